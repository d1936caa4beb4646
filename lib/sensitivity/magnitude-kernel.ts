import { sparseThreshold } from './threshold-table';
import type { SensitivitySettings } from './types';

/** How the chance of a detection rises over the cells around a companion at the beginning of cell 0. */
export interface MagnitudeKernel {
  /** First and last cell with a rise. */
  from: number;
  to: number;
  /** Number of rises, made even by a 0 at their end. */
  count: number;
  /** A 0, the rises, and two 0s: as the kernels read them, shape [count + 3]. */
  taps: Float64Array;
  /** Chance without a signal. */
  base: number;
}

/** Beyond this a smooth threshold's chance no longer changes by more than 4e-6. */
const LOWEST_SIGMA = 4.5;
const LOWEST_MAG = 4;
/**
 * A row is the mean of H over its cell and Π a straight line there: together they spread a
 * detection by a twelfth of a squared cell, which a second difference takes back.
 */
export const SPREAD = 1 / 12;

/** Under the hard rule the chance of a companion in a cell is the cell's rise. */
const HARD: MagnitudeKernel = {
  from: -1,
  to: 1,
  ...paddedTaps(Float64Array.of(-SPREAD, 1 + 2 * SPREAD, -SPREAD)),
  base: 0,
};

const kernels = new Map<string, MagnitudeKernel>();

/**
 * The kernel of a threshold on cells of one width, worked out once and kept.
 *
 * @param threshold rule
 * @param nSigma n of the smooth threshold
 * @param cellMag width of a cell, [mag]
 */
export function magnitudeKernel(
  threshold: SensitivitySettings['threshold'],
  nSigma: number,
  cellMag: number,
): MagnitudeKernel {
  if (threshold === 'hard') return HARD;
  const key = `${nSigma} ${cellMag}`;
  const known = kernels.get(key);
  if (known) return known;
  const kernel = smoothKernel(nSigma, cellMag);
  if (kernels.size >= 32) kernels.clear();
  kernels.set(key, kernel);
  return kernel;
}

function smoothKernel(nSigma: number, cellMag: number): MagnitudeKernel {
  const { certainAt, probability } = sparseThreshold(nSigma);
  const lowest = 1 - LOWEST_SIGMA / nSigma;
  const lowestMag = lowest > 0 ? Math.max(-LOWEST_MAG, 2.5 * Math.log10(lowest)) : -LOWEST_MAG;
  const from = Math.floor(lowestMag / cellMag) - 2;
  const to = Math.ceil(certainAt / cellMag) + 2;
  // What little is gained further down counts where the cells begin.
  const base = probability(-Infinity);
  const sharpened = (chance: (cells: number) => number) => (cells: number) =>
    chance(cells) - SPREAD * (chance(cells + 1) - 2 * chance(cells) + chance(cells - 1));
  const chanceFrom = (p: (x: number) => number) => {
    const sharpenedOnce = sharpened((cells) => p(cells * cellMag));
    return (cells: number) => (cells <= from + 1 ? base : sharpenedOnce(cells));
  };
  // Ages are spread over the lattice's points, a straight line between them: the same once more.
  const sharpenedTwice = sharpened(chanceFrom(probability));
  const taps = new Float64Array(to - from + 1);
  let before = base;
  for (let k = 0; k < taps.length; k++) {
    const next = sharpenedTwice(from + k + 1);
    taps[k] = next - before;
    before = next;
  }
  return { from, to, ...paddedTaps(taps), base };
}

function paddedTaps(rises: Float64Array): { count: number; taps: Float64Array } {
  const count = rises.length + (rises.length & 1);
  const taps = new Float64Array(count + 3);
  taps.set(rises, 1);
  return { count, taps };
}
