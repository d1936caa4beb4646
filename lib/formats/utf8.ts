import { isUtf8 } from 'node:buffer';
import type { Fault } from '@/lib/errors';

const continuation = (byte: number | undefined): boolean =>
  byte !== undefined && (byte & 0xc0) === 0x80;

/** Length of the UTF-8 sequence at `at`, or 0 where there is none (RFC 3629, table of section 4). */
function sequenceLength(bytes: Uint8Array, at: number): number {
  const first = bytes[at];
  const second = bytes[at + 1];
  if (first < 0x80) return 1;
  if (first < 0xc2 || first > 0xf4 || !continuation(second)) return 0;
  if (first < 0xe0) return 2;
  if (first === 0xe0 && second < 0xa0) return 0;
  if (first === 0xed && second > 0x9f) return 0;
  if (!continuation(bytes[at + 2])) return 0;
  if (first < 0xf0) return 3;
  if (first === 0xf0 && second < 0x90) return 0;
  if (first === 0xf4 && second > 0x8f) return 0;
  return continuation(bytes[at + 3]) ? 4 : 0;
}

function firstBrokenByte(bytes: Uint8Array): number {
  let at = 0;
  while (at < bytes.length) {
    const length = sequenceLength(bytes, at);
    if (length === 0) return at;
    at += length;
  }
  return at;
}

function looksUtf16(bytes: Uint8Array): boolean {
  const [a, b, c, d] = bytes;
  const hasMark = (a === 0xff && b === 0xfe) || (a === 0xfe && b === 0xff);
  const isLittle = bytes.length >= 4 && b === 0 && d === 0 && a !== 0 && c !== 0;
  const isBig = bytes.length >= 4 && a === 0 && c === 0 && b !== 0 && d !== 0;
  return hasMark || isLittle || isBig;
}

function isMostlyControls(bytes: Uint8Array): boolean {
  const head = bytes.subarray(0, 512);
  const controls = head.filter((byte) => byte < 9 || (byte > 13 && byte < 32)).length;
  return controls > head.length / 50;
}

/**
 * Refuses bytes that are not UTF-8: decoded leniently, Latin-1 accents would become "�" unseen.
 *
 * @returns the fault with the first broken byte, counted from 1, or null
 */
export function refuseBrokenUtf8(bytes: Uint8Array): Fault | null {
  if (looksUtf16(bytes)) {
    return { code: 'not-utf8', item: 'byte 1', found: 'UTF-16 text', expected: 'UTF-8' };
  }
  if (isUtf8(bytes)) return null;
  const at = firstBrokenByte(bytes);
  const item = `byte ${at + 1}`;
  if (isMostlyControls(bytes)) {
    return {
      code: 'not-utf8',
      item,
      found: 'binary data',
      expected: 'CSV text',
      hint: 'The first bytes match no format that can be read',
    };
  }
  return {
    code: 'not-utf8',
    item,
    found: `the byte 0x${bytes[at].toString(16).toUpperCase().padStart(2, '0')}, which is not UTF-8`,
    expected: 'UTF-8 text',
    hint: 'Save the file again with the encoding UTF-8',
  };
}
