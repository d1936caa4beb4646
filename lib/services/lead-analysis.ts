import type { AnalysisView } from '@/lib/schemas/analyses';

/** The lead analysis: the one that an owner chose, until then the one with the newest result. */
export function leadOf(
  analyses: AnalysisView[],
  settings: Record<string, unknown>,
): AnalysisView | null {
  const chosen = analyses.find(({ id }) => id === settings.leadAnalysisId);
  if (chosen) return chosen;
  const finishedAt = ({ runs }: AnalysisView) =>
    runs.reduce((newest, run) => (run.limit === null ? newest : max(newest, run.finishedAt)), '');
  const [newest] = analyses
    .filter((analysis) => finishedAt(analysis) !== '')
    .sort((a, b) => (finishedAt(a) < finishedAt(b) ? 1 : -1));
  return newest ?? null;
}

const max = (a: string, b: string | null) => (b !== null && b > a ? b : a);
