import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function NewPopulationLoading() {
  return <PageSkeleton what="a new population" shape="axes" />;
}
