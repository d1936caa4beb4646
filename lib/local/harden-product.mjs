import path from 'node:path';
import { databaseAddress, querySuperuser } from './cluster-server.mjs';
import { dataFolder } from './environment.mjs';
import { findFreePort } from './ports.mjs';
import { chooseMail, runScript, startProduct } from './product.mjs';
import { Supervisor } from './supervisor.mjs';
import {
  copyTemplate,
  emptyFolder,
  prepareTestDatabase,
  stopTestDatabase,
} from './test-database.mjs';
import { buildWeb, isBuildFresh } from './web-build.mjs';

export const distFolder = '.next-harden';

/** The production build of the harden run, made where it is missing or old. */
export async function ensureWebBuild(/** @type {(line: string) => void} */ say) {
  if (isBuildFresh(distFolder)) return;
  say('Building the web part');
  await buildWeb(distFolder);
}

/**
 * A product for rows that need one: own database in the tests' cluster, own folder, ports and
 * production build. It is started at the first call and stopped with the run.
 */
export class HardenProduct {
  #starting = null;
  #cluster = null;
  #supervisor = null;
  #pids = new Map();
  #database = `test_${process.pid}_harden`;

  constructor(/** @type {{ bundleFolder: string, say: (line: string) => void }} */ options) {
    this.bundleFolder = options.bundleFolder;
    this.say = options.say;
  }

  /** @returns {Promise<import('../../tests/harden/row').RunningProduct>} */
  start() {
    this.#starting ??= this.#bringUp();
    return this.#starting;
  }

  async #bringUp() {
    await ensureWebBuild(this.say);
    this.#cluster = await prepareTestDatabase({ outlivesThisProcess: false });
    const { cluster } = this.#cluster;
    await copyTemplate(cluster, this.#database);
    const folder = emptyFolder(path.join(dataFolder(), 'harden', 'product'));
    this.#supervisor = new Supervisor({
      logsFolder: path.join(folder, 'logs'),
      say: this.say,
      onChange: (processes) => {
        this.#pids = new Map(processes.map(({ name, pid }) => [name, pid]));
      },
    });
    const port = await findFreePort(3410);
    const product = {
      databaseUrl: () => databaseAddress(cluster, this.#database),
      folder,
      bundleFolder: this.bundleFolder,
      distFolder,
      port,
      address: `http://127.0.0.1:${port}`,
      mail: await chooseMail(port, ''),
      secrets: { NEXTAUTH_SECRET: 'only-for-the-harden-run-0123456789' },
      isDevelopment: false,
    };
    await runScript(product, 'seed');
    await startProduct(this.#supervisor, product);
    return {
      address: product.address,
      databaseUrl: product.databaseUrl(),
      folder,
      pidOf: (/** @type {string} */ service) => {
        const pid = this.#pids.get(service);
        if (pid === undefined) throw new Error(`the service ${service} is not running`);
        return pid;
      },
    };
  }

  async stop() {
    await this.#starting?.catch(() => null);
    await this.#supervisor?.stop();
    if (this.#cluster === null) return;
    const { cluster, started } = this.#cluster;
    await querySuperuser(cluster, `drop database if exists ${this.#database} with (force)`);
    if (started) await stopTestDatabase();
  }
}
