import { drawnRun } from '@/app/drawn-run';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { RunSummary } from '@/lib/schemas/runs';
import { listAnalyses } from '@/lib/services/analyses';
import { findPopulationsById } from '@/lib/services/populations';

export function isFinished(run: RunSummary): boolean {
  return run.job.status === 'done' && run.limit !== null;
}

/** The newest finished run of an analysis, with the population that it was made under. */
export async function newestRunOf(actor: Actor, analysis: AnalysisView) {
  const finished = analysis.runs.find(isFinished);
  const run = finished ? await drawnRun(actor, analysis, finished) : null;
  const used = run?.populationId;
  const populations = used ? await findPopulationsById(actor, [used]) : undefined;
  return { run, runPopulation: (used && populations?.get(used)) || null };
}

/** The run that finished last in the whole collaboration: its maps serve previews and estimates. */
export async function newestRun(actor: Actor): Promise<PackedRun | null> {
  const { analyses } = await listAnalyses(actor);
  const [newest] = analyses
    .flatMap((analysis) => analysis.runs.filter(isFinished).map((run) => ({ analysis, run })))
    .sort((a, b) => (b.run.finishedAt ?? '').localeCompare(a.run.finishedAt ?? ''));
  return newest ? drawnRun(actor, newest.analysis, newest.run) : null;
}
