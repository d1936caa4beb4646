import type { AgeSide } from './age-sides';
import { newAgeSpread } from './age-spread';
import { type CoolingPaths, cellOfZero } from './cooling-paths';
import type { Kernels } from './kernels/kernels';
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

/** Whose chances they are: paths through the cooling relation, the age and the threshold. */
export interface WeightInputs {
  paths: CoolingPaths;
  /** Where the age is uncertain, see ageSides. */
  sides: readonly AgeSide[];
  /** What has no error, or nodes of age. */
  single: SingleAges;
  threshold: SensitivitySettings['threshold'];
  nSigma: number;
}

/** Memory that is used while the weights are made, in doubles. */
export function weightScratch({ paths, threshold, nSigma }: WeightInputs, cells: number): number {
  const { from, to, taps } = magnitudeKernel(threshold, nSigma, paths.cellMag);
  return 2 * (cells + to - from) + 2 * taps.length + 2 * (to - from) + 16;
}

/**
 * W: how Π(q) = E p(q - M), the chance of a detection where the limit is q, rises from cell to cell
 * of limiting magnitude, for every mass. Ages are integrated exactly, no nodes are used.
 *
 * @param inputs see WeightInputs
 * @param range cells of the star
 * @param kernels whose memory holds the answer
 * @param at where the rows of range.count + 1 begin; the first entry is Π below every cell
 * @param scratch where so many doubles as weightScratch tells may be written
 */
export function fillMagnitudeWeights(
  { paths, sides, single, threshold, nSigma }: WeightInputs,
  range: CellRange,
  kernels: Kernels,
  at: number,
  scratch: number,
): WeightBands {
  const memory = kernels.reserve(0);
  const masses = paths.begins.length - 1;
  const kernel = magnitudeKernel(threshold, nSigma, paths.cellMag);
  const tapCount = kernel.taps.length + (kernel.taps.length & 1);
  const zero = cellOfZero(paths.cellMag);
  const perCell = 1 / paths.cellMag;
  // Places whose rises reach the cells: any other counts in full, or not at all.
  const lowest = range.first - kernel.to;
  const highest = range.first + range.count - kernel.from;
  const taps = scratch;
  const deposit = taps + tapCount;
  const rises = deposit + highest - lowest + 2;
  const origin = lowest + kernel.from;
  const risesEnd = rises + highest + kernel.to - origin + 4;
  memory.fill(0, taps, risesEnd);
  memory.set(kernel.taps, taps);
  const spread = newAgeSpread(
    paths,
    sides,
    threshold === 'smooth',
    lowest,
    highest,
    memory.subarray(deposit, rises),
  );
  const bands = { first: new Int32Array(masses), end: new Int32Array(masses) };
  const ages = single.weights.length;
  for (let m = 0; m < masses; m++) {
    const seen = spread(m);
    let from = seen.first + kernel.from;
    let end = seen.end + kernel.to;
    let base = seen.brighter + kernel.base * (seen.total - seen.brighter);
    const places = seen.end - seen.first;
    if (places > 0) {
      kernels.convolve(
        rises + from - origin,
        deposit + seen.first - lowest,
        places,
        taps,
        tapCount,
      );
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
        memory[rises + c - origin] += weight * (next - before);
        before = next;
      }
    }
    const first = Math.max(0, from - range.first);
    const last = Math.min(range.count, end - range.first);
    const row = at + m * (range.count + 1);
    const cells = rises + range.first - origin;
    for (let c = rises + Math.max(0, from - origin); c < cells; c++) base += memory[c];
    memory[row] = base;
    for (let c = 0; c < range.count; c++) memory[row + 1 + c] = 0;
    for (let c = first; c < last; c++) memory[row + 1 + c] = memory[cells + c];
    if (end > from) memory.fill(0, rises + from - origin, rises + end - origin + 1);
    bands.first[m] = last > first ? first + 1 : range.count + 1;
    bands.end[m] = last > first ? last + 1 : 0;
  }
  return bands;
}
