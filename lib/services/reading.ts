import path from 'node:path';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';
import { InputError } from '@/lib/errors';
import type { ReadContext, ReadResult } from '@/lib/formats';

/** formats: a file is read within 60 s and 1 GiB, or refused. */
const LONGEST_MS = 60_000;
const MOST_MEGABYTES = 1024;

/** From here on a file is read alone, on a thread that ends with it and gives its memory back. */
const LARGE_BYTES = 8 << 20;
const lanes = {
  small: { threads: 2, idleMs: 30_000 },
  large: { threads: 1, idleMs: 0 },
} as const;
type Lane = keyof typeof lanes;

interface Readers {
  pool: Piscina;
  /** Settles with each file that is being read. */
  reading: Set<Promise<void>>;
}

const holder = globalThis as typeof globalThis & { rareboundReaders?: Map<Lane, Readers> };

function readersOf(lane: Lane): Readers {
  holder.rareboundReaders ??= new Map();
  const there = holder.rareboundReaders.get(lane);
  if (there) return there;
  const { threads, idleMs } = lanes[lane];
  const pool = new Piscina({
    filename: path.resolve(config().bundleDirectory, 'workers/compute/read-upload.js'),
    minThreads: 0,
    maxThreads: threads,
    idleTimeout: idleMs,
    resourceLimits: { maxOldGenerationSizeMb: MOST_MEGABYTES },
  });
  const made = { pool, reading: new Set<Promise<void>>() };
  holder.rareboundReaders.set(lane, made);
  return made;
}

/** Ends the reading threads; the next file starts new ones. */
export async function closeReaders(): Promise<void> {
  const all = [...(holder.rareboundReaders?.values() ?? [])];
  holder.rareboundReaders = undefined;
  await Promise.all(all.map(({ pool }) => pool.destroy()));
}

/** A file that lies on the disk or in the database. */
export interface KeptFile {
  byteLength: number;
  /** Brings its bytes, anew at each call: they move to the thread that reads them. */
  load(): Promise<Uint8Array>;
}

/** Files that wait for a thread wait where they lie, not in memory. */
async function withThread<Answer>(
  lane: Lane,
  work: (pool: Piscina) => Promise<Answer>,
): Promise<Answer> {
  const { pool, reading } = readersOf(lane);
  while (reading.size >= lanes[lane].threads) await Promise.race(reading);
  const running = work(pool);
  const ended = running.then(
    () => undefined,
    () => undefined,
  );
  reading.add(ended);
  try {
    return await running;
  } finally {
    reading.delete(ended);
  }
}

/** Reads a file on a thread of its own, so that a large or hostile one cannot hold up the pages. */
export function readOnThread(file: KeptFile, context: ReadContext): Promise<ReadResult> {
  const lane = file.byteLength < LARGE_BYTES ? 'small' : 'large';
  return withThread(lane, async (pool) => readBytes(pool, await file.load(), context));
}

async function readBytes(
  pool: Piscina,
  bytes: Uint8Array,
  context: ReadContext,
): Promise<ReadResult> {
  const isWhole = bytes.byteLength === bytes.buffer.byteLength;
  const own = isWhole ? bytes : new Uint8Array(bytes);
  const limit = AbortSignal.timeout(LONGEST_MS);
  try {
    return (await pool.run(
      { bytes: own, context },
      { signal: limit, transferList: [own.buffer as ArrayBuffer] },
    )) as ReadResult;
  } catch (error) {
    if (limit.aborted) {
      throw new InputError({
        code: 'too-slow',
        item: 'file',
        found: 'a file that takes over 60 s to read',
        expected: 'a smaller file',
      });
    }
    if ((error as { code?: string }).code === 'ERR_WORKER_OUT_OF_MEMORY') {
      throw new InputError({
        code: 'too-large',
        item: 'file',
        found: 'a file that needs over 1 GiB of memory to read',
        expected: 'a smaller file',
      });
    }
    throw error;
  }
}
