import { type FillRow, newRow, type SeparationRow } from './separation-rows';
import type { PreparedCurve, PreparedStar } from './star-model';

/**
 * H(a, q): probability of being where the limit is at least as faint as q, coverage included. Held
 * per cell between levels as the best straight line in q: its mean and its first moment.
 */
export interface LevelRows {
  /** Absolute limiting magnitudes, increasing, shape [cell + 1]. */
  levels: Float64Array;
  /** Mean of H in each cell, shape [cell, semiMajorAxis], row-major. */
  mean: Float64Array;
  /** (1/width) ∫ ξ H dq, ξ from -1 to 1 across the cell, same shape. */
  moment: Float64Array;
  /** H below every level, shape [semiMajorAxis]. */
  total: Float64Array;
}

/** Below this length in ln θ a piece is a jump and its antiderivatives are not divided by it. */
const SHORTEST_PIECE = 1e-7;
/** A stretch is flat, hence a jump of H, when its limit varies by less than this share of a cell. */
const FLAT_SHARE = 0.05;
/** Levels closer than this are one, so that differences across a cell keep their digits. */
const NARROWEST_CELL_MAG = 1e-6;

interface Piece {
  fromY: number;
  toY: number;
  fromQ: number;
  toQ: number;
  fromCoverage: number;
  toCoverage: number;
}

/**
 * H of one curve, averaged over the distance nodes; independent of any cooling relation.
 *
 * The curve is linear in ln θ, so a level is crossed at a known place and the mean of H over a cell
 * is a difference of the antiderivative of F: exact however sharp F is.
 *
 * @param star prepared star
 * @param curve one of its curves
 * @param fill rows of the eccentricity law, with both antiderivatives
 * @param columns number of semi-major axes
 * @param widestCell largest distance of levels, [mag]
 */
export function levelRows(
  star: PreparedStar,
  curve: PreparedCurve,
  fill: FillRow,
  columns: number,
  widestCell: number,
): LevelRows {
  const perDistance = star.modulus.map((_, l) => l);
  const pieces = Array.from(perDistance, (l) => piecesAt(star, curve, l));
  const levels = chooseLevels(pieces.flat(), widestCell);
  const cells = levels.length - 1;
  const rows: LevelRows = {
    levels,
    mean: new Float64Array(cells * columns),
    moment: new Float64Array(cells * columns),
    total: new Float64Array(columns),
  };
  const whole = new Float64Array((cells + 1) * columns);
  const adder = newPieceAdder(rows, whole, fill, columns);
  for (const l of perDistance) {
    for (const piece of pieces[l]) adder(piece, star.distances.weights[l]);
  }
  addWholeCells(rows, whole, columns);
  return rows;
}

/** The curve's segments at one distance node, in ln au and absolute magnitude. */
function piecesAt(star: PreparedStar, curve: PreparedCurve, node: number): Piece[] {
  const { logSeparation, limitMag, coverage } = curve;
  const pieces: Piece[] = [];
  for (let i = 0; i + 1 < logSeparation.length; i++) {
    pieces.push({
      fromY: logSeparation[i] + star.logDistance[node],
      toY: logSeparation[i + 1] + star.logDistance[node],
      fromQ: limitMag[i] - star.modulus[node],
      toQ: limitMag[i + 1] - star.modulus[node],
      fromCoverage: coverage[i],
      toCoverage: coverage[i + 1],
    });
  }
  return pieces;
}

/** Ends, every flat stretch, and steps of at most the widest cell between. */
function chooseLevels(pieces: Piece[], widestCell: number): Float64Array {
  const ends = pieces.flatMap((piece) => [piece.fromQ, piece.toQ]);
  const lowest = ends.reduce((a, b) => Math.min(a, b));
  const highest = ends.reduce((a, b) => Math.max(a, b));
  const fixed = [lowest, Math.max(highest, lowest + 1e-3 * widestCell)];
  for (const piece of pieces) {
    if (Math.abs(piece.toQ - piece.fromQ) > FLAT_SHARE * widestCell) continue;
    fixed.push(0.5 * (piece.fromQ + piece.toQ));
  }
  fixed.sort((a, b) => a - b);
  const levels = [fixed[0]];
  for (let i = 1; i < fixed.length; i++) {
    const gap = fixed[i] - fixed[i - 1];
    if (gap < NARROWEST_CELL_MAG) continue;
    const steps = Math.ceil(gap / widestCell - 1e-9);
    for (let k = 1; k <= steps; k++) levels.push(fixed[i - 1] + (gap * k) / steps);
  }
  return Float64Array.from(levels);
}

/** Adds one segment's share to the cells it crosses, and to `whole` for the cells below it. */
function newPieceAdder(rows: LevelRows, whole: Float64Array, fill: FillRow, columns: number) {
  const { levels, mean, moment, total } = rows;
  const cells = levels.length - 1;
  const spares = [newRow(columns), newRow(columns)];
  let bottom = newRow(columns);
  let top = newRow(columns);
  let topY = Number.NaN;
  const all = new Float64Array(columns);
  return (piece: Piece, weight: number) => {
    const length = piece.toY - piece.fromY;
    const climb = piece.toQ - piece.fromQ;
    const slope = climb / length;
    const kappa = (piece.toCoverage - piece.fromCoverage) / length;
    const coverageAt = (y: number) => piece.fromCoverage + kappa * (y - piece.fromY);
    // Segments follow each other, so the last one's end is this one's beginning.
    if (piece.fromY === topY) [bottom, top] = [top, bottom];
    else fill(piece.fromY, bottom);
    fill(piece.toY, top);
    topY = piece.toY;
    const { cumulative: topF, first: topG } = top;
    const { cumulative: bottomF, first: bottomG } = bottom;
    const { fromCoverage, toCoverage } = piece;
    for (let j = 0; j < columns; j++) {
      all[j] = toCoverage * topF[j] - fromCoverage * bottomF[j] - kappa * (topG[j] - bottomG[j]);
      total[j] += weight * all[j];
    }
    const rises = climb > 0;
    const faintest = Math.max(piece.fromQ, piece.toQ);
    const brightest = Math.min(piece.fromQ, piece.toQ);
    let cell = firstCellAbove(levels, brightest);
    for (let j = 0; j < columns; j++) whole[cell * columns + j] += weight * all[j];
    let low = rises ? bottom : top;
    let lowY = rises ? piece.fromY : piece.toY;
    for (let from = brightest; cell < cells; cell++) {
      const to = Math.min(levels[cell + 1], faintest);
      const isLast = to === faintest;
      const spare = spares[cell & 1];
      const highY = isLast
        ? rises
          ? piece.toY
          : piece.fromY
        : piece.fromY + (to - piece.fromQ) / slope;
      if (!isLast) fill(highY, spare);
      const high = isLast ? (rises ? top : bottom) : spare;
      addToCell(cell, from, to, low, high, lowY, highY);
      if (isLast) break;
      [from, low, lowY] = [to, high, highY];
    }

    function addToCell(
      c: number,
      from: number,
      to: number,
      low: SeparationRow,
      high: SeparationRow,
      yFrom: number,
      yTo: number,
    ): void {
      const width = levels[c + 1] - levels[c];
      const middle = 0.5 * (levels[c] + levels[c + 1]);
      const below = from - levels[c];
      const belowMoment = 0.5 * ((from - middle) ** 2 - (levels[c] - middle) ** 2);
      const offset = 0.5 * (from + to) - middle;
      const [a, b, yA, yB] = rises ? [low, high, yFrom, yTo] : [high, low, yTo, yFrom];
      const [cA, cB] = [coverageAt(yA), coverageAt(yB)];
      const span = yB - yA;
      const isJump = span < SHORTEST_PIECE;
      const bend = isJump ? 0 : -slope * slope * 0.5 * (cA + cB);
      const end = rises ? top : bottom;
      const endCoverage = rises ? piece.toCoverage : piece.fromCoverage;
      const sign = rises ? 1 : -1;
      const perWidth = weight / width;
      const perMoment = (2 * weight) / (width * width);
      const { cumulative: aF, first: aG, second: aH } = a;
      const { cumulative: bF, first: bG, second: bH } = b;
      const { cumulative: endF, first: endG } = end;
      const perSpan = isJump ? 0 : 1 / span;
      const [f, g] = isJump ? [0.5, -0.5 * kappa] : [0, perSpan];
      const inward = (to - from) * sign;
      const row = c * columns;
      for (let j = 0; j < columns; j++) {
        const average = isJump
          ? f * (cA * aF[j] + cB * bF[j]) + g * (aG[j] + bG[j])
          : g * (cB * bG[j] - cA * aG[j] - 2 * kappa * (bH[j] - aH[j]));
        const inside = inward * (endCoverage * endF[j] - kappa * endG[j] - average);
        const bent = bend * (0.5 * span * (aG[j] + bG[j]) - (bH[j] - aH[j]));
        mean[row + j] += perWidth * (inside + below * all[j]);
        moment[row + j] += perMoment * (belowMoment * all[j] + offset * inside + bent);
      }
    }
  };
}

/** First cell whose upper level is above q. */
function firstCellAbove(levels: Float64Array, q: number): number {
  let low = 0;
  let high = levels.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (levels[middle + 1] > q) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** A segment fainter than a whole cell counts fully in it: a running sum from the faintest down. */
function addWholeCells(rows: LevelRows, whole: Float64Array, columns: number): void {
  const cells = rows.levels.length - 1;
  for (let c = cells - 1; c >= 0; c--) {
    for (let j = 0; j < columns; j++) {
      whole[c * columns + j] += whole[(c + 1) * columns + j];
      rows.mean[c * columns + j] += whole[(c + 1) * columns + j];
    }
  }
}
