import { notFound } from 'next/navigation';
import { isFinished } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { NotFound } from '@/lib/errors';
import { getAnalysis } from '@/lib/services/analyses';
import { findPopulationsById } from '@/lib/services/populations';
import { getRun } from '@/lib/services/runs';

/** An analysis with its newest finished run, which further questions are asked of. */
export async function studyInputs(collaboration: string, analysisKey: string) {
  const actor = await currentActor(collaboration);
  try {
    const analysis = await getAnalysis(actor, analysisKey);
    const finished = analysis.runs.find(isFinished);
    const run = finished ? await getRun(actor, finished.id) : null;
    const used = run?.inputs?.population.id;
    const populations = used ? await findPopulationsById(actor, [used]) : undefined;
    return {
      collaboration: actor.collaboration,
      analysis,
      run,
      runPopulation: (used && populations?.get(used)) || null,
    };
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}
