import { cellOfZero } from './cooling-paths';
import type { AddRow } from './row-adder';
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

/**
 * Mean over each cell of H(a, q), the probability of being where the limit is at least as faint as
 * q, coverage included; averaged over the distance nodes and independent of any cooling relation.
 *
 * With v(y) the limit cut to the cell and counted from its lower end, the mean is ∫ v c dF / width.
 * v c is a parabola between kinks, so by parts only the kinks are left: ∫ u dF = [u F] + Σ Δu' G -
 * Σ Δu'' G2, with G and G2 the antiderivatives of F. Exact, however flat or steep the curve is.
 *
 * @param star prepared star
 * @param curve one of its curves
 * @param cellMag width of the cells, [mag]
 * @param range see cellRange
 * @param add adds a row to that of a cell, and takes it from that of another; row numbers 0 to
 *   count - 1 are the cells' own, count to 2 count what the cells below gain: their sum from the
 *   top down is still to be taken, see sumFromTop
 */
export function addLevelMeans(
  star: PreparedStar,
  curve: PreparedCurve,
  cellMag: number,
  range: CellRange,
  add: AddRow,
): void {
  const { logSeparation, limitMag, coverage } = curve;
  const last = logSeparation.length - 1;
  const offset = cellOfZero(cellMag) - range.first;
  const perCell = 1 / cellMag;
  for (let l = 0; l < star.modulus.length; l++) {
    const weight = star.distances.weights[l];
    const shift = star.logDistance[l];
    const place = (i: number) => (limitMag[i] - star.modulus[l]) * perCell + offset;
    // Slopes in cells per ln θ, so that widths are 1.
    let slopeBefore = 0;
    let kappaBefore = 0;
    for (let i = 0; i <= last; i++) {
      const y = logSeparation[i] + shift;
      const q = place(i);
      const cell = Math.floor(q);
      const length = i < last ? logSeparation[i + 1] - logSeparation[i] : 1;
      const slope = i < last ? (place(i + 1) - q) / length : 0;
      const kappa = i < last ? (coverage[i + 1] - coverage[i]) / length : 0;
      const above = q - cell;
      const end = i === 0 ? -coverage[i] : i === last ? coverage[i] : 0;
      const bend = (slope - slopeBefore) * coverage[i] + above * (kappa - kappaBefore);
      const curl = -2 * (slope * kappa - slopeBefore * kappaBefore);
      add(y, weight * end * above, weight * bend, weight * curl, cell, -1);
      if (end !== 0 || kappa !== kappaBefore) {
        add(y, weight * end, weight * (kappa - kappaBefore), 0, range.count + cell, -1);
      }
      if (i < last && slope !== 0) {
        const next = Math.floor(place(i + 1));
        const step = slope > 0 ? 1 : -1;
        for (let c = cell; c !== next; c += step) {
          const level = slope > 0 ? c + 1 : c;
          const within = Math.min(length, Math.max(0, (level - q) / slope));
          const steep = weight * Math.abs(slope);
          const share = coverage[i] + kappa * within;
          add(y + within, 0, steep * share, -2 * steep * kappa, level, level - 1);
        }
      }
      slopeBefore = slope;
      kappaBefore = kappa;
    }
  }
}
