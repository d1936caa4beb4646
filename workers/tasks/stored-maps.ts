import type { MapGrid } from '@/lib/sensitivity';
import { CompletenessMapRow } from '@/models';
import { valuesOnGrid } from '@/models/map-on-grid';

/** Maps read at once: some megabytes. */
const READ_AT_ONCE = 200;

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
  for (let start = 0; start < digests.length; start += READ_AT_ONCE) {
    const part = digests.slice(start, start + READ_AT_ONCE);
    const rows = await CompletenessMapRow.findAll({ where: { collaborationId, digest: part } });
    const rowOf = new Map(rows.map((row) => [row.digest, row]));
    part.forEach((digest, i) => {
      const row = rowOf.get(digest);
      if (!row) throw new Error(`the map ${digest} is not stored`);
      maps.set(valuesOnGrid(row, grid), (start + i) * size);
    });
  }
  return maps;
}
