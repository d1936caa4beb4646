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

/**
 * Shortest interval that holds the given probability, in the rate itself (not in its logarithm).
 *
 * Starts at the lower edge where the density falls from there, ends at the upper edge where it
 * still rises there; otherwise both ends have the same density.
 *
 * @param level scalar [fraction], 0 < level < 1
 * @throws RangeError for a level outside (0, 1)
 * Edges: for a density that is high at both edges the shorter of the two one-sided intervals.
 * @source Box & Tiao 1973, Bayesian Inference in Statistical Analysis, section 2.8
 */
export function highestDensityInterval(posterior: RatePosterior, level: number): [number, number] {
  checkLevel(level);
  const [low, top] = posterior.support;
  const rest = 1 - level;
  const fromLow: [number, number] = [low, posterior.quantile(level)];
  const startsLow = posterior.density(low) >= posterior.density(fromLow[1]);
  const toTop: [number, number] = [posterior.quantile(rest), posterior.quantile(1)];
  const endsTop = posterior.density(top) >= posterior.density(toTop[0]);
  if (startsLow && endsTop) return fromLow[1] - low <= toTop[1] - toTop[0] ? fromLow : toTop;
  if (startsLow) return fromLow;
  if (endsTop) return toTop;
  const start = findRoot(
    (p) =>
      posterior.density(posterior.quantile(p)) - posterior.density(posterior.quantile(p + level)),
    0,
    rest,
    { absoluteTolerance: 1e-15, relativeTolerance: 1e-12 },
  );
  return [posterior.quantile(start), posterior.quantile(start + level)];
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
