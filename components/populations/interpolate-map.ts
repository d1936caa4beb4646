import type { MapGrid } from '@/lib/sensitivity';

/** A map, in whatever unit its values are. */
interface AnyMap extends MapGrid {
  completeness: ArrayLike<number>;
}

/** Position of x between nodes, linear in ln x; undefined outside. */
function place(nodes: Float64Array, x: number): { below: number; share: number } | undefined {
  const last = nodes.length - 1;
  if (x < nodes[0] || x > nodes[last]) return undefined;
  let below = 0;
  while (below < last - 1 && nodes[below + 1] < x) below++;
  return { below, share: Math.log(x / nodes[below]) / Math.log(nodes[below + 1] / nodes[below]) };
}

/**
 * Completeness between the nodes of a map, bilinear in (ln m, ln a), as weights integrate it.
 *
 * @returns in the unit of the map; 0 outside it
 */
export function interpolateMap(map: AnyMap, massMjup: number, semiMajorAxisAu: number): number {
  const row = place(map.massMjup, massMjup);
  const column = place(map.semiMajorAxisAu, semiMajorAxisAu);
  if (!row || !column) return 0;
  const columns = map.semiMajorAxisAu.length;
  const at = (i: number, j: number) =>
    map.completeness[(row.below + i) * columns + column.below + j];
  const lower = at(0, 0) + column.share * (at(0, 1) - at(0, 0));
  const upper = at(1, 0) + column.share * (at(1, 1) - at(1, 0));
  return lower + row.share * (upper - lower);
}
