import { drawnRun } from '@/app/drawn-run';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { DrawnRun, RunSummary } from '@/lib/schemas/runs';
import { listAnalyses } from '@/lib/services/analyses';
import { findPopulationsById } from '@/lib/services/populations';

export function isFinished(run: RunSummary): boolean {
  return run.job.status === 'done' && run.limit !== null;
}

/** The newest finished run of an analysis, with the population that it was made under. */
export async function newestRunOf(actor: Actor, { runs }: AnalysisView) {
  const finished = runs.find(isFinished);
  const run = finished ? await drawnRun(actor, finished.id) : null;
  const used = run?.inputs?.population.id;
  const populations = used ? await findPopulationsById(actor, [used]) : undefined;
  return { run, runPopulation: (used && populations?.get(used)) || null };
}

/** The run that finished last in the whole collaboration: its maps serve previews and estimates. */
export async function newestRun(actor: Actor): Promise<DrawnRun | null> {
  const { analyses } = await listAnalyses(actor);
  const finished = analyses
    .flatMap((analysis) => analysis.runs)
    .filter(isFinished)
    .sort((a, b) => (b.finishedAt ?? '').localeCompare(a.finishedAt ?? ''));
  return finished.length === 0 ? null : drawnRun(actor, finished[0].id);
}
