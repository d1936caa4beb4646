import type { WrittenMaps } from '@/lib/formats';
import { decodeMap, encodeMap, type MapGrid, regridNodes } from '@/lib/sensitivity';
import { type PassingMap, streamMaps } from '@/models/map-stream';

/** Maps held at once while a file is sent. */
const HELD_AT_ONCE = 64;

/**
 * Stored maps one after the other, in the order of their ids.
 *
 * @param grid where to bring them; null leaves each on its own
 */
export async function* mapsInOrder(
  collaborationId: string,
  ids: readonly string[],
  grid: MapGrid | null,
): AsyncGenerator<Float64Array> {
  const valuesOf = ({ massMjup, semiMajorAxisAu, encoded }: PassingMap) => {
    const completeness = decodeMap(encoded);
    if (grid === null) return completeness;
    const regridded = regridNodes({ massMjup, semiMajorAxisAu, completeness }, grid);
    // As a run reads them: encoded again, so that a file holds the very numbers of the run.
    return decodeMap(encodeMap(regridded.map.completeness));
  };
  for (let start = 0; start < ids.length; start += HELD_AT_ONCE) {
    const held: Float64Array[] = [];
    const keys = ids.slice(start, start + HELD_AT_ONCE);
    await streamMaps(collaborationId, { by: 'id', keys }, (map) => held.push(valuesOf(map)));
    yield* held;
  }
}

export type MapsHead = Pick<WrittenMaps, 'title' | 'format' | 'provenance'>;
