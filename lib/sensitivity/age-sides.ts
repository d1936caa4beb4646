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

/** A side made ready to be asked at many places, see momentsAt. */
export interface PreparedSide {
  weight: number;
  from: number;
  to: number;
  /** As in AgeSide; what follows is used where it is > 0. */
  sigma: number;
  /** x of the normal table's first node and its nodes per ln Myr. */
  zero: number;
  perStep: number;
  /** The side's weight over what the table gains along it. */
  scale: number;
  /** The table's values at the side's beginning, and the area along all of the side. */
  startChance: number;
  startArea: number;
  whole: number;
}

/** A normal law ends here: 6e-7 of it lies beyond both ends. */
const LAST_SIGMA = 5;
const STEPS_PER_SIGMA = 128;

/** Φ on equal steps of z, with G(z) = z Φ(z) + φ(z) as the integral of the lines between. */
let normalTable: { chance: Float64Array; area: Float64Array } | null = null;

function standardNormal() {
  if (normalTable) return normalTable;
  const nodes = 2 * LAST_SIGMA * STEPS_PER_SIGMA + 2;
  const chance = new Float64Array(nodes);
  const area = new Float64Array(nodes);
  for (let i = 0; i < nodes; i++) chance[i] = normalCumulative(i / STEPS_PER_SIGMA - LAST_SIGMA);
  area[0] = -LAST_SIGMA * chance[0] + normalDensity(LAST_SIGMA);
  for (let i = 1; i < nodes; i++) {
    area[i] = area[i - 1] + (0.5 * (chance[i - 1] + chance[i])) / STEPS_PER_SIGMA;
  }
  normalTable = { chance, area };
  return normalTable;
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

/** @param side see AgeSide */
export function prepareSide({ weight, from, to, centre, sigma }: AgeSide): PreparedSide {
  const even = { weight, from, to, sigma: 0, zero: 0, perStep: 0 };
  if (!(sigma > 0)) return { ...even, scale: 0, startChance: 0, startArea: 0, whole: 0 };
  const { chance, area } = standardNormal();
  const perStep = STEPS_PER_SIGMA / sigma;
  const zero = centre - LAST_SIGMA * sigma;
  const lookUp = (x: number) => {
    const place = Math.max(0, (x - zero) * perStep);
    const k = Math.min(place | 0, chance.length - 2);
    const t = place - k;
    const rise = chance[k + 1] - chance[k];
    return [chance[k] + t * rise, area[k] + (t * (chance[k] + 0.5 * t * rise)) / STEPS_PER_SIGMA];
  };
  const [startChance, startArea] = lookUp(from);
  const [endChance, endArea] = lookUp(to);
  const scale = weight / (endChance - startChance);
  const whole = scale * (sigma * (endArea - startArea) - startChance * (to - from));
  return { weight, from, to, sigma, zero, perStep, scale, startChance, startArea, whole };
}

/**
 * P(age < t) of one side, from 0 to the side's weight, and its integral over ln t from the side's
 * beginning.
 *
 * @param side see prepareSide
 * @param x ln t, [ln Myr], may be infinite
 * @param out chance and area are written to its first two places
 * Accuracy: 2e-6 of the side's weight; area is the exact integral of the lines behind chance.
 */
export function momentsAt(side: PreparedSide, x: number, out: Float64Array): void {
  if (x <= side.from) {
    out[0] = 0;
    out[1] = 0;
  } else if (side.sigma > 0) {
    normalMoments(side, x, out);
  } else {
    evenMoments(side, x, out);
  }
}

function evenMoments({ weight, from, to }: PreparedSide, x: number, out: Float64Array): void {
  const length = to - from;
  const along = Math.min(length, x - from);
  out[0] = (weight * along) / length;
  out[1] = (weight * along * along) / (2 * length) + weight * Math.max(0, x - to);
}

function normalMoments(side: PreparedSide, x: number, out: Float64Array): void {
  if (x >= side.to) {
    out[0] = side.weight;
    out[1] = side.whole + side.weight * (x - side.to);
    return;
  }
  const { chance, area } = standardNormal();
  const { scale, startChance } = side;
  const place = (x - side.zero) * side.perStep;
  const k = place | 0;
  const t = place - k;
  const rise = chance[k + 1] - chance[k];
  const sum = area[k] + (t * (chance[k] + 0.5 * t * rise)) / STEPS_PER_SIGMA;
  out[0] = scale * (chance[k] + t * rise - startChance);
  out[1] = scale * (side.sigma * (sum - side.startArea) - startChance * (x - side.from));
}
