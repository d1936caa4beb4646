import type { Fault } from '@/lib/errors';

const lineFeed = 10;
const carriageReturn = 13;
const hash = 35;
const quote = 34;

/** Where the headings of a CSV file start, and what separates its cells. */
export interface CsvLayout {
  /** First byte of the heading line. */
  start: number;
  /** Physical line of that byte, from 1. */
  line: number;
  commentLines: number;
  hasMark: boolean;
  delimiter: ',' | '\t';
}

/** Position after the line end at `at` (LF, CRLF or CR). */
function afterLineEnd(bytes: Uint8Array, at: number): number {
  return bytes[at] === carriageReturn && bytes[at + 1] === lineFeed ? at + 2 : at + 1;
}

export function isLineEnd(byte: number): boolean {
  return byte === lineFeed || byte === carriageReturn;
}

/** Counts the physical lines that end between two bytes. */
export function countLineEnds(bytes: Uint8Array, from: number, to: number): number {
  let count = 0;
  for (let at = from; at < to; at += 1) {
    const byte = bytes[at];
    if (byte === lineFeed || (byte === carriageReturn && bytes[at + 1] !== lineFeed)) count += 1;
  }
  return count;
}

/** The separators of the heading line, those within quotation marks left out. */
function countSeparators(bytes: Uint8Array, start: number): Record<',' | '\t' | ';', number> {
  const counts = { ',': 0, '\t': 0, ';': 0 };
  let isQuoted = false;
  for (let at = start; at < bytes.length; at += 1) {
    const byte = bytes[at];
    if (byte === quote) isQuoted = !isQuoted;
    if (isQuoted) continue;
    if (isLineEnd(byte)) break;
    if (byte === 44) counts[','] += 1;
    if (byte === 9) counts['\t'] += 1;
    if (byte === 59) counts[';'] += 1;
  }
  return counts;
}

/** Skips the byte order mark, empty lines and lines starting with # before the headings. */
export function findLayout(bytes: Uint8Array): CsvLayout | { fault: Fault } {
  const hasMark = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf;
  let at = hasMark ? 3 : 0;
  let line = 1;
  let commentLines = 0;
  while (at < bytes.length && (bytes[at] === hash || isLineEnd(bytes[at]))) {
    if (bytes[at] === hash) commentLines += 1;
    while (at < bytes.length && !isLineEnd(bytes[at])) at += 1;
    if (at < bytes.length) {
      at = afterLineEnd(bytes, at);
      line += 1;
    }
  }
  const counts = countSeparators(bytes, at);
  if (counts[','] === 0 && counts['\t'] === 0 && counts[';'] > 0) {
    return { fault: semicolonFault(bytes, at, line) };
  }
  const delimiter = counts['\t'] > 0 && counts['\t'] >= counts[','] ? '\t' : ',';
  return { start: at, line, commentLines, hasMark, delimiter };
}

function semicolonFault(bytes: Uint8Array, start: number, line: number): Fault {
  const end = bytes.findIndex((byte, at) => at >= start && isLineEnd(byte));
  const heading = Buffer.from(bytes.subarray(start, end < 0 ? undefined : end)).toString('utf8');
  return {
    code: 'delimiter',
    line,
    found: `one column named "${heading.length > 20 ? `${heading.slice(0, 20)}...` : heading}"`,
    expected: 'commas or tabs between cells',
  };
}

/** True where a file mixes LF, CRLF and CR line ends. */
export function hasMixedLineEnds(bytes: Uint8Array): boolean {
  let kinds = 0;
  for (let at = 0; at < bytes.length; at += 1) {
    if (bytes[at] === carriageReturn) {
      const isPair = bytes[at + 1] === lineFeed;
      kinds |= isPair ? 1 : 2;
      if (isPair) at += 1;
    } else if (bytes[at] === lineFeed) kinds |= 4;
    if (kinds !== 0 && (kinds & (kinds - 1)) !== 0) return true;
  }
  return false;
}
