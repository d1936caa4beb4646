import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes } from 'node:crypto';
import { config } from '@/lib/config';

const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** A key of its own for each purpose, all from the server's one secret. */
const keyFor = (purpose: string) =>
  Buffer.from(hkdfSync('sha256', config().authSecret, '', `rarebound ${purpose}`, 32));

/** Bytes that only a holder of the server's secret can read: a copy of the database opens nothing. */
export function sealFor(purpose: string, value: unknown): Buffer {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', keyFor(purpose), nonce);
  const sealed = Buffer.concat([cipher.update(JSON.stringify(value), 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]);
}

/** @throws Error when the bytes were sealed with another secret or for another purpose, or were changed */
export function unsealFor(purpose: string, bytes: Buffer): unknown {
  const nonce = bytes.subarray(0, NONCE_BYTES);
  const decipher = createDecipheriv('aes-256-gcm', keyFor(purpose), nonce);
  decipher.setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
  const open = decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES));
  return JSON.parse(Buffer.concat([open, decipher.final()]).toString('utf8'));
}

/** 256 bits that nobody without the server's secret can write under a text. */
export const signFor = (purpose: string, text: string): string =>
  createHmac('sha256', keyFor(purpose)).update(text).digest('base64url');
