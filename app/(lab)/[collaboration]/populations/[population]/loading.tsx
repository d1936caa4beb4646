import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function PopulationLoading() {
  return <PageSkeleton what="the population" shape="axes" />;
}
