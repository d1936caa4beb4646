import { largestSeparation } from './orbits';
import { separationTable } from './separation-table';
import type { EccentricityLaw } from './types';

/** Equal steps of ln a differ from each other by no more than this share. */
const EVEN_STEP = 1e-9;
/** Columns beyond the largest separation that still have a place in the table. */
const COLUMNS_BEYOND = 48;
/** Widest step of the table in y, where the rows' step allows. */
const WIDEST_STEP = 1.2e-3;

/**
 * F and its antiderivatives as rows: for axes of equal step Δ in ln a, all columns of a row stand at
 * the same phase between multiples of Δ, so a row is one contiguous slice of four planes.
 *
 * Node i, counted down from the top, is at y = top - i Δ/phases; plane p holds node n · phases + p
 * at [p][n + beyond].
 */
export interface SeparationPhases {
  /** ln a of the first column and the step between columns. */
  firstLogAxis: number;
  axisStep: number;
  phases: number;
  /** Step between nodes. */
  step: number;
  /** Largest y - ln a at which F is below 1. */
  top: number;
  /** Slices begin at most so many columns before the top. */
  beyond: number;
  /** Columns of a phase, and doubles of a plane. */
  width: number;
  planeSize: number;
  /** Drop of F to the node below; F; G; G2: one plane after another. */
  planes: Float64Array;
}

/** Step of an axis that is even in ln a, or null. */
export function evenStep(logAxis: Float64Array): number | null {
  const last = logAxis.length - 1;
  if (last < 1) return null;
  const step = (logAxis[last] - logAxis[0]) / last;
  for (let j = 1; j < last; j++) {
    if (Math.abs(logAxis[j] - (logAxis[0] + j * step)) > EVEN_STEP * step * last) return null;
  }
  return step;
}

/**
 * The phases of a law for an axis.
 *
 * @param law eccentricity law
 * @param firstLogAxis ln a of the first column
 * @param axisStep step of ln a, > 0
 * @param columns columns of a row, with whatever is read beyond them
 * @throws RangeError for parameters outside their domain
 */
export function separationPhases(
  law: EccentricityLaw,
  firstLogAxis: number,
  axisStep: number,
  columns: number,
): SeparationPhases {
  const table = separationTable(law);
  const top = Math.log(largestSeparation(law));
  const phases = Math.max(1, Math.ceil(axisStep / WIDEST_STEP));
  const step = axisStep / phases;
  const bottom = Math.ceil((top - table.start) / axisStep) + 1;
  const beyond = columns + COLUMNS_BEYOND;
  const width = beyond + bottom + columns + 1;
  const planeSize = phases * width;
  const planes = new Float64Array(4 * planeSize);
  const cumulativeAt = (y: number) => {
    const place = (y - table.start) / table.step;
    if (!(place > 0)) return 0;
    const i = Math.floor(place);
    if (i >= table.cumulative.length - 1) return 1;
    return table.cumulative[i] + (place - i) * (table.cumulative[i + 1] - table.cumulative[i]);
  };
  let [value, first, second] = [0, 0, 0];
  // Up from the bottom, so that the antiderivatives begin at 0.
  for (let node = bottom * phases; node > -beyond * phases; node--) {
    const next = node <= 1 ? 1 : cumulativeAt(top - (node - 1) * step);
    const rise = next - value;
    second += step * (first + step * (0.5 * value + rise / 6));
    first += step * (value + 0.5 * rise);
    value = next;
    const index = node - 1;
    const phase = ((index % phases) + phases) % phases;
    const at = phase * width + (index - phase) / phases + beyond;
    planes[at] = rise;
    planes[planeSize + at] = value;
    planes[2 * planeSize + at] = first;
    planes[3 * planeSize + at] = second;
  }
  return { firstLogAxis, axisStep, phases, step, top, beyond, width, planeSize, planes };
}
