import { normalQuantile } from './normal';

/** A seeded stream of numbers: the same seed gives the same stream on every machine. */
export interface RandomStream {
  /** Uniform on (0, 1), 53 bits, never 0 and never 1. */
  uniform(): number;
  /** Standard normal, by inversion: one uniform each. */
  normal(): number;
}

/**
 * Stream of random numbers from a seed: xoshiro128** with its state filled from a hash of the text.
 *
 * Uniform draws use integer arithmetic only, so they agree to the last bit on every engine.
 *
 * @param seed any text; stored with every result that used it
 * @source Blackman & Vigna 2021, ACM Transactions on Mathematical Software 47, 36; state filled with
 *   FNV-1a and the finaliser of MurmurHash3 (both public domain)
 * @example createRandom('demo').uniform() // the same number every time
 */
export function createRandom(seed: string): RandomStream {
  const state = stateFrom(seed);
  const uniform = () => {
    const high = nextInteger(state) >>> 5;
    const low = nextInteger(state) >>> 6;
    return (high * 67_108_864 + low + 0.5) / 9_007_199_254_740_992;
  };
  return { uniform, normal: () => normalQuantile(uniform()) };
}

/**
 * Seed of one part of a parallel computation, so that the number of threads changes nothing.
 *
 * @param seed the whole computation's seed
 * @param part number or name of the part
 */
export function deriveSeed(seed: string, part: number | string): string {
  return `${seed.length}:${seed}/${part}`;
}

function stateFrom(seed: string): Uint32Array {
  let hash = 0x811c9dc5;
  for (let i = 0; i < seed.length; i++) {
    const code = seed.charCodeAt(i);
    hash = Math.imul(hash ^ (code & 0xff), 0x01000193);
    hash = Math.imul(hash ^ (code >>> 8), 0x01000193);
  }
  const state = new Uint32Array(4);
  // A second pass per word keeps seeds whose 32-bit hashes meet from sharing all four words.
  for (let word = 0; word < 4; word++) {
    let mixed = hash ^ Math.imul(word + 1, 0x9e3779b9);
    for (let i = 0; i < seed.length; i++) mixed = finalise(mixed + seed.charCodeAt(i) + word);
    state[word] = finalise(mixed);
  }
  if (state.every((x) => x === 0)) state[0] = 1;
  for (let i = 0; i < 16; i++) nextInteger(state);
  return state;
}

function finalise(x: number): number {
  let h = x | 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

function rotate(x: number, bits: number): number {
  return (x << bits) | (x >>> (32 - bits));
}

/** Next 32 bits of xoshiro128**; the state is advanced in place. */
function nextInteger(state: Uint32Array): number {
  const result = Math.imul(rotate(Math.imul(state[1], 5), 7), 9) >>> 0;
  const shifted = state[1] << 9;
  state[2] ^= state[0];
  state[3] ^= state[1];
  state[1] ^= state[2];
  state[0] ^= state[3];
  state[2] ^= shifted;
  state[3] = rotate(state[3], 11);
  return result;
}
