import { gaussLegendre } from '@/lib/numerics/quadrature';
import type { MapGrid } from '@/lib/sensitivity';
import { populationLaws } from './forms';
import type { BoundedLaw } from './law';
import type { Population } from './population';

/** Weights whose product with a map is its mean completeness under a population. */
export interface PopulationWeights {
  /** Shape [mass], normalised over the whole box. */
  mass: Float64Array;
  /** Shape [semiMajorAxis], normalised over the whole box. */
  semiMajorAxis: Float64Array;
  /** Share of the population outside the map, where completeness counts as 0 [fraction]. */
  shareOutsideMap: number;
}

/** Share outside the map above which a result carries a warning. */
export const SHARE_OUTSIDE_WARNING = 0.2;

const POINTS = 24;

/** Integral of each node's hat function times the law, cut at the box and at the law's breaks. */
function axisWeights(nodes: Float64Array, { law, min, max }: BoundedLaw): Float64Array {
  const weights = new Float64Array(nodes.length);
  const whole = law.integral(min, max);
  const rule = gaussLegendre(POINTS);
  for (let i = 0; i + 1 < nodes.length; i++) {
    const from = Math.max(nodes[i], min);
    const to = Math.min(nodes[i + 1], max);
    if (!(from < to)) continue;
    const logStart = Math.log(nodes[i]);
    const logStep = Math.log(nodes[i + 1] / nodes[i]);
    const inner = law.breaks.filter((at) => at > from && at < to);
    const cuts = [from, ...inner, to];
    for (let piece = 0; piece + 1 < cuts.length; piece++) {
      const middle = 0.5 * Math.log(cuts[piece] * cuts[piece + 1]);
      const half = 0.5 * Math.log(cuts[piece + 1] / cuts[piece]);
      for (let q = 0; q < POINTS; q++) {
        const y = middle + half * rule.nodes[q];
        const share = (half * rule.weights[q] * law.shape(Math.exp(y))) / whole;
        const upper = (y - logStart) / logStep;
        weights[i] += share * (1 - upper);
        weights[i + 1] += share * upper;
      }
    }
  }
  return weights;
}

function shareInside(nodes: Float64Array, { law, min, max }: BoundedLaw): number {
  const from = Math.max(nodes[0], min);
  const to = Math.min(nodes[nodes.length - 1], max);
  return from < to ? law.integral(from, to) / law.integral(min, max) : 0;
}

/**
 * Weights of a map's nodes under a population: the mean completeness is W^T C V.
 *
 * Integrates the bilinear interpolant of a map in (ln m, ln a) against the population: per axis
 * W_i is the integral of hat_i times the law, 24 Gauss-Legendre points per interval, cut at the
 * box edges, which need not be nodes. Outside the map completeness counts as 0.
 *
 * @param grid nodes of the map, both axes increasing and positive [M_Jup], [au]
 * @param population shape and box; the box may exceed the map
 * @returns weights per axis, and the share of the population outside the map
 * @throws RangeError for a population that cannot be used, and for one entirely outside the map
 * Accuracy: 1e-13 relative for indices up to 10 in size. Cost: 24 powers per node.
 */
export function populationWeights(grid: MapGrid, population: Population): PopulationWeights {
  const laws = populationLaws(population);
  const inside =
    shareInside(grid.massMjup, laws.mass) * shareInside(grid.semiMajorAxisAu, laws.semiMajorAxis);
  if (!(inside > 0)) {
    throw new RangeError(
      'the population lies entirely outside the completeness maps ' +
        `(${grid.massMjup[0]} to ${grid.massMjup[grid.massMjup.length - 1]} M_Jup, ` +
        `${grid.semiMajorAxisAu[0]} to ${grid.semiMajorAxisAu[grid.semiMajorAxisAu.length - 1]} au)`,
    );
  }
  return {
    mass: axisWeights(grid.massMjup, laws.mass),
    semiMajorAxis: axisWeights(grid.semiMajorAxisAu, laws.semiMajorAxis),
    shareOutsideMap: Math.max(0, 1 - inside),
  };
}

/** First and one past the last node that carries weight. */
function activeRange(weights: Float64Array): [number, number] {
  let first = 0;
  let end = weights.length;
  while (first < end && weights[first] === 0) first++;
  while (end > first && weights[end - 1] === 0) end--;
  return [first, end];
}

/**
 * Mean completeness of every map of a stack.
 *
 * @param maps shape [star, mass, semiMajorAxis], completeness 0..1, or 0..65535 when stored as
 *   16-bit integers
 * @param weights of the stack's grid
 * @returns shape [star], 0..1
 * @throws RangeError where the stack is not a whole number of maps
 * Cost: one multiply-add per node that carries weight.
 */
export function meanCompletenessOfStack(
  maps: Float64Array | Float32Array | Uint16Array,
  weights: PopulationWeights,
): Float64Array {
  const { mass, semiMajorAxis } = weights;
  const columns = semiMajorAxis.length;
  const size = mass.length * columns;
  const stars = maps.length / size;
  if (!Number.isInteger(stars)) {
    throw new RangeError(
      `the maps hold ${maps.length} values, not a multiple of ${mass.length} x ${columns} nodes`,
    );
  }
  const scale = maps instanceof Uint16Array ? 1 / 65535 : 1;
  const [firstRow, endRow] = activeRange(mass);
  const [firstColumn, endColumn] = activeRange(semiMajorAxis);
  const means = new Float64Array(stars);
  for (let star = 0; star < stars; star++) {
    let sum = 0;
    for (let row = firstRow; row < endRow; row++) {
      const start = star * size + row * columns;
      let along = 0;
      for (let column = firstColumn; column < endColumn; column++) {
        along += maps[start + column] * semiMajorAxis[column];
      }
      sum += mass[row] * along;
    }
    means[star] = Math.min(1, Math.max(0, sum * scale));
  }
  return means;
}

/**
 * Mean completeness of one map, or expected detections per companion and star of a summed map.
 *
 * @param completeness shape [mass, semiMajorAxis], row-major; not capped at 1, so that a map summed
 *   over stars gives the exposure S [stars]
 * @param weights of the map's grid
 * @throws RangeError where the map has another size than the weights
 */
export function meanCompleteness(completeness: Float64Array, weights: PopulationWeights): number {
  const { mass, semiMajorAxis } = weights;
  const columns = semiMajorAxis.length;
  if (completeness.length !== mass.length * columns) {
    throw new RangeError(
      `the map holds ${completeness.length} values, not ${mass.length} x ${columns}`,
    );
  }
  let sum = 0;
  for (let row = 0; row < mass.length; row++) {
    if (mass[row] === 0) continue;
    let along = 0;
    for (let column = 0; column < columns; column++) {
      along += completeness[row * columns + column] * semiMajorAxis[column];
    }
    sum += mass[row] * along;
  }
  return sum;
}
