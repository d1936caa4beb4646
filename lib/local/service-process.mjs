import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync } from 'node:fs';
import { endWithLauncher } from './death-signal.mjs';
import { readProcess } from './process-run.mjs';

/**
 * A process that the launcher keeps alive.
 *
 * @typedef {object} Service
 * @property {string} name also of its log file
 * @property {string} command
 * @property {string[]} args
 * @property {() => NodeJS.ProcessEnv} [env] asked at each start, for a port may have changed
 * @property {string} [cwd]
 * @property {{ uid?: number, gid?: number }} [owner]
 * @property {() => Promise<void>} [prepare] runs before each start
 * @property {(upMs: number) => boolean | Promise<boolean>} isReady
 * @property {number} [readyMs] how long a start may take
 * @property {number} [tries] how often the first start is tried
 * @property {'TERM' | 'INT'} [stopSignal]
 * @property {number} [stopMs] how long it may take to end before it is killed
 */

/** Only the end of a log says why a process ended. */
export function lastLines(/** @type {string} */ file, count = 15) {
  if (!existsSync(file)) return '';
  const lines = readFileSync(file, 'utf8').trimEnd().split('\n');
  return lines
    .slice(-count)
    .map((line) => `    ${line}`)
    .join('\n');
}

/**
 * Starts a service's process. A group of its own keeps the terminal's Ctrl-C away from it, so that
 * the launcher can stop the services in order.
 */
export function launch(/** @type {Service} */ service, /** @type {string} */ logFile) {
  const words = [service.command, ...service.args];
  const guarded = endWithLauncher(words, service.stopSignal ?? 'TERM');
  const log = openSync(logFile, 'a');
  const child = spawn(guarded[0], guarded.slice(1), {
    cwd: service.cwd,
    env: service.env?.() ?? process.env,
    ...service.owner,
    detached: true,
    stdio: ['ignore', log, log],
  });
  closeSync(log);
  const startTicks = child.pid === undefined ? undefined : readProcess(child.pid)?.startTicks;
  const ended = new Promise((resolve) => {
    child.once('error', (error) => resolve(error.message));
    child.once('exit', (code, by) => resolve(by === null ? `exit code ${code}` : `signal ${by}`));
  });
  return { child, startTicks, startedAt: Date.now(), ended };
}

/** Kills a process and whatever it has started. */
export function killGroup(/** @type {number} */ pid) {
  for (const target of [-pid, pid]) {
    try {
      process.kill(target, 'SIGKILL');
    } catch {
      // It has ended meanwhile, which is what was wanted.
    }
  }
}
