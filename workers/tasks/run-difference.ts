/** Significant digits to which a run that is made again must give what is stored. */
export const CHECKED_DIGITS = 6;

/** Half a unit in the last of these digits, of the largest number that begins with nines. */
const LARGEST_RELATIVE = 0.5 * 10 ** -CHECKED_DIGITS;

const isSameNumber = (a: number, b: number) =>
  Math.abs(a - b) <= LARGEST_RELATIVE * Math.max(Math.abs(a), Math.abs(b));

const show = (value: unknown) =>
  typeof value === 'number' ? String(value) : (JSON.stringify(value) ?? 'nothing');
const shorten = (text: string) => (text.length > 60 ? `${text.slice(0, 57)}…` : text);

/**
 * Where two results part: numbers beyond the digits that are checked, and anything else that is not
 * the same.
 *
 * @returns one line a place: "answer.limit: 0.0581 stored, 0.0585 again"
 */
export function findDifferences(stored: unknown, again: unknown, path = ''): string[] {
  if (typeof stored === 'number' && typeof again === 'number') {
    return isSameNumber(stored, again) ? [] : [line(path, stored, again)];
  }
  const areObjects =
    typeof stored === 'object' && typeof again === 'object' && stored !== null && again !== null;
  if (!areObjects) return stored === again ? [] : [line(path, stored, again)];
  const [a, b] = [stored, again] as Record<string, unknown>[];
  const keys = [...new Set([...Object.keys(a), ...Object.keys(b)])];
  return keys.flatMap((key) => findDifferences(a[key], b[key], path ? `${path}.${key}` : key));
}

const line = (path: string, stored: unknown, again: unknown) =>
  `${path || 'result'}: ${shorten(show(stored))} stored, ${shorten(show(again))} again`;
