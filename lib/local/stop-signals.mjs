import { endRunning } from './process-run.mjs';

// npm passes the terminal's signal on a second time; a person who presses again takes longer.
const repeatMs = 500;

/**
 * Stops everything at the first signal, and waits less at a second one.
 *
 * @param {import('./supervisor.mjs').Supervisor} supervisor
 * @returns {Promise<number>} resolves with the exit code once all has stopped
 */
export function stopOnSignals(supervisor) {
  let firstAt = 0;
  return new Promise((resolve) => {
    const onSignal = async () => {
      if (firstAt > 0) {
        if (Date.now() - firstAt > repeatMs) supervisor.hurry();
        return;
      }
      firstAt = Date.now();
      process.stdout.write('\nStopping\n');
      endRunning();
      await supervisor.stop();
      resolve(0);
    };
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, onSignal);
  });
}
