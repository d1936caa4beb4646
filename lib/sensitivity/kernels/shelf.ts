import type { Kernels } from './kernels';

/** Where tables lie in the kernels' memory, and where what comes behind all of them begins. */
export interface Shelved {
  places: number[];
  end: number;
}

/** Tables are taken away when they fill more than 64 MB. */
const MOST_DOUBLES = 1 << 23;
/** A place of 0 stands for nothing. */
const BEGIN = 2;

/**
 * Keeps tables in the kernels' memory from star to star, in front of what each star writes there.
 *
 * @param kernels whose memory it is
 * @returns function of all the tables that a star needs; they must not change afterwards
 */
export function newShelf(kernels: Kernels): (tables: readonly Float64Array[]) => Shelved {
  const known = new Map<Float64Array, number>();
  let end = BEGIN;
  const place = (table: Float64Array) => {
    const at = end;
    end += table.length + (table.length & 1);
    kernels.reserve(end).set(table, at);
    known.set(table, at);
    return at;
  };
  return (tables) => {
    const missing = tables.reduce((sum, t) => (known.has(t) ? sum : sum + t.length), 0);
    if (missing > 0 && end + missing > MOST_DOUBLES) {
      known.clear();
      end = BEGIN;
    }
    return { places: tables.map((table) => known.get(table) ?? place(table)), end };
  };
}
