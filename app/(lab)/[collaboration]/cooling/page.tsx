import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { CoolingScreen } from '@/components/cooling/cooling-screen';
import { may } from '@/lib/access/permissions';
import { listCoolingTables } from '@/lib/services/cooling-tables';

export const metadata: Metadata = { title: 'Cooling' };

export default async function CoolingPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  return (
    <CoolingScreen
      collaboration={actor.collaboration}
      tables={await listCoolingTables(actor)}
      canName={may(actor, 'import-cooling-table')}
    />
  );
}
