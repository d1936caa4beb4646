import { detectionProbability } from './contrast';

/** p(x) of the smooth threshold, x = limit - magnitude in mag, on equal steps. */
export interface ThresholdTable {
  /** Beyond this x a companion is certain to be found. */
  certainAt: number;
  probability(x: number): number;
}

/** The same with its numbers: node i is p at START_MAG + i · step, shape [steps + 1]. */
export interface TabulatedThreshold extends ThresholdTable {
  values: Float64Array;
  perStep: number;
}

/** p is Φ(-n) to nine digits below it. */
export const START_MAG = -15;
/** z at which Φ is 1 to the last bit. */
const CERTAIN_SIGMAS = 8;
const STEP_TIMES_SIGMA = 0.01;
const WIDEST_STEP_MAG = 0.002;
/** Beyond n = 100 the threshold is narrower than any curve is known. */
const NARROWEST_STEP_MAG = 1e-4;

const tables = new Map<number, TabulatedThreshold>();

/** The table's nodes: number of steps and their width. */
function tableSteps(nSigma: number): { certainAt: number; steps: number; step: number } {
  const certainAt = 2.5 * Math.log10(1 + CERTAIN_SIGMAS / nSigma);
  const wanted = Math.min(WIDEST_STEP_MAG, STEP_TIMES_SIGMA / nSigma);
  const steps = Math.ceil((certainAt - START_MAG) / Math.max(NARROWEST_STEP_MAG, wanted));
  return { certainAt, steps, step: (certainAt - START_MAG) / steps };
}

/** p on the straight lines between nodes, whose values a function gives. */
function betweenNodes(
  steps: number,
  step: number,
  valueAt: (node: number) => number,
): (x: number) => number {
  const perStep = 1 / step;
  const floor = valueAt(0);
  return (x) => {
    const place = (x - START_MAG) * perStep;
    if (!(place > 0)) return floor;
    if (place >= steps) return 1;
    const i = place | 0;
    const value = valueAt(i);
    return value + (valueAt(i + 1) - value) * (place - i);
  };
}

/**
 * Table of the smooth threshold Φ(n (10^(0.4 x) - 1)) for one n, built once and kept.
 *
 * @param nSigma n, > 0
 * Accuracy: 3e-6 in p.
 */
export function thresholdTable(nSigma: number): TabulatedThreshold {
  const known = tables.get(nSigma);
  if (known) return known;
  const { certainAt, steps, step } = tableSteps(nSigma);
  const p = new Float64Array(steps + 1);
  for (let i = 0; i <= steps; i++) {
    p[i] = detectionProbability(START_MAG + i * step, 0, nSigma, 'smooth');
  }
  const table = {
    certainAt,
    probability: betweenNodes(steps, step, (i) => p[i]),
    values: p,
    perStep: 1 / step,
  };
  if (tables.size >= 16) tables.clear();
  tables.set(nSigma, table);
  return table;
}

/**
 * The same numbers without a table, for whoever asks for few of them.
 *
 * @param nSigma n, > 0
 * Cost: two evaluations of Φ a value; a table costs some thousand once.
 */
export function sparseThreshold(nSigma: number): ThresholdTable {
  const { certainAt, steps, step } = tableSteps(nSigma);
  const valueAt = (i: number) => detectionProbability(START_MAG + i * step, 0, nSigma, 'smooth');
  return { certainAt, probability: betweenNodes(steps, step, valueAt) };
}
