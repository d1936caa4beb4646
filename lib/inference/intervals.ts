import { findRoot } from '@/lib/numerics/roots';
import type { RatePosterior } from './contract';

/** A limit within this factor of level times the prior's upper end is set by the prior. */
const SET_BY_PRIOR = 0.9;

function checkLevel(level: number): void {
  if (!(level > 0 && level < 1)) {
    throw new RangeError(`a credible level lies between 0 and 1 (0.95, not 95), got ${level}`);
  }
}

/**
 * Upper limit: the rate lies below it with the given posterior probability.
 *
 * @param credibleLevel scalar [fraction], 0 < level < 1
 * @returns planets per star, or fraction of stars
 * @throws RangeError for a level outside (0, 1)
 * Edges: where `posterior.constrained` is false this is the prior's own quantile, which must be
 *   labelled as such.
 * @example upperLimit(posterior, 0.95) // 0.119829290931605 for S = 25, k = 0, uniform to 1
 */
export function upperLimit(posterior: RatePosterior, credibleLevel: number): number {
  checkLevel(credibleLevel);
  return posterior.quantile(credibleLevel);
}

/**
 * Interval that leaves equal probability on each side.
 *
 * @param level scalar [fraction], 0 < level < 1
 * @throws RangeError for a level outside (0, 1)
 */
export function equalTailedInterval(posterior: RatePosterior, level: number): [number, number] {
  checkLevel(level);
  return [posterior.quantile(0.5 * (1 - level)), posterior.quantile(0.5 * (1 + level))];
}

/** Places tried before the shortest interval is polished. */
const TRIALS = 64;

/**
 * Shortest interval that holds the given probability, in the rate itself (not in its logarithm).
 *
 * Starts at the lower edge where the density falls from there, ends at the upper edge where it
 * still rises there; otherwise both ends have the same density. One interval, also for a density
 * with two peaks.
 *
 * @param level scalar [fraction], 0 < level < 1
 * @throws RangeError for a level outside (0, 1)
 * Cost: about 150 quantiles.
 * @source Box & Tiao 1973, Bayesian Inference in Statistical Analysis, section 2.8
 */
export function highestDensityInterval(posterior: RatePosterior, level: number): [number, number] {
  checkLevel(level);
  const rest = 1 - level;
  const startOf = (trial: number) => (trial === TRIALS ? rest : (trial * rest) / TRIALS);
  const endOf = (start: number) => (start === rest ? 1 : start + level);
  const ends = (start: number): [number, number] => [
    posterior.quantile(start),
    posterior.quantile(endOf(start)),
  ];
  let best = 0;
  let shortest = Number.POSITIVE_INFINITY;
  for (let trial = 0; trial <= TRIALS; trial++) {
    const [low, high] = ends(startOf(trial));
    // A flat density gives equal lengths up to rounding: the first, at the lower edge, stays.
    if (high - low < shortest * (1 - 1e-12)) {
      best = trial;
      shortest = high - low;
    }
  }
  /** Negative where moving up shortens the interval. */
  const slope = (start: number) => {
    const [low, high] = ends(start);
    return posterior.density(low) - posterior.density(high);
  };
  const left = startOf(Math.max(0, best - 1));
  const right = startOf(Math.min(TRIALS, best + 1));
  if (!(slope(left) < 0 && slope(right) > 0)) return ends(startOf(best));
  return ends(findRoot(slope, left, right, { absoluteTolerance: 1e-15, relativeTolerance: 1e-12 }));
}

/**
 * Whether a limit says more about the prior than about the data.
 *
 * True when the limit is not at least 10 % below level times the prior's upper end, and when the
 * data constrain nothing. A prior without an upper end is judged by the second rule alone.
 *
 * @param level scalar [fraction], 0 < level < 1
 */
export function isSetByPrior(posterior: RatePosterior, level: number): boolean {
  if (!posterior.constrained) return true;
  const end = posterior.support[1];
  return Number.isFinite(end) && upperLimit(posterior, level) > SET_BY_PRIOR * level * end;
}
