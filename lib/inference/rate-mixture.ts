import { gaussLegendre } from '@/lib/numerics/quadrature';
import type { RatePosterior, RatePrior, RateQuantity } from './contract';
import { integrateDensity } from './integrated-density';
import type { NodeRates } from './node-rates';
import type { RateLikelihood } from './poisson';
import type { PriorLaw } from './prior-law';
import { logPriorNorm, multiply, NO_DATA, stretchesOf } from './product';
import { placeAt } from './stretches';

/** A rate whose likelihood is a weighted sum over nodes. */
export interface RateMixture {
  quantity: RateQuantity;
  /** S averaged over the nodes [stars]. */
  exposure: number;
  prior: RatePrior;
  law: PriorLaw;
  rates: NodeRates;
  /** ln of each node's weight, shape [node]; -Infinity leaves a node out. */
  logWeight: Float64Array;
  /** False where the data say nothing of the rate. */
  constrained: boolean;
  /** Largest fraction that the rates of single stars allow, where it cuts the prior; else null. */
  cutAt: number | null;
}

/** ln of the share of the posterior that may be left out at its upper end. */
const LEFT_OUT = -50;
const MOST_HALVINGS = 20;

function logSumOf(logs: Float64Array, logWeight: Float64Array): number {
  let peak = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < logs.length; i++) {
    const value = logs[i] + logWeight[i];
    if (value > peak) peak = value;
  }
  if (peak === Number.NEGATIVE_INFINITY) return peak;
  let sum = 0;
  for (let i = 0; i < logs.length; i++) {
    const value = logs[i] + logWeight[i] - peak;
    if (value > -40) sum += Math.exp(value);
  }
  return peak + Math.log(sum);
}

/** The likelihood of the rate alone, the nodes summed out. */
export function mixtureLikelihood({
  rates,
  logWeight,
  constrained,
}: Pick<RateMixture, 'rates' | 'logWeight' | 'constrained'>): RateLikelihood {
  if (!constrained) return NO_DATA;
  const kept = Int32Array.from(logWeight.keys()).filter((i) => logWeight[i] > -Infinity);
  const weights = Float64Array.from(kept, (node) => logWeight[node]);
  const logs = new Float64Array(kept.length);
  const isWhole = kept.length === rates.nodes;
  return {
    powerOfRate: rates.powerOfRate,
    powerOfComplement: 0,
    decay: rates.decay,
    logRegular(x, complement) {
      if (isWhole) rates.fill(x, complement, logs);
      else for (let i = 0; i < kept.length; i++) logs[i] = rates.logRegular(kept[i], x, complement);
      return logSumOf(logs, weights);
    },
  };
}

/**
 * The law on the part of its support that matters: far above the peak the likelihood of a fraction is
 * not short to write as a series, and carries nothing.
 */
function tightLaw(law: PriorLaw, likelihood: RateLikelihood): PriorLaw {
  const [low, top] = law.support;
  if (law.breaks !== undefined || likelihood.decay !== 0 || !Number.isFinite(top)) return law;
  const { logDensity, exponentAtZero } = multiply(law, likelihood);
  const step = Math.LN2;
  // Between two places the rate may still rise by its power.
  const fall = LEFT_OUT - step * Math.max(1, exponentAtZero);
  const logs: number[] = [];
  let peak = Number.NEGATIVE_INFINITY;
  for (let i = 1; i <= MOST_HALVINGS && top * 2 ** -i > low; i++) {
    const place = placeAt(top * 2 ** -i);
    logs.push(logDensity(place) + place.logX);
    peak = Math.max(peak, logs[i - 1]);
    if (logs[i - 1] < peak - 1) break;
  }
  let halvings = 0;
  while (halvings < logs.length && logs[halvings] < peak + fall) halvings++;
  return halvings === 0 ? law : { ...law, support: [low, top * 2 ** -halvings] };
}

/**
 * Posterior of a rate whose likelihood is a weighted sum over nodes.
 *
 * @throws RangeError for a prior without an upper end where a node has no exposure
 * Accuracy: as `integrateDensity`. Cost: some hundred evaluations of all nodes.
 */
export function mixturePosterior(mixture: RateMixture): RatePosterior {
  const { law, quantity, exposure, prior, rates, constrained, cutAt } = mixture;
  const likelihood = mixtureLikelihood(mixture);
  const integrated = integrateDensity(stretchesOf(tightLaw(law, likelihood), likelihood));
  const { logDensity } = multiply(law, likelihood);
  const priorOnly = multiply(law, NO_DATA);
  const priorNorm = logPriorNorm(law);
  const [low, top] = law.support;
  const isOutside = (x: number) => !(x >= low && x <= top) || x === Number.POSITIVE_INFINITY;
  return {
    quantity,
    exposure,
    detections: rates.powerOfRate,
    prior,
    support: [low, top],
    mean: integrated.mean,
    median: integrated.quantile(0.5),
    standardDeviation: integrated.standardDeviation,
    constrained,
    logEvidence: integrated.logMass - priorNorm,
    density: (x) => (isOutside(x) ? 0 : Math.exp(logDensity(placeAt(x)) - integrated.logMass)),
    priorDensity: (x) =>
      isOutside(x) ? 0 : Math.exp(priorOnly.logDensity(placeAt(x)) - priorNorm),
    cumulative: integrated.cumulative,
    quantile: (p) => (p === 1 ? top : integrated.quantile(p)),
    cutAt,
    nodes: integrated.nodes,
  };
}

/** Places of the rate that serve every node: integrals of prior, powers and regular part. */
export interface RateRule {
  x: Float64Array;
  /** ln of weight, prior (normalised) and x^k: what is left is the regular part. */
  logWeight: Float64Array;
}

/** Quantiles of the posterior between which the rate is summed, and places in each piece. */
const CUTS = [1e-5, 0.003, 0.05, 0.2, 0.5, 0.8, 0.95, 0.995, 0.9999, 1 - 1e-7];
const PLACES = 12;

/**
 * A rule that integrates the regular part of every node over the rate.
 *
 * Pieces between quantiles of the summed posterior: where a node carries weight it is resolved.
 *
 * @param posterior of the mixture
 */
export function rateRule(mixture: RateMixture, posterior: RatePosterior): RateRule {
  const { law, rates, constrained } = mixture;
  const powers: RateLikelihood = {
    ...NO_DATA,
    powerOfRate: constrained ? rates.powerOfRate : 0,
    decay: rates.decay,
  };
  const priorNorm = logPriorNorm(law);
  const norm = Number.isNaN(priorNorm) ? 0 : priorNorm;
  const places = CUTS.map((p) => posterior.quantile(p));
  const { nodes, weights } = gaussLegendre(PLACES);
  const x: number[] = [];
  const logWeight: number[] = [];
  for (const stretch of stretchesOf(tightLaw(law, mixtureLikelihood(mixture)), powers)) {
    const inside = places.filter((place) => place > stretch.from && place < stretch.to);
    const ends = [0, ...inside.map(stretch.toV).sort((a, b) => a - b), 1];
    for (let piece = 0; piece + 1 < ends.length; piece++) {
      const half = 0.5 * (ends[piece + 1] - ends[piece]);
      if (!(half > 0)) continue;
      for (let i = 0; i < PLACES; i++) {
        const v = ends[piece] + half * (1 + nodes[i]);
        x.push(stretch.toX(v));
        logWeight.push(Math.log(half * weights[i]) + stretch.logDensity(v) - norm);
      }
    }
  }
  return { x: Float64Array.from(x), logWeight: Float64Array.from(logWeight) };
}
