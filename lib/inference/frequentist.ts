import { normalQuantile } from '@/lib/numerics/normal';
import { findRoot } from '@/lib/numerics/roots';
import { betaQuantile, gammaQuantile, gammaQuantileUpper } from '@/lib/numerics/special';

function checkConfidence(level: number): void {
  if (!(level > 0 && level < 1)) {
    throw new RangeError(`a confidence level lies between 0 and 1 (0.95, not 95), got ${level}`);
  }
}

function checkCount(count: number, trials = Number.POSITIVE_INFINITY): void {
  if (!(Number.isInteger(count) && count >= 0 && count <= trials)) {
    throw new RangeError(`a count must be a whole number from 0 to ${trials}, got ${count}`);
  }
}

/**
 * Upper confidence limit on the mean number of companions per star, without a prior.
 *
 * @param detections k, integer >= 0
 * @param exposure S, scalar [stars], > 0; 0 gives Infinity
 * @param confidenceLevel scalar [fraction], one-sided
 * @throws RangeError for a count or level outside its domain
 * @source Garwood 1936, Biometrika 28, 437; Gehrels 1986, ApJ 303, 336
 * @example poissonUpperLimit(0, 25, 0.95) // 0.119829290942160
 */
export function poissonUpperLimit(
  detections: number,
  exposure: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(detections);
  return gammaQuantileUpper(1 - confidenceLevel, detections + 1) / exposure;
}

/**
 * Lower confidence limit on the mean number of companions per star; 0 without a detection.
 *
 * @source Garwood 1936, Biometrika 28, 437
 */
export function poissonLowerLimit(
  detections: number,
  exposure: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(detections);
  return detections === 0 ? 0 : gammaQuantile(1 - confidenceLevel, detections) / exposure;
}

/**
 * Upper confidence limit on a fraction from plain counts (every star fully seen).
 *
 * @param successes integer, 0..trials
 * @param trials integer >= 1
 * @source Clopper & Pearson 1934, Biometrika 26, 404
 */
export function binomialUpperLimit(
  successes: number,
  trials: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(successes, trials);
  if (successes === trials) return 1;
  return betaQuantile(confidenceLevel, successes + 1, trials - successes);
}

/** Lower confidence limit on a fraction from plain counts; 0 without a success. */
export function binomialLowerLimit(
  successes: number,
  trials: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(successes, trials);
  if (successes === 0) return 0;
  return betaQuantile(1 - confidenceLevel, successes, trials - successes + 1);
}

/**
 * Approximate central interval of a fraction from plain counts; to be labelled approximate.
 *
 * @source Wilson 1927, J. Am. Stat. Assoc. 22, 209
 */
export function wilsonInterval(
  successes: number,
  trials: number,
  confidenceLevel: number,
): [number, number] {
  checkConfidence(confidenceLevel);
  checkCount(successes, trials);
  const z = normalQuantile(0.5 * (1 + confidenceLevel));
  const share = successes / trials;
  const scale = 1 + (z * z) / trials;
  const centre = (share + (z * z) / (2 * trials)) / scale;
  const half =
    (z * Math.sqrt((share * (1 - share)) / trials + (z * z) / (4 * trials * trials))) / scale;
  return [successes === 0 ? 0 : centre - half, successes === trials ? 1 : centre + half];
}

/**
 * Probabilities of 0, 1, ... successes in independent trials of unequal probability.
 *
 * Convolution over the trials; exact, no normal approximation.
 *
 * @param probabilities shape [trial], 0..1
 * @param most largest count wanted, default all
 * @returns shape [min(most, trials) + 1]
 */
export function poissonBinomial(
  probabilities: ArrayLike<number>,
  most = probabilities.length,
): Float64Array {
  const size = Math.min(most, probabilities.length) + 1;
  const counts = new Float64Array(size);
  counts[0] = 1;
  for (let j = 0; j < probabilities.length; j++) {
    const p = probabilities[j];
    for (let n = Math.min(j + 1, size - 1); n > 0; n--) {
      counts[n] = counts[n] * (1 - p) + counts[n - 1] * p;
    }
    counts[0] *= 1 - p;
  }
  return counts;
}

/**
 * Upper confidence limit on the fraction of stars with a companion, stars unequally complete.
 *
 * Solves P(K <= k | f) = 1 - level, K the exact Poisson-binomial count of f C_j.
 *
 * @param completeness mean completeness of each star, shape [star], 0..1
 * @param detections k, stars with a counted detection
 * @param confidenceLevel scalar [fraction], one-sided
 * @returns fraction of stars; 1 where even f = 1 is not excluded
 * @throws RangeError for a count or level outside its domain
 * Accuracy: 1e-12 absolute. Cost: about 10 convolutions of k + 1 terms.
 * @source equals Clopper & Pearson 1934 where every completeness is 1
 */
export function hostFractionUpperLimit(
  completeness: Float64Array,
  detections: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(detections, completeness.length);
  const excess = (fraction: number) =>
    chanceOfAtMost(completeness, fraction, detections) - (1 - confidenceLevel);
  if (detections === completeness.length || excess(1) >= 0) return 1;
  return findRoot(excess, 0, 1, { absoluteTolerance: 1e-14 });
}

/** P(K <= most) at a fraction, K the exact count of f C_j. */
function chanceOfAtMost(completeness: Float64Array, fraction: number, most: number): number {
  const counts = poissonBinomial(
    completeness.map((c) => fraction * c),
    most,
  );
  return counts.reduce((sum, p) => sum + p, 0);
}

/**
 * Lower confidence limit on the fraction of stars with a companion, stars unequally complete.
 *
 * Solves P(K >= k | f) = 1 - level, K the exact Poisson-binomial count of f C_j.
 *
 * @param completeness mean completeness of each star, shape [star], 0..1
 * @param detections k, stars with a counted detection
 * @param confidenceLevel scalar [fraction], one-sided
 * @returns fraction of stars; 0 without a detection, 1 where even f = 1 makes k too rare
 * @throws RangeError for a count or level outside its domain
 * @source equals Clopper & Pearson 1934 where every completeness is 1
 */
export function hostFractionLowerLimit(
  completeness: Float64Array,
  detections: number,
  confidenceLevel: number,
): number {
  checkConfidence(confidenceLevel);
  checkCount(detections, completeness.length);
  if (detections === 0) return 0;
  const excess = (fraction: number) =>
    confidenceLevel - chanceOfAtMost(completeness, fraction, detections - 1);
  if (excess(1) <= 0) return 1;
  return findRoot(excess, 0, 1, { absoluteTolerance: 1e-14 });
}
