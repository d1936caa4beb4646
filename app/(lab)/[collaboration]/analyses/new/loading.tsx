import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function NewAnalysisLoading() {
  return <PageSkeleton what="a new analysis" shape="axes" />;
}
