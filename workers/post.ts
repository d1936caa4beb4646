import { sendDue } from '@/lib/mail/post';
import { describeError, log } from './log';

const PAUSE_MS = 1500;

export interface Post {
  stop(): Promise<void>;
}

/** Sends the mail that waits, for as long as the process lives. */
export function startPost(): Post {
  let isStopped = false;
  let timer: NodeJS.Timeout | undefined;
  let current: Promise<void> = Promise.resolve();

  async function round(): Promise<void> {
    try {
      for (const { id, kind, outcome, fault } of await sendDue(() => isStopped)) {
        log(outcome === 'failed' ? 'warning' : 'info', `mail ${outcome}`, { id, kind, fault });
      }
    } catch (error) {
      log('warning', 'mail not looked at', describeError(error));
    }
    if (!isStopped) schedule();
  }
  function schedule(): void {
    timer = setTimeout(() => {
      current = round();
    }, PAUSE_MS);
  }

  schedule();
  return {
    async stop() {
      isStopped = true;
      clearTimeout(timer);
      await current;
    },
  };
}
