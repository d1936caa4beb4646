import { createHash } from 'node:crypto';

/**
 * JSON with sorted keys and no spaces, so that equal values give equal text.
 *
 * Keys whose value is undefined are left out, as JSON does. Typed arrays are written as lists.
 *
 * @throws TypeError for what JSON would lose in silence: a number that is not finite, a bigint, a
 *   function, or undefined inside a list
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') {
    return JSON.stringify(value);
  }
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new TypeError(`a digest needs finite numbers, got ${value}`);
    return JSON.stringify(value);
  }
  if (ArrayBuffer.isView(value) && !(value instanceof DataView)) {
    return canonicalJson(Array.from(value as unknown as Iterable<number>));
  }
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  if (value instanceof Date) return JSON.stringify(value);
  if (typeof value === 'object') {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
      .map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`);
    return `{${members.join(',')}}`;
  }
  throw new TypeError(`a digest needs JSON values, got ${typeof value}`);
}

/** SHA-256 in lower-case hexadecimal, of text as UTF-8 or of bytes. */
export function sha256Hex(content: string | Uint8Array): string {
  return createHash('sha256').update(content).digest('hex');
}

/** SHA-256 of the canonical JSON: the fingerprint of inputs, results and definitions. */
export function digestOf(value: unknown): string {
  return sha256Hex(canonicalJson(value));
}
