import { InputError } from '@/lib/errors';
import type { ReadContext, ReadResult } from '@/lib/formats';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { findOutside } from './domains';
import { type MutationKind, mutate } from './mutations';
import type { FormatFiles } from './sample-files';

const SEED = 'damaged files 1';
const KINDS: readonly MutationKind[] = ['flip', 'cut', 'splice'];

export type Reader = (bytes: Uint8Array, context: ReadContext) => Promise<ReadResult>;

export interface Finding {
  format: string;
  /** Number, file and change: enough to make the same bytes again. */
  mutation: string;
  what: string;
}

export interface Tally {
  mutations: number;
  accepted: number;
  refused: number;
  slowestMs: number;
  findings: Finding[];
}

const emptyTally = (): Tally => ({
  mutations: 0,
  accepted: 0,
  refused: 0,
  slowestMs: 0,
  findings: [],
});

/** What is wrong with an answer; null where it is one that a person may get. */
function faultOf(result: ReadResult): string | null {
  if (result.ok) return findOutside(result);
  const [first] = result.faults;
  if (first === undefined || result.faultCount < 1) return 'refused without a fault';
  // The name of the file is the sender's own word.
  const text = JSON.stringify(result.faults.map(({ file: _, ...fault }) => fault));
  const leak = /undefined|\[object |node_modules|\.js:\d|Cannot read|is not a function/.exec(text);
  return leak ? `a fault says "${leak[0]}": ${text.slice(0, 200)}` : null;
}

/** The bytes of mutation number `index` of a format, and how they came about. */
export async function mutationOf(format: FormatFiles, index: number) {
  const random = createRandom(deriveSeed(`${SEED} ${format.name}`, index));
  const { good, bad } = format;
  const all = [...good, ...bad];
  // Whole files in turn with those that are refused as they are: changes of these get less far.
  const files = bad.length === 0 || index % 2 === 0 ? good : bad;
  const file = files[Math.floor(index / 2) % files.length];
  const donor = all[Math.floor(random.uniform() * all.length)];
  const kind = KINDS[Math.floor(random.uniform() * KINDS.length)];
  const isInside = format.wrap !== undefined && random.uniform() < 0.5;
  const source = isInside ? file.inner : file.bytes;
  const changed = mutate(random, kind, source, isInside ? donor.inner : donor.bytes);
  const bytes = isInside && format.wrap ? format.wrap(changed.bytes, file) : changed.bytes;
  const where = isInside ? 'inside ' : '';
  const mutation = `${format.name} ${index}: ${where}${file.context.fileName}, ${changed.words}`;
  return { bytes, context: file.context, mutation };
}

/**
 * Reads damaged copies of a format's files and notes every answer that nobody should get: an error
 * that is no refusal, a value outside its domain, a wait beyond the limit.
 */
export async function readMutations(
  format: FormatFiles,
  count: number,
  longestMs: number,
  read: Reader,
): Promise<Tally> {
  const tally = emptyTally();
  for (let index = 0; index < count; index++) {
    const { bytes, context, mutation } = await mutationOf(format, index);
    const find = (what: string) => tally.findings.push({ format: format.name, mutation, what });
    const start = performance.now();
    try {
      const result = await read(bytes, context);
      if (result.ok) tally.accepted++;
      else tally.refused++;
      const fault = faultOf(result);
      if (fault !== null) find(fault);
    } catch (error) {
      tally.refused++;
      if (!(error instanceof InputError)) find(`threw ${String((error as Error).stack ?? error)}`);
    }
    const tookMs = performance.now() - start;
    tally.slowestMs = Math.max(tally.slowestMs, tookMs);
    if (tookMs > longestMs) find(`took ${Math.round(tookMs)} ms`);
    tally.mutations++;
  }
  return tally;
}
