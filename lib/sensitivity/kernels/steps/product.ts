import { clear, move, multiplyPair, real, whole } from '../machine';

/**
 * C = W · H of every mass, pressed together to `columns` of a row.
 *
 * @param out where the map goes, (masses + 1) · stride doubles of which masses · columns are the map
 * @param factors rows of `width` weights
 * @param bands where these are not 0, see fillWeights
 * @param rows H, `stride` apart
 * @param firstColumn first column that is reached; those before it are 0
 */
export function multiplyRows(
  out: i32,
  masses: i32,
  columns: i32,
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
  for (let m: i32 = 0; m < masses; m++) {
    move(out + m * columns + firstColumn, out + m * stride + firstColumn, columns - firstColumn);
    clear(out + m * columns, firstColumn);
  }
}
