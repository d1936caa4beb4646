import type { CandidateView } from '@/lib/schemas/candidates';
import type { CompanionRow, CompanionVerdictRow } from '@/models';
import type { FoundCandidate } from './find';
import type { LeadRanges } from './lead-ranges';

const pairOf = (lower: number | null, upper: number | null): [number, number] | null =>
  lower === null || upper === null ? null : [lower, upper];

/** What is said of a candidate: by its row now, or by one verdict of its history. */
export function statedOf(row: CompanionRow | CompanionVerdictRow) {
  return {
    status: row.status,
    probability: row.probability,
    massMjup: row.massMjup,
    massErrorsMjup: pairOf(row.massErrorLowerMjup, row.massErrorUpperMjup),
    semiMajorAxisAu: row.semiMajorAxisAu,
    semiMajorAxisErrorsAu: pairOf(row.semiMajorAxisErrorLowerAu, row.semiMajorAxisErrorUpperAu),
  };
}

export const isOpen = ({ status }: Pick<CompanionRow, 'status'>) =>
  status === 'candidate' || status === 'ambiguous';

export function describeCandidate(
  { row, target, survey }: FoundCandidate,
  counts: { observations: number; proposals: number },
  ranges: LeadRanges,
): CandidateView {
  return {
    ...statedOf(row),
    ...counts,
    id: row.id,
    name: row.name,
    star: target.name,
    survey: { slug: survey.slug, name: survey.name, position: survey.position },
    isInsideRanges: ranges.covers(row, target),
    isOpen: isOpen(row),
  };
}
