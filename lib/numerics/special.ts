export { betaQuantile, regularisedBeta } from './incomplete-beta';
export { gammaP, gammaQ, gammaQuantile, gammaQuantileUpper } from './incomplete-gamma';
export { logBeta, logGamma } from './log-gamma';

const EULER_GAMMA = 0.5772156649015329;

/**
 * Exponential integral E1(x), the integral of e^(-t)/t from x to infinity.
 *
 * Power series up to 1, continued fraction (modified Lentz) above.
 *
 * @param x scalar [1], > 0
 * @returns E1(x) > 0; underflows to 0 beyond about 740
 * @throws RangeError for x <= 0, where E1 diverges or is complex
 * Accuracy: 1e-14 relative.
 * @source Abramowitz & Stegun 1964, 5.1.11 and 5.1.22
 * @example exponentialIntegral(1) // 0.219383934395520
 */
export function exponentialIntegral(x: number): number {
  if (!(x > 0)) throw new RangeError(`E1 needs x > 0, got ${x}`);
  if (x <= 1) {
    let term = 1;
    let sum = 0;
    for (let n = 1; n < 40; n++) {
      term *= -x / n;
      sum -= term / n;
      if (Math.abs(term) < 1e-18 * Math.abs(sum)) break;
    }
    return -EULER_GAMMA - Math.log(x) + sum;
  }
  let b = x + 1;
  let c = 1e300;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < 500; n++) {
    const a = -n * n;
    b += 2;
    d = 1 / (a * d + b);
    c = b + a / c;
    const factor = c * d;
    h *= factor;
    if (Math.abs(factor - 1) < 1e-16) break;
  }
  return h * Math.exp(-x);
}

/**
 * Integral of x^index d ln x from `from` to `to`: (to^index - from^index)/index, or ln(to/from) at 0.
 *
 * Written as from^index L expm1(index L)/(index L) with L = ln(to/from), which keeps its digits
 * when the index is near 0.
 *
 * @param index scalar [1], any finite number
 * @param from lower end, > 0
 * @param to upper end, same unit, >= from
 * @throws RangeError for ends that are not positive and in order
 * Accuracy: 1e-15 relative near index 0.
 * @example powerLawIntegral(-0.31, 0.3, 10) // 3.10529618585352
 */
export function powerLawIntegral(index: number, from: number, to: number): number {
  if (!(from > 0) || !(to >= from)) {
    throw new RangeError(`integral of a power law needs 0 < from <= to, got ${from} to ${to}`);
  }
  const logRatio = Math.log(to / from);
  const product = index * logRatio;
  const quotient = Math.abs(product) < 1e-12 ? 1 + product / 2 : Math.expm1(product) / product;
  return from ** index * logRatio * quotient;
}
