import path from 'node:path';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';
import { InputError } from '@/lib/errors';
import type { ReadContext, ReadResult } from '@/lib/formats';

/** formats: a file is read within 60 s and 1 GiB, or refused. */
const LONGEST_MS = 60_000;
const MOST_MEGABYTES = 1024;
const THREADS = 2;

const holder = globalThis as typeof globalThis & {
  rareboundReaders?: Piscina;
  /** Settles with each file that is being read. */
  rareboundReading?: Set<Promise<void>>;
};

function readers(): Piscina {
  holder.rareboundReaders ??= new Piscina({
    filename: path.resolve(config().bundleDirectory, 'workers/compute/read-upload.js'),
    minThreads: 0,
    maxThreads: THREADS,
    idleTimeout: 30_000,
    resourceLimits: { maxOldGenerationSizeMb: MOST_MEGABYTES },
  });
  return holder.rareboundReaders;
}

/** Ends the reading threads; the next file starts new ones. */
export async function closeReaders(): Promise<void> {
  await holder.rareboundReaders?.destroy();
  holder.rareboundReaders = undefined;
}

/** Brings the bytes of a file, anew at each call: they move to the thread that reads them. */
export type LoadBytes = () => Promise<Uint8Array>;

/** Files that wait for a thread wait on the disk, not in memory. */
async function withThread<Answer>(work: () => Promise<Answer>): Promise<Answer> {
  while (holder.rareboundReading && holder.rareboundReading.size >= THREADS) {
    await Promise.race(holder.rareboundReading);
  }
  holder.rareboundReading ??= new Set();
  const running = work();
  const ended = running.then(
    () => undefined,
    () => undefined,
  );
  holder.rareboundReading.add(ended);
  try {
    return await running;
  } finally {
    holder.rareboundReading.delete(ended);
  }
}

/** Reads a file on a thread of its own, so that a large or hostile one cannot hold up the pages. */
export function readOnThread(load: LoadBytes, context: ReadContext): Promise<ReadResult> {
  return withThread(async () => readBytes(await load(), context));
}

async function readBytes(bytes: Uint8Array, context: ReadContext): Promise<ReadResult> {
  const isWhole = bytes.byteLength === bytes.buffer.byteLength;
  const own = isWhole ? bytes : new Uint8Array(bytes);
  const limit = AbortSignal.timeout(LONGEST_MS);
  try {
    return (await readers().run(
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
