import { rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem, root } from './environment.mjs';
import { fingerprint, readMark } from './fingerprint.mjs';
import { run } from './process-run.mjs';

const sources = [
  'app',
  'components',
  'lib',
  'models',
  'public',
  'proxy.ts',
  'next.config.mjs',
  'postcss.config.mjs',
  'tailwind.config.ts',
  'tsconfig.json',
  'package-lock.json',
];

export const nextProgram = path.join(root, 'node_modules/next/dist/bin/next');

const markOf = (/** @type {string} */ folder) => path.join(root, folder, 'rarebound-sources');

const wantedMark = () => fingerprint(sources, { leaveOut: ['lib/local'], salt: process.version });

/** @returns {boolean} whether the build in this folder was made from the present sources */
export function isBuildFresh(/** @type {string} */ folder) {
  return readMark(markOf(folder)) === wantedMark();
}

/** What the web server and its build are told beside the environment of the launcher. */
export function nextEnvironment(/** @type {string} */ folder) {
  return { NEXT_TELEMETRY_DISABLED: '1', RAREBOUND_DIST_DIR: folder };
}

/**
 * Builds the web part into a folder; the mark is written last, so a broken build never counts.
 *
 * @param {string} folder
 * @returns {Promise<void>} throws LauncherProblem with the compiler's words
 */
export async function buildWeb(folder) {
  const wanted = wantedMark();
  rmSync(markOf(folder), { force: true });
  // Without an address of a database: a page that reads it while being built would freeze its rows.
  const { DATABASE_URL: _, ...environment } = process.env;
  const { code, output } = await run(process.execPath, [nextProgram, 'build'], {
    env: { ...environment, NODE_ENV: 'production', NO_COLOR: '1', ...nextEnvironment(folder) },
  });
  if (code !== 0) throw new LauncherProblem(`The web part could not be built:\n${output.trim()}`);
  writeFileSync(markOf(folder), `${wanted}\n`);
}
