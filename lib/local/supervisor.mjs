import { existsSync, mkdirSync, renameSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem } from './environment.mjs';
import { wait, waitUntil } from './process-run.mjs';
import { killGroup, lastLines, launch } from './service-process.mjs';

/** @typedef {import('./service-process.mjs').Service} Service */

const longestPauseMs = 30_000;
const calmAfterMs = 60_000;

/** @returns {number} how long to wait before start number `failures` + 1 */
export function restartPauseMs(/** @type {number} */ failures) {
  return Math.min(longestPauseMs, 1000 * 2 ** Math.max(0, failures - 1));
}

/** Keeps services running, restarts what ends by itself, and stops them in reverse order. */
export class Supervisor {
  #kept = [];
  #stopping = false;
  #hurry = false;

  /**
   * @param {{ logsFolder: string, say: (line: string) => void,
   *   onChange?: (processes: { name: string, pid: number, startTicks?: string }[]) => void,
   *   pauseMs?: (failures: number) => number }} options pauseMs: other waits before a restart, for
   *   a run that kills services again and again
   */
  constructor({ logsFolder, say, onChange = () => {}, pauseMs = restartPauseMs }) {
    this.logsFolder = logsFolder;
    this.pauseMs = pauseMs;
    this.say = say;
    this.onChange = onChange;
    mkdirSync(logsFolder, { recursive: true });
  }

  logFile(/** @type {Service} */ service) {
    return path.join(this.logsFolder, `${service.name}.log`);
  }

  /** Starts a service and waits until it is ready; from then on it is restarted when it ends. */
  async start(/** @type {Service} */ service) {
    const file = this.logFile(service);
    if (existsSync(file)) renameSync(file, file.replace(/\.log$/, '.previous.log'));
    const kept = { service, running: null, failures: 0 };
    this.#kept.push(kept);
    for (let left = service.tries ?? 1; ; left -= 1) {
      const problem = await this.#startOnce(kept);
      if (problem === null) break;
      if (left <= 1 || this.#stopping) {
        throw new LauncherProblem(
          `${service.name} did not start (${problem}); the end of ${file}:\n${lastLines(file)}`,
        );
      }
      await wait(500);
    }
    this.#watch(kept);
  }

  /** @returns {Promise<string | null>} what went wrong, null when the service is ready */
  async #startOnce(kept) {
    const { service } = kept;
    await service.prepare?.();
    if (this.#stopping) return 'the launcher is stopping';
    kept.running = launch(service, this.logFile(service));
    this.#report();
    const { startedAt, ended } = kept.running;
    let end = null;
    ended.then((words) => {
      end = words;
    });
    const readyMs = service.readyMs ?? 30_000;
    const ready = await waitUntil(
      async () => end !== null || this.#stopping || service.isReady(Date.now() - startedAt),
      readyMs,
    );
    if (end === null && ready) return null;
    if (end === null) killGroup(kept.running.child.pid);
    await ended;
    kept.running = null;
    return end ?? `no answer within ${readyMs / 1000} s`;
  }

  async #watch(kept) {
    const { service } = kept;
    while (!this.#stopping) {
      if (kept.running !== null) {
        const { startedAt, ended } = kept.running;
        const words = await ended;
        kept.running = null;
        if (this.#stopping) return;
        if (Date.now() - startedAt > calmAfterMs) kept.failures = 0;
        this.say(`${service.name} ended unexpectedly (${words}); the end of its log:`);
        this.say(lastLines(this.logFile(service), 8));
      }
      kept.failures += 1;
      const pauseMs = this.pauseMs(kept.failures);
      this.say(`${service.name} is started again in ${pauseMs / 1000} s`);
      await waitUntil(() => this.#stopping, pauseMs);
      if (this.#stopping) return;
      const problem = await this.#startOnce(kept);
      if (problem === null) this.say(`${service.name} is running again`);
      else if (!this.#stopping) this.say(`${service.name} did not start (${problem})`);
    }
  }

  #report() {
    const processes = this.#kept
      .filter(({ running }) => running?.child.pid !== undefined)
      .map(({ service, running }) => ({
        name: service.name,
        pid: running.child.pid,
        startTicks: running.startTicks,
      }));
    this.onChange(processes);
  }

  /** Stops everything, last started first. */
  async stop() {
    this.#stopping = true;
    for (const kept of [...this.#kept].reverse()) {
      const { service, running } = kept;
      if (running?.child.pid === undefined) continue;
      const { child } = running;
      const isOver = () => child.exitCode !== null || child.signalCode !== null;
      if (!isOver()) child.kill(`SIG${service.stopSignal ?? 'TERM'}`);
      const patienceMs = service.stopMs ?? 12_000;
      const isDatabase = service.stopSignal === 'INT';
      await waitUntil(() => isOver() || (this.#hurry && !isDatabase), patienceMs, 20);
      if (!isOver()) killGroup(child.pid);
      await running.ended;
    }
    this.#kept = [];
    this.#report();
  }

  get isStopping() {
    return this.#stopping;
  }

  /** Waits no longer for anybody but the database, which ends by itself within moments. */
  hurry() {
    this.#hurry = true;
  }
}
