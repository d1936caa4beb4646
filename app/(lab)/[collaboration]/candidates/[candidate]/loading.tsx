import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function CandidateLoading() {
  return <PageSkeleton what="the candidate" shape="axes" />;
}
