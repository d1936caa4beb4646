import { PageSkeleton } from '@/components/ui/page-skeleton';

export default function LabLoading() {
  return <PageSkeleton what="the page" shape="table" />;
}
