import { type AgeSide, NORMAL_STEPS_PER_SIGMA, normalTable, writeSide } from './age-sides';
import type { CellRange } from './cell-range';
import { type CoolingPaths, cellOfZero } from './cooling-paths';
import type { Kernels } from './kernels/kernels';
import { HINTS, SIDE } from './kernels/steps/age-spread';
import { magnitudeKernel, SPREAD } from './magnitude-kernel';
import { START_MAG, thresholdTable } from './threshold-table';
import type { SensitivitySettings } from './types';

/** Single ages: magnitudes of every mass, Infinity for none. */
export interface SingleAges {
  weights: Float64Array;
  /** Shape [mass, age], [mag]. */
  magnitudes: Float64Array;
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

const NO_TABLE = new Float64Array(0);

/** Tables that the kernels read while the weights are made: they stay from star to star. */
export function weightTables({ paths, single, threshold, nSigma }: WeightInputs): Float64Array[] {
  return [
    paths.stretches,
    paths.begins,
    paths.fades,
    normalTable(),
    magnitudeKernel(threshold, nSigma, paths.cellMag).taps,
    single.weights.length > 0 ? thresholdTable(nSigma).values : NO_TABLE,
  ];
}

/** Memory that is used while the weights are made, in doubles. */
export function weightScratch(inputs: WeightInputs, cells: number): number {
  const { sides, single, threshold, nSigma, paths } = inputs;
  const { from, to } = magnitudeKernel(threshold, nSigma, paths.cellMag);
  const ages = sides.length * (SIDE + HINTS) + single.weights.length + single.magnitudes.length;
  return ages + 2 * (cells + to - from) + (to - from) + 32;
}

/**
 * W of every mass in the kernels' memory, see fillWeights there.
 *
 * @param inputs see WeightInputs
 * @param places of weightTables
 * @param range cells of the star
 * @param at where the rows of range.count + 1 begin; the first entry is Π below every cell
 * @param bands where the rows are not 0, shape [mass, 2]
 * @param scratch where so many doubles as weightScratch tells may be written
 */
export function fillMagnitudeWeights(
  { paths, sides, single, threshold, nSigma }: WeightInputs,
  places: readonly number[],
  range: CellRange,
  kernels: Kernels,
  at: number,
  bands: number,
  scratch: number,
): void {
  const memory = kernels.reserve(0);
  const [stretches, begins, fades, normal, taps, table] = places;
  const { cellMag, masses } = paths;
  let free = scratch + HINTS * sides.length;
  const sidesAt = free;
  for (const side of sides) {
    writeSide(side, memory.subarray(free, free + SIDE));
    free += SIDE;
  }
  const ages = single.weights.length;
  const magnitudes = free + ages;
  kernels.setPaths(stretches, begins, fades);
  kernels.setSides(sidesAt, sides.length, normal, 1 / NORMAL_STEPS_PER_SIGMA, scratch);
  const { count, from, to, base } = magnitudeKernel(threshold, nSigma, cellMag);
  kernels.setKernel(taps + 1, count, from, to, base, threshold === 'smooth' ? 1 : 0);
  if (ages > 0) {
    memory.set(single.weights, free);
    memory.set(single.magnitudes, magnitudes);
    const { values, perStep } = thresholdTable(nSigma);
    kernels.setSingleAges(
      ages,
      free,
      magnitudes,
      table,
      values.length - 1,
      START_MAG,
      perStep,
      cellMag,
      1 / cellMag,
      cellOfZero(cellMag),
      SPREAD,
    );
    free = magnitudes + single.magnitudes.length;
  } else {
    kernels.setSingleAges(0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0);
  }
  kernels.fillWeights(masses, range.first, range.count, at, bands, free);
}
