import type { MapGrid } from '@/lib/sensitivity';
import { axisWeights, shareInside } from './axis-weights';
import { populationLaws } from './forms';
import { requireHostMasses } from './host-mass';
import type { MassRatioPopulation, Population, SystemsPopulation } from './population';
import { seeSystems, systemsOnGrid } from './systems';
import {
  activeRange,
  entirelyOutside,
  meanCompletenessOfStack,
  populationWeights,
} from './weights';

/** Maps of a sample, shape [star, mass, semiMajorAxis]; 16-bit integers hold round(65535 C). */
export type MapStack = Uint16Array | Float32Array | Float64Array;

/** What each star of a sample would show of a population. */
export interface SampleCompleteness {
  /** Shape [star], 0..1: mean completeness, or the probability that any of a system is seen. */
  perStar: Float64Array;
  /** Shape [star], >= 0: companions seen per system; null unless systems are tabulated. */
  numberSeenPerStar: Float64Array | null;
  /** Mean over the stars of the share outside the maps, where completeness counts as 0. */
  shareOutsideMap: number;
}

function starsOf(maps: MapStack, grid: MapGrid): number {
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const stars = maps.length / size;
  if (!Number.isInteger(stars)) {
    throw new RangeError(
      `the maps hold ${maps.length} values, not a multiple of ${grid.massMjup.length} x ` +
        `${grid.semiMajorAxisAu.length} nodes`,
    );
  }
  return stars;
}

/** Each map contracted over the semi-major axis, whose law all stars share: shape [star, mass]. */
function contractAxis(maps: MapStack, stars: number, rows: number, weights: Float64Array) {
  const columns = weights.length;
  const [first, end] = activeRange(weights);
  const contracted = new Float64Array(stars * rows);
  for (let row = 0; row < contracted.length; row++) {
    const start = row * columns;
    let sum = 0;
    for (let column = first; column < end; column++) sum += maps[start + column] * weights[column];
    contracted[row] = sum;
  }
  return contracted;
}

function ofMassRatio(
  maps: MapStack,
  grid: MapGrid,
  population: MassRatioPopulation,
  hostMassMsun: Float64Array | undefined,
): SampleCompleteness {
  const stars = starsOf(maps, grid);
  requireHostMasses(population, hostMassMsun, stars);
  const masses = hostMassMsun as Float64Array;
  const rows = grid.massMjup.length;
  const perStar = new Float64Array(stars);
  if (stars === 0) return { perStar, numberSeenPerStar: null, shareOutsideMap: 0 };
  const { semiMajorAxis } = populationLaws(population, masses[0]);
  const axis = axisWeights(grid.semiMajorAxisAu, semiMajorAxis);
  const insideAxis = shareInside(grid.semiMajorAxisAu, semiMajorAxis);
  const contracted = contractAxis(maps, stars, rows, axis);
  const scale = maps instanceof Uint16Array ? 1 / 65535 : 1;
  const known = new Map<number, { weights: Float64Array; inside: number }>();
  let inside = 0;
  for (let star = 0; star < stars; star++) {
    let own = known.get(masses[star]);
    if (own === undefined) {
      const { mass } = populationLaws(population, masses[star]);
      own = {
        weights: axisWeights(grid.massMjup, mass),
        inside: insideAxis * shareInside(grid.massMjup, mass),
      };
      known.set(masses[star], own);
    }
    let sum = 0;
    for (let row = 0; row < rows; row++) sum += own.weights[row] * contracted[star * rows + row];
    perStar[star] = Math.min(1, Math.max(0, sum * scale));
    inside += own.inside;
  }
  if (!(inside > 0)) throw entirelyOutside(grid);
  return { perStar, numberSeenPerStar: null, shareOutsideMap: Math.max(0, 1 - inside / stars) };
}

function ofSystems(maps: MapStack, grid: MapGrid, population: SystemsPopulation) {
  const stars = starsOf(maps, grid);
  const systems = systemsOnGrid(grid, population);
  const { shareOutsideMap } = systems;
  if (shareOutsideMap >= 1) throw entirelyOutside(grid);
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const perStar = new Float64Array(stars);
  const numberSeenPerStar = new Float64Array(stars);
  for (let star = 0; star < stars; star++) {
    const { anySeen, numberSeen } = seeSystems(maps, star * size, systems);
    perStar[star] = anySeen;
    numberSeenPerStar[star] = numberSeen;
  }
  return { perStar, numberSeenPerStar, shareOutsideMap };
}

/**
 * What each star of a sample would show of a population, whatever its form.
 *
 * Laws: mean completeness W^T C V. Mass ratio: the weights in mass differ from star to star, those
 * in semi-major axis are shared and contracted first. Tabulated systems: the probability that any
 * companion is seen, and the mean number seen.
 *
 * @param maps stack of maps, shape [star, mass, semiMajorAxis], not modified
 * @param grid their nodes
 * @param hostMassMsun shape [star] [M_Sun]: needed for the mass ratio alone
 * @throws RangeError for a population that cannot be used or that lies outside every map, for maps
 *   that do not fit the grid, and for stars of unknown mass
 * Cost: one multiply-add per node that carries weight; for the mass ratio, 24 powers per node and
 *   distinct host mass besides; for systems, four products per companion and star.
 */
export function sampleCompleteness(
  maps: MapStack,
  grid: MapGrid,
  population: Population,
  hostMassMsun?: Float64Array,
): SampleCompleteness {
  if (population.form === 'systems') return ofSystems(maps, grid, population);
  if (population.form === 'mass-ratio') return ofMassRatio(maps, grid, population, hostMassMsun);
  const weights = populationWeights(grid, population);
  const perStar = meanCompletenessOfStack(maps, weights);
  return { perStar, numberSeenPerStar: null, shareOutsideMap: weights.shareOutsideMap };
}
