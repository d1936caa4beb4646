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

/** The finished run with the most stars, the one that ended last of equals. */
export function findWidest<Of extends Pick<AnalysisView, 'runs'>>(analyses: Of[]) {
  const [widest] = analyses
    .flatMap((analysis) => analysis.runs.filter(isFinished).map((run) => ({ analysis, run })))
    .sort(
      (a, b) =>
        (b.run.stars ?? 0) - (a.run.stars ?? 0) ||
        (b.run.finishedAt ?? '').localeCompare(a.run.finishedAt ?? ''),
    );
  return widest;
}

/** The widest run of the whole collaboration: its maps serve previews and estimates. */
export async function widestRun(actor: Actor): Promise<PackedRun | null> {
  const { analyses } = await listAnalyses(actor);
  const widest = findWidest(analyses);
  return widest ? drawnRun(actor, widest.analysis, widest.run) : null;
}
