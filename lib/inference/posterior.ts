import type { RatePosterior, RateQuestion } from './contract';
import { hostFractionLikelihood } from './host-fraction';
import { integrateDensity, type Stretch } from './integrated-density';
import { poissonLikelihood, type RateLikelihood } from './poisson';
import { type PriorLaw, priorLaw } from './priors';
import { fromOne, fromZero, type LogDensity, logarithmic, placeAt } from './stretches';

/** Below this many expected detections at the largest rate the data say nothing. */
const NOTHING_OBSERVABLE = 1e-9;

/** What says nothing of the rate. */
export const NO_DATA: RateLikelihood = {
  powerOfRate: 0,
  powerOfComplement: 0,
  logRegular: () => 0,
  decay: 0,
};

/** Prior times likelihood: the two powers put together, and the rest. */
export interface Product {
  exponentAtZero: number;
  exponentAtOne: number;
  logDensity: LogDensity;
}

/** Puts the powers of prior and likelihood together. */
export function multiply(prior: PriorLaw, likelihood: RateLikelihood): Product {
  const exponentAtZero = prior.exponentAtZero + likelihood.powerOfRate;
  const exponentAtOne = prior.exponentAtOne + likelihood.powerOfComplement;
  return {
    exponentAtZero,
    exponentAtOne,
    logDensity: ({ x, logX, complement, logComplement }) =>
      (exponentAtZero === 1 ? 0 : (exponentAtZero - 1) * logX) +
      (exponentAtOne === 1 ? 0 : (exponentAtOne - 1) * logComplement) +
      prior.logRegular(x, complement) +
      likelihood.logRegular(x, complement),
  };
}

/** Detections that the likelihood counts: for the host fraction a star enters once. */
function countedStars(question: RateQuestion): number[] {
  const { likelihood, completeness, detectedStars } = question;
  for (const star of detectedStars) {
    if (!Number.isInteger(star) || star < 0) {
      throw new RangeError(`detectedStars holds indices of stars, got ${star}`);
    }
  }
  if (likelihood === 'mean-number') return [...detectedStars];
  const distinct = [...new Set(detectedStars)];
  for (const star of distinct) {
    if (star >= completeness.length) {
      throw new RangeError(
        `detectedStars names star ${star}, but there are ${completeness.length} stars`,
      );
    }
    if (completeness[star] === 0) {
      throw new RangeError(
        `star ${star} has a detection where its map says nothing can be seen (mean completeness ` +
          '0): check the map, the ranges of the population or the detection',
      );
    }
  }
  return distinct;
}

function sumCompleteness(question: RateQuestion): number {
  const isFraction = question.likelihood === 'host-fraction';
  let sum = 0;
  for (let star = 0; star < question.completeness.length; star++) {
    const c = question.completeness[star];
    if (!(c >= 0) || !Number.isFinite(c) || (isFraction && c > 1)) {
      throw new RangeError(
        `completeness of star ${star} must lie ${isFraction ? 'in 0..1' : 'at 0 or above'}, got ${c}`,
      );
    }
    sum += c;
  }
  return sum;
}

/** Upper end for an unbounded prior: the posterior's weight above it is below 1e-20. */
function effectiveEnd(exponent: number, decay: number): number {
  if (!(decay > 0)) {
    throw new RangeError(
      'there is no posterior: the stars show nothing of this population and the prior has no ' +
        'upper end; give the prior a maximum',
    );
  }
  return (exponent + 10 * Math.sqrt(exponent) + 60) / decay;
}

/**
 * Prior times likelihood on pieces of the support in which it is smooth.
 *
 * @throws RangeError for a prior without an upper end where the data give none either
 */
export function stretchesOf(prior: PriorLaw, likelihood: RateLikelihood): Stretch[] {
  const [low, top] = prior.support;
  const { exponentAtZero, exponentAtOne, logDensity } = multiply(prior, likelihood);
  if (low > 0) return [logarithmic(low, top, logDensity)];
  if (top === Number.POSITIVE_INFINITY) {
    const end = effectiveEnd(exponentAtZero, prior.decay + likelihood.decay);
    return [fromZero(end, exponentAtZero, logDensity)];
  }
  if (top !== 1) return [fromZero(top, exponentAtZero, logDensity)];
  return [fromZero(0.5, exponentAtZero, logDensity), fromOne(0.5, exponentAtOne, logDensity)];
}

/** ln of the integral of a prior's own form; NaN where it has none. */
export function logPriorNorm(prior: PriorLaw): number {
  if (prior.logNorm === null) return Number.NaN;
  if (prior.logNorm !== 'numerical') return prior.logNorm;
  return integrateDensity(stretchesOf(prior, NO_DATA)).logMass;
}

/**
 * Posterior of the rate of companions: of F (mean number per star) or of f (fraction of stars).
 *
 * Prior times F^k exp(-F S), or times f^k and the product of 1 - f C_j over the stars without a
 * counted detection, integrated once; limits and intervals are then root finding.
 *
 * @param question likelihood, mean completeness of each star [fraction] (for the mean number also
 *   one entry holding the sum over stars), counted detections, prior
 * @returns mean, median, density, distribution function and quantiles of the rate
 * @throws RangeError for a prior that does not fit (see `priorLaw`), completeness out of range, a
 *   detected star whose completeness is 0 (host fraction), detections without any exposure, and a
 *   prior without an upper end where nothing could be seen
 * Edges: where exposure times the largest rate is below 1e-9 the posterior is the prior and
 *   `constrained` is false: no limit may then be headlined.
 * Accuracy: limits 1e-9 relative against the closed forms. Cost: some hundred evaluations of the
 *   likelihood, each one multiply-add a star.
 * @source Gelman et al. 2013, Bayesian Data Analysis, 3rd ed., chapter 2 (Poisson and binomial
 *   models; chapter from memory); Lafreniere et al. 2007, ApJ 670, 1367 (stars of unequal completeness)
 * @example
 * ratePosterior({ likelihood: 'mean-number', completeness: Float64Array.of(25), detectedStars: [],
 *   prior: { law: 'uniform', max: 1 } }).quantile(0.95) // 0.119829290931605
 */
export function ratePosterior(question: RateQuestion): RatePosterior {
  const exposure = sumCompleteness(question);
  const counted = countedStars(question);
  const detections = counted.length;
  const law = priorLaw(question.prior, question.likelihood, question.completeness);
  if (detections > 0 && exposure === 0) {
    throw new RangeError(
      `${detections} detections, but no star shows anything of this population (exposure 0): ` +
        'check the maps, the ranges of the population or the detections',
    );
  }
  const [low, top] = law.support;
  const largest = exposure === 0 ? 0 : exposure * top;
  const constrained = detections > 0 || largest >= NOTHING_OBSERVABLE;
  const likelihood = !constrained
    ? NO_DATA
    : question.likelihood === 'mean-number'
      ? poissonLikelihood(exposure, detections)
      : hostFractionLikelihood(question.completeness, counted);
  const integrated = integrateDensity(stretchesOf(law, likelihood));
  const { logDensity } = multiply(law, likelihood);
  const priorOnly = multiply(law, NO_DATA);
  const isOutside = (x: number) => !(x >= low && x <= top) || x === Number.POSITIVE_INFINITY;
  let knownNorm: number | undefined;
  const priorNorm = () => {
    knownNorm ??= logPriorNorm(law);
    return knownNorm;
  };
  return {
    quantity: question.likelihood === 'mean-number' ? 'companions_per_star' : 'host_fraction',
    exposure,
    detections,
    prior: question.prior,
    support: [low, top],
    mean: integrated.mean,
    median: integrated.quantile(0.5),
    standardDeviation: integrated.standardDeviation,
    constrained,
    get logEvidence() {
      return integrated.logMass - priorNorm();
    },
    density(x) {
      if (isOutside(x)) return 0;
      return Math.exp(logDensity(placeAt(x)) - integrated.logMass);
    },
    priorDensity(x) {
      if (isOutside(x)) return 0;
      return Math.exp(priorOnly.logDensity(placeAt(x)) - priorNorm());
    },
    cumulative: integrated.cumulative,
    quantile: (p) => (p === 1 ? top : integrated.quantile(p)),
  };
}
