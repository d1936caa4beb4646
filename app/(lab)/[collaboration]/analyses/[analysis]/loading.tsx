import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function AnalysisLoading() {
  return <PageSkeleton what="the analysis" shape="plate" />;
}
