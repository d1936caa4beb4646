import type { MapGrid } from '@/lib/sensitivity';
import { axisWeights, shareInside } from './axis-weights';
import { checkPopulation } from './checks';
import { populationLaws } from './forms';
import type { Population, SystemsPopulation } from './population';
import { systemsOnGrid } from './systems';
import type { PopulationWeights } from './weights';

function hatsOf(nodes: Float64Array, at: number[], own: number[], whole: number): Float64Array {
  const weights = new Float64Array(nodes.length);
  const last = nodes.length - 1;
  for (let k = 0; k < at.length; k++) {
    if (!(at[k] >= nodes[0] && at[k] <= nodes[last])) continue;
    let i = 0;
    while (i < last - 1 && nodes[i + 1] <= at[k]) i++;
    const upper = Math.log(at[k] / nodes[i]) / Math.log(nodes[i + 1] / nodes[i]);
    weights[i] += ((1 - upper) * own[k]) / whole;
    weights[i + 1] += (upper * own[k]) / whole;
  }
  return weights;
}

function marginalsOfSystems(grid: MapGrid, population: SystemsPopulation): PopulationWeights {
  const { shareOutsideMap } = systemsOnGrid(grid, population);
  const own = population.companionSystem.map((system) => population.weight[system]);
  const whole = own.reduce((a, b) => a + b, 0);
  return {
    mass: hatsOf(grid.massMjup, population.massMjup, own, whole),
    semiMajorAxis: hatsOf(grid.semiMajorAxisAu, population.semiMajorAxisAu, own, whole),
    shareOutsideMap,
  };
}

/**
 * How a population's companions are spread over the nodes of each axis by itself.
 *
 * For laws these are `populationWeights`; of tabulated systems the companions, by their systems'
 * weight, shared out between the nodes beside them. Made for what is shown per axis: only for laws
 * does the product of the two say anything about both axes together.
 *
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @returns weights per axis, all 0 where nothing lies on the map; the share outside it, up to 1
 * @throws RangeError for a population that cannot be used, and for a missing host mass
 */
export function marginalWeights(
  grid: MapGrid,
  population: Population,
  hostMassMsun?: number,
): PopulationWeights {
  checkPopulation(population);
  if (population.form === 'systems') return marginalsOfSystems(grid, population);
  const { mass, semiMajorAxis } = populationLaws(population, hostMassMsun);
  const inside =
    shareInside(grid.massMjup, mass) * shareInside(grid.semiMajorAxisAu, semiMajorAxis);
  return {
    mass: axisWeights(grid.massMjup, mass),
    semiMajorAxis: axisWeights(grid.semiMajorAxisAu, semiMajorAxis),
    shareOutsideMap: Math.max(0, 1 - inside),
  };
}
