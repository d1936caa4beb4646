import { detectionProbability } from './contrast';

/** p(x) of the smooth threshold and ∫ p dx, x = limit - magnitude in mag, on equal steps. */
export interface ThresholdTable {
  /** Beyond this x a companion is certain to be found. */
  certainAt: number;
  probability(x: number): number;
  /**
   * Adds weight · p and weight · ∫ p dx at every level for one magnitude.
   *
   * @param levels limits, increasing, shape [level], [mag], not modified
   * @param magnitude of the companion, [mag], finite
   * @param weight factor
   * @param chance added to in place, shape [level]
   * @param area added to in place, shape [level]; the integral's constant is the same at all levels
   */
  addLevels(
    levels: Float64Array,
    magnitude: number,
    weight: number,
    chance: Float64Array,
    area: Float64Array,
  ): void;
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
 * Accuracy: 3e-6 in p; the integral is exact for the straight lines between nodes.
 */
export function thresholdTable(nSigma: number): ThresholdTable {
  const known = tables.get(nSigma);
  if (known) return known;
  const certainAt = 2.5 * Math.log10(1 + CERTAIN_SIGMAS / nSigma);
  const wanted = Math.min(WIDEST_STEP_MAG, STEP_TIMES_SIGMA / nSigma);
  const steps = Math.ceil((certainAt - START_MAG) / Math.max(NARROWEST_STEP_MAG, wanted));
  const step = (certainAt - START_MAG) / steps;
  const p = new Float64Array(steps + 1);
  const sum = new Float64Array(steps + 1);
  for (let i = 0; i <= steps; i++) {
    p[i] = detectionProbability(START_MAG + i * step, 0, nSigma, 'smooth');
    if (i > 0) sum[i] = sum[i - 1] + 0.5 * step * (p[i - 1] + p[i]);
  }
  const [floor, top] = [p[0], sum[steps]];
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
    addLevels: (levels, magnitude, weight, chance, area) => {
      for (let e = 0; e < levels.length; e++) {
        const x = levels[e] - magnitude;
        const place = (x - START_MAG) * perStep;
        if (place <= 0) {
          chance[e] += weight * floor;
          area[e] += weight * floor * (x - START_MAG);
        } else if (place >= steps) {
          chance[e] += weight;
          area[e] += weight * (top + x - certainAt);
        } else {
          const i = place | 0;
          const t = place - i;
          const rise = t * (p[i + 1] - p[i]);
          chance[e] += weight * (p[i] + rise);
          area[e] += weight * (sum[i] + step * t * (p[i] + 0.5 * rise));
        }
      }
    },
  };
  if (tables.size >= 16) tables.clear();
  tables.set(nSigma, table);
  return table;
}
