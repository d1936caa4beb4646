import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { LauncherProblem, root, runCommand } from './environment.mjs';
import { ensurePackages } from './packages.mjs';
import { findNumpy } from './reference-programs.mjs';
import { prepareTestDatabase, stopTestDatabase } from './test-database.mjs';

const folder = 'dist/bench';
const measureEntry = 'tests/bench/main.ts';
/** Reads or writes a survey file and measures nothing: it loads only what maps need. */
const surveyEntry = 'tests/bench/survey-maps.ts';

const names = (/** @type {string[]} */ words, /** @type {string} */ option) =>
  words.some((word) => word === option || word.startsWith(`${option}=`));

/** Whether something is asked that reads from the database. */
function asksStorage(/** @type {string[]} */ words) {
  return !names(words, '--only') || words.some((word) => /^(--only=)?storage$/.test(word));
}

function runNode(/** @type {string} */ entry, words, environment = {}) {
  const script = path.join(root, folder, entry.replace(/\.ts$/, '.js'));
  const child = spawn(process.execPath, ['--enable-source-maps', script, ...words], {
    stdio: 'inherit',
    env: { ...process.env, ...environment },
  });
  return new Promise((resolve) => child.once('exit', (code) => resolve(code ?? 1)));
}

runCommand(async () => {
  const words = process.argv.slice(2);
  for (const entry of [measureEntry, surveyEntry]) {
    if (existsSync(path.join(root, entry))) continue;
    throw new LauncherProblem(`There is no benchmark to run: ${entry} is missing.`);
  }
  await ensurePackages();
  await bundleScripts(folder, [measureEntry, surveyEntry]);
  if (names(words, '--survey') || names(words, '--survey-out')) return runNode(surveyEntry, words);
  const database = asksStorage(words)
    ? await prepareTestDatabase({ outlivesThisProcess: false })
    : null;
  try {
    return await runNode(measureEntry, words, {
      BENCH_NUMPY: (await findNumpy()) ?? '',
      BENCH_FOLDER: path.join(root, 'tests/bench'),
      ...(database && { TEST_DATABASE_URL: database.url }),
    });
  } finally {
    if (database?.started) await stopTestDatabase();
  }
});
