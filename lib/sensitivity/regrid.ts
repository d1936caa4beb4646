import { logOf, requirePositiveAxis } from '@/lib/numerics/grid';
import { type Bracket, bracket } from '@/lib/numerics/interpolate';
import { requireGrid } from './map-grid';
import type { CompletenessMap, MapGrid } from './types';

/**
 * A map of nodes on another grid: bilinear in (ln m, ln a), 0 outside the old axes.
 *
 * Keeps 0…1 and the order of values; never extrapolates.
 *
 * @param map nodes, at least 2 x 2, not modified
 * @param grid new nodes, not modified
 * @returns the map on the new nodes (axes copied), and the share of new nodes outside the old axes
 * @throws RangeError for axes not positive and increasing, or a wrong number of values
 */
export function regridNodes(
  map: CompletenessMap,
  grid: MapGrid,
): { map: CompletenessMap; shareOutside: number } {
  requireMapShape(map);
  requireGrid(grid);
  const masses = brackets(map.massMjup, grid.massMjup);
  const axes = brackets(map.semiMajorAxisAu, grid.semiMajorAxisAu);
  const columns = map.semiMajorAxisAu.length;
  const old = map.completeness;
  const completeness = new Float64Array(masses.length * axes.length);
  let outside = 0;
  let cell = 0;
  for (const m of masses) {
    for (const a of axes) {
      if (m === null || a === null) {
        outside++;
        cell++;
        continue;
      }
      const corner = m.index * columns + a.index;
      const next = corner + columns;
      // Weighted means, not rises: a share of 1 then gives the node's own value to the last bit.
      const below = (1 - a.share) * old[corner] + a.share * old[corner + 1];
      const above = (1 - a.share) * old[next] + a.share * old[next + 1];
      const value = (1 - m.share) * below + m.share * above;
      completeness[cell++] = Math.min(1, Math.max(0, value));
    }
  }
  return {
    map: {
      massMjup: Float64Array.from(grid.massMjup),
      semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
      completeness,
    },
    shareOutside: outside / completeness.length,
  };
}

function brackets(axis: Float64Array, wanted: Float64Array): (Bracket | null)[] {
  const logAxis = logOf(axis);
  return Array.from(wanted, (x) => bracket(logAxis, Math.log(x)));
}

/** A map whose values are means over cells, between edges one longer than each side. */
export interface CellMap {
  massEdgesMjup: Float64Array;
  semiMajorAxisEdgesAu: Float64Array;
  /** Shape [mass, semiMajorAxis], row-major, 0 to 1. */
  completeness: Float64Array;
}

/**
 * A map of cells on other cells: mean weighted by area in (ln m, ln a), 0 outside the old edges.
 *
 * ∫∫ C d ln m d ln a is conserved when the new cells cover the old.
 *
 * @param map cells, not modified
 * @param massEdgesMjup new edges, [M_Jup], at least 2
 * @param semiMajorAxisEdgesAu new edges, [au], at least 2
 * @returns the map on the new cells, and the share of their area outside the old edges
 * @throws RangeError for edges not positive and increasing, or a wrong number of values
 */
export function regridCells(
  map: CellMap,
  massEdgesMjup: Float64Array,
  semiMajorAxisEdgesAu: Float64Array,
): { map: CellMap; shareOutside: number } {
  for (const [name, edges] of Object.entries({
    massEdgesMjup: map.massEdgesMjup,
    semiMajorAxisEdgesAu: map.semiMajorAxisEdgesAu,
    'new massEdgesMjup': massEdgesMjup,
    'new semiMajorAxisEdgesAu': semiMajorAxisEdgesAu,
  })) {
    requirePositiveAxis(edges, name);
  }
  const oldColumns = map.semiMajorAxisEdgesAu.length - 1;
  requireLength(map.completeness, (map.massEdgesMjup.length - 1) * oldColumns);
  const rows = overlaps(map.massEdgesMjup, massEdgesMjup);
  const columns = overlaps(map.semiMajorAxisEdgesAu, semiMajorAxisEdgesAu);
  const completeness = new Float64Array(rows.length * columns.length);
  for (let i = 0; i < rows.length; i++) {
    for (let j = 0; j < columns.length; j++) {
      let mean = 0;
      for (const [m, massShare] of rows[i]) {
        for (const [a, axisShare] of columns[j]) {
          mean += massShare * axisShare * map.completeness[m * oldColumns + a];
        }
      }
      completeness[i * columns.length + j] = Math.min(1, mean);
    }
  }
  const inside =
    insideShare(map.massEdgesMjup, massEdgesMjup) *
    insideShare(map.semiMajorAxisEdgesAu, semiMajorAxisEdgesAu);
  return {
    map: {
      massEdgesMjup: Float64Array.from(massEdgesMjup),
      semiMajorAxisEdgesAu: Float64Array.from(semiMajorAxisEdgesAu),
      completeness,
    },
    shareOutside: 1 - inside,
  };
}

/** Per new cell: which old cells lie in it, and what share of its length in ln x each covers. */
function overlaps(old: Float64Array, wanted: Float64Array): [number, number][][] {
  const from = logOf(old);
  const to = logOf(wanted);
  return Array.from({ length: to.length - 1 }, (_, i) => {
    const shares: [number, number][] = [];
    for (let k = 0; k + 1 < from.length; k++) {
      const common = Math.min(from[k + 1], to[i + 1]) - Math.max(from[k], to[i]);
      if (common > 0) shares.push([k, common / (to[i + 1] - to[i])]);
    }
    return shares;
  });
}

/** Share of the new axis, in ln x, that the old one covers. */
function insideShare(old: Float64Array, wanted: Float64Array): number {
  const ends = (edges: Float64Array) => [Math.log(edges[0]), Math.log(edges[edges.length - 1])];
  const [oldLow, oldHigh] = ends(old);
  const [low, high] = ends(wanted);
  return Math.max(0, Math.min(oldHigh, high) - Math.max(oldLow, low)) / (high - low);
}

/**
 * Refuses a map whose axes or number of values are wrong.
 *
 * @throws RangeError naming the axis or the number of values
 */
export function requireMapShape(map: CompletenessMap): void {
  requirePositiveAxis(map.massMjup, 'massMjup');
  requirePositiveAxis(map.semiMajorAxisAu, 'semiMajorAxisAu');
  requireLength(map.completeness, map.massMjup.length * map.semiMajorAxisAu.length);
}

function requireLength(values: Float64Array, length: number): void {
  if (values.length !== length) {
    throw new RangeError(`completeness must have ${length} values, got ${values.length}`);
  }
}
