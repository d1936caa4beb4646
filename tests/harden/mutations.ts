import type { RandomStream } from '@/lib/numerics/random';

export type MutationKind = 'flip' | 'cut' | 'splice';

export interface Mutation {
  bytes: Uint8Array;
  /** How it was made, so that a finding can be made again. */
  words: string;
}

/** Headers decide what the rest is taken for, so half of all changes fall into the first bytes. */
const HEADER_BYTES = 600;
const MOST_FLIPS = 8;
const MOST_SPLICED = 400;

/** A whole number from 0 to below `count`. */
const below = (random: RandomStream, count: number) => Math.floor(random.uniform() * count);

function placeIn(random: RandomStream, length: number): number {
  const reach = random.uniform() < 0.5 ? Math.min(length, HEADER_BYTES) : length;
  return below(random, reach);
}

function flip(random: RandomStream, bytes: Uint8Array): Mutation {
  const changed = bytes.slice();
  const places: string[] = [];
  // A single changed bit gets furthest into a reader.
  const count = random.uniform() < 0.5 ? 1 : 1 + below(random, MOST_FLIPS);
  for (let i = 0; i < count && changed.length > 0; i++) {
    const at = placeIn(random, changed.length);
    const bit = below(random, 8);
    changed[at] ^= 1 << bit;
    places.push(`${at}.${bit}`);
  }
  return { bytes: changed, words: `flip ${places.join(' ')}` };
}

/** The end cut off, or a piece out of the middle. */
function cut(random: RandomStream, bytes: Uint8Array): Mutation {
  const from = placeIn(random, bytes.length);
  const isEnd = random.uniform() < 0.5;
  const to = isEnd ? bytes.length : Math.min(bytes.length, from + 1 + below(random, MOST_SPLICED));
  const left = new Uint8Array(bytes.length - (to - from));
  left.set(bytes.subarray(0, from));
  left.set(bytes.subarray(to), from);
  return { bytes: left, words: `cut ${from}-${to}` };
}

/** A piece of another file of the format, put between two bytes or over some. */
function splice(random: RandomStream, bytes: Uint8Array, donor: Uint8Array): Mutation {
  const length = Math.min(donor.length, 1 + below(random, MOST_SPLICED));
  const from = below(random, donor.length - length + 1);
  const at = placeIn(random, bytes.length + 1);
  const isOver = random.uniform() < 0.5;
  const rest = isOver ? Math.min(bytes.length, at + length) : at;
  const changed = new Uint8Array(at + length + bytes.length - rest);
  changed.set(bytes.subarray(0, at));
  changed.set(donor.subarray(from, from + length), at);
  changed.set(bytes.subarray(rest), at + length);
  return { bytes: changed, words: `splice ${from}+${length} ${isOver ? 'over' : 'at'} ${at}` };
}

/**
 * One damaged copy of a file.
 *
 * @param bytes not modified
 * @param donor another file of the same format, from which a splice takes its piece
 */
export function mutate(
  random: RandomStream,
  kind: MutationKind,
  bytes: Uint8Array,
  donor: Uint8Array,
): Mutation {
  if (kind === 'flip') return flip(random, bytes);
  return kind === 'cut' ? cut(random, bytes) : splice(random, bytes, donor);
}
