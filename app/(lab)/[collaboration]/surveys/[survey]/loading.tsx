import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function SurveyLoading() {
  return <PageSkeleton what="the survey" shape="table" />;
}
