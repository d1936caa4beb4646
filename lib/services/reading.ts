import path from 'node:path';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';
import { InputError } from '@/lib/errors';
import type { ReadContext, ReadResult } from '@/lib/formats';

/** formats: a file is read within 60 s and 1 GiB, or refused. */
const LONGEST_MS = 60_000;
const MOST_MEGABYTES = 1024;

const holder = globalThis as typeof globalThis & { rareboundReaders?: Piscina };

function readers(): Piscina {
  holder.rareboundReaders ??= new Piscina({
    filename: path.resolve(config().bundleDirectory, 'workers/compute/read-upload.js'),
    minThreads: 0,
    maxThreads: 2,
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

/** Reads a file on a thread of its own, so that a large or hostile one cannot hold up the pages. */
export async function readOnThread(bytes: Buffer, context: ReadContext): Promise<ReadResult> {
  const own = new Uint8Array(bytes);
  const limit = AbortSignal.timeout(LONGEST_MS);
  try {
    return (await readers().run(
      { bytes: own, context },
      { signal: limit, transferList: [own.buffer] },
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
