import { intervalIndex } from '@/lib/numerics/grid';
import type { MapGrid } from '@/lib/sensitivity';
import { checkPopulation } from './checks';
import type { SystemsPopulation } from './population';

/** Systems laid on a map's grid: where each companion reads the map. */
export interface SystemsOnGrid {
  /** Normalised to 1, shape [system]. */
  weight: Float64Array;
  /** Companions of system y: `firstCompanion[y]` to `firstCompanion[y + 1]`, shape [system + 1]. */
  firstCompanion: Int32Array;
  /** Index of the lower corner of its cell in a map, or -1 outside the map, shape [companion]. */
  corner: Int32Array;
  /** Place in the cell along mass and semi-major axis, 0..1, shape [companion]. */
  alongMass: Float64Array;
  alongAxis: Float64Array;
  /** Number of columns of the map. */
  columns: number;
  /** Share of the companions, by weight, outside the map, where completeness counts as 0. */
  shareOutsideMap: number;
}

function placeIn(nodes: Float64Array, x: number): { index: number; along: number } | null {
  if (!(x >= nodes[0] && x <= nodes[nodes.length - 1])) return null;
  const index = intervalIndex(nodes, x);
  return { index, along: Math.log(x / nodes[index]) / Math.log(nodes[index + 1] / nodes[index]) };
}

/**
 * Prepares tabulated systems for many maps on one grid.
 *
 * @throws RangeError for systems that cannot be used, and where every companion lies outside
 * Cost: two binary searches per companion.
 */
export function systemsOnGrid(grid: MapGrid, population: SystemsPopulation): SystemsOnGrid {
  checkPopulation(population);
  const { companionSystem, massMjup, semiMajorAxisAu } = population;
  const total = population.weight.reduce((a, b) => a + b, 0);
  const weight = Float64Array.from(population.weight, (w) => w / total);
  const firstCompanion = new Int32Array(weight.length + 1);
  for (const system of companionSystem) firstCompanion[system + 1]++;
  for (let y = 0; y < weight.length; y++) firstCompanion[y + 1] += firstCompanion[y];
  const next = firstCompanion.slice();
  const companions = companionSystem.length;
  const corner = new Int32Array(companions).fill(-1);
  const alongMass = new Float64Array(companions);
  const alongAxis = new Float64Array(companions);
  const columns = grid.semiMajorAxisAu.length;
  let whole = 0;
  let outside = 0;
  for (let k = 0; k < companions; k++) {
    const at = next[companionSystem[k]]++;
    const own = weight[companionSystem[k]];
    whole += own;
    const row = placeIn(grid.massMjup, massMjup[k]);
    const column = placeIn(grid.semiMajorAxisAu, semiMajorAxisAu[k]);
    if (row === null || column === null) {
      outside += own;
      continue;
    }
    corner[at] = row.index * columns + column.index;
    alongMass[at] = row.along;
    alongAxis[at] = column.along;
  }
  const shareOutsideMap = outside / whole;
  return { weight, firstCompanion, corner, alongMass, alongAxis, columns, shareOutsideMap };
}

/** What one star would show of the systems. */
export interface SystemsSeen {
  /** Probability that at least one companion of a system is seen, 0..1. */
  anySeen: number;
  /** Mean number of companions seen per system. */
  numberSeen: number;
}

/**
 * What one star's map would show of tabulated systems.
 *
 * P(any seen) = sum over systems of w [1 - product over companions of (1 - C(m, a))]; mean number
 * seen = sum of w C(m, a). C is bilinear in (ln m, ln a) and 0 outside the map. Orbit planes within
 * a system are taken as independent.
 *
 * @param maps stack of maps, 0..1 or 0..65535 for 16-bit integers, not modified
 * @param start where the star's map begins
 * Cost: four products per companion.
 */
export function seeSystems(
  maps: Float64Array | Float32Array | Uint16Array,
  start: number,
  systems: SystemsOnGrid,
): SystemsSeen {
  const { weight, firstCompanion, corner, alongMass, alongAxis, columns } = systems;
  const scale = maps instanceof Uint16Array ? 1 / 65535 : 1;
  let anySeen = 0;
  let numberSeen = 0;
  for (let y = 0; y < weight.length; y++) {
    let unseen = 1;
    let seen = 0;
    for (let k = firstCompanion[y]; k < firstCompanion[y + 1]; k++) {
      if (corner[k] < 0) continue;
      const at = start + corner[k];
      const u = alongAxis[k];
      const lower = maps[at] + (maps[at + 1] - maps[at]) * u;
      const upper = maps[at + columns] + (maps[at + columns + 1] - maps[at + columns]) * u;
      const c = scale * (lower + (upper - lower) * alongMass[k]);
      unseen *= 1 - c;
      seen += c;
    }
    anySeen += weight[y] * (1 - unseen);
    numberSeen += weight[y] * seen;
  }
  return { anySeen: Math.min(1, Math.max(0, anySeen)), numberSeen };
}
