import { normalCumulative, normalQuantile } from '@/lib/numerics/normal';
import { gaussLegendre } from '@/lib/numerics/quadrature';
import type { AgeLaw, AgeOfStar, SensitivitySettings } from './types';

/** Values of an uncertain quantity with the weight of each; shape [n], weights sum to 1. */
export interface WeightedNodes {
  values: Float64Array;
  weights: Float64Array;
}

/** The laws of an age with their probabilities; one law is certain. */
export function ageParts(age: AgeOfStar): { probability: number; age: AgeLaw }[] {
  if (!('mixture' in age)) return [{ probability: 1, age }];
  let total = 0;
  for (const { probability } of age.mixture) {
    if (!(probability >= 0 && probability <= 1)) {
      throw new RangeError(`probability of an age must be between 0 and 1, got ${probability}`);
    }
    total += probability;
  }
  if (!(Math.abs(total - 1) < 1e-9)) {
    throw new RangeError(`probabilities of the ages must sum to 1, got ${total}`);
  }
  return age.mixture.filter(({ probability }) => probability > 0);
}

/** Nodes on each side of the median, by threshold: a sharp edge needs more (see the tests). */
const NODES_PER_SIDE = { smooth: 5, hard: 10 } as const;

/** An age law as a quantile function with its kink, the probability at which the two sides meet. */
interface AgeQuantile {
  kink: number;
  quantile(p: number): number;
}

/**
 * An age from a uniform number, [Myr]: the quantile function of each law on its own stretch of
 * [0, 1], in the order of the mixture. One law gives its quantile function.
 *
 * @param age see AgeOfStar
 * @returns function of a probability 0 to 1 to an age, [Myr]
 * @throws RangeError for probabilities that do not sum to 1, or a law outside its domain
 */
export function ageDraw(age: AgeOfStar): (p: number) => number {
  const parts = ageParts(age).map((part) => ({ ...part, quantile: ageQuantile(part.age) }));
  return (p) => {
    let from = 0;
    for (const { probability, quantile } of parts) {
      if (p < from + probability) return quantile((p - from) / probability);
      from += probability;
    }
    return parts[parts.length - 1].quantile(1);
  };
}

/**
 * Quantile function of an age law, [Myr].
 *
 * With lower and upper points: t(z) = t0 (t+/t0)^z above the median and t0 (t0/t-)^z below, z
 * standard normal, which has exactly the quoted percentiles; hard bounds cut it. With hard bounds
 * alone: uniform in log age on each side of the median. With neither: one age.
 *
 * @param law see AgeLaw
 * @returns function of a probability 0 to 1 to an age, [Myr]
 * @throws RangeError for ages not positive or out of order, or half of a pair
 */
export function ageQuantile(law: AgeLaw): (p: number) => number {
  return preparedLaw(law).quantile;
}

/**
 * Age nodes of a star: K Gauss–Legendre nodes in probability on each side of the median, because
 * the law has a kink there that one rule across it would not follow. Each law of a mixture has its
 * own nodes, weighted with its probability.
 *
 * @param age see AgeOfStar
 * @param threshold smooth K = 5, hard K = 10
 * @param nodesPerSide K, instead of the rule's own
 * @returns ages [Myr], increasing within each law, weights that sum to 1; one node for an age
 *   without error
 * @throws RangeError for ages not positive or out of order, half of a pair, or probabilities that
 *   do not sum to 1
 */
export function ageNodes(
  age: AgeOfStar,
  threshold: SensitivitySettings['threshold'],
  nodesPerSide: number = NODES_PER_SIDE[threshold],
): WeightedNodes {
  if (!('mixture' in age)) return nodesOfLaw(age, nodesPerSide);
  const parts = ageParts(age).map((part) => ({ ...part, ...nodesOfLaw(part.age, nodesPerSide) }));
  return {
    values: Float64Array.from(parts.flatMap(({ values }) => [...values])),
    weights: Float64Array.from(
      parts.flatMap(({ weights, probability }) => Array.from(weights, (w) => w * probability)),
    ),
  };
}

/**
 * The least and the greatest of the age nodes, without those between.
 *
 * @param age see AgeOfStar
 * @param threshold as for ageNodes
 * @param nodesPerSide as for ageNodes
 * @returns ages [Myr], shape [2]
 * @throws as ageNodes does
 */
export function ageNodeEnds(
  age: AgeOfStar,
  threshold: SensitivitySettings['threshold'],
  nodesPerSide: number = NODES_PER_SIDE[threshold],
): Float64Array {
  const first = 0.5 * (gaussLegendre(nodesPerSide).nodes[0] + 1);
  let [least, most] = [Infinity, 0];
  for (const part of ageParts(age)) {
    const { kink, quantile } = preparedLaw(part.age);
    least = Math.min(least, quantile(kink * first));
    most = Math.max(most, quantile(1 - (1 - kink) * first));
  }
  return Float64Array.of(least, most);
}

function nodesOfLaw(law: AgeLaw, nodesPerSide: number): WeightedNodes {
  const { kink, quantile } = preparedLaw(law);
  if (quantile(0.01) === quantile(0.99)) {
    return { values: Float64Array.of(law.medianMyr), weights: Float64Array.of(1) };
  }
  const { nodes, weights } = gaussLegendre(nodesPerSide);
  const values = new Float64Array(2 * nodesPerSide);
  const shares = new Float64Array(2 * nodesPerSide);
  for (let i = 0; i < nodesPerSide; i++) {
    const step = 0.5 * (nodes[i] + 1);
    const mirrored = 2 * nodesPerSide - 1 - i;
    values[i] = quantile(kink * step);
    shares[i] = 0.5 * weights[i] * kink;
    values[mirrored] = quantile(1 - (1 - kink) * step);
    shares[mirrored] = 0.5 * weights[i] * (1 - kink);
  }
  return { values, weights: shares };
}

function preparedLaw(law: AgeLaw): AgeQuantile {
  requireAgeLaw(law);
  const { medianMyr, lowerMyr, upperMyr, minMyr, maxMyr } = law;
  if (lowerMyr !== undefined && upperMyr !== undefined) {
    return percentileLaw(medianMyr, lowerMyr, upperMyr, minMyr, maxMyr);
  }
  if (minMyr === undefined || maxMyr === undefined) return { kink: 0.5, quantile: () => medianMyr };
  const below = Math.log(medianMyr / minMyr);
  const above = Math.log(maxMyr / medianMyr);
  const quantile = (p: number) =>
    medianMyr * Math.exp(p < 0.5 ? below * (2 * p - 1) : above * (2 * p - 1));
  return { kink: 0.5, quantile };
}

function percentileLaw(
  median: number,
  lower: number,
  upper: number,
  min: number | undefined,
  max: number | undefined,
): AgeQuantile {
  const below = Math.log(median / lower);
  const above = Math.log(upper / median);
  const from = min === undefined ? 0 : normalCumulative(cutAt(Math.log(min / median), below));
  const to = max === undefined ? 1 : normalCumulative(cutAt(Math.log(max / median), above));
  const quantile = (p: number) => {
    const z = normalQuantile(Math.min(1, from + p * (to - from)));
    const age = median * Math.exp(z < 0 ? below * z : above * z || 0);
    return Math.min(max ?? Infinity, Math.max(min ?? 0, age));
  };
  return { kink: (0.5 - from) / (to - from), quantile };
}

/** Place of a bound in units of its side's σ; a side without spread is not cut. */
function cutAt(logRatio: number, sigma: number): number {
  if (sigma > 0) return logRatio / sigma;
  return logRatio < 0 ? -Infinity : Infinity;
}

/** @throws RangeError for ages not positive or out of order, or half of a pair */
export function requireAgeLaw(law: AgeLaw): void {
  const { medianMyr, lowerMyr, upperMyr, minMyr, maxMyr } = law;
  requireAge('medianMyr', medianMyr);
  requireAge('lowerMyr', lowerMyr);
  requireAge('upperMyr', upperMyr);
  requireAge('minMyr', minMyr);
  requireAge('maxMyr', maxMyr);
  if ((lowerMyr === undefined) !== (upperMyr === undefined)) {
    throw new RangeError('lowerMyr and upperMyr must be given together, got one of them');
  }
  requireOrder('lowerMyr', lowerMyr, 'medianMyr', medianMyr);
  requireOrder('medianMyr', medianMyr, 'upperMyr', upperMyr);
  requireOrder('minMyr', minMyr, 'medianMyr', medianMyr);
  requireOrder('medianMyr', medianMyr, 'maxMyr', maxMyr);
  const isBoundsOnly = lowerMyr === undefined && (minMyr === undefined) !== (maxMyr === undefined);
  if (isBoundsOnly) {
    throw new RangeError('minMyr and maxMyr must be given together, got one of them');
  }
}

function requireAge(name: string, value: number | undefined): void {
  if (value !== undefined && !(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be finite and > 0, got ${value}`);
  }
}

function requireOrder(
  lowName: string,
  low: number | undefined,
  highName: string,
  high: number | undefined,
): void {
  if (low !== undefined && high !== undefined && low > high) {
    throw new RangeError(`${lowName} must be <= ${highName} ${high}, got ${low}`);
  }
}
