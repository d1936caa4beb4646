import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem, root } from './environment.mjs';
import { run } from './process-run.mjs';

const computeFolder = 'workers/compute';
const scripts = [
  'workers/main.ts',
  'lib/local/migrate.ts',
  'lib/local/seed.ts',
  'lib/local/mailbox.ts',
  'lib/local/repository-stand-in.ts',
  'lib/local/orcid-stand-in.ts',
];

function computeEntries() {
  const folder = path.join(root, computeFolder);
  if (!existsSync(folder)) return [];
  return readdirSync(folder)
    .filter((name) => name.endsWith('.ts') && !name.endsWith('.d.ts'))
    .map((name) => `${computeFolder}/${name}`);
}

/**
 * Bundles the worker, its thread entries and the scripts of the launcher.
 *
 * @param {string} outputFolder relative to the project; the tests have one of their own, so that a
 *   running product keeps the files that its threads load later
 * @param {string[]} [entries] only these, by default all that exist
 */
export async function bundleScripts(outputFolder, entries = [...scripts, ...computeEntries()]) {
  const present = entries.filter((entry) => existsSync(path.join(root, entry)));
  if (present.length === 0) return;
  const { code, output } = await run(path.join(root, 'node_modules/esbuild/bin/esbuild'), [
    ...present,
    '--bundle',
    '--platform=node',
    '--target=node20',
    '--format=cjs',
    `--outdir=${outputFolder}`,
    '--outbase=.',
    '--packages=external',
    '--sourcemap',
    '--log-level=warning',
  ]);
  if (code !== 0) throw new LauncherProblem(`The scripts could not be bundled:\n${output.trim()}`);
}
