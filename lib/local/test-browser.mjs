import { existsSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { databaseAddress, querySuperuser } from './cluster-server.mjs';
import { installDebianPackage } from './debian.mjs';
import { dataFolder, LauncherProblem, root } from './environment.mjs';
import { countPages, measurePages } from './page-sizes.mjs';
import { findFreePort } from './ports.mjs';
import { run } from './process-run.mjs';
import { chooseMail, productEnvironment, runScript, startProduct } from './product.mjs';
import { webService } from './services.mjs';
import { Supervisor } from './supervisor.mjs';
import { testDistFolder, testEnvironment } from './test-checks.mjs';
import { countCommand, countPlaywright } from './test-counts.mjs';
import { copyTemplate, emptyFolder, testBundleFolder } from './test-database.mjs';
import { buildWeb, isBuildFresh } from './web-build.mjs';

/** @typedef {import('./test-counts.mjs').Count} Count */

const chromium = '/usr/bin/chromium';

/** @returns {string | null} the folder of an up-to-date build; a product's own is only read */
const freshBuild = () => ['.next', testDistFolder].find(isBuildFresh) ?? null;

/**
 * Builds the web part, and weighs what each page of it loads first.
 *
 * @returns {Promise<Count>} a test a page
 */
export async function checkBuild() {
  if (freshBuild() === null) await buildWeb(testDistFolder);
  return countPages(measurePages(freshBuild() ?? testDistFolder));
}

/**
 * The demonstration in a database of the browser tests' own, made by scripts alone: no page of it is
 * asked for yet, so that the web part may still be building.
 *
 * @typedef {{ folder: string, database: string, databaseUrl: () => string, bundleFolder: string,
 *   secrets: Record<string, string>, isDevelopment: boolean }} Demonstration
 * @param {import('./cluster-files.mjs').Cluster} cluster
 * @returns {Promise<Demonstration>}
 */
export async function makeDemonstration(cluster) {
  const database = `test_${process.pid}_browser`;
  await copyTemplate(cluster, database);
  const demonstration = {
    folder: emptyFolder(path.join(dataFolder(), 'test-browser')),
    database,
    databaseUrl: () => databaseAddress(cluster, database),
    bundleFolder: testBundleFolder,
    secrets: { NEXTAUTH_SECRET: 'only-for-the-browser-tests-0123456789' },
    isDevelopment: false,
  };
  // Nobody listens there yet: what the seed sends waits for the mailbox of the product.
  await runScript(await placeOf(demonstration), 'seed', { isPatient: true });
  return demonstration;
}

/** Addresses that are free now, and the newest build. */
async function placeOf(/** @type {Demonstration} */ demonstration) {
  const port = await findFreePort(3310);
  return {
    ...demonstration,
    distFolder: freshBuild() ?? testDistFolder,
    port,
    address: `http://127.0.0.1:${port}`,
    mail: await chooseMail(port, ''),
  };
}

/**
 * Runs the browser tests against a product of their own: own database with the demonstration in it,
 * own ports, own mailbox.
 *
 * @param {import('./cluster-files.mjs').Cluster} cluster
 * @param {object} options
 * @param {Promise<Demonstration>} options.demonstration
 * @param {string} options.reportFile
 * @param {(supervisor: Supervisor) => void} options.onSupervisor
 * @param {string[]} [options.files] all where it is left out
 * @param {Record<string, string>} [options.environment] what else the tests are told
 * @returns {Promise<Count>}
 */
export async function runBrowserTests(cluster, options) {
  if (freshBuild() === null) throw new LauncherProblem('There is no build of the web part to test');
  if (!existsSync(chromium)) await installDebianPackage('chromium', 'for the browser tests');
  const made = await options.demonstration;
  const supervisor = new Supervisor({
    logsFolder: path.join(made.folder, 'logs'),
    say: (line) => process.stdout.write(`    ${line}\n`),
  });
  options.onSupervisor(supervisor);
  try {
    const product = await placeOf(made);
    await startProduct(supervisor, product);
    return await runPlaywright(product, options);
  } finally {
    await supervisor.stop();
    await querySuperuser(cluster, `drop database if exists ${made.database} with (force)`);
  }
}

/** How a test starts one more web server of this product, which it may kill. */
function webServer(product) {
  const { command, args, env } = webService({
    ...product,
    environment: () => productEnvironment(product),
  });
  return { command, args: args.slice(0, -1), env: env() };
}

async function runPlaywright(product, { reportFile, files = [], environment = {} }) {
  rmSync(reportFile, { force: true });
  const { code, output } = await run(
    path.join(root, 'node_modules/.bin/playwright'),
    ['test', '--reporter=line,json', ...files],
    {
      env: testEnvironment({
        BASE_URL: product.address,
        DATABASE_URL: product.databaseUrl(),
        MAILBOX_URL: productEnvironment(product).MAILBOX_URL,
        RAREBOUND_DATA_DIR: product.folder,
        PLAYWRIGHT_JSON_OUTPUT_FILE: reportFile,
        WEB_SERVER: JSON.stringify(webServer(product)),
        FORCE_COLOR: '0',
        ...environment,
      }),
    },
  );
  if (!existsSync(reportFile)) return countCommand({ code: code || 1, output });
  const count = countPlaywright(JSON.parse(readFileSync(reportFile, 'utf8')), code);
  if (count.failed === 0) return count;
  return { ...count, notes: [...count.notes, output.trim(), `Logs: ${product.folder}/logs`] };
}
