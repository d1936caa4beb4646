import type { Fault } from '@/lib/errors';
import type { Excerpt } from './kinds';
import { showUnseen } from './reports';

const excerptsAtMost = 20;
const charactersAtMost = 200;

const isLineEnd = (byte: number) => byte === 10 || byte === 13;

/** Texts of the wanted lines, cut at so many characters; a line that is no UTF-8 is left out. */
export function linesOf(
  bytes: Uint8Array,
  wanted: ReadonlySet<number>,
  atMost: number,
): Map<number, string> {
  const texts = new Map<number, string>();
  const last = [...wanted].reduce((most, line) => Math.max(most, line), 0);
  let start = 0;
  for (let line = 1; line <= last && start < bytes.length; line += 1) {
    let end = start;
    while (end < bytes.length && !isLineEnd(bytes[end])) end += 1;
    if (wanted.has(line)) {
      const text = textOf(bytes.subarray(start, end), atMost);
      if (text !== null) texts.set(line, text);
    }
    start = end + (bytes[end] === 13 && bytes[end + 1] === 10 ? 2 : 1);
  }
  return texts;
}

function textOf(line: Uint8Array, atMost: number): string | null {
  // No character takes more than four bytes.
  const bytesAtMost = 4 * atMost;
  try {
    const isCut = line.length > bytesAtMost;
    // A character that the cut parts is held back by the decoder, and not an error.
    const decoder = new TextDecoder('utf-8', { fatal: true });
    const text = decoder.decode(line.subarray(0, bytesAtMost), { stream: isCut });
    const characters = Array.from(text);
    const head = characters.slice(0, atMost).join('');
    return showUnseen(isCut || characters.length > atMost ? `${head}…` : head);
  } catch {
    return null;
  }
}

/** The line of each fault with the lines around it, of the first faults that name one. */
export function excerptsOf(bytes: Uint8Array, faults: readonly Pick<Fault, 'line'>[]): Excerpt[] {
  const lines = [...new Set(faults.flatMap(({ line }) => line ?? []))].slice(0, excerptsAtMost);
  const around = new Set(lines.flatMap((line) => [line - 1, line, line + 1]));
  const texts = linesOf(bytes, around, charactersAtMost);
  return lines.flatMap((line) => {
    const text = texts.get(line);
    if (text === undefined) return [];
    return { line, before: texts.get(line - 1) ?? null, text, after: texts.get(line + 1) ?? null };
  });
}
