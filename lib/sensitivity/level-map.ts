import { compiledKernels } from './kernels/compiled';
import type { Kernels } from './kernels/kernels';
import { plainKernels } from './kernels/plain';
import { addLevelMeans, type CellRange, cellRange } from './level-means';
import { fillMagnitudeWeights, type WeightInputs, weightScratch } from './magnitude-weights';
import { largestSeparation } from './orbits';
import { type AddRow, lookedUpRows, phaseRows } from './row-adder';
import { evenStep, type SeparationPhases, separationPhases } from './separation-phases';
import { tabulatedRows } from './separation-rows';
import type { PreparedStar } from './star-model';
import type { EccentricityLaw } from './types';

/** Columns are worked on in blocks of so many. */
const BLOCK = 8;

let chosen: Kernels | null = null;
/** Chosen with the first map: whoever computes none compiles nothing. */
function kernelsHere(): Kernels {
  chosen ??= compiledKernels() ?? plainKernels();
  return chosen;
}

/** The table that lies at the beginning of the kernels' memory. */
interface Workspace {
  law: string;
  firstLogAxis: number;
  axisStep: number;
  stride: number;
  phases: SeparationPhases | null;
}

const workspace: Workspace = {
  law: '',
  firstLogAxis: 0,
  axisStep: 0,
  stride: 0,
  phases: null,
};

/**
 * Completeness of one curve as a product, C = W · H: weights from age alone, rows from the curve.
 *
 * @param star prepared star with one curve
 * @param inputs of the weights
 * @param law eccentricity law
 * @param logAxis ln a of the grid, [ln au], not modified
 * @returns shape [mass, semiMajorAxis], row-major, not yet cut to 0…1
 */
export function levelMap(
  star: PreparedStar,
  inputs: WeightInputs,
  law: EccentricityLaw,
  logAxis: Float64Array,
): Float64Array {
  const kernels = kernelsHere();
  const columns = logAxis.length;
  const { cellMag, begins } = inputs.paths;
  const masses = begins.length - 1;
  const stride = BLOCK * Math.ceil(columns / BLOCK);
  const [curve] = star.curves;
  // A cell more at each end: places are rounded in two ways.
  const range = cellRange(star, curve, cellMag);
  range.first--;
  range.count += 2;
  const phases = phasesFor(law, logAxis, stride);
  // What is kept for the next star lies in front, whether this one uses it or not.
  const rows = workspace.phases?.planes.length ?? 0;
  // Row 0 is H below every cell; the cells follow, and what the cells below each gain.
  const below = rows + stride * (range.count + 1);
  const spare = below + stride * range.count;
  const scratch = spare + stride;
  const factors = scratch + weightScratch(inputs, range.count);
  const out = factors + masses * (range.count + 1);
  const memory = kernels.reserve(out + (masses + 1) * stride);
  const firstColumn = phases ? firstReached(star, law, logAxis) : 0;
  const places = { rows: rows + stride, stride, firstColumn, spare: 2 * range.count };
  memory.fill(0, rows, scratch);
  const add: AddRow = phases
    ? phaseRows(kernels, phases, 0, places)
    : lookedUpRows(kernels, tabulatedRows(law, logAxis), columns, places);
  addLevelMeans(star, curve, cellMag, range, add);
  sumFromTop(memory, rows, below, range, stride);
  const bands = fillMagnitudeWeights(inputs, range, kernels, factors, scratch);
  for (let m = 0; m < masses; m += 2) {
    const next = Math.min(m + 1, masses - 1);
    const width = range.count + 1;
    kernels.multiplyPair(
      out + m * stride + firstColumn,
      out + (m + 1) * stride + firstColumn,
      factors + m * width,
      factors + next * width,
      rows + firstColumn,
      stride,
      Math.min(bands.first[m], bands.first[next]),
      Math.max(bands.end[m], bands.end[next]),
      stride - firstColumn,
    );
  }
  const completeness = new Float64Array(masses * columns);
  for (let m = 0; m < masses; m++) {
    const from = out + m * stride;
    const reached = memory.subarray(from + firstColumn, from + columns);
    completeness.set(reached, m * columns + firstColumn);
  }
  return completeness;
}

/** The phases of an even axis, at the beginning of the memory; null for an axis that is not. */
function phasesFor(
  law: EccentricityLaw,
  logAxis: Float64Array,
  stride: number,
): SeparationPhases | null {
  const axisStep = evenStep(logAxis);
  if (axisStep === null) return null;
  const key = lawKey(law);
  const isKnown =
    workspace.law === key &&
    workspace.firstLogAxis === logAxis[0] &&
    workspace.axisStep === axisStep &&
    workspace.stride === stride;
  if (isKnown) return workspace.phases;
  const phases = separationPhases(law, logAxis[0], axisStep, stride);
  kernelsHere().reserve(phases.planes.length).set(phases.planes);
  Object.assign(workspace, { law: key, firstLogAxis: logAxis[0], axisStep, stride, phases });
  return phases;
}

/** Names a law with its numbers: this is asked for every star. */
function lawKey(law: EccentricityLaw): string {
  if (law.law === 'beta') return `beta ${law.alpha} ${law.beta}`;
  if (law.law === 'fixed') return `fixed ${law.eccentricity}`;
  if (law.law === 'uniform') return `uniform ${law.max}`;
  return law.law === 'rayleigh' ? `rayleigh ${law.sigma}` : law.law;
}

/** First column, by blocks, whose largest separation reaches the curve's beginning. */
function firstReached(star: PreparedStar, law: EccentricityLaw, logAxis: Float64Array): number {
  const nearest = star.logDistance.reduce((a, b) => Math.min(a, b));
  const wanted =
    star.curves[0].logSeparation[0] + nearest - Math.log(largestSeparation(law)) - 1e-9;
  let j = 0;
  while (j < logAxis.length && logAxis[j] < wanted) j++;
  return Math.min(logAxis.length - 1, j) & -BLOCK;
}

/** Adds to each cell what lies at fainter limits: sums from the faintest cell down. */
function sumFromTop(
  memory: Float64Array,
  rows: number,
  below: number,
  range: CellRange,
  stride: number,
): void {
  for (let c = range.count - 1; c >= 0; c--) {
    const from = below + c * stride;
    // Cell c - 1 and the row under all cells stand one row lower than c.
    const to = rows + c * stride;
    const next = c === 0 ? from : from - stride;
    for (let j = 0; j < stride; j++) {
      const sum = memory[from + j];
      memory[to + j] += sum;
      memory[next + j] += sum;
    }
  }
}
