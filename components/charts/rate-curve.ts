import type { RatePosterior } from '@/lib/inference';

/** A posterior as points: what a chart draws and an answer of the server carries. */
export interface RateCurve {
  /** Increasing, shape [point]: fraction of stars, or companions per star. */
  rate: Float64Array;
  density: Float64Array;
  /** 0 to 1. */
  cumulative: Float64Array;
}

/**
 * End of the rate axis: a little over twice the largest limit, and never beyond the support.
 *
 * @param limits the limits that stand on the axis
 * @param supportMax largest possible rate; Infinity where there is none
 */
export function rateAxisMax(limits: number[], supportMax: number): number {
  return Math.min(2.06 * Math.max(...limits), supportMax);
}

/**
 * Density and cumulative probability at points that lie closer together near zero.
 *
 * @param max largest rate, > 0
 * @param points number of points, at least 2
 */
export function sampleRateCurve(posterior: RatePosterior, max: number, points = 321): RateCurve {
  const rate = Float64Array.from({ length: points }, (_, i) => max * (i / (points - 1)) ** 1.6);
  const low = posterior.support[0];
  // A density may be infinite at the very end of its support: the first point stands just inside.
  rate[0] = Math.max(low, rate[1] * 1e-3);
  return {
    rate,
    density: rate.map((x) => (x < low ? 0 : posterior.density(x))),
    cumulative: rate.map((x) => (x < low ? 0 : posterior.cumulative(x))),
  };
}

/** The prior at the points of a curve, shape [point]; NaN where it has no density. */
export function samplePrior(posterior: RatePosterior, rate: Float64Array): Float64Array {
  return rate.map((x) => posterior.priorDensity(x));
}
