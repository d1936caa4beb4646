import type { RatePosterior } from './contract';

/** A posterior tabulated for drawing; all arrays of one length, values increasing. */
export interface PosteriorCurve {
  /** Rate [planets per star, or fraction of stars]. */
  value: Float64Array;
  /** Posterior density per unit of the rate. */
  density: Float64Array;
  /** Posterior probability below the value, 0..1. */
  cumulative: Float64Array;
  /** Prior density per unit of the rate; NaN for an improper prior. */
  priorDensity: Float64Array;
}

/** Probability above the drawn range, and how much room is left beside it. */
const TAIL = 0.001;
const ROOM = 1.08;

/**
 * Range worth drawing: from the lower edge of the support to a little past the 99.9 % point.
 *
 * Starts further up only where the posterior has left the lower edge far behind.
 *
 * @returns [from, to] inside the support
 */
export function displayRange(posterior: RatePosterior): [number, number] {
  const [low, top] = posterior.support;
  const high = posterior.quantile(1 - TAIL);
  const to = Math.min(top, low + (high - low) * ROOM);
  const start = posterior.quantile(TAIL);
  const isFarUp = start - low > 0.5 * (to - low);
  return [isFarUp ? Math.max(low, start - (ROOM - 1) * (to - start)) : low, to];
}

/**
 * Tabulates a posterior on n equally spaced values.
 *
 * A density that is infinite at the lower edge (Jeffreys) is drawn from a quarter step inside it,
 * and one that is infinite at the upper edge to a quarter step before it.
 *
 * @param n number of points, integer >= 2
 * @param range [from, to] in the rate; default `displayRange`, so that two posteriors can share one
 * @throws RangeError for fewer than 2 points or a range that is not increasing
 * Cost: one likelihood a point.
 */
export function posteriorCurve(
  posterior: RatePosterior,
  n = 400,
  range: [number, number] = displayRange(posterior),
): PosteriorCurve {
  if (!Number.isInteger(n) || n < 2) throw new RangeError(`a curve needs 2 points, got ${n}`);
  const [from, to] = range;
  if (!(to > from) || !Number.isFinite(to - from)) {
    throw new RangeError(`the range of a curve must increase, got ${from} to ${to}`);
  }
  const step = (to - from) / (n - 1);
  const value = Float64Array.from({ length: n }, (_, i) => (i === n - 1 ? to : from + i * step));
  if (!Number.isFinite(posterior.density(from))) value[0] = from + 0.25 * step;
  if (!Number.isFinite(posterior.density(to))) value[n - 1] = to - 0.25 * step;
  return {
    value,
    density: value.map((x) => posterior.density(x)),
    cumulative: value.map((x) => posterior.cumulative(x)),
    priorDensity: value.map((x) => finite(posterior.priorDensity(x))),
  };
}

/** An infinite prior density cannot be drawn: it is left out. */
function finite(density: number): number {
  return density === Number.POSITIVE_INFINITY ? Number.NaN : density;
}
