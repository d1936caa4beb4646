import { beat, buryDeadWorkers, signOff, sweep } from '@/lib/queue/heartbeat';
import { HEARTBEAT_MS } from '@/lib/queue/lease';
import { describeError, log } from './log';
import { tellOfEnd } from './run-mail';

/** Looks for the dead twice as often as it beats, so that a second attempt starts soon. */
const WATCH_MS = HEARTBEAT_MS / 2;

export interface Heart {
  stop(): Promise<void>;
}

/** Beats for the workers of this process, and frees what dead workers held. */
export async function startHeart(
  workerIds: () => string[],
  processId: string,
  facts: { threads: number; engineVersion: string },
): Promise<Heart> {
  let lastBeat = Number.NEGATIVE_INFINITY;
  let timer: NodeJS.Timeout | undefined;
  let isStopped = false;
  let current: Promise<void> = Promise.resolve();

  async function pulse(): Promise<void> {
    try {
      // A process that slept past its lease must not bury itself: beat first, then look.
      if (performance.now() - lastBeat > HEARTBEAT_MS - WATCH_MS / 2) {
        await beat(workerIds(), processId, facts);
        lastBeat = performance.now();
      }
      const dead = await buryDeadWorkers();
      if (dead.length > 0) log('warning', 'workers found dead', { workers: dead });
      const { requeued, ended } = await sweep((transaction, jobId) =>
        tellOfEnd(transaction, jobId, 'failed'),
      );
      if (requeued.length + ended.length > 0) log('warning', 'jobs swept', { requeued, ended });
    } catch (error) {
      log('warning', 'heartbeat missed', describeError(error));
    }
    if (!isStopped) schedule();
  }
  function schedule(): void {
    timer = setTimeout(() => {
      current = pulse();
    }, WATCH_MS);
  }

  current = pulse();
  await current;
  return {
    async stop() {
      isStopped = true;
      clearTimeout(timer);
      await current;
      await signOff(workerIds()).catch((error: unknown) => {
        log('warning', 'not signed off', describeError(error));
      });
    },
  };
}
