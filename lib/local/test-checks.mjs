import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { root } from './environment.mjs';
import { run } from './process-run.mjs';
import { countCommand, countLockfile, countRanks, countVitest } from './test-counts.mjs';
import { nextEnvironment, nextProgram } from './web-build.mjs';

/** @typedef {import('./test-counts.mjs').Count} Count */

export const testDistFolder = '.next-test';

const program = (/** @type {string} */ name) => path.join(root, 'node_modules/.bin', name);

/** What belongs to a running product must not reach its tests. */
export function testEnvironment(/** @type {Record<string, string>} */ extra = {}) {
  const { DATABASE_URL, NEXTAUTH_URL, NEXTAUTH_SECRET, MAIL_URL, MAILBOX_URL, NODE_ENV, ...rest } =
    process.env;
  return { ...rest, NEXT_TELEMETRY_DISABLED: '1', ...extra };
}

/** @returns {Promise<Count>} */
export async function checkLint() {
  return countCommand(await run(program('biome'), ['ci', '--colors=off', '.']));
}

/** @returns {Promise<Count>} */
export async function checkRanks() {
  const rooms = ['app', 'components', 'lib', 'models', 'workers', 'proxy.ts'];
  const { code, output, stdout } = await run(program('depcruise'), [
    ...rooms.filter((room) => existsSync(path.join(root, room))),
    '--output-type',
    'json',
  ]);
  try {
    return countRanks(JSON.parse(stdout));
  } catch {
    return countCommand({ code: code || 1, output });
  }
}

/** @returns {Promise<Count>} */
export async function checkLockfile() {
  return countLockfile(readFileSync(path.join(root, 'package-lock.json'), 'utf8'));
}

/**
 * Types of everything. The settings are made here, because those that Next.js keeps would read the
 * types of pages that an older build knew.
 *
 * @returns {Promise<Count>}
 */
export async function checkTypes() {
  const folder = path.join(root, testDistFolder);
  mkdirSync(folder, { recursive: true });
  const routes = await run(process.execPath, [nextProgram, 'typegen'], {
    env: testEnvironment(nextEnvironment(testDistFolder)),
  });
  if (routes.code !== 0) return countCommand(routes);
  const settings = path.join(folder, 'tsconfig.json');
  writeFileSync(
    settings,
    JSON.stringify({
      extends: '../tsconfig.json',
      include: ['../next-env.d.ts', '../**/*.ts', '../**/*.tsx', '../**/*.mts', 'types/**/*.ts'],
      exclude: ['../node_modules', '../dist', '../.data', '../lib/sensitivity/kernels/assembly'],
    }),
  );
  return countCommand(await run(program('tsc'), ['--noEmit', '-p', settings]));
}

/** @returns {Promise<Count>} */
export async function checkPureTypes() {
  return countCommand(await run(program('tsc'), ['--noEmit', '-p', 'tsconfig.pure.json']));
}

/**
 * Runs the tests of one Vitest project.
 *
 * @param {string} project
 * @param {{ reportFile: string, environment: NodeJS.ProcessEnv }} options
 * @returns {Promise<Count>}
 */
export async function runVitest(project, { reportFile, environment }) {
  rmSync(reportFile, { force: true });
  const { code, output } = await run(
    program('vitest'),
    [
      'run',
      '--project',
      project,
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${reportFile}`,
      '--no-color',
    ],
    { env: environment },
  );
  if (!existsSync(reportFile)) return countCommand({ code: code || 1, output });
  const count = countVitest(JSON.parse(readFileSync(reportFile, 'utf8')), code);
  return count.failed === 0 ? count : { ...count, notes: [...count.notes, output.trim()] };
}
