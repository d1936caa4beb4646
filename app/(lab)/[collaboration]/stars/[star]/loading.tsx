import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function StarLoading() {
  return <PageSkeleton what="the star" shape="axes" />;
}
