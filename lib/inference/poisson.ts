/**
 * Likelihood of the rate as the posterior needs it, up to the shape factors of the detections:
 * x^powerOfRate (1 - x)^powerOfComplement exp(logRegular(x)).
 */
export interface RateLikelihood {
  /** k, the number of detections that count. */
  powerOfRate: number;
  /** Stars without a detection that would certainly have shown a companion. */
  powerOfComplement: number;
  /** The complement 1 - x comes along, because near 1 x itself has lost it. */
  logRegular(x: number, complement: number): number;
  /** Rate of the exponential decay [stars]; 0 where the rate ends at 1. */
  decay: number;
  /** Power of the rate far out, beyond `powerOfRate`; absent: none. */
  growth?: number;
}

/**
 * Poisson likelihood of the mean number of companions per star, F^k exp(-F S).
 *
 * @param exposure S, scalar [stars], >= 0
 * @param detections k, integer >= 0
 */
export function poissonLikelihood(exposure: number, detections: number): RateLikelihood {
  return {
    powerOfRate: detections,
    powerOfComplement: 0,
    logRegular: (x) => -x * exposure,
    decay: exposure,
  };
}
