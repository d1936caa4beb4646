import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function CoolingLoading() {
  return <PageSkeleton what="the cooling relations" shape="axes" />;
}
