import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { dataFolder } from './environment.mjs';

/**
 * The secret that signs sessions: from the environment, else made once and kept, so that people
 * stay signed in over a restart.
 *
 * @param {string} [folder]
 * @returns {{ NEXTAUTH_SECRET: string }}
 */
export function readSecrets(folder = dataFolder()) {
  const given = process.env.NEXTAUTH_SECRET;
  if (given) return { NEXTAUTH_SECRET: given };
  const file = path.join(folder, 'secrets.json');
  if (!existsSync(file)) {
    const secrets = { NEXTAUTH_SECRET: randomBytes(32).toString('base64url') };
    writeFileSync(file, `${JSON.stringify(secrets)}\n`, { mode: 0o600, flag: 'wx' });
  }
  return JSON.parse(readFileSync(file, 'utf8'));
}
