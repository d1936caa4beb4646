import { betaQuantile } from './incomplete-beta';

/**
 * t above which a Student variable lies with probability p.
 *
 * With x the Beta(ν/2, 1/2) quantile of 2p, t² = ν (1 - x)/x; near the median the mirrored quantile
 * keeps the digits of 1 - x.
 *
 * @param p upper-tail probability, above 0 and below 1
 * @param freedom ν, degrees of freedom, > 0, not necessarily whole
 * @returns t, negative for p > 1/2
 * @throws RangeError outside these domains
 * Accuracy: 1e-10 relative for 1e-9 <= p <= 0.45 and 1 <= ν <= 3000.
 * @source Abramowitz & Stegun 1964, 26.7.1
 * @example studentQuantileUpper(0.025, 5) // 2.570582
 */
export function studentQuantileUpper(p: number, freedom: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`p must be above 0 and below 1, got ${p}`);
  if (!(freedom > 0 && Number.isFinite(freedom))) {
    throw new RangeError(`freedom must be finite and > 0, got ${freedom}`);
  }
  if (p === 0.5) return 0;
  if (p > 0.5) return -studentQuantileUpper(1 - p, freedom);
  if (p > 0.1) {
    const y = betaQuantile(1 - 2 * p, 0.5, 0.5 * freedom);
    return Math.sqrt((freedom * y) / (1 - y));
  }
  const x = betaQuantile(2 * p, 0.5 * freedom, 0.5);
  return Math.sqrt((freedom * (1 - x)) / x);
}
