import type { MapData } from '@/components/charts/map-contours';
import { orNull } from '@/components/runs/or-null';
import { type Population, type PopulationWeights, populationWeights } from '@/lib/population';
import { formatPercent } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import { interpolateMap } from './interpolate-map';

/** Below this mean detection probability a limit rests on the population and not on data. */
const HARDLY_SEEN = 0.05;
/** A smaller share of a population out of sight is not worth a warning. */
export const HARDLY_ANY = 0.01;

/** Share of the population where the mean detection probability is under 5 %, outside included. */
export function shareHardlySeen(
  map: MapData,
  population: Population,
  weights: PopulationWeights,
): number {
  if (population.form === 'systems') {
    let [hardly, whole] = [0, 0];
    population.companionSystem.forEach((system, k) => {
      const own = population.weight[system];
      whole += own;
      const seen = interpolateMap(map, population.massMjup[k], population.semiMajorAxisAu[k]);
      if (seen < HARDLY_SEEN) hardly += own;
    });
    return hardly / whole;
  }
  const columns = map.semiMajorAxisAu.length;
  let share = weights.shareOutsideMap;
  weights.mass.forEach((mass, row) => {
    for (let column = 0; column < columns; column++) {
      if (map.completeness[row * columns + column] < HARDLY_SEEN) {
        share += mass * weights.semiMajorAxis[column];
      }
    }
  });
  return Math.min(1, share);
}

/**
 * The same on the plain mean map of a sample; null where the population weighs the stars by their
 * masses or is known by its summary, so that the mean map alone cannot tell.
 */
export function shareOnMeanMap(map: MapData, definition: ListedDefinition): number | null {
  if (definition.form !== 'power-law' && definition.form !== 'shaped') return null;
  if (definition.hostScaling) return null;
  return orNull(() => shareHardlySeen(map, definition, populationWeights(map, definition)));
}

/** The share in words, and what it means for a limit. */
export const hardlySeenWords = (share: number) => ({
  fact: `${formatPercent(share)} of this population lies where the mean detection probability is under ${formatPercent(HARDLY_SEEN, 1)}`,
  meaning: 'There the limit rests on the population, not on data',
});
