import { deleteDue, dropExpiredExports } from './leaving/delete-due';
import { describeError, log } from './log';

const PAUSE_MS = 60_000;
/** Soon after the start, for what came due while nothing ran. */
const FIRST_MS = 5000;

/** Deletes collaborations whose time has come, and archives that nobody may fetch any more. */
export function startDepartures(): { stop(): Promise<void> } {
  let isStopped = false;
  let timer: NodeJS.Timeout | undefined;
  let current: Promise<void> = Promise.resolve();

  async function round(): Promise<void> {
    try {
      for (;;) {
        const id = isStopped ? null : await deleteDue();
        if (id === null) break;
        log('info', 'collaboration deleted', { collaboration: id });
      }
      await dropExpiredExports();
    } catch (error) {
      log('warning', 'departures not looked at', describeError(error));
    }
    if (!isStopped) schedule(PAUSE_MS);
  }
  function schedule(pauseMs: number): void {
    timer = setTimeout(() => {
      current = round();
    }, pauseMs);
  }

  schedule(FIRST_MS);
  return {
    async stop() {
      isStopped = true;
      clearTimeout(timer);
      await current;
    },
  };
}
