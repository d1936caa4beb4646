import type { CandidateTreatment, RateQuestion, UndecidedCandidate } from './contract';

/** A question whose parts fit together, in the form that the likelihood takes. */
export interface CheckedQuestion extends Pick<RateQuestion, 'likelihood' | 'prior'> {
  /**
   * The rate is `unit` times x, and x runs up to 1 for a fraction: the largest fraction of stars
   * that the rates of single stars allow, or 1.
   */
  unit: number;
  /** unit s_j C_j, shape [star]: probability of a detection per x. */
  completeness: Float64Array;
  /** S = sum of s_j C_j [stars]. */
  exposure: number;
  /** Stars with a counted detection, each once for a fraction. */
  counted: number[];
  /** Candidates that may or may not be real, 0 < probability < 1; one a star for a fraction. */
  undecided: UndecidedCandidate[];
  treatment: CandidateTreatment['treatment'];
  /** Rate for which probabilities were quoted, in units of x; NaN where they are fixed. */
  referenceRate: number;
  background: number;
}

function checkIndex(star: number, name: string): void {
  if (!Number.isInteger(star) || star < 0) {
    throw new RangeError(`${name} holds indices of stars, got ${star}`);
  }
}

/** A star of a fraction must be there, and be able to show what was found. */
function checkSeen(star: number, { completeness }: RateQuestion, what: string): void {
  if (star >= completeness.length) {
    throw new RangeError(`${what} star ${star}, but there are ${completeness.length} stars`);
  }
  if (completeness[star] === 0) {
    throw new RangeError(
      `star ${star} has a detection where its map says nothing can be seen (mean completeness ` +
        '0): check the map, the ranges of the population or the detection',
    );
  }
}

/** Detections that the likelihood counts: for the host fraction a star enters once. */
function countedStars(question: RateQuestion): number[] {
  const { likelihood, detectedStars } = question;
  for (const star of detectedStars) checkIndex(star, 'detectedStars');
  if (likelihood === 'mean-number') return [...detectedStars];
  const distinct = [...new Set(detectedStars)];
  for (const star of distinct) checkSeen(star, question, 'detectedStars names');
  return distinct;
}

/** Completeness times the rate of each star over the one asked for. */
function scaledCompleteness(question: RateQuestion): Float64Array {
  const { likelihood, completeness, rateScale } = question;
  const isFraction = likelihood === 'host-fraction';
  if (rateScale !== undefined && rateScale.length !== completeness.length) {
    throw new RangeError(
      `rateScale has one value a star, got ${rateScale.length} for ${completeness.length} stars`,
    );
  }
  const scaled = new Float64Array(completeness.length);
  for (let star = 0; star < scaled.length; star++) {
    const c = completeness[star];
    if (!(c >= 0) || !Number.isFinite(c) || (isFraction && c > 1)) {
      throw new RangeError(
        `completeness of star ${star} must lie ${isFraction ? 'in 0..1' : 'at 0 or above'}, got ${c}`,
      );
    }
    const scale = rateScale === undefined ? 1 : rateScale[star];
    if (!(scale > 0) || !Number.isFinite(scale)) {
      throw new RangeError(`rateScale of star ${star} must be a positive number, got ${scale}`);
    }
    scaled[star] = scale * c;
  }
  return scaled;
}

/** The fraction at which the first star's own rate reaches 1; 1 where none does below. */
function largestFraction({ likelihood, rateScale }: RateQuestion): number {
  if (likelihood === 'mean-number' || rateScale === undefined) return 1;
  let largest = 1;
  for (const scale of rateScale) largest = Math.max(largest, scale);
  return 1 / largest;
}

function checkReference(question: RateQuestion, unit: number): number {
  const { candidates, likelihood } = question;
  if (candidates?.treatment !== 'rate-dependent') return Number.NaN;
  const { referenceRate } = candidates;
  if (!(referenceRate > 0) || !Number.isFinite(referenceRate)) {
    throw new RangeError(
      'candidates whose probability depends on the rate need the positive rate that it was quoted ' +
        `for, got ${referenceRate}`,
    );
  }
  if (likelihood === 'host-fraction' && referenceRate >= unit) {
    throw new RangeError(
      `candidates: the rate they were quoted for must lie below ${unit} for a fraction of stars, ` +
        `got ${referenceRate}`,
    );
  }
  return referenceRate / unit;
}

/**
 * Candidates that are neither confirmed (probability 1) nor refuted (0), the confirmed apart.
 *
 * A star counts once for the host fraction: its candidates become one, real when any of them is,
 * and fall away where the star has a confirmed companion.
 */
function settle(question: RateQuestion, counted: number[]) {
  const entries = question.candidates?.entries ?? [];
  const isFraction = question.likelihood === 'host-fraction';
  const confirmed = [...counted];
  const open: UndecidedCandidate[] = [];
  for (const { star, probability } of entries) {
    checkIndex(star, 'candidates');
    if (!(probability >= 0 && probability <= 1)) {
      throw new RangeError(`a candidate's probability lies in 0..1, got ${probability}`);
    }
    if (probability === 0) continue;
    if (isFraction) checkSeen(star, question, 'candidates name');
    if (probability < 1) open.push({ star, probability });
    else if (!isFraction || !confirmed.includes(star)) confirmed.push(star);
  }
  if (!isFraction) return { confirmed, undecided: open };
  const noneReal = new Map<number, number>();
  for (const { star, probability } of open) {
    if (confirmed.includes(star)) continue;
    noneReal.set(star, (noneReal.get(star) ?? 1) * (1 - probability));
  }
  const undecided = [...noneReal].map(([star, none]) => ({ star, probability: 1 - none }));
  return { confirmed, undecided };
}

function checkBackground({ background = 0, likelihood }: RateQuestion): number {
  if (!(background >= 0) || !Number.isFinite(background)) {
    throw new RangeError(`the expected background must be a number >= 0, got ${background}`);
  }
  if (background > 0 && likelihood === 'host-fraction') {
    throw new RangeError(
      'a known background belongs to the mean number of companions: a star of the host fraction ' +
        'either has a companion or not; give the candidates their probabilities instead',
    );
  }
  return background;
}

/**
 * Checks a question and puts its rates on one scale.
 *
 * @throws RangeError for completeness or scale out of range, detections and candidates of stars
 *   that are not there or show nothing, probabilities outside 0..1, a missing reference rate, and a
 *   background that is negative or asked of a fraction
 */
export function checkQuestion(question: RateQuestion): CheckedQuestion {
  const scaled = scaledCompleteness(question);
  const unit = largestFraction(question);
  let exposure = 0;
  for (const c of scaled) exposure += c;
  const { confirmed, undecided } = settle(question, countedStars(question));
  return {
    likelihood: question.likelihood,
    prior: question.prior,
    unit,
    // A product of 1/s and s can miss 1 by one rounding.
    completeness: unit === 1 ? scaled : scaled.map((c) => Math.min(1, unit * c)),
    exposure,
    counted: confirmed,
    undecided,
    treatment: question.candidates?.treatment ?? 'fixed',
    referenceRate: checkReference(question, unit),
    background: checkBackground(question),
  };
}
