import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { dataFolder, folderDigest, LauncherProblem, root, runCommand } from './environment.mjs';
import { holdExclusively } from './exclusive.mjs';
import { ensurePackages } from './packages.mjs';
import { endRunning } from './process-run.mjs';
import { checkBuild, makeDemonstration, runBrowserTests } from './test-browser.mjs';
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
let demonstration = null;
let supervisor = null;

/** The cluster and the bundled scripts are prepared by the first step that needs them. */
function prepareOnce() {
  prepared ??= prepareTestDatabase({ outlivesThisProcess: false }).then(async (database) => {
    await bundleScripts(testBundleFolder);
    return database;
  });
  return prepared;
}

function demonstrateOnce() {
  demonstration ??= prepareOnce().then(({ cluster }) => makeDemonstration(cluster));
  // The browser tests, which wait for it, say why there is none.
  demonstration.catch(() => {});
  return demonstration;
}

async function databaseTests(name) {
  const { url } = await prepareOnce();
  return runVitest(name, {
    reportFile: reportOf(name.replace('*', '')),
    environment: testEnvironment({ TEST_DATABASE_URL: url }),
  });
}

const plainTests = (/** @type {string} */ name) =>
  runVitest(name, { reportFile: reportOf(name), environment: testEnvironment() });

async function browserTests(part = {}) {
  const { cluster } = await prepareOnce();
  return runBrowserTests(cluster, {
    demonstration: demonstrateOnce(),
    ...part,
    reportFile: reportOf('browser'),
    onSupervisor: (started) => {
      supervisor = started;
    },
  });
}

/** Looks at every screen, and keeps a picture of it at each width in each theme. */
async function pictureScreens() {
  const folder = path.join(root, 'test-results/screens');
  const count = await browserTests({
    files: ['screens.spec.ts'],
    environment: { SCREEN_PICTURES: folder },
  });
  return { ...count, notes: [...count.notes, `The pictures are in ${folder}`] };
}

/** In the order in which they are run; what is quick to run and to mend comes first. */
const groups = {
  /** Of one thread each, which two cores can share. */
  abreast: {
    types: checkTypes,
    'live-reference': () => checkLiveReference(reportOf('live-reference')),
    lint: checkLint,
    ranks: checkRanks,
    lockfile: checkLockfile,
    'pure-types': checkPureTypes,
  },
  /** They take every core. */
  full: {
    unit: () => plainTests('unit'),
    reference: () => plainTests('reference'),
  },
  /**
   * They wait for a database or a worker at times. `behind` is built meanwhile, with as much right to
   * a core: the demonstration, which takes what the others leave, begins when it is there.
   */
  waiting: {
    database: () => databaseTests('database*'),
    workers: () => databaseTests('workers'),
  },
  behind: { build: checkBuild },
  last: { browser: () => browserTests() },
  /** Only when they are asked for. */
  onDemand: { screens: pictureScreens },
};
const steps = Object.assign({}, ...Object.values(groups));

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

async function countSteps(/** @type {string[]} */ names) {
  const counts = [];
  const isWanted = (/** @type {string} */ name) => names.length === 0 || names.includes(name);
  const wantedOf = (/** @type {keyof typeof groups} */ group) =>
    Object.keys(groups[group]).filter(isWanted);
  const lane = async (/** @type {string[]} */ waiting) => {
    for (let name = waiting.shift(); name !== undefined; name = waiting.shift()) {
      counts.push(await runStep(name));
    }
  };
  const behind = async () => {
    await lane(wantedOf('behind'));
    if (isWanted('browser')) await demonstrateOnce().catch(() => {});
  };
  const abreast = wantedOf('abreast');
  await Promise.all([lane(abreast), lane(abreast)]);
  await lane(wantedOf('full'));
  await Promise.all([lane(wantedOf('waiting')), behind()]);
  await lane(wantedOf('last'));
  if (names.length > 0) await lane(wantedOf('onDemand'));
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
