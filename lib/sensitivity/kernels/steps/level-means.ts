import { addTo, clear, foldRow, real, whole } from '../machine';
import { addRow, rowAt } from './rows';

/**
 * Mean over each cell of H(a, q), the probability of being where the limit is at least as faint as
 * q, coverage included; averaged over the distance nodes and independent of any cooling relation.
 *
 * With v(y) the limit cut to the cell and counted from its lower end, the mean is ∫ v c dF / width.
 * v c is a parabola between kinks, so by parts only the kinks are left: ∫ u dF = [u F] + Σ Δu' G -
 * Σ Δu'' G2, with G and G2 the antiderivatives of F. Exact, however flat or steep the curve is.
 *
 * Rows 0 … cells - 1 are what the cells have of their own, the next `cells` what all below each one
 * gain, and the last `cells` what a cell gains at its lower edge and the one below loses.
 *
 * @param curve ln θ, limit and coverage, shape [3, points]
 * @param distances weight, ln d and μ, shape [node, 3]
 * @param perCell cells per mag
 * @param offset place of magnitude 0, counted in cells from the first
 */
export function addLevelMeans(
  curve: i32,
  points: i32,
  distances: i32,
  nodes: i32,
  perCell: f64,
  offset: i32,
  cells: i32,
): void {
  const limit = curve + points;
  const coverage = limit + points;
  for (let l: i32 = 0; l < nodes; l++) {
    const weight = real(distances + 3 * l);
    const shift = real(distances + 3 * l + 1);
    const modulus = real(distances + 3 * l + 2);
    // Slopes in cells per ln θ, so that widths are 1.
    let slopeBefore: f64 = 0;
    let kappaBefore: f64 = 0;
    let q: f64 = (real(limit) - modulus) * perCell + offset;
    for (let i: i32 = 0; i < points; i++) {
      const isLast = i === points - 1;
      const y: f64 = real(curve + i) + shift;
      const cell = whole(Math.floor(q));
      const covered = real(coverage + i);
      let qNext: f64 = q;
      let length: f64 = 1;
      let slope: f64 = 0;
      let kappa: f64 = 0;
      if (!isLast) {
        qNext = (real(limit + i + 1) - modulus) * perCell + offset;
        length = real(curve + i + 1) - real(curve + i);
        slope = (qNext - q) / length;
        kappa = (real(coverage + i + 1) - covered) / length;
      }
      const above: f64 = q - cell;
      let end: f64 = 0;
      if (i === 0) end = -covered;
      else if (isLast) end = covered;
      const bend: f64 = (slope - slopeBefore) * covered + above * (kappa - kappaBefore);
      const curl: f64 = -2 * (slope * kappa - slopeBefore * kappaBefore);
      addRow(y, weight * end * above, weight * bend, weight * curl, cell);
      if (end !== 0 || kappa !== kappaBefore) {
        addRow(y, weight * end, weight * (kappa - kappaBefore), 0, cells + cell);
      }
      if (slope !== 0) {
        const next = whole(Math.floor(qNext));
        const step: i32 = slope > 0 ? 1 : -1;
        const steep: f64 = weight * Math.abs(slope);
        for (let c = cell; c !== next; c += step) {
          const level: i32 = slope > 0 ? c + 1 : c;
          const within: f64 = Math.min(length, Math.max(0, (level - q) / slope));
          const share: f64 = covered + kappa * within;
          addRow(y + within, 0, steep * share, -2 * steep * kappa, 2 * cells + level);
        }
      }
      slopeBefore = slope;
      kappaBefore = kappa;
      q = qNext;
    }
  }
}

/**
 * The rows of all cells from what was added: row 0 is H below every cell, cell c is row c + 1.
 *
 * @param out where the rows go, `stride` apart
 * @param spare two rows that may be written on
 * @param columns columns from the first that is reached, a multiple of 8
 */
export function foldRows(out: i32, spare: i32, stride: i32, columns: i32, cells: i32): void {
  const nothing = spare;
  const sum = spare + stride;
  const column = stride - columns;
  clear(spare, 2 * stride);
  let edgeAbove = nothing;
  for (let c = cells - 1; c >= -1; c--) {
    const ownRow: i32 = c < 0 ? 0 : rowAt(c);
    const edgeRow: i32 = c < 0 ? 0 : rowAt(2 * cells + c);
    const own: i32 = ownRow > 0 ? ownRow + column : nothing;
    const edge: i32 = edgeRow > 0 ? edgeRow + column : nothing;
    foldRow(out + (c + 1) * stride + column, own, edge, edgeAbove, sum, columns);
    const gain: i32 = c < 0 ? 0 : rowAt(cells + c);
    if (gain > 0) addTo(sum, gain + column, columns);
    edgeAbove = edge;
  }
}
