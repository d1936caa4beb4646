import { type MovingAxis, sumAlong, sumOfIntegers } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import type { StackedMaps } from './answer';

/** First and one past the last place where any of the weights is not 0. */
function activeRange(weights: readonly Float64Array[]): [number, number] {
  const { length } = weights[0];
  const isActive = (at: number) => weights.some((one) => one[at] !== 0);
  let first = 0;
  let end = length;
  while (first < end && !isActive(first)) first++;
  while (end > first && !isActive(end - 1)) end--;
  return [first, end];
}

function countMaps(maps: StackedMaps, grid: MapGrid): number {
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const stars = maps.length / size;
  if (!Number.isInteger(stars)) {
    throw new RangeError(
      `the maps hold ${maps.length} values, not a multiple of ${grid.massMjup.length} x ` +
        `${grid.semiMajorAxisAu.length} nodes`,
    );
  }
  return stars;
}

function requireWeights(weights: readonly Float64Array[], length: number, axis: string): void {
  if (weights.length === 0) throw new RangeError(`there are no weights along the ${axis}`);
  for (const one of weights) {
    if (one.length !== length) {
      throw new RangeError(`weights along the ${axis} need ${length} values, got ${one.length}`);
    }
  }
}

/** Sums of a row with six sets of weights at once: one reading of the row serves all six. */
function multiplyRow(
  row: Float64Array,
  weights: Float64Array,
  sets: number,
  out: Float64Array,
  start: number,
): void {
  const n = row.length;
  let set = 0;
  for (; set + 6 <= sets; set += 6) {
    const b0 = set * n;
    const b1 = b0 + n;
    const b2 = b1 + n;
    const b3 = b2 + n;
    const b4 = b3 + n;
    const b5 = b4 + n;
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    let s4 = 0;
    let s5 = 0;
    for (let i = 0; i < n; i++) {
      const value = row[i];
      s0 += value * weights[b0 + i];
      s1 += value * weights[b1 + i];
      s2 += value * weights[b2 + i];
      s3 += value * weights[b3 + i];
      s4 += value * weights[b4 + i];
      s5 += value * weights[b5 + i];
    }
    out[start + set] = s0;
    out[start + set + 1] = s1;
    out[start + set + 2] = s2;
    out[start + set + 3] = s3;
    out[start + set + 4] = s4;
    out[start + set + 5] = s5;
  }
  for (; set < sets; set++) {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += row[i] * weights[set * n + i];
    out[start + set] = sum;
  }
}

/**
 * Mean of every map of a stack under every pair of weights: two small products a star.
 *
 * @param maps shape [star, mass, semiMajorAxis]; 16-bit integers hold round(65535 C)
 * @param massWeights n sets of weights, each shape [mass]
 * @param axisWeights p sets of weights, each shape [semiMajorAxis]
 * @returns shape [n, p, star]; not capped, so that a summed map gives exposures
 * @throws RangeError where maps or weights do not fit the grid
 * Cost: p (mass x semiMajorAxis) + n p mass multiply-adds a star, over the nodes that carry weight.
 */
export function contractStack(
  maps: StackedMaps,
  grid: MapGrid,
  massWeights: readonly Float64Array[],
  axisWeights: readonly Float64Array[],
): Float64Array {
  const stars = countMaps(maps, grid);
  requireWeights(massWeights, grid.massMjup.length, 'mass');
  requireWeights(axisWeights, grid.semiMajorAxisAu.length, 'semi-major axis');
  const columns = grid.semiMajorAxisAu.length;
  const size = grid.massMjup.length * columns;
  const [firstRow, endRow] = activeRange(massWeights);
  const [firstColumn, endColumn] = activeRange(axisWeights);
  const scale = maps instanceof Uint16Array ? 1 / 65535 : 1;
  const [n, p, rows, width] = [
    massWeights.length,
    axisWeights.length,
    endRow - firstRow,
    endColumn - firstColumn,
  ];
  const across = new Float64Array(p * width);
  axisWeights.forEach((one, set) => {
    across.set(one.subarray(firstColumn, endColumn), set * width);
  });
  const row = new Float64Array(width);
  const half = new Float64Array(rows * p);
  const means = new Float64Array(n * p * stars);
  const sums = new Float64Array(p);
  for (let star = 0; star < stars; star++) {
    for (let i = 0; i < rows; i++) {
      const start = star * size + (firstRow + i) * columns + firstColumn;
      for (let j = 0; j < width; j++) row[j] = maps[start + j];
      multiplyRow(row, across, p, half, i * p);
    }
    for (let set = 0; set < n; set++) {
      const weights = massWeights[set];
      sums.fill(0);
      for (let i = 0; i < rows; i++) {
        const weight = weights[firstRow + i] * scale;
        for (let b = 0; b < p; b++) sums[b] += weight * half[i * p + b];
      }
      for (let b = 0; b < p; b++) means[(set * p + b) * stars + star] = sums[b];
    }
  }
  return means;
}

/** Maps averaged over the axis that stands still, shape [star, place on the moving axis]. */
export interface ContractedMaps {
  moving: MovingAxis;
  stars: number;
  values: Float64Array;
}

/**
 * Averages a stack over the axis that stays still while a control of the other one moves.
 *
 * Made once when the control is taken; `completenessWhileMoving` then follows exactly.
 *
 * @param maps shape [star, mass, semiMajorAxis]; 16-bit integers hold round(65535 C)
 * @param stillWeights of the axis that stays, from `populationWeights`
 * @throws RangeError where maps or weights do not fit the grid
 * Cost: one multiply-add a node and star.
 */
export function contractStillAxis(
  maps: StackedMaps,
  grid: MapGrid,
  moving: MovingAxis,
  stillWeights: Float64Array,
): ContractedMaps {
  const stars = countMaps(maps, grid);
  const [rows, columns] = [grid.massMjup.length, grid.semiMajorAxisAu.length];
  const stillLength = moving === 'mass' ? columns : rows;
  requireWeights([stillWeights], stillLength, moving === 'mass' ? 'semi-major axis' : 'mass');
  const length = moving === 'mass' ? rows : columns;
  const values = new Float64Array(stars * length);
  const isStored = maps instanceof Uint16Array;
  const scale = isStored ? 1 / 65535 : 1;
  const [first, end] = activeRange([stillWeights]);
  if (moving === 'mass') {
    for (let row = 0; row < stars * rows; row++) {
      const start = row * columns;
      const sum = isStored
        ? sumOfIntegers(maps, start, stillWeights, first, end)
        : sumAlong(maps, start, stillWeights, first, end);
      values[row] = scale * sum;
    }
    return { moving, stars, values };
  }
  for (let star = 0; star < stars; star++) {
    const at = star * columns;
    for (let i = first; i < end; i++) {
      const start = (star * rows + i) * columns;
      const weight = stillWeights[i] * scale;
      for (let j = 0; j < columns; j++) values[at + j] += weight * maps[start + j];
    }
  }
  return { moving, stars, values };
}

/**
 * Mean completeness of every star while a control moves.
 *
 * @param weights of the moving axis, from `populationWeights`
 * @returns shape [star], 0..1: what `meanCompletenessOfStack` gives, to rounding
 * @throws RangeError where the weights have another length than the moving axis
 * Cost: one multiply-add a star and place on the moving axis.
 */
export function completenessWhileMoving(
  { moving, stars, values }: ContractedMaps,
  weights: Float64Array,
): Float64Array {
  const length = weights.length;
  if (values.length !== stars * length) {
    throw new RangeError(
      `weights along the moving axis (${moving}) need ${values.length / stars} values, got ${length}`,
    );
  }
  const means = new Float64Array(stars);
  for (let star = 0; star < stars; star++) {
    const sum = sumAlong(values, star * length, weights, 0, length);
    means[star] = Math.min(1, Math.max(0, sum));
  }
  return means;
}
