import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { dataFolder, folderDigest, LauncherProblem, runCommand } from './environment.mjs';
import { holdExclusively } from './exclusive.mjs';
import { ensurePackages } from './packages.mjs';
import { endRunning } from './process-run.mjs';
import { checkBuild, runBrowserTests } from './test-browser.mjs';
import {
  checkLint,
  checkLockfile,
  checkPureTypes,
  checkRanks,
  checkTypes,
  runVitest,
  testEnvironment,
} from './test-checks.mjs';
import { addCounts } from './test-counts.mjs';
import { prepareTestDatabase, stopTestDatabase, testBundleFolder } from './test-database.mjs';
import { checkLiveReference } from './test-live-reference.mjs';

const reports = path.join(dataFolder(), 'test-reports');
const reportOf = (/** @type {string} */ name) => path.join(reports, `${name}.json`);
const say = (/** @type {string} */ line) => process.stdout.write(`${line}\n`);

let prepared = null;
let supervisor = null;

/** The cluster is prepared by the first step that needs it. */
function prepareOnce() {
  prepared ??= prepareTestDatabase({ outlivesThisProcess: false });
  return prepared;
}

async function databaseTests(name) {
  const { url } = await prepareOnce();
  await bundleScripts(testBundleFolder);
  return runVitest(name, {
    reportFile: reportOf(name),
    environment: testEnvironment({ TEST_DATABASE_URL: url }),
  });
}

const plainTests = (/** @type {string} */ name) =>
  runVitest(name, { reportFile: reportOf(name), environment: testEnvironment() });

async function browserTests() {
  const { cluster } = await prepareOnce();
  await bundleScripts(testBundleFolder);
  return runBrowserTests(cluster, {
    reportFile: reportOf('browser'),
    onSupervisor: (started) => {
      supervisor = started;
    },
  });
}

/** What is quick to run and to mend comes first. */
const steps = {
  lint: checkLint,
  ranks: checkRanks,
  lockfile: checkLockfile,
  types: checkTypes,
  'pure-types': checkPureTypes,
  unit: () => plainTests('unit'),
  reference: () => plainTests('reference'),
  'live-reference': () => checkLiveReference(reportOf('live-reference')),
  database: () => databaseTests('database'),
  workers: () => databaseTests('workers'),
  build: checkBuild,
  browser: browserTests,
};

async function runStep(name) {
  const start = Date.now();
  let count;
  try {
    count = await steps[name]();
  } catch (error) {
    const words = error instanceof LauncherProblem ? error.message : error.stack;
    count = { passed: 0, failed: 1, notes: [words] };
  }
  const seconds = ((Date.now() - start) / 1000).toFixed(1);
  const failed = count.failed > 0 ? `, ${count.failed} failed` : '';
  const missed = count.notRun?.length > 0 ? ', some not run' : '';
  say(`${name.padEnd(14)} ${count.passed} passed${failed}${missed} (${seconds} s)`);
  for (const note of count.notes) say(`\n${note}\n`);
  return count;
}

async function cleanUp() {
  await supervisor?.stop();
  const database = await prepared?.catch(() => null);
  if (database?.started) await stopTestDatabase();
}

/** Steps of one thread each, which two cores can share; the others use every core themselves. */
const abreast = ['types', 'live-reference', 'lint', 'ranks', 'lockfile', 'pure-types'];

async function countSteps(/** @type {string[]} */ names) {
  const isWanted = (/** @type {string} */ name) => names.length === 0 || names.includes(name);
  const counts = [];
  const waiting = abreast.filter(isWanted);
  const lane = async () => {
    for (let name = waiting.shift(); name !== undefined; name = waiting.shift()) {
      counts.push(await runStep(name));
    }
  };
  await Promise.all([lane(), lane()]);
  for (const name of Object.keys(steps)) {
    if (isWanted(name) && !abreast.includes(name)) counts.push(await runStep(name));
  }
  return counts;
}

async function runSteps(/** @type {string[]} */ names) {
  const unknown = names.filter((name) => !(name in steps));
  if (unknown.length > 0) {
    const known = Object.keys(steps).join(', ');
    throw new LauncherProblem(`There is no step "${unknown[0]}"; the steps are ${known}.`);
  }
  const lock = await holdExclusively(`test-${folderDigest(dataFolder())}`, () =>
    String(process.pid),
  );
  if ('heldBy' in lock) {
    throw new LauncherProblem(`The tests are already running here, as process ${lock.heldBy}.`);
  }
  mkdirSync(reports, { recursive: true });
  const interrupted = new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
      process.on(signal, () => resolve(signal));
    }
  });
  const counts = await Promise.race([countSteps(names), interrupted]);
  if (typeof counts === 'string') {
    say(`\nStopped by ${counts}`);
    endRunning();
    await cleanUp();
    return 130;
  }
  await cleanUp();
  const { passed, failed } = addCounts(counts);
  for (const what of counts.flatMap((count) => count.notRun ?? [])) say(`not run: ${what}`);
  say(`${passed} passed, ${failed} failed`);
  return failed > 0 || passed === 0 ? 1 : 0;
}

runCommand(async () => {
  const args = process.argv.slice(2);
  await ensurePackages();
  if (args[0] === '--stop') {
    const wasRunning = await stopTestDatabase();
    say(wasRunning ? 'The test database was stopped.' : 'No test database was running.');
    return 0;
  }
  if (args[0] === '--prepare') {
    say((await prepareTestDatabase({ outlivesThisProcess: true })).url);
    return 0;
  }
  return runSteps(args);
});
