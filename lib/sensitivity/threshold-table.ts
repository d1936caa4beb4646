import { detectionProbability } from './contrast';

/** p(x) of the smooth threshold and ∫ p dx, x = limit - magnitude in mag, on equal steps. */
export interface ThresholdTable {
  /** p below the table: Φ(-n), the chance of a false positive. */
  floor: number;
  /** Beyond this x a companion is certain to be found. */
  certainAt: number;
  probability(x: number): number;
  /** ∫ p dx from the table's start; negative below it. */
  integral(x: number): number;
}

/** p is Φ(-n) to nine digits below it. */
const START_MAG = -15;
/** z at which Φ is 1 to the last bit. */
const CERTAIN_SIGMAS = 8;
const STEP_TIMES_SIGMA = 0.01;

const tables = new Map<number, ThresholdTable>();

/**
 * Table of the smooth threshold Φ(n (10^(0.4 x) - 1)) for one n, built once and kept.
 *
 * @param nSigma n, > 0
 * Accuracy: 3e-6 in p; the integral is exact for the straight lines between nodes.
 */
export function thresholdTable(nSigma: number): ThresholdTable {
  const known = tables.get(nSigma);
  if (known) return known;
  const certainAt = 2.5 * Math.log10(1 + CERTAIN_SIGMAS / nSigma);
  const steps = Math.ceil((certainAt - START_MAG) / Math.min(0.002, STEP_TIMES_SIGMA / nSigma));
  const step = (certainAt - START_MAG) / steps;
  const p = new Float64Array(steps + 1);
  const sum = new Float64Array(steps + 1);
  for (let i = 0; i <= steps; i++) {
    p[i] = detectionProbability(START_MAG + i * step, 0, nSigma, 'smooth');
    if (i > 0) sum[i] = sum[i - 1] + 0.5 * step * (p[i - 1] + p[i]);
  }
  const [floor, top] = [p[0], sum[steps]];
  const table: ThresholdTable = {
    floor,
    certainAt,
    probability: (x) => {
      const place = (x - START_MAG) / step;
      if (!(place > 0)) return floor;
      if (place >= steps) return 1;
      const i = place | 0;
      return p[i] + (p[i + 1] - p[i]) * (place - i);
    },
    integral: (x) => {
      const place = (x - START_MAG) / step;
      if (!(place > 0)) return floor * (x - START_MAG);
      if (place >= steps) return top + x - certainAt;
      const i = place | 0;
      const t = place - i;
      return sum[i] + step * t * (p[i] + 0.5 * t * (p[i + 1] - p[i]));
    },
  };
  if (tables.size >= 16) tables.clear();
  tables.set(nSigma, table);
  return table;
}
