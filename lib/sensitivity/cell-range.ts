import { cellOfZero } from './cooling-paths';
import type { PreparedCurve, PreparedStar } from './star-model';

/** Which cells of limiting magnitude a star's curve reaches, all distance nodes together. */
export interface CellRange {
  first: number;
  count: number;
}

/** First cell and number of cells of a curve, cells as in CoolingPaths. */
export function cellRange(star: PreparedStar, curve: PreparedCurve, cellMag: number): CellRange {
  let low = Infinity;
  let high = -Infinity;
  for (const q of curve.limitMag) {
    low = Math.min(low, q);
    high = Math.max(high, q);
  }
  const zero = cellOfZero(cellMag);
  const most = star.modulus.reduce((a, b) => Math.max(a, b));
  const least = star.modulus.reduce((a, b) => Math.min(a, b));
  const first = Math.floor((low - most) / cellMag) + zero;
  return { first, count: Math.floor((high - least) / cellMag) + zero - first + 1 };
}
