import { logGamma } from '@/lib/numerics/special';
import type { Likelihood, RatePosterior } from './contract';
import { poissonBinomial } from './frequentist';

/** Number of detections that a sample may bring. */
export interface CountDistribution {
  /** P(n), n = 0, 1, ...: up to where less than 1e-12 is left. */
  probability: Float64Array;
  /** Expected number of detections. */
  mean: number;
  /** P(n >= 1). */
  chanceOfAny: number;
}

/** Stars that are looked at: what a rate makes of them. */
export interface Sample {
  likelihood: Likelihood;
  /** Mean completeness of each star, shape [star]; of the mean number their sum alone will do. */
  completeness: Float64Array;
  /** s_j, shape [star]: rate of each star over the rate asked for. */
  rateScale?: Float64Array;
}

/** Probability left beyond the last count. */
const REST = 1e-12;

/** Poisson probabilities of 0, 1, ... up to where less than 1e-13 is left. */
function poissonCounts(mean: number): Float64Array {
  const most = Math.ceil(mean + 9 * Math.sqrt(mean) + 30);
  return Float64Array.from({ length: most + 1 }, (_, n) =>
    mean === 0 ? Number(n === 0) : Math.exp(n * Math.log(mean) - mean - logGamma(n + 1)),
  );
}

/** The same with an end before which nothing counts any more. */
function ended(probability: Float64Array): CountDistribution {
  let last = probability.length - 1;
  let rest = 0;
  while (last > 0 && rest + probability[last] < REST) rest += probability[last--];
  const kept = probability.slice(0, last + 1);
  const mean = kept.reduce((sum, p, n) => sum + n * p, 0);
  return { probability: kept, mean, chanceOfAny: Math.max(0, 1 - kept[0]) };
}

function scaledOf({ completeness, rateScale }: Sample): Float64Array {
  return rateScale ? completeness.map((c, j) => c * rateScale[j]) : completeness;
}

/** Most successes worth a place: the mean with nine of its roots. */
function mostCounts(scaled: Float64Array, rate: number): number {
  const mean = rate * scaled.reduce((sum, c) => sum + c, 0);
  return Math.min(scaled.length, Math.ceil(mean + 9 * Math.sqrt(mean) + 30));
}

function countsAt(scaled: Float64Array, likelihood: Likelihood, rate: number): Float64Array {
  if (likelihood === 'mean-number') {
    return poissonCounts(rate * scaled.reduce((sum, c) => sum + c, 0));
  }
  const chances = scaled.map((c) => {
    if (rate * c > 1 + 1e-12) {
      throw new RangeError(`a star's chance of a detection would be ${rate * c} at rate ${rate}`);
    }
    return Math.min(1, rate * c);
  });
  return poissonBinomial(chances, mostCounts(scaled, rate));
}

/**
 * Number of detections of a sample at a given rate, exactly.
 *
 * Mean number: Poisson of F S. Host fraction: the sum of unequal trials f s_j C_j.
 *
 * @param rate planets per star, or fraction of stars, >= 0
 * @throws RangeError for a negative rate, and for a chance above 1
 * @source Poisson-binomial: convolution over the stars, no approximation
 */
export function countsAtRate(sample: Sample, rate: number): CountDistribution {
  if (!(rate >= 0) || !Number.isFinite(rate)) {
    throw new RangeError(`a rate must be a number >= 0, got ${rate}`);
  }
  return ended(countsAt(scaledOf(sample), sample.likelihood, rate));
}

/**
 * Negative binomial: a Poisson count whose rate follows a gamma law.
 *
 * P(n) = Gamma(n + A)/(n! Gamma(A)) (B/(B + S'))^A (S'/(B + S'))^n.
 *
 * @param shape A, scalar [1], > 0
 * @param rate B, scalar [stars], > 0
 * @param exposure S', scalar [stars], >= 0
 * @param most largest count
 * @returns shape [most + 1]
 * @source Gelman et al. 2013, Bayesian Data Analysis, 3rd ed., section 2.6 (from memory)
 */
export function negativeBinomial(
  shape: number,
  rate: number,
  exposure: number,
  most: number,
): Float64Array {
  if (!(shape > 0) || !(rate > 0) || !(exposure >= 0)) {
    throw new RangeError(
      `negative binomial needs shape > 0, rate > 0, exposure >= 0, got ${shape}, ${rate}, ${exposure}`,
    );
  }
  const logNone = shape * Math.log(rate / (rate + exposure));
  const logStep = Math.log(exposure / (rate + exposure));
  return Float64Array.from({ length: most + 1 }, (_, n) =>
    Math.exp(
      logGamma(n + shape) -
        logGamma(n + 1) -
        logGamma(shape) +
        logNone +
        (n === 0 ? 0 : n * logStep),
    ),
  );
}

/** Shape and rate where a posterior is a gamma law; null where it is not. */
function gammaOf(posterior: RatePosterior): { shape: number; rate: number } | null {
  const { prior, detections, exposure, undecided = 0, background = 0 } = posterior;
  if (undecided > 0 || background > 0 || posterior.quantity === 'host_fraction') return null;
  if (prior.law === 'gamma') {
    return { shape: prior.shape + detections, rate: prior.rate + exposure };
  }
  if (prior.law === 'jeffreys' && prior.max === undefined) {
    return { shape: 0.5 + detections, rate: exposure };
  }
  return null;
}

/**
 * Number of detections that a planned sample may bring, the rate from a posterior.
 *
 * A negative binomial where the posterior is a gamma law, else the average over the posterior.
 *
 * @param posterior of the same quantity as the sample's likelihood
 * @param sample stars that are planned, or the survey's own for what it might have found
 * @throws RangeError where the two quantities differ, and for a chance above 1
 * Accuracy: 1e-9 of a probability. Cost: one distribution a place of the posterior's rule.
 */
export function predictCounts(posterior: RatePosterior, sample: Sample): CountDistribution {
  const isNumber = sample.likelihood === 'mean-number';
  if (isNumber !== (posterior.quantity === 'companions_per_star')) {
    throw new RangeError('the posterior is of the other quantity than the sample');
  }
  const scaled = scaledOf(sample);
  const gamma = gammaOf(posterior);
  if (gamma !== null) {
    const exposure = scaled.reduce((sum, c) => sum + c, 0);
    const farRate = posterior.quantile(1 - 1e-13);
    const { shape, rate } = gamma;
    return ended(negativeBinomial(shape, rate, exposure, poissonCounts(farRate * exposure).length));
  }
  const { rate, weight } = posterior.nodes();
  let total = new Float64Array(1);
  for (let i = 0; i < rate.length; i++) {
    if (weight[i] < 1e-15) continue;
    const counts = countsAt(scaled, sample.likelihood, rate[i]);
    if (counts.length > total.length) {
      const longer = new Float64Array(counts.length);
      longer.set(total);
      total = longer;
    }
    for (let n = 0; n < counts.length; n++) total[n] += weight[i] * counts[n];
  }
  return ended(total);
}

/**
 * Counts between which a distribution lies with equal probability on each side at most.
 *
 * @param level scalar [fraction], 0 < level < 1
 * @returns [smallest n with P(<= n) >= (1 - level)/2, smallest n with P(<= n) >= (1 + level)/2]
 */
export function countInterval({ probability }: CountDistribution, level: number): [number, number] {
  if (!(level > 0 && level < 1)) {
    throw new RangeError(`a level lies between 0 and 1 (0.95, not 95), got ${level}`);
  }
  return [
    countQuantile(probability, 0.5 * (1 - level)),
    countQuantile(probability, 0.5 * (1 + level)),
  ];
}

/** Smallest n with P(<= n) >= p. */
export function countQuantile(probability: Float64Array, p: number): number {
  let below = 0;
  for (let n = 0; n < probability.length; n++) {
    below += probability[n];
    if (below >= p) return n;
  }
  return probability.length - 1;
}
