import { normalCumulative, normalDensity, normalQuantile } from '@/lib/numerics/normal';
import { gaussLegendre } from '@/lib/numerics/quadrature';
import { ageParts, requireAgeLaw, type WeightedNodes } from './age';
import type { AgeLaw, AgeOfStar } from './types';

/**
 * One side of an age law in x = ln t, between its hard ends: a normal law cut to that side, or equal
 * chances along x. A law has a kink at its median and none within a side.
 */
export interface AgeSide {
  /** Probability that the age lies on this side. */
  weight: number;
  /** Ends of the support, [ln Myr]. */
  from: number;
  to: number;
  /** Median and spread of the normal law; spread 0 marks equal chances. */
  centre: number;
  sigma: number;
}

/** An age as single values and sides, whose weights together sum to 1. */
export interface AgeSides {
  /** Ages without error, [Myr]. */
  points: WeightedNodes;
  sides: AgeSide[];
}

/** A normal law ends here: 6e-7 of it lies beyond both ends. */
const LAST_SIGMA = 5;
export const NORMAL_STEPS_PER_SIGMA = 128;

let kept: Float64Array | null = null;

/**
 * Φ on equal steps of z from -5 to beyond 5, with G(z) = z Φ(z) + φ(z) as the integral of the lines
 * between, shape [node, 2]; NORMAL_STEPS_PER_SIGMA nodes a unit of z.
 */
export function normalTable(): Float64Array {
  if (kept) return kept;
  const nodes = 2 * LAST_SIGMA * NORMAL_STEPS_PER_SIGMA + 2;
  const table = new Float64Array(2 * nodes);
  for (let i = 0; i < nodes; i++) {
    table[2 * i] = normalCumulative(i / NORMAL_STEPS_PER_SIGMA - LAST_SIGMA);
  }
  table[1] = -LAST_SIGMA * table[0] + normalDensity(LAST_SIGMA);
  for (let i = 2; i < 2 * nodes; i += 2) {
    table[i + 1] = table[i - 1] + (0.5 * (table[i - 2] + table[i])) / NORMAL_STEPS_PER_SIGMA;
  }
  kept = table;
  return table;
}

/**
 * The sides of every law of an age, and what has no error.
 *
 * @param age see AgeOfStar
 * @throws RangeError for ages not positive or out of order, half of a pair, or probabilities that
 *   do not sum to 1
 */
export function ageSides(age: AgeOfStar): AgeSides {
  const sides: AgeSide[] = [];
  const values: number[] = [];
  const weights: number[] = [];
  for (const { probability, age: law } of ageParts(age)) {
    for (const side of sidesOfLaw(law)) {
      const weight = probability * side.weight;
      if (!(weight > 0)) continue;
      if (side.to > side.from) sides.push({ ...side, weight });
      else {
        values.push(law.medianMyr);
        weights.push(weight);
      }
    }
  }
  return {
    points: { values: Float64Array.from(values), weights: Float64Array.from(weights) },
    sides,
  };
}

function sidesOfLaw(law: AgeLaw): AgeSide[] {
  requireAgeLaw(law);
  const { medianMyr, lowerMyr, upperMyr, minMyr, maxMyr } = law;
  const centre = Math.log(medianMyr);
  const at = { centre, sigma: 0, from: centre, to: centre };
  if (lowerMyr !== undefined && upperMyr !== undefined) {
    const [below, above] = [Math.log(medianMyr / lowerMyr), Math.log(upperMyr / medianMyr)];
    const first = Math.max(centre - LAST_SIGMA * below, Math.log(minMyr ?? 0));
    const last = Math.min(centre + LAST_SIGMA * above, Math.log(maxMyr ?? Infinity));
    // Bounds cut the law before it is normalised, so they move weight from one side to the other.
    const kept = (end: number, sigma: number) =>
      sigma > 0 ? normalCumulative(Math.abs(end - centre) / sigma) - 0.5 : 0.5;
    const [lower, upper] = [kept(first, below), kept(last, above)];
    const share = 1 / (lower + upper);
    return [
      { ...at, weight: lower * share, sigma: below, from: first },
      { ...at, weight: upper * share, sigma: above, to: last },
    ];
  }
  if (minMyr === undefined || maxMyr === undefined) return [{ ...at, weight: 1 }];
  return [
    { ...at, weight: 0.5, from: Math.log(minMyr) },
    { ...at, weight: 0.5, to: Math.log(maxMyr) },
  ];
}

/** Least spread of a side in ln t: how finely a sharp edge in age must be followed. */
export function spreadOf({ sigma, from, to }: AgeSide): number {
  return sigma > 0 ? sigma : 0.3 * (to - from);
}

/**
 * A side as nodes, for one so narrow that nothing changes much along it.
 *
 * @param side see AgeSide
 * @param count number of Gauss–Legendre nodes in probability
 * @returns ages [Myr], weights that sum to the side's
 */
export function sideNodes(
  { weight, from, to, centre, sigma }: AgeSide,
  count: number,
): WeightedNodes {
  const { nodes, weights } = gaussLegendre(count);
  const chanceAt = (x: number) => normalCumulative((x - centre) / sigma);
  const [low, high] = sigma > 0 ? [chanceAt(from), chanceAt(to)] : [0, 1];
  const values = nodes.map((node) => {
    const p = low + 0.5 * (1 + node) * (high - low);
    return Math.exp(sigma > 0 ? centre + sigma * normalQuantile(p) : from + p * (to - from));
  });
  return { values, weights: weights.map((w) => 0.5 * w * weight) };
}

/**
 * Writes a side for the kernels: its weight, ends and spread; then, for a normal law, ln t of the
 * table's first node, its nodes per ln Myr, the side's weight over what the table gains along it,
 * the table's values at the side's beginning and the area along all of the side.
 *
 * @param side see AgeSide
 * @param out SIDE numbers of the kernels are written to it
 */
export function writeSide({ weight, from, to, centre, sigma }: AgeSide, out: Float64Array): void {
  out.fill(0);
  out[0] = weight;
  out[1] = from;
  out[2] = to;
  out[3] = sigma;
  if (!(sigma > 0)) {
    out[3] = 0;
    return;
  }
  const table = normalTable();
  const perStep = NORMAL_STEPS_PER_SIGMA / sigma;
  const zero = centre - LAST_SIGMA * sigma;
  const lookUp = (x: number): [number, number] => {
    const place = Math.max(0, (x - zero) * perStep);
    const k = Math.min(place | 0, table.length / 2 - 2);
    const t = place - k;
    const low = table[2 * k];
    const rise = table[2 * k + 2] - low;
    const area = table[2 * k + 1] + (t * (low + 0.5 * t * rise)) / NORMAL_STEPS_PER_SIGMA;
    return [low + t * rise, area];
  };
  const [startChance, startArea] = lookUp(from);
  const [endChance, endArea] = lookUp(to);
  const scale = weight / (endChance - startChance);
  out[4] = zero;
  out[5] = perStep;
  out[6] = scale;
  out[7] = startChance;
  out[8] = startArea;
  out[9] = scale * (sigma * (endArea - startArea) - startChance * (to - from));
}
