import { drawnRun } from '@/app/drawn-run';
import type { Actor } from '@/lib/access/actor';
import type { DrawnRun, RunSummary } from '@/lib/schemas/runs';
import { listAnalyses } from '@/lib/services/analyses';

export function isFinished(run: RunSummary): boolean {
  return run.job.status === 'done' && run.limit !== null;
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
