import type { MapGrid } from '@/lib/sensitivity';
import { axisWeights, shareInside } from './axis-weights';
import { populationLaws } from './forms';
import type { Population } from './population';
import { sumAlong, sumOfIntegers } from './weighted-sums';

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

/** The fault of a population of which a sample's maps hold nothing. */
export function entirelyOutside({ massMjup, semiMajorAxisAu }: MapGrid): RangeError {
  return new RangeError(
    'the population lies entirely outside the completeness maps ' +
      `(${massMjup[0]} to ${massMjup[massMjup.length - 1]} M_Jup, ` +
      `${semiMajorAxisAu[0]} to ${semiMajorAxisAu[semiMajorAxisAu.length - 1]} au)`,
  );
}

/**
 * Weights of a map's nodes under a population: the mean completeness is W^T C V.
 *
 * Integrates the bilinear interpolant of a map in (ln m, ln a) against the population: per axis
 * W_i is the integral of hat_i times the law, by Gauss-Legendre points per interval, cut at the box
 * edges, which need not be nodes. Outside the map completeness counts as 0.
 *
 * @param grid nodes of the map, both axes increasing and positive [M_Jup], [au]
 * @param population laws and box; the box may exceed the map
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @returns weights per axis, and the share of the population outside the map
 * @throws RangeError for a population that cannot be used, for one entirely outside the map, for
 *   tabulated systems, which have no weights of their own, and for a missing host mass
 * Accuracy and cost: as `axisWeights`.
 */
export function populationWeights(
  grid: MapGrid,
  population: Population,
  hostMassMsun?: number,
): PopulationWeights {
  const laws = populationLaws(population, hostMassMsun);
  const inside =
    shareInside(grid.massMjup, laws.mass) * shareInside(grid.semiMajorAxisAu, laws.semiMajorAxis);
  if (!(inside > 0)) throw entirelyOutside(grid);
  return {
    mass: axisWeights(grid.massMjup, laws.mass),
    semiMajorAxis: axisWeights(grid.semiMajorAxisAu, laws.semiMajorAxis),
    shareOutsideMap: Math.max(0, 1 - inside),
  };
}

/** The axis along which a control moves. */
export type MovingAxis = 'mass' | 'semiMajorAxis';

/**
 * Weights of a population that differs from another along one axis alone.
 *
 * @param before weights of the other on the same grid; those of the axis that stands still are taken
 * @throws RangeError as `populationWeights`
 */
export function weightsWhileMoving(
  grid: MapGrid,
  population: Population,
  moving: MovingAxis,
  before: PopulationWeights,
): PopulationWeights {
  const laws = populationLaws(population);
  const inside =
    shareInside(grid.massMjup, laws.mass) * shareInside(grid.semiMajorAxisAu, laws.semiMajorAxis);
  if (!(inside > 0)) throw entirelyOutside(grid);
  const nodes = moving === 'mass' ? grid.massMjup : grid.semiMajorAxisAu;
  return {
    ...before,
    [moving]: axisWeights(nodes, laws[moving]),
    shareOutsideMap: Math.max(0, 1 - inside),
  };
}

/** First and one past the last node that carries weight. */
export function activeRange(weights: Float64Array): [number, number] {
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
  const isStored = maps instanceof Uint16Array;
  const scale = isStored ? 1 / 65535 : 1;
  const [firstRow, endRow] = activeRange(mass);
  const [firstColumn, endColumn] = activeRange(semiMajorAxis);
  const means = new Float64Array(stars);
  for (let star = 0; star < stars; star++) {
    let sum = 0;
    for (let row = firstRow; row < endRow; row++) {
      const start = star * size + row * columns;
      sum +=
        mass[row] *
        (isStored
          ? sumOfIntegers(maps, start, semiMajorAxis, firstColumn, endColumn)
          : sumAlong(maps, start, semiMajorAxis, firstColumn, endColumn));
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
