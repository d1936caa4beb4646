import { gammaQ, gammaQuantileUpper } from '@/lib/numerics/special';
import type { RateLikelihood } from './poisson';

/**
 * Poisson likelihood of the mean number where b false detections are expected among those counted,
 * (F S + b)^n exp(-F S).
 *
 * @param exposure S, scalar [stars], >= 0
 * @param count n, integer >= 0: companions and false detections together
 * @param background b, scalar [detections], > 0
 * @source Kraft, Burrows & Nousek 1991, ApJ 374, 344
 */
export function backgroundLikelihood(
  exposure: number,
  count: number,
  background: number,
): RateLikelihood {
  return {
    powerOfRate: 0,
    powerOfComplement: 0,
    logRegular: (x) => count * Math.log(x * exposure + background) - x * exposure,
    decay: exposure,
    growth: count,
  };
}

/**
 * Upper limit on the mean number above a known background, flat prior without an end.
 *
 * Q(n + 1, F S + b) = (1 - level) Q(n + 1, b), Q the regularised upper incomplete gamma.
 *
 * @param count n, integer >= 0
 * @param background b, scalar [detections], >= 0
 * @param exposure S, scalar [stars], > 0
 * @param credibleLevel scalar [fraction], 0 < level < 1
 * @throws RangeError for arguments outside their domains
 * @source Kraft, Burrows & Nousek 1991, ApJ 374, 344
 * @example backgroundUpperLimit(2, 1.1, 25, 0.95) // 0.213552675324889
 */
export function backgroundUpperLimit(
  count: number,
  background: number,
  exposure: number,
  credibleLevel: number,
): number {
  if (!(Number.isInteger(count) && count >= 0)) {
    throw new RangeError(`a count must be a whole number >= 0, got ${count}`);
  }
  if (!(background >= 0) || !(exposure > 0)) {
    throw new RangeError(
      `background must be >= 0 and exposure > 0, got ${background} and ${exposure}`,
    );
  }
  if (!(credibleLevel > 0 && credibleLevel < 1)) {
    throw new RangeError(`a credible level lies between 0 and 1, got ${credibleLevel}`);
  }
  const tail = (1 - credibleLevel) * gammaQ(count + 1, background);
  return Math.max(0, gammaQuantileUpper(tail, count + 1) - background) / exposure;
}
