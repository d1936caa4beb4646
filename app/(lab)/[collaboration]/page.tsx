import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { OverviewScreen } from '@/components/overview/overview-screen';
import { demonstrationBeside } from '@/lib/services/demonstration';
import { getFirstSteps } from '@/lib/services/first-steps';
import { getOverview } from '@/lib/services/overview';

export const metadata: Metadata = { title: 'Overview' };

export default async function OverviewPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [initial, steps, demonstration] = await Promise.all([
    getOverview(actor),
    getFirstSteps(actor),
    demonstrationBeside(actor.collaboration),
  ]);
  return (
    <OverviewScreen
      collaboration={actor.collaboration}
      initial={initial}
      steps={steps}
      hasDemonstration={demonstration !== null}
    />
  );
}
