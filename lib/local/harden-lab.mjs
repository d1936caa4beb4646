import { appendFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { openCluster } from './cluster-files.mjs';
import { databaseAddress, ensureRoleAndDatabase, isServerReady } from './cluster-server.mjs';
import { dataFolder, LauncherProblem } from './environment.mjs';
import { findFreePort } from './ports.mjs';
import { isAlive, run, waitUntil } from './process-run.mjs';
import { productEnvironment, runScript } from './product.mjs';
import { killGroup } from './service-process.mjs';
import { databaseService, webService, workerService } from './services.mjs';
import { Supervisor } from './supervisor.mjs';
import { emptyFolder } from './test-database.mjs';

/** @typedef {import('../../tests/harden/row').LaboratoryOptions} LaboratoryOptions */

const databaseName = 'rarebound';
/** A killed service is back soon, however often it was killed before. */
const pauseMs = () => 500;

/**
 * A laboratory for rows that break things: an empty one with a durable database of its own, whose
 * processes are this run's to kill. The supervisor of `npm start` keeps them running.
 *
 * @implements {import('../../tests/harden/row').Laboratory}
 */
export class HardenLab {
  #pids = new Map();
  #workers = 0;
  #supervisor;
  #product;
  #cluster;

  /**
   * @param {{ bundleFolder: string, distFolder: string }} run where its programs lie
   * @param {LaboratoryOptions} options
   */
  static async open(run, options) {
    const lab = new HardenLab();
    try {
      await lab.#bringUp(run, options);
    } catch (error) {
      await lab.close();
      throw error;
    }
    return lab;
  }

  constructor() {
    this.folder = emptyFolder(path.join(dataFolder(), 'harden', 'laboratory'));
    const logsFolder = path.join(this.folder, 'logs');
    this.#supervisor = new Supervisor({
      logsFolder,
      say: (line) => appendFileSync(path.join(logsFolder, 'supervisor.log'), `${line}\n`),
      pauseMs,
      onChange: (processes) => {
        this.#pids = new Map(processes.map((one) => [one.name, one]));
      },
    });
  }

  async #bringUp({ bundleFolder, distFolder }, { workers, web, database, settings }) {
    const name = path.relative(dataFolder(), database ?? path.join(this.folder, 'postgres'));
    this.#cluster = { ...(await openCluster(name, { durable: true })), more: settings };
    await this.#supervisor.start(databaseService(this.#cluster));
    await ensureRoleAndDatabase(this.#cluster, databaseName);
    const port = await findFreePort(3430);
    this.#product = {
      databaseUrl: () => databaseAddress(this.#cluster, databaseName),
      folder: this.folder,
      bundleFolder,
      distFolder,
      port,
      address: `http://127.0.0.1:${port}`,
      mail: { mailUrl: 'smtp://127.0.0.1:9' },
      secrets: { NEXTAUTH_SECRET: 'only-for-the-harden-run-0123456789' },
      isDevelopment: false,
    };
    await runScript(this.#product, 'migrate');
    for (let i = 0; i < workers; i += 1) await this.addWorker();
    if (web) await this.#supervisor.start(webService({ ...this.#product, ...this.#told() }));
  }

  #told(/** @type {Record<string, string>} */ more = {}) {
    return { environment: () => ({ ...productEnvironment(this.#product), ...more }) };
  }

  get address() {
    return this.#product.address;
  }

  get databaseUrl() {
    return this.#product.databaseUrl();
  }

  async addWorker(threads = 1) {
    this.#workers += 1;
    const told = this.#told({ RAREBOUND_WORKER_THREADS: String(threads) });
    const name = `worker-${this.#workers}`;
    await this.#supervisor.start({ ...workerService({ ...this.#product, ...told }), name });
    return name;
  }

  pidOf(/** @type {string} */ service) {
    const found = this.#pids.get(service);
    if (found === undefined) throw new LauncherProblem(`The service ${service} is not running.`);
    return found.pid;
  }

  isRunning(/** @type {string} */ service) {
    const { pid, startTicks } = this.#pids.get(service) ?? {};
    return pid !== undefined && isAlive(pid, startTicks);
  }

  /** `kill -9`: of the server alone for the database, else of the process and what it started. */
  async kill(/** @type {string} */ service) {
    if (!this.isRunning(service)) return false;
    const { pid, startTicks } = this.#pids.get(service);
    if (service === 'postgres') process.kill(pid, 'SIGKILL');
    else killGroup(pid);
    await waitUntil(() => !isAlive(pid, startTicks), 10_000, 5);
    return true;
  }

  isDatabaseUp() {
    return isServerReady(this.#cluster);
  }

  /** Stops everything in order. @returns how many pages of the database have a wrong checksum */
  async stopAndCheck() {
    await this.#supervisor.stop();
    const { binaries, data, owner } = this.#cluster;
    const words = ['--check', '-D', data];
    const { code, output } = await run(path.join(binaries, 'pg_checksums'), words, {
      ...owner,
      cwd: '/',
    });
    const bad = /Bad checksums:\s+(\d+)/.exec(output);
    if (bad === null)
      throw new LauncherProblem(`pg_checksums ended with ${code}: ${output.trim()}`);
    return Number(bad[1]);
  }

  async close() {
    await this.#supervisor.stop();
    rmSync(path.join(this.folder, 'postgres'), { recursive: true, force: true });
  }
}
