import type { AnalysisView } from '@/lib/schemas/analyses';

/**
 * The lead analysis: the one that an owner chose, until then the one with the newest result. The same
 * rule as `LEAD_ANALYSIS`, for who has read all analyses.
 */
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

/** The same rule as `leadOf` as a query: the lead's row of the collaboration `$1`, if there is one. */
export const LEAD_ANALYSIS = `
  select a.* from analysis a join collaboration c on c.id = a.collaboration_id
    left join lateral (
      select max(r.finished_at) as at from run r
      where r.analysis_id = a.id and r.result is not null) newest on true
  where c.id = $1 and (a.id::text = c.settings->>'leadAnalysisId' or newest.at is not null)
  order by a.id::text = c.settings->>'leadAnalysisId' desc nulls last, newest.at desc, a.number desc
  limit 1`;
