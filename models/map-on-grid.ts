import { type CompletenessMap, encodeMap, type MapGrid, regridNodes } from '@/lib/sensitivity';
import type { CompletenessMapRow } from './completeness-map';
import { unpackMap } from './map-values';

export function mapOfRow(row: CompletenessMapRow): CompletenessMap {
  return {
    massMjup: Float64Array.from(row.massMjup),
    semiMajorAxisAu: Float64Array.from(row.semiMajorAxisAu),
    completeness: unpackMap(row.nodeValues),
  };
}

/**
 * A stored map on another grid, encoded again: what a run integrates and what its page receives
 * are these same numbers.
 *
 * @returns shape [mass, semiMajorAxis] of the grid, round(65535 C); the stored values themselves
 *   where the grid is the map's own
 */
export function valuesOnGrid(row: CompletenessMapRow, grid: MapGrid): Uint16Array {
  return encodeMap(regridNodes(mapOfRow(row), grid).map.completeness);
}
