import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function ForecastLoading() {
  return <PageSkeleton what="the forecast" shape="axes" />;
}
