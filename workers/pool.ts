import os from 'node:os';
import path from 'node:path';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';

/** A thread that computes longer than this is ended; its item fails, the pool goes on. */
const TASK_LIMIT_S = 120;
const THREAD_MEMORY_MB = 512;

/** A part of the work that no thread could do; the sentence is for people. */
export class ThreadFault extends Error {}

export interface ComputePool {
  threads: number;
  /**
   * Runs the default export of workers/compute/<name>.ts in a thread.
   *
   * @param transfer buffers that move to the thread instead of being copied
   * @throws ThreadFault when the thread took too long or too much memory, or threw
   */
  run<Input, Output>(
    name: string,
    input: Input,
    options: { signal: AbortSignal; transfer?: ArrayBufferLike[] },
  ): Promise<Output>;
  close(): Promise<void>;
}

interface PoolOptions {
  folder: string;
  /** Task whose file a thread loads when it starts; the others are loaded when first run. */
  preload?: string;
  threads?: number;
  taskLimitS?: number;
  memoryMb?: number;
}

/** Threads of this process; each loads a task's file when it first runs it or starts, and stays warm. */
export function openPool({
  folder,
  preload,
  threads = config().workerThreads ?? os.availableParallelism(),
  taskLimitS = TASK_LIMIT_S,
  memoryMb = THREAD_MEMORY_MB,
}: PoolOptions): ComputePool {
  const piscina = new Piscina({
    ...(preload && { filename: path.join(folder, `${preload}.js`) }),
    minThreads: 1,
    maxThreads: threads,
    idleTimeout: 60_000,
    resourceLimits: { maxOldGenerationSizeMb: memoryMb },
  });
  return {
    threads,
    async run(name, input, { signal, transfer = [] }) {
      const limit = AbortSignal.timeout(taskLimitS * 1000);
      try {
        return await piscina.run(input, {
          filename: path.join(folder, `${name}.js`),
          signal: AbortSignal.any([signal, limit]),
          transferList: transfer as ArrayBuffer[],
        });
      } catch (error) {
        if (signal.aborted) throw signal.reason;
        if (limit.aborted) {
          throw new ThreadFault(`The computation took longer than ${taskLimitS} s`);
        }
        throw asFault(error, memoryMb);
      }
    },
    close: () => piscina.destroy(),
  };
}

function asFault(error: unknown, memoryMb: number): unknown {
  const { code, message } = error as { code?: string; message?: string };
  if (code === 'ERR_WORKER_OUT_OF_MEMORY') {
    return new ThreadFault(`The computation needed more than ${memoryMb} MB of memory`);
  }
  return new ThreadFault(message ?? String(error));
}
