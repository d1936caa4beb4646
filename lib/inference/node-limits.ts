import { solveIncreasing } from '@/lib/numerics/increasing-root';
import { findRoot } from '@/lib/numerics/roots';
import { exponentialIntegral, gammaP, gammaQuantile } from '@/lib/numerics/special';
import { antiderivative, chebyshevNodes, coefficients, evaluateSeries, NODES } from './chebyshev';
import type { RatePrior } from './contract';
import { upperLimit } from './intervals';
import { logNoDetection } from './no-detection';
import { ratePosterior } from './posterior';
import { priorLaw } from './priors';

/** A limit where nothing was found, and whether the prior set it. */
export interface LimitWithoutDetection {
  limit: number;
  setByPrior: boolean;
}

/** A limit above this share of level times the prior's upper end is set by the prior. */
const SET_BY_PRIOR = 0.9;

function requireLevel(level: number): void {
  if (!(level > 0 && level < 1)) {
    throw new RangeError(`a credible level lies between 0 and 1 (0.95, not 95), got ${level}`);
  }
}

/** Priors under which the posterior of the mean number is a gamma law cut at the prior's end. */
function gammaForm(prior: RatePrior): { shape: number; rate: number; top: number } | null {
  if (prior.law === 'uniform') return { shape: 1, rate: 0, top: prior.max };
  if (prior.law === 'jeffreys') {
    return { shape: 0.5, rate: 0, top: prior.max ?? Number.POSITIVE_INFINITY };
  }
  if (prior.law === 'gamma') return { ...prior, top: Number.POSITIVE_INFINITY };
  return null;
}

const markIn = (limit: number, level: number, top: number, isBlind: boolean) => ({
  limit,
  setByPrior: isBlind || (Number.isFinite(top) && limit > SET_BY_PRIOR * level * top),
});

/** P(F < x) is the integral of exp(-F S)/F from the floor to x, over the whole. */
function logUniformLimit(
  { min, max }: { min: number; max: number },
  exposure: number,
  level: number,
): number {
  if (exposure === 0) return min * (max / min) ** level;
  const atFloor = exponentialIntegral(min * exposure);
  const whole = atFloor - exponentialIntegral(max * exposure);
  const missing = (logX: number) =>
    atFloor - exponentialIntegral(Math.exp(logX) * exposure) - level * whole;
  return Math.exp(findRoot(missing, Math.log(min), Math.log(max), { relativeTolerance: 1e-13 }));
}

/**
 * Upper limit of the mean number where nothing was found, as a function of the exposure.
 *
 * In closed form for all priors but a tabulated one, where the posterior is integrated.
 *
 * @param level credible level [fraction], 0 < level < 1
 * @returns function of S [stars], >= 0; where S is 0 the limit is the prior's own, or Infinity for a
 *   prior that has none, and counts as set by it
 * @throws RangeError for a prior that does not fit the mean number
 * @example numberLimit({ law: 'uniform', max: 1 }, 0.95)(25).limit // 0.119829290931605
 */
export function numberLimit(
  prior: RatePrior,
  level: number,
): (exposure: number) => LimitWithoutDetection {
  requireLevel(level);
  const { support } = priorLaw(prior, 'mean-number', new Float64Array(0));
  const top = support[1];
  const form = gammaForm(prior);
  return (exposure) => {
    const isBlind = exposure === 0 || exposure * top < 1e-9;
    if (prior.law === 'log-uniform') {
      return markIn(logUniformLimit(prior, isBlind ? 0 : exposure, level), level, top, isBlind);
    }
    if (form === null) {
      const completeness = Float64Array.of(exposure);
      const posterior = ratePosterior({
        likelihood: 'mean-number',
        completeness,
        detectedStars: [],
        prior,
      });
      return markIn(upperLimit(posterior, level), level, top, isBlind);
    }
    const { shape, rate } = form;
    const total = rate + (isBlind ? 0 : exposure);
    if (total === 0) {
      return markIn(top === Infinity ? top : top * level ** (1 / shape), level, top, true);
    }
    const share = top === Infinity ? 1 : gammaP(shape, total * top);
    const limit = Math.min(top, gammaQuantile(level * share, shape, total));
    return markIn(limit, level, top, isBlind);
  };
}

/** Ends of pieces in units of 1/S; beyond the last the likelihood is below e^-40. */
const PIECES = [0, 2.5, 7.5, 17.5, 40];

/** Limit under a uniform prior: the product of 1 - f C_j, integrated piece by piece. */
function uniformFractionLimit(
  completeness: Float64Array,
  exposure: number,
  top: number,
  level: number,
): number {
  const scale = Math.min(top, PIECES[PIECES.length - 1] / exposure) / PIECES[PIECES.length - 1];
  const values = new Float64Array(NODES);
  const integrals: Float64Array[] = [];
  const densities: Float64Array[] = [];
  const masses: number[] = [];
  for (let piece = 0; piece + 1 < PIECES.length; piece++) {
    const half = 0.5 * scale * (PIECES[piece + 1] - PIECES[piece]);
    const from = scale * PIECES[piece];
    for (let j = 0; j < NODES; j++) {
      values[j] = Math.exp(logNoDetection(from + half * (1 + chebyshevNodes[j]), completeness));
    }
    const density = coefficients(values);
    densities.push(density);
    integrals.push(antiderivative(density, half));
    masses.push(evaluateSeries(integrals[piece], 1));
  }
  let wanted = level * masses.reduce((sum, mass) => sum + mass, 0);
  let piece = 0;
  while (piece + 2 < PIECES.length && wanted > masses[piece]) wanted -= masses[piece++];
  const half = 0.5 * scale * (PIECES[piece + 1] - PIECES[piece]);
  const t = solveIncreasing(
    (at) => ({
      value: evaluateSeries(integrals[piece], at) - wanted,
      slope: half * evaluateSeries(densities[piece], at),
    }),
    (2 * wanted) / masses[piece] - 1,
    -1,
    1,
  );
  return scale * PIECES[piece] + half * (1 + t);
}

/**
 * Upper limits of the host fraction where nothing was found, at many nodes.
 *
 * @param completeness of each star at each node, shape [node, star], 0..1
 * @param stars number of stars
 * @param rateScale s_j, shape [star]: each star's rate over the one asked for
 * @returns one limit a node; where no star shows anything it is the prior's own
 * @throws RangeError for a prior that does not fit the host fraction, and as `ratePosterior`
 * Accuracy: 1e-9 relative. Cost, uniform prior: 64 multiply-adds a node and star; other priors: a
 *   posterior a node, some times as long.
 */
export function fractionLimits(
  completeness: Float64Array,
  stars: number,
  prior: RatePrior,
  level: number,
  rateScale?: Float64Array,
): LimitWithoutDetection[] {
  requireLevel(level);
  const cut = rateScale?.reduce((least, s) => Math.min(least, 1 / s), 1) ?? 1;
  return Array.from({ length: completeness.length / stars }, (_, node) => {
    const own = completeness.subarray(node * stars, (node + 1) * stars);
    if (prior.law !== 'uniform') {
      const posterior = ratePosterior({
        likelihood: 'host-fraction',
        completeness: own,
        detectedStars: [],
        prior,
        ...(rateScale && { rateScale }),
      });
      const limit = upperLimit(posterior, level);
      return markIn(limit, level, posterior.support[1], !posterior.constrained);
    }
    const top = Math.min(priorLaw(prior, 'host-fraction', own).support[1], cut);
    const seen = rateScale === undefined ? own : own.map((c, star) => c * rateScale[star]);
    const exposure = seen.reduce((sum, c) => sum + c, 0);
    const isBlind = exposure * top < 1e-9;
    const limit = isBlind ? level * top : uniformFractionLimit(seen, exposure, top, level);
    return markIn(limit, level, top, isBlind);
  });
}
