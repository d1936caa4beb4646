import { hold } from '@/lib/queue/attempt';
import { CompletenessMapRow, inTransaction } from '@/models';
import { passingOfRow } from '@/models/map-on-grid';
import { MissingMap, type PassingMap, streamMaps } from '@/models/map-stream';
import type { Work } from '../perform';
import { type MapToStore, rowOfMap, storeMaps } from './map-store';

/** Where a run finds maps by their digests, and puts those that it combines. */
export interface MapShelf {
  known(digests: string[]): Promise<ReadonlySet<string>>;
  /** With their values; those that are not there are left out. */
  read(digests: string[]): Promise<CompletenessMapRow[]>;
  /** One at a time in the order of the digests; throws where one is not there. */
  stream(digests: string[], onMap: (map: PassingMap, place: number) => void): Promise<void>;
  keep(map: MapToStore): Promise<void>;
}

/** The collaboration's table of maps; what is put there passes the fence of the attempt. */
export function tableShelf({ attempt }: Work): MapShelf {
  const { collaborationId } = attempt;
  return {
    async known(digest) {
      const rows = await CompletenessMapRow.findAll({
        attributes: ['digest'],
        where: { collaborationId, digest },
      });
      return new Set(rows.map((row) => row.digest));
    },
    read: (digest) => CompletenessMapRow.findAll({ where: { collaborationId, digest } }),
    stream: (keys, onMap) => streamMaps(collaborationId, { by: 'digest', keys }, onMap),
    keep: (map) =>
      inTransaction(async (transaction) => {
        await hold(transaction, attempt);
        await storeMaps(collaborationId, [map], transaction);
      }),
  };
}

/** Maps in memory alone: what is computed there touches no table. */
export function memoryShelf(
  collaborationId: string,
  given: CompletenessMapRow[] = [],
): MapShelf & { all(): CompletenessMapRow[] } {
  const rows = new Map(given.map((row) => [row.digest, row]));
  return {
    all: () => [...rows.values()],
    known: async (digests) => new Set(digests.filter((digest) => rows.has(digest))),
    read: async (digests) => [...new Set(digests)].flatMap((digest) => rows.get(digest) ?? []),
    async stream(digests, onMap) {
      digests.forEach((digest, place) => {
        const row = rows.get(digest);
        if (!row) throw new MissingMap(digest);
        onMap(passingOfRow(row), place);
      });
    },
    async keep(map) {
      rows.set(map.digest, CompletenessMapRow.build(rowOfMap(collaborationId, map)));
    },
  };
}
