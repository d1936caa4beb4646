import { isInside, type Population } from '@/lib/population';
import { formatPlain } from '@/lib/quantities/display';
import type { CandidateTreatment, RateQuestion } from './contract';

/** A companion candidate that nobody settled, as far as it is known. */
export interface OpenCandidate {
  name: string;
  /** Index of its star in the sample. */
  star: number;
  /** Probability [fraction] that it is a companion; null: nobody gave one. */
  probability: number | null;
  /** Best values; null: not measured. */
  massMjup: number | null;
  semiMajorAxisAu: number | null;
}

/** What becomes of the open candidates of a sample: they count with their probability. */
export type OpenCandidates =
  | { treatment: 'fixed'; open: readonly OpenCandidate[] }
  | { treatment: 'rate-dependent'; referenceRate: number; open: readonly OpenCandidate[] };

/** A candidate that counts. */
export interface CountedCandidate {
  name: string;
  star: number;
  probability: number;
}

const REMEDY = 'give one, settle the candidate, or set candidates aside';

function countOne(
  candidate: OpenCandidate,
  population: Population,
  hostMassMsun: number | undefined,
): CountedCandidate | null {
  const { name, star, probability, massMjup, semiMajorAxisAu } = candidate;
  if (probability === 0) return null;
  if (massMjup === null || semiMajorAxisAu === null) {
    const missing = massMjup === null ? 'mass' : 'semi-major axis';
    throw new RangeError(
      `The candidate ${name} has no ${missing}, so whether it lies in the ranges is not known: ${REMEDY}`,
    );
  }
  if (!isInside(population, massMjup, semiMajorAxisAu, hostMassMsun)) return null;
  if (probability === null) {
    throw new RangeError(
      `The candidate ${name} lies in the ranges and has no probability of being real: ${REMEDY}`,
    );
  }
  return { name, star, probability };
}

/**
 * The open candidates that count: those whose best mass and semi-major axis lie in the population's
 * ranges, edges included.
 *
 * @param hostMassMsun shape [star] [M_Sun]: for the mass ratio, whose ranges differ from star to star
 * @throws RangeError that names a candidate without mass or semi-major axis, or one inside the ranges
 *   without a probability, and says what to do
 */
export function countCandidates(
  open: readonly OpenCandidate[],
  population: Population,
  hostMassMsun?: Float64Array | null,
): CountedCandidate[] {
  return open.flatMap(
    (candidate) => countOne(candidate, population, hostMassMsun?.[candidate.star]) ?? [],
  );
}

/** Counted candidates as a question of the rate takes them; undefined where there are none. */
export function candidateTreatment(
  settings: OpenCandidates | null | undefined,
  counted: readonly CountedCandidate[],
): RateQuestion['candidates'] {
  if (!settings || counted.length === 0) return undefined;
  const entries = counted.map(({ star, probability }) => ({ star, probability }));
  return settings.treatment === 'fixed'
    ? { treatment: 'fixed', entries }
    : { treatment: 'rate-dependent', referenceRate: settings.referenceRate, entries };
}

/** What a limit did with the candidates without an answer. */
export interface StatedCandidates {
  treatment: CandidateTreatment['treatment'] | 'set-aside';
  referenceRate?: number | null;
  /** Those that count, or those set aside that may lie in the ranges. */
  entries: readonly { name: string; probability: number | null }[];
}

/** Whether a companion or a candidate counts: only then is an interval quoted beside the limit. */
export const countsAnything = (
  counted: readonly unknown[],
  candidates: Pick<StatedCandidates, 'treatment' | 'entries'> | null | undefined,
) =>
  counted.length > 0 ||
  (candidates != null && candidates.treatment !== 'set-aside' && candidates.entries.length > 0);

/** A candidate without an answer, as the inputs of a run keep it. */
export interface KeptCandidate {
  name: string;
  probability?: number | null;
  /** null: not known. */
  insideRanges: boolean | null;
}

/** Candidates that no limit counts: those that may lie in the ranges; undefined: there are none at all. */
export function setAside<Kept extends KeptCandidate>(
  undecided: readonly Kept[],
  isPossible = (one: Kept): boolean => one.insideRanges !== false,
): StatedCandidates | undefined {
  if (undecided.length === 0) return undefined;
  const entries = undecided
    .filter(isPossible)
    .map(({ name, probability = null }) => ({ name, probability }));
  return { treatment: 'set-aside', entries };
}

const named = (entries: StatedCandidates['entries'], of = '') =>
  entries
    .map(({ name, probability }) =>
      probability === null ? name : `${name} (${of}${formatPlain(probability)})`,
    )
    .join(', ');

/** The treatment in words, each candidate by name with its probability. */
export function describeCandidates(stated: StatedCandidates): string {
  const { treatment, entries } = stated;
  if (entries.length === 0) return 'none without an answer inside the ranges';
  if (treatment === 'set-aside')
    return `set aside, though not settled: ${named(entries, 'probability ')}`;
  const count = entries.length === 1 ? '1 counts' : `${entries.length} count`;
  return treatment === 'fixed'
    ? `${count} with the probability of being real, held fixed: ${named(entries)}`
    : `${count} with a probability of being real that follows the rate, quoted for a rate of ` +
        `${formatPlain(stated.referenceRate ?? Number.NaN)}: ${named(entries)}`;
}

/** The background in words, where there is one. */
export function describeBackground(background: number): string {
  return `${formatPlain(background)} false detections expected among those counted`;
}
