import { EventEmitter } from 'node:events';
import os from 'node:os';
import path from 'node:path';
import { Logger, run, type TaskList, type WorkerEvents } from 'graphile-worker';
import { config } from '@/lib/config';
import { deliverySchema, type JobKind } from '@/lib/queue/kinds';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { closeDatabase, takeTime } from '@/models';
import { startDepartures } from './departures';
import { startHeart } from './heart';
import { describeError, log } from './log';
import { perform, type Work } from './perform';
import { openPool } from './pool';
import { startPost } from './post';
import { performComputeMaps } from './tasks/compute-maps';
import { performComputeRun } from './tasks/compute-run';
import { performComputeStudy } from './tasks/compute-study';
import { performDepositRelease } from './tasks/deposit-release';
import { performExportCollaboration } from './tasks/export-collaboration';
import { performRecreateRun } from './tasks/recreate-run';
import { performVerifyRelease } from './tasks/verify-release';

const tasks: Record<JobKind, (work: Work) => Promise<void>> = {
  'compute-maps': performComputeMaps,
  'compute-run': performComputeRun,
  'compute-study': performComputeStudy,
  'verify-release': performVerifyRelease,
  'recreate-run': performRecreateRun,
  'deposit-release': performDepositRelease,
  'export-collaboration': performExportCollaboration,
};

/** Jobs at once: one per thread would let many small runs wait behind one survey's maps. */
const JOBS_AT_ONCE = 2;
/** Low enough that pages stay quick while every thread computes. */
const NICENESS = 10;

async function main(): Promise<void> {
  os.setPriority(NICENESS);
  takeTime();
  const pool = openPool({ folder: path.join(__dirname, 'compute'), preload: 'complete-maps' });
  const shutdown = new AbortController();
  const workerIds = new Set<string>();
  const events = new EventEmitter() as WorkerEvents;
  events.on('worker:create', ({ worker }) => workerIds.add(worker.workerId));

  const taskList: TaskList = Object.fromEntries(
    Object.entries(tasks).map(([kind, task]) => [
      kind,
      async (payload, helpers) => {
        const { jobId } = deliverySchema.parse(payload);
        const workerId = helpers.job.locked_by;
        if (!workerId) throw new Error(`the delivery of job ${jobId} names no worker`);
        await perform({ jobId, workerId, shutdown: shutdown.signal, pool }, task);
      },
    ]),
  );
  const runner = await run({
    connectionString: config().databaseUrl,
    schema: 'queue',
    taskList,
    events,
    concurrency: JOBS_AT_ONCE,
    maxPoolSize: JOBS_AT_ONCE + 1,
    pollInterval: 1000,
    noHandleSignals: true,
    logger: new Logger(() => (level, message) => {
      if (level === 'error' || level === 'warning') log(level, 'queue', { message });
    }),
  });
  const heart = await startHeart(() => [...workerIds], `${os.hostname()}:${process.pid}`, {
    threads: pool.threads,
    engineVersion: ENGINE_VERSION,
  });
  const post = startPost();
  const departures = startDepartures();
  log('info', 'worker ready', { threads: pool.threads, process: process.pid });

  let isStopping = false;
  async function stop(signal: string): Promise<void> {
    if (isStopping) return;
    isStopping = true;
    log('info', 'worker stops', { signal });
    shutdown.abort();
    await runner.stop();
    await post.stop();
    await departures.stop();
    await heart.stop();
    await pool.close();
    await closeDatabase();
    log('info', 'worker stopped');
  }
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => {
      stop(signal).then(
        () => process.exit(0),
        (error: unknown) => {
          log('error', 'stop failed', describeError(error));
          process.exit(1);
        },
      );
    });
  }
  await runner.promise;
}

/**
 * A thread that is ended at its time limit may still report that it ran out of memory, to nobody:
 * its item has failed already. Anything else that nobody caught ends the process; the queue hands
 * its jobs to the next one.
 */
process.on('uncaughtException', (error: Error & { code?: string }) => {
  if (error.code === 'ERR_WORKER_OUT_OF_MEMORY') {
    log('warning', 'thread ended late', describeError(error));
    return;
  }
  log('error', 'worker ended', describeError(error));
  process.exit(1);
});

main().catch((error: unknown) => {
  log('error', 'worker ended', describeError(error));
  process.exit(1);
});
