import { existsSync, mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { openCluster } from './cluster-files.mjs';
import {
  databaseAddress,
  ensureRoleAndDatabase,
  findServer,
  querySuperuser,
  startServer,
  stopServer,
} from './cluster-server.mjs';
import { dataFolder, folderDigest, LauncherProblem, root } from './environment.mjs';
import { withExclusive } from './exclusive.mjs';
import { fingerprint } from './fingerprint.mjs';
import { isAlive, run, wait } from './process-run.mjs';

export const testBundleFolder = 'dist/test';
const templateName = 'rarebound_template';
const maintenanceName = 'rarebound_tests';
const schemaSources = ['migrations', 'lib/local/migrate.ts', 'package-lock.json'];

const openTestCluster = () => openCluster('postgres-test', { durable: false });

/**
 * Starts the cluster of the tests if it is not running and brings the template up to date.
 *
 * @param {{ outlivesThisProcess: boolean }} options whether a server that this call starts goes on
 *   when the process ends
 * @returns {Promise<{ url: string, started: boolean, cluster: import('./cluster-files.mjs').Cluster }>}
 *   url: the maintenance database, whose role may create databases; started: whether this call did
 */
export function prepareTestDatabase({ outlivesThisProcess }) {
  return withExclusive(`test-database-${folderDigest(dataFolder())}`, async () => {
    const cluster = await openTestCluster();
    const started = findServer(cluster) === null;
    const logs = path.join(dataFolder(), 'logs');
    mkdirSync(logs, { recursive: true });
    await startServer(cluster, {
      logFile: path.join(logs, 'postgres-test.log'),
      outlivesThisProcess,
    });
    await ensureRoleAndDatabase(cluster, maintenanceName);
    await dropAbandoned(cluster);
    await ensureTemplate(cluster);
    return { url: databaseAddress(cluster, maintenanceName), started, cluster };
  });
}

/** @returns {Promise<boolean>} whether a server was running */
export async function stopTestDatabase() {
  if (!existsSync(path.join(dataFolder(), 'postgres-test', 'connection.json'))) return false;
  const cluster = await openTestCluster();
  if (findServer(cluster) === null) return false;
  await stopServer(cluster);
  return true;
}

/** Databases carry the number of the process that made them; those of dead ones are rubbish. */
async function dropAbandoned(cluster) {
  const names = await querySuperuser(
    cluster,
    "select datname from pg_database where datname ~ '^test_[0-9]+_'",
  );
  for (const name of names.split('\n').filter(Boolean)) {
    if (!isAlive(Number(name.split('_')[1]))) {
      await querySuperuser(cluster, `drop database if exists "${name}" with (force)`);
    }
  }
}

async function ensureTemplate(cluster) {
  const wanted = fingerprint(schemaSources);
  const found = await querySuperuser(
    cluster,
    `select shobj_description(oid, 'pg_database') from pg_database where datname = '${templateName}'`,
  );
  if (found === wanted) return;
  const unfinished = `${templateName}_unfinished`;
  await querySuperuser(cluster, `drop database if exists ${unfinished} with (force)`);
  await ensureRoleAndDatabase(cluster, unfinished);
  await migrateDatabase(databaseAddress(cluster, unfinished));
  await querySuperuser(
    cluster,
    `drop database if exists ${templateName} with (force);
     alter database ${unfinished} rename to ${templateName};
     comment on database ${templateName} is '${wanted}'`,
  );
}

/**
 * A migrated, empty database of its own for a product, copied from the template.
 *
 * @param {import('./cluster-files.mjs').Cluster} cluster
 * @param {string} name
 */
export async function copyTemplate(cluster, name) {
  const end = Date.now() + 30_000;
  for (;;) {
    try {
      await querySuperuser(
        cluster,
        `create database ${name} template ${templateName} strategy file_copy owner rarebound`,
      );
      return;
    } catch (error) {
      // A test file may be copying it, which one at a time can.
      if (!error.message.includes('is being accessed by other users') || Date.now() > end) {
        throw error;
      }
      await wait(100);
    }
  }
}

/** Runs the migrations, bundled for the tests, on a database. */
export async function migrateDatabase(/** @type {string} */ url) {
  await bundleScripts(testBundleFolder, ['lib/local/migrate.ts']);
  const script = path.join(root, testBundleFolder, 'lib/local/migrate.js');
  const { code, output } = await run(process.execPath, ['--enable-source-maps', script], {
    env: { ...process.env, DATABASE_URL: url },
  });
  if (code !== 0) throw new LauncherProblem(`The migrations failed:\n${output.trim()}`);
}

/** Forgets what an earlier run of the browser tests left on the disk. */
export function emptyFolder(/** @type {string} */ folder) {
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  return folder;
}
