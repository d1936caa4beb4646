import { detectionProbability } from './contrast';

/** p(x) of the smooth threshold, x = limit - magnitude in mag, on equal steps. */
export interface ThresholdTable {
  /** Beyond this x a companion is certain to be found. */
  certainAt: number;
  probability(x: number): number;
}

/** p is Φ(-n) to nine digits below it. */
const START_MAG = -15;
/** z at which Φ is 1 to the last bit. */
const CERTAIN_SIGMAS = 8;
const STEP_TIMES_SIGMA = 0.01;
const WIDEST_STEP_MAG = 0.002;
/** Beyond n = 100 the threshold is narrower than any curve is known. */
const NARROWEST_STEP_MAG = 1e-4;

const tables = new Map<number, ThresholdTable>();

/**
 * Table of the smooth threshold Φ(n (10^(0.4 x) - 1)) for one n, built once and kept.
 *
 * @param nSigma n, > 0
 * Accuracy: 3e-6 in p.
 */
export function thresholdTable(nSigma: number): ThresholdTable {
  const known = tables.get(nSigma);
  if (known) return known;
  const certainAt = 2.5 * Math.log10(1 + CERTAIN_SIGMAS / nSigma);
  const wanted = Math.min(WIDEST_STEP_MAG, STEP_TIMES_SIGMA / nSigma);
  const steps = Math.ceil((certainAt - START_MAG) / Math.max(NARROWEST_STEP_MAG, wanted));
  const step = (certainAt - START_MAG) / steps;
  const p = new Float64Array(steps + 1);
  for (let i = 0; i <= steps; i++) {
    p[i] = detectionProbability(START_MAG + i * step, 0, nSigma, 'smooth');
  }
  const floor = p[0];
  const perStep = 1 / step;
  const table: ThresholdTable = {
    certainAt,
    probability: (x) => {
      const place = (x - START_MAG) * perStep;
      if (!(place > 0)) return floor;
      if (place >= steps) return 1;
      const i = place | 0;
      return p[i] + (p[i + 1] - p[i]) * (place - i);
    },
  };
  if (tables.size >= 16) tables.clear();
  tables.set(nSigma, table);
  return table;
}
