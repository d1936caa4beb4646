import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { PopulationList } from '@/components/populations/population-list';
import { may } from '@/lib/access/permissions';
import { listPopulations } from '@/lib/services/populations';

export const metadata: Metadata = { title: 'Populations' };

export default async function PopulationsPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { populations } = await listPopulations(actor);
  return (
    <PopulationList
      collaboration={actor.collaboration}
      initial={populations}
      canCreate={may(actor, 'save-population', { isOwn: true })}
    />
  );
}
