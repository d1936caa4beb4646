import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { OverviewScreen } from '@/components/overview/overview-screen';
import { getOverview } from '@/lib/services/overview';

export const metadata: Metadata = { title: 'Overview' };

export default async function OverviewPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  return <OverviewScreen collaboration={actor.collaboration} initial={await getOverview(actor)} />;
}
