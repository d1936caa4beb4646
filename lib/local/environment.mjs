import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, realpathSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of the project, whatever the folder that the command was given in. */
export const root = realpathSync(
  path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..'),
);

const settingsFile = path.join(root, '.env');
if (existsSync(settingsFile)) process.loadEnvFile(settingsFile);

/** What a command cannot go on without, said in one sentence that a person can act on. */
export class LauncherProblem extends Error {}

/**
 * Folder of everything that this machine keeps: database, secrets, logs, mail.
 *
 * @returns {string} absolute path, made if it was missing
 */
export function dataFolder() {
  const folder = path.resolve(root, process.env.RAREBOUND_DATA_DIR || '.data');
  mkdirSync(folder, { recursive: true });
  return folder;
}

/** @returns {string} a short name of a folder, the same at each call */
export function folderDigest(/** @type {string} */ folder) {
  return createHash('sha256').update(folder).digest('hex').slice(0, 16);
}

/** A terminal that was closed must not end the launcher before it has stopped its children. */
export function outliveTheTerminal() {
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {});
}

/** Runs a command's main function; a problem is shown as its sentence, anything else with its stack. */
export async function runCommand(/** @type {() => Promise<number>} */ main) {
  outliveTheTerminal();
  try {
    process.exit(await main());
  } catch (error) {
    process.stderr.write(`${error instanceof LauncherProblem ? error.message : error.stack}\n`);
    process.exit(1);
  }
}
