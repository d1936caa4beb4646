import { clear, clearShorts, encode, move, multiplyPair, real, whole } from '../machine';

/**
 * C = W · H of every mass, from the first column that is reached.
 *
 * @param out where the rows go, (masses + 1) · stride doubles
 * @param factors rows of `width` weights
 * @param bands where these are not 0, see fillWeights
 * @param rows H, `stride` apart
 * @param firstColumn first column that is reached; those before it are 0
 */
export function multiplyRows(
  out: i32,
  masses: i32,
  factors: i32,
  width: i32,
  bands: i32,
  rows: i32,
  stride: i32,
  firstColumn: i32,
): void {
  for (let m: i32 = 0; m < masses; m += 2) {
    const next: i32 = m + 1 < masses ? m + 1 : m;
    const first = Math.min(real(bands + 2 * m), real(bands + 2 * next));
    const end = Math.max(real(bands + 2 * m + 1), real(bands + 2 * next + 1));
    multiplyPair(
      out + m * stride + firstColumn,
      out + (m + 1) * stride + firstColumn,
      factors + m * width,
      factors + next * width,
      rows + firstColumn,
      stride,
      whole(first),
      whole(end),
      stride - firstColumn,
    );
  }
}

/**
 * Presses what multiplyRows wrote together, to `columns` of a row.
 *
 * @param firstColumn the columns before it are set to 0
 */
export function pressRows(
  out: i32,
  masses: i32,
  columns: i32,
  stride: i32,
  firstColumn: i32,
): void {
  for (let m: i32 = 0; m < masses; m++) {
    move(out + m * columns + firstColumn, out + m * stride + firstColumn, columns - firstColumn);
    clear(out + m * columns, firstColumn);
  }
}

/**
 * Writes what multiplyRows wrote as it is stored, `columns` of a row, see encode.
 *
 * @param to where it goes, counted in 16-bit numbers
 * @returns 1, or 0 where something is no number
 */
export function encodeRows(
  to: i32,
  rows: i32,
  masses: i32,
  columns: i32,
  stride: i32,
  firstColumn: i32,
): i32 {
  let areNumbers: i32 = 1;
  for (let m: i32 = 0; m < masses; m++) {
    clearShorts(to + m * columns, firstColumn);
    const from = rows + m * stride + firstColumn;
    const reached = encode(to + m * columns + firstColumn, from, columns - firstColumn);
    if (reached === 0) areNumbers = 0;
  }
  return areNumbers;
}
