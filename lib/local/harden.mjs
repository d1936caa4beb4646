import { readdirSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import os from 'node:os';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { dataFolder, folderDigest, LauncherProblem, root, runCommand } from './environment.mjs';
import { holdExclusively } from './exclusive.mjs';
import { HardenLab } from './harden-lab.mjs';
import { distFolder, ensureWebBuild, HardenProduct } from './harden-product.mjs';
import { ensurePackages } from './packages.mjs';
import { endRunning } from './process-run.mjs';
import { emptyFolder } from './test-database.mjs';

/** @typedef {import('../../tests/harden/row').Row} Row */

const bundleFolder = 'dist/harden';
const rowsFolder = 'tests/harden/rows';
/** A process of its own that a row starts. */
const engineProcess = 'tests/harden/engine-process.ts';
const say = (/** @type {string} */ line) => process.stdout.write(`${line}\n`);
const note = (/** @type {string} */ line) => process.stderr.write(`    ${line}\n`);

/** @returns {Promise<Row[]>} every row that has a file, in the order of the files' names */
async function loadRows() {
  const entries = readdirSync(path.join(root, rowsFolder))
    .filter((name) => name.endsWith('.ts'))
    .sort()
    .map((name) => `${rowsFolder}/${name}`);
  await bundleScripts(bundleFolder);
  await bundleScripts(bundleFolder, [...entries, engineProcess]);
  const load = createRequire(import.meta.url);
  return entries.map((entry) => {
    const { row } = load(path.join(root, bundleFolder, entry.replace(/\.ts$/, '.js')));
    if (row === undefined) throw new LauncherProblem(`${entry} exports no row`);
    return row;
  });
}

/** @returns {Promise<import('../../tests/harden/row').Measured & { seconds: number }>} */
async function measureRow(/** @type {Row} */ row, /** @type {HardenProduct} */ product) {
  const start = Date.now();
  const laboratories = [];
  const bench = {
    root,
    bundleFolder,
    folder: emptyFolder(path.join(dataFolder(), 'harden', row.name)),
    product: () => product.start(),
    laboratory: async (options) => {
      if (options.web) await ensureWebBuild(note);
      const opened = await HardenLab.open({ bundleFolder, distFolder }, options);
      laboratories.push(opened);
      return opened;
    },
    say: note,
  };
  try {
    const measured = await row.measure(bench);
    return { ...measured, seconds: (Date.now() - start) / 1000 };
  } catch (error) {
    const cause = error.cause ? `\nbecause of ${error.cause.stack ?? error.cause}` : '';
    const words = error instanceof LauncherProblem ? error.message : `${error.stack}${cause}`;
    const seconds = (Date.now() - start) / 1000;
    return { isMet: false, figure: 'not measured', details: {}, notes: [words], seconds };
  } finally {
    for (const opened of laboratories) await opened.close();
  }
}

const machine = () => ({
  processors: os.cpus().length,
  load: os.loadavg().map((value) => Number(value.toFixed(2))),
  node: process.version,
});

async function measureRows(/** @type {Row[]} */ rows, product, isJson) {
  const results = [];
  for (const row of rows) {
    const before = machine();
    const measured = await measureRow(row, product);
    const { name, what, goal } = row;
    results.push({ name, what, goal, ...measured, machine: before });
    if (isJson) continue;
    const answer = measured.isMet ? 'met' : 'missed';
    say(
      `${name}: ${measured.figure} (goal: ${goal}): ${answer}, in ${measured.seconds.toFixed(0)} s`,
    );
    for (const line of measured.notes ?? []) say(`    ${line}`);
  }
  return results;
}

/** The rows that are named, or all; those behind `--without` are left out. */
function pickRows(/** @type {Row[]} */ rows, /** @type {string[]} */ words) {
  const known = rows.map(({ name }) => name);
  const at = words.includes('--without') ? words.indexOf('--without') : words.length;
  const [names, without] = [words.slice(0, at), words.slice(at + 1)];
  const unknown = [...names, ...without].find((name) => !known.includes(name));
  if (unknown !== undefined) {
    throw new LauncherProblem(`There is no row "${unknown}"; the rows are ${known.join(', ')}.`);
  }
  const picked = rows.filter(
    ({ name }) => (names.length === 0 || names.includes(name)) && !without.includes(name),
  );
  return picked.sort((a, b) => Number(b.isFirst ?? false) - Number(a.isFirst ?? false));
}

runCommand(async () => {
  const words = process.argv.slice(2);
  const isJson = words.includes('--json');
  const options = ['--json', '--without'];
  const wrong = words.find((word) => word.startsWith('--') && !options.includes(word));
  if (wrong !== undefined) throw new LauncherProblem(`There is no option "${wrong}"`);
  const lock = await holdExclusively(`harden-${folderDigest(dataFolder())}`, () =>
    String(process.pid),
  );
  if ('heldBy' in lock) {
    throw new LauncherProblem(`It is already running here, as process ${lock.heldBy}.`);
  }
  await ensurePackages();
  // Rows read files on the product's own threads, whose code lies with the bundles of this run.
  process.env.RAREBOUND_BUNDLE_DIR = bundleFolder;
  process.env.DATABASE_URL ??= 'postgres://of-no-row';
  // So that rows can ask as people at different addresses.
  process.env.RAREBOUND_BEHIND_PROXY = 'yes';
  const rows = pickRows(
    await loadRows(),
    words.filter((word) => word !== '--json'),
  );
  const product = new HardenProduct({ bundleFolder, say: note });
  const interrupted = new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve(signal));
  });
  try {
    const results = await Promise.race([measureRows(rows, product, isJson), interrupted]);
    if (typeof results === 'string') {
      endRunning();
      return 130;
    }
    const { version } = JSON.parse(readFileSync(path.join(root, 'package.json'), 'utf8'));
    if (isJson) say(JSON.stringify({ version, rows: results }, null, 2));
    const missed = results.filter(({ isMet }) => !isMet).length;
    if (!isJson) say(`${results.length - missed} met, ${missed} missed`);
    return missed > 0 ? 1 : 0;
  } finally {
    await product.stop();
  }
});
