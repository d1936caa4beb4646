import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function CompareLoading() {
  return <PageSkeleton what="the comparison" shape="plate" />;
}
