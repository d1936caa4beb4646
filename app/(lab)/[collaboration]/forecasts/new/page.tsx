import type { Metadata } from 'next';
import { isFinished, newestRunOf } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { NewForecast } from '@/components/studies/forecast/new-forecast';
import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { listAnalyses } from '@/lib/services/analyses';
import { leadOf } from '@/lib/services/lead-analysis';
import { getSettings } from '@/lib/services/settings';
import { getStudy } from '@/lib/services/studies';

export const metadata: Metadata = { title: 'New forecast' };

export default async function NewForecastPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { analysis, from } = await searchParams;
  const [{ analyses }, { leadAnalysis }, earlier] = await Promise.all([
    listAnalyses(actor),
    getSettings(actor),
    from === undefined ? null : findForecast(actor, from),
  ]);
  const canAsk = may(actor, 'run-analysis', { isOwn: true });
  const bases = analyses.filter(({ runs }) => runs.some(isFinished));
  const wanted = earlier?.run.analysisKey ?? analysis;
  const lead = bases.find(({ key }) => key === leadAnalysis) ?? leadOf(bases, {});
  const base = bases.find(({ key }) => key === wanted) ?? lead ?? bases[0];
  const { run = null, runPopulation = null } = base ? await newestRunOf(actor, base) : {};
  return (
    <NewForecast
      collaboration={actor.collaboration}
      bases={bases}
      first={base && run ? { key: base.key, run, population: runPopulation } : null}
      start={earlier?.settings.kind === 'forecast' ? earlier.settings : undefined}
      disabledReason={canAsk ? undefined : 'Only members of this collaboration can ask for one.'}
    />
  );
}

/** One that is gone leaves the form empty. */
async function findForecast(actor: Actor, id: string) {
  try {
    return await getStudy(actor, id);
  } catch (reason) {
    if (reason instanceof NotFound) return null;
    throw reason;
  }
}
