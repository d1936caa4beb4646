import type { MapGrid } from '@/lib/sensitivity';
import { valuesOnGrid } from '@/models/map-on-grid';
import { streamMaps } from '@/models/map-stream';

/**
 * Stored maps on one grid, one for each digest in order, encoded as a run integrates them.
 *
 * @returns shape [digest, mass, semiMajorAxis], round(65535 C)
 */
export async function readMaps(
  collaborationId: string,
  digests: readonly string[],
  grid: MapGrid,
): Promise<Uint16Array> {
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const maps = new Uint16Array(digests.length * size);
  await streamMaps(collaborationId, { by: 'digest', keys: digests }, (map, place) => {
    maps.set(valuesOnGrid(map, grid), place * size);
  });
  return maps;
}
