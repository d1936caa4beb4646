import {
  type CompletenessMap,
  decodeMap,
  encodeMap,
  type MapGrid,
  regridNodes,
} from '@/lib/sensitivity';
import type { CompletenessMapRow } from './completeness-map';
import type { PassingMap } from './map-stream';
import { asEncoded, unpackMap } from './map-values';

export function mapOfRow(row: CompletenessMapRow): CompletenessMap {
  return {
    massMjup: Float64Array.from(row.massMjup),
    semiMajorAxisAu: Float64Array.from(row.semiMajorAxisAu),
    completeness: unpackMap(row.nodeValues),
  };
}

/** A row in the form in which maps pass by. */
export function passingOfRow(row: CompletenessMapRow): PassingMap {
  const { id, digest, checksum, report } = row;
  return {
    ...{ id, digest, checksum, report },
    massMjup: Float64Array.from(row.massMjup),
    semiMajorAxisAu: Float64Array.from(row.semiMajorAxisAu),
    encoded: asEncoded(row.nodeValues),
  };
}

const isSameAxis = (a: Float64Array, b: Float64Array) =>
  a.length === b.length && a.every((value, i) => value === b[i]);

/**
 * A stored map on another grid, encoded again: what a run integrates and what its page receives
 * are these same numbers.
 *
 * @returns shape [mass, semiMajorAxis] of the grid, round(65535 C); the stored values themselves
 *   where the grid is the map's own
 */
export function valuesOnGrid(
  { massMjup, semiMajorAxisAu, encoded }: Pick<PassingMap, 'encoded' | keyof MapGrid>,
  grid: MapGrid,
): Uint16Array {
  const isOwn =
    isSameAxis(massMjup, grid.massMjup) && isSameAxis(semiMajorAxisAu, grid.semiMajorAxisAu);
  if (isOwn) return encoded;
  const map = { massMjup, semiMajorAxisAu, completeness: decodeMap(encoded) };
  return encodeMap(regridNodes(map, grid).map.completeness);
}
