import type { AgeSide } from './age-sides';
import { newAgeSpread } from './age-spread';
import { type CoolingPaths, cellOfZero } from './cooling-paths';
import type { CellRange } from './level-means';
import { magnitudeKernel } from './magnitude-kernel';
import type { SensitivitySettings } from './types';

/** Single ages: magnitudes of every mass, Infinity for none. */
export interface SingleAges {
  weights: Float64Array;
  /** Shape [mass, age], [mag]. */
  magnitudes: Float64Array;
}

/** Where the rows of weights of the masses are not 0, shape [mass]; entry 0 of a row counts apart. */
export interface WeightBands {
  first: Int32Array;
  end: Int32Array;
}

/**
 * W: how Π(q) = E p(q - M), the chance of a detection where the limit is q, rises from cell to cell
 * of limiting magnitude, for every mass. Ages are integrated exactly, no nodes are used.
 *
 * @param paths the masses' paths through the cooling relation
 * @param sides where the age is uncertain, see ageSides
 * @param single what has no error, or nodes of age
 * @param threshold rule
 * @param nSigma n of the smooth threshold
 * @param range cells of the star
 * @param memory filled in place: rows of range.count + 1, the first entry Π below every cell
 * @param at where the rows begin
 */
export function fillMagnitudeWeights(
  paths: CoolingPaths,
  sides: readonly AgeSide[],
  single: SingleAges,
  threshold: SensitivitySettings['threshold'],
  nSigma: number,
  range: CellRange,
  memory: Float64Array,
  at: number,
): WeightBands {
  const masses = paths.begins.length - 1;
  const kernel = magnitudeKernel(threshold, nSigma, paths.cellMag);
  const { taps } = kernel;
  const zero = cellOfZero(paths.cellMag);
  const perCell = 1 / paths.cellMag;
  // Places whose rises reach the cells: any other counts in full, or not at all.
  const lowest = range.first - kernel.to;
  const highest = range.first + range.count - kernel.from;
  const spread = newAgeSpread(paths, sides, threshold === 'smooth', lowest, highest);
  const scratch = new Float64Array(highest + kernel.to - (lowest + kernel.from) + 2);
  const origin = lowest + kernel.from;
  const bands = { first: new Int32Array(masses), end: new Int32Array(masses) };
  const ages = single.weights.length;
  for (let m = 0; m < masses; m++) {
    const seen = spread(m);
    let [from, end] = [seen.first + kernel.from, seen.end + kernel.to];
    let base = seen.brighter + kernel.base * (seen.total - seen.brighter);
    for (let i = seen.first; i < seen.end; i++) {
      const weight = seen.weights[i - lowest];
      const start = i + kernel.from - origin;
      for (let k = 0; k < taps.length; k++) scratch[start + k] += weight * taps[k];
    }
    for (let k = 0; k < ages; k++) {
      const magnitude = single.magnitudes[m * ages + k];
      if (magnitude === Infinity) continue;
      const weight = single.weights[k];
      const place = magnitude * perCell + zero;
      const cell = Math.floor(place);
      base += weight * (cell < lowest ? 1 : kernel.base);
      if (cell < lowest || cell >= highest) continue;
      from = Math.min(from, cell + kernel.from);
      end = Math.max(end, cell + kernel.to + 2);
      let before = kernel.base;
      for (let c = cell + kernel.from; c <= cell + 1 + kernel.to; c++) {
        const next = kernel.chanceAt(c + 1 - place);
        scratch[c - origin] += weight * (next - before);
        before = next;
      }
    }
    const first = Math.max(0, from - range.first);
    const last = Math.min(range.count, end - range.first);
    const row = at + m * (range.count + 1);
    memory.fill(0, row, row + range.count + 1);
    for (let c = from - origin; c < range.first - origin; c++) base += scratch[c];
    memory[row] = base;
    for (let c = first; c < last; c++) memory[row + 1 + c] = scratch[range.first - origin + c];
    if (end > from) scratch.fill(0, from - origin, end - origin);
    [bands.first[m], bands.end[m]] = last > first ? [first + 1, last + 1] : [range.count + 1, 0];
  }
  return bands;
}
