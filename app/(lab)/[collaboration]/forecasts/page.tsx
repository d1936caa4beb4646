import type { Metadata } from 'next';
import { isFinished } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { ForecastList } from '@/components/studies/forecast/forecast-list';
import { may } from '@/lib/access/permissions';
import { listAnalyses } from '@/lib/services/analyses';
import { listStudies } from '@/lib/services/studies';

export const metadata: Metadata = { title: 'Forecasts' };

export default async function ForecastsPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [{ studies }, { analyses }] = await Promise.all([
    listStudies(actor, { kind: 'forecast', limit: 100, offset: 0 }),
    listAnalyses(actor),
  ]);
  return (
    <ForecastList
      collaboration={actor.collaboration}
      initial={studies}
      canCreate={may(actor, 'run-analysis', { isOwn: true })}
      hasRun={analyses.some(({ runs }) => runs.some(isFinished))}
    />
  );
}
