import { gammaQ } from './incomplete-gamma';

export { betaQuantile, regularisedBeta } from './incomplete-beta';
export { gammaP, gammaQ, gammaQuantile, gammaQuantileUpper } from './incomplete-gamma';
export { logBeta, logGamma } from './log-gamma';

const EULER_GAMMA = 0.5772156649015329;
const SQRT_2PI = Math.sqrt(2 * Math.PI);

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

/** Density of the standard normal at z [1]. */
export function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z) / SQRT_2PI;
}

/**
 * Probability that a standard normal lies below z.
 *
 * @param z scalar [1]
 * @returns 0..1, with full relative precision in the lower tail down to z = -37
 * @example normalCumulative(-5) // 2.86651571879194e-7
 */
export function normalCumulative(z: number): number {
  if (z === 0) return 0.5;
  const tail = 0.5 * gammaQ(0.5, 0.5 * z * z);
  return z < 0 ? tail : 1 - tail;
}

/**
 * z below which a standard normal lies with probability p.
 *
 * @param p scalar [1], 0 < p < 1
 * @throws RangeError outside (0, 1)
 * Accuracy: 1e-14 relative in the lower tail, limited by 1 - p in the upper one.
 * @source start value: Abramowitz & Stegun 1964, 26.2.23; then Halley steps
 * @example normalQuantile(0.05) // -1.64485362695147
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`normal quantile needs 0 < p < 1, got ${p}`);
  if (p === 0.5) return 0;
  const lower = Math.min(p, 1 - p);
  const t = Math.sqrt(-2 * Math.log(lower));
  let z =
    (2.515517 + t * (0.802853 + t * 0.010328)) /
      (1 + t * (1.432788 + t * (0.189269 + t * 0.001308))) -
    t;
  for (let step = 0; step < 3; step++) {
    const newton = (normalCumulative(z) - lower) / normalDensity(z);
    z -= newton / (1 + 0.5 * z * newton);
  }
  return p < 0.5 ? z : -z;
}
