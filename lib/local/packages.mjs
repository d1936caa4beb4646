import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem, root } from './environment.mjs';
import { fingerprint, readMark } from './fingerprint.mjs';
import { run } from './process-run.mjs';

// Inside node_modules, because npm ci removes the folder: a half-made one never carries the mark.
const mark = path.join(root, 'node_modules', '.rarebound-lockfile');

/** Installs the packages of the lockfile when they are not those that lie in node_modules. */
export async function ensurePackages() {
  const wanted = fingerprint(['package-lock.json'], { salt: process.version });
  if (readMark(mark) === wanted) return;
  process.stdout.write('Installing packages\n');
  // NODE_ENV=production would make npm leave out what the build needs.
  const { code, output } = await run('npm', ['ci', '--include=dev', '--no-progress']);
  if (code !== 0) throw new LauncherProblem(`npm ci failed:\n${output.trim()}`);
  writeFileSync(mark, `${wanted}\n`);
}
