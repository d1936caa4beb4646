import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { LauncherProblem, root, runCommand } from './environment.mjs';
import { ensurePackages } from './packages.mjs';

const entry = 'tests/bench/main.ts';
const folder = 'dist/bench';

runCommand(async () => {
  if (!existsSync(path.join(root, entry))) {
    throw new LauncherProblem(`There is no benchmark to run: ${entry} is missing.`);
  }
  await ensurePackages();
  await bundleScripts(folder, [entry]);
  const script = path.join(root, folder, 'tests/bench/main.js');
  const words = ['--enable-source-maps', script, ...process.argv.slice(2)];
  const child = spawn(process.execPath, words, { cwd: root, stdio: 'inherit' });
  return new Promise((resolve) => child.once('exit', (code) => resolve(code ?? 1)));
});
