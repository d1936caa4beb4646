import { gammaQuantileUpper, logGamma } from '@/lib/numerics/special';

/** Steps of the search for an end: the accepted rates have gaps finer than a count, not than this. */
const STEP = 0.005;
const COARSE_STEP = 0.02;
/** Backgrounds looked at beyond the given one, for an upper end that does not rise with it. */
const FURTHER = 4;

/**
 * Whether a count belongs to the accepted ones of a rate: the counts with a larger likelihood ratio
 * do not reach the level without it.
 */
function isAccepted(rate: number, count: number, background: number, level: number): boolean {
  const mean = rate + background;
  const logMean = Math.log(mean);
  const logRatio = (n: number) => {
    const best = Math.max(n, background);
    return (n === 0 ? 0 : n * (logMean - Math.log(best))) - mean + best;
  };
  if (mean === 0) return count === 0;
  const own = logRatio(count);
  const probability = (n: number) => Math.exp(n * logMean - mean - logGamma(n + 1));
  let sum = 0;
  // The ratio has one peak, next to the mean: on both sides of it counts are taken until it has
  // fallen to that of the count itself.
  const peak = Math.floor(mean);
  let term = probability(peak);
  for (let n = peak; n >= 0 && logRatio(n) > own; n--) {
    sum += term;
    term *= n / mean;
  }
  term = probability(peak + 1);
  for (let n = peak + 1; logRatio(n) > own; n++) {
    sum += term;
    term *= mean / (n + 1);
  }
  return sum < level;
}

/** Halves between a rate that is accepted and one that is not. */
function refine(inside: number, outside: number, isInside: (rate: number) => boolean): number {
  let [good, bad] = [inside, outside];
  for (let i = 0; i < 45; i++) {
    const middle = 0.5 * (good + bad);
    if (isInside(middle)) good = middle;
    else bad = middle;
  }
  return good;
}

/** Largest accepted rate; 0 where none is. */
function upperEnd(count: number, background: number, level: number, step: number): number {
  const isInside = (rate: number) => isAccepted(rate, count, background, level);
  const bound = gammaQuantileUpper((1 - level) / 8, count + 1) + 1;
  for (let i = Math.ceil(bound / step); i >= 0; i--) {
    if (isInside(i * step)) return refine(i * step, (i + 1) * step, isInside);
  }
  return 0;
}

function lowerEnd(count: number, background: number, level: number, upper: number): number {
  const isInside = (rate: number) => isAccepted(rate, count, background, level);
  for (let i = 0; i * STEP <= upper; i++) {
    if (isInside(i * STEP)) return i === 0 ? 0 : refine(i * STEP, (i - 1) * STEP, isInside);
  }
  return upper;
}

/**
 * Unified confidence interval of a Poisson mean above a known background.
 *
 * Counts are accepted in the order of P(n | mu + b)/P(n | max(0, n - b) + b). The upper end is the
 * largest over backgrounds at and above the given one, so that it does not rise with b.
 *
 * @param count n, integer >= 0
 * @param background b, scalar [counts], >= 0
 * @param confidenceLevel scalar [fraction], two-sided
 * @returns [lower, upper] of the mean mu [counts]
 * @throws RangeError for arguments outside their domains
 * Accuracy: ends are found in steps of 0.005 (0.02 for larger backgrounds), then to 1e-12; 0.02 of
 *   a tabulated interval. Cost: some ten thousand sums of a few tens of terms where b > 0.
 * @source Feldman & Cousins 1998, Phys. Rev. D 57, 3873, sections III and IV B
 * @example feldmanCousinsInterval(0, 0, 0.95) // [0, 3.09]
 */
export function feldmanCousinsInterval(
  count: number,
  background: number,
  confidenceLevel: number,
): [number, number] {
  if (!(Number.isInteger(count) && count >= 0)) {
    throw new RangeError(`a count must be a whole number >= 0, got ${count}`);
  }
  if (!(background >= 0) || !Number.isFinite(background)) {
    throw new RangeError(`the expected background must be a number >= 0, got ${background}`);
  }
  if (!(confidenceLevel > 0 && confidenceLevel < 1)) {
    throw new RangeError(
      `a confidence level lies between 0 and 1 (0.95, not 95), got ${confidenceLevel}`,
    );
  }
  const own = upperEnd(count, background, confidenceLevel, STEP);
  const lower = lowerEnd(count, background, confidenceLevel, own);
  if (background === 0) return [lower, own];
  let upper = own;
  for (let i = 1; i * COARSE_STEP <= FURTHER; i++) {
    const further = background + i * COARSE_STEP;
    upper = Math.max(upper, upperEnd(count, further, confidenceLevel, COARSE_STEP));
  }
  return [lower, upper];
}
