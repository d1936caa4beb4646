import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { root } from './environment.mjs';

/** Files below a file or folder, sorted, without hidden ones and without what `leaveOut` names. */
function listFiles(relative, leaveOut, base) {
  const absolute = path.join(base, relative);
  if (leaveOut.includes(relative) || !existsSync(absolute)) return [];
  if (!statSync(absolute).isDirectory()) return [relative];
  return readdirSync(absolute)
    .filter((name) => !name.startsWith('.') && name !== 'node_modules')
    .sort()
    .flatMap((name) => listFiles(path.posix.join(relative, name), leaveOut, base));
}

/**
 * Digest over names and contents: two folders with the same digest build to the same thing.
 *
 * @param {string[]} places files and folders relative to `base`; absent ones count as absent
 * @param {{ leaveOut?: string[], salt?: string, base?: string }} [options]
 * @returns {string} 64 hexadecimal digits
 */
export function fingerprint(places, { leaveOut = [], salt = '', base = root } = {}) {
  const hash = createHash('sha256').update(salt);
  for (const file of places.flatMap((place) => listFiles(place, leaveOut, base))) {
    hash.update(`\0${file}\0`).update(
      createHash('sha256')
        .update(readFileSync(path.join(base, file)))
        .digest(),
    );
  }
  return hash.digest('hex');
}

/** @returns {string | null} the digest that the last complete build left, null when there is none */
export function readMark(/** @type {string} */ file) {
  return existsSync(file) ? readFileSync(file, 'utf8').trim() : null;
}
