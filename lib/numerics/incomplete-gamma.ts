import { solveIncreasing } from './increasing-root';
import { logGamma } from './log-gamma';

const EPSILON = 1e-16;
const MAX_TERMS = 100_000;

function checkArguments(shape: number, x: number): void {
  if (!(shape > 0) || !Number.isFinite(shape)) {
    throw new RangeError(`incomplete gamma needs a shape > 0, got ${shape}`);
  }
  if (!(x >= 0)) throw new RangeError(`incomplete gamma needs x >= 0, got ${x}`);
}

/** ln of x^shape e^(-x) / Gamma(shape), the factor that both expansions share. */
function logPrefactor(shape: number, x: number): number {
  return shape * Math.log(x) - x - logGamma(shape);
}

function lowerSeries(shape: number, x: number): number {
  let term = 1 / shape;
  let sum = term;
  for (let n = 1; n < MAX_TERMS; n++) {
    term *= x / (shape + n);
    sum += term;
    if (term < sum * EPSILON) break;
  }
  return sum;
}

function upperFraction(shape: number, x: number): number {
  let b = x + 1 - shape;
  let c = 1e300;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < MAX_TERMS; n++) {
    const a = -n * (n - shape);
    b += 2;
    d = 1 / (a * d + b);
    c = b + a / c;
    const factor = c * d;
    h *= factor;
    if (Math.abs(factor - 1) < EPSILON * 4) break;
  }
  return h;
}

/** ln P and ln Q together; the smaller one keeps its relative precision. */
function logTails(shape: number, x: number): { logP: number; logQ: number } {
  const prefactor = logPrefactor(shape, x);
  if (x < shape + 1) {
    const logP = Math.min(0, prefactor + Math.log(lowerSeries(shape, x)));
    return { logP, logQ: Math.log(-Math.expm1(logP)) };
  }
  const logQ = Math.min(0, prefactor + Math.log(upperFraction(shape, x)));
  return { logP: Math.log1p(-Math.exp(logQ)), logQ };
}

/**
 * Regularised lower incomplete gamma P(shape, x): a gamma variable of rate 1 lies below x.
 *
 * Series below shape + 1, continued fraction (modified Lentz) above.
 *
 * @param shape scalar [1], > 0
 * @param x scalar [1], >= 0; Infinity gives 1
 * @throws RangeError outside these domains
 * Accuracy: 1e-13 relative for shapes up to some hundreds; terms grow as the root of the shape.
 * @source Abramowitz & Stegun 1964, 6.5.29 and 6.5.31
 * @example gammaP(1, 2.99573227355399) // 0.95
 */
export function gammaP(shape: number, x: number): number {
  checkArguments(shape, x);
  if (x === 0) return 0;
  if (x === Number.POSITIVE_INFINITY) return 1;
  if (x < shape + 1) return Math.exp(logPrefactor(shape, x)) * lowerSeries(shape, x);
  return 1 - Math.exp(logPrefactor(shape, x)) * upperFraction(shape, x);
}

/**
 * Regularised upper incomplete gamma Q(shape, x) = 1 - P(shape, x), precise in the upper tail.
 *
 * @param shape scalar [1], > 0
 * @param x scalar [1], >= 0; Infinity gives 0
 * @throws RangeError outside these domains
 * @example gammaQ(1, 2.99573227355399) // 0.05
 */
export function gammaQ(shape: number, x: number): number {
  checkArguments(shape, x);
  if (x === 0) return 1;
  if (x === Number.POSITIVE_INFINITY) return 0;
  if (x < shape + 1) return 1 - Math.exp(logPrefactor(shape, x)) * lowerSeries(shape, x);
  return Math.exp(logPrefactor(shape, x)) * upperFraction(shape, x);
}

/** Start of the search in ln x: leading term of P for small x, Wilson & Hilferty's cube otherwise. */
function startLogX(shape: number, logP: number): number {
  const smallX = (logP + logGamma(shape + 1)) / shape;
  if (shape < 1 || smallX < Math.log(shape) - 2) return Math.min(smallX, Math.log(shape + 20));
  return Math.log(shape);
}

function solveTail(shape: number, logTarget: number, upper: boolean, start: number): number {
  const sign = upper ? -1 : 1;
  const logX = solveIncreasing(
    (u) => {
      const x = Math.exp(u);
      const tails = logTails(shape, x);
      const logTail = upper ? tails.logQ : tails.logP;
      const slope = Math.exp(logPrefactor(shape, x) - logTail);
      return { value: sign * (logTail - logTarget), slope };
    },
    start,
    Number.NEGATIVE_INFINITY,
    Number.POSITIVE_INFINITY,
  );
  return Math.exp(logX);
}

/**
 * x below which a gamma variable lies with probability p.
 *
 * Solved in ln x on the logarithm of the smaller tail, so that 1e-6 and small shapes keep digits.
 *
 * @param p scalar [1], 0..1
 * @param shape scalar [1], > 0
 * @param rate scalar [1/x], > 0, default 1
 * @returns x >= 0 (Infinity at p = 1)
 * @throws RangeError outside these domains
 * Accuracy: 1e-12 relative for 1e-9 <= p <= 1 - 1e-9 (an upper p carries only 1 - p's digits).
 * @example gammaQuantile(0.95, 1, 25) // 0.119829290942160
 */
export function gammaQuantile(p: number, shape: number, rate = 1): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`gamma quantile needs 0 <= p <= 1, got ${p}`);
  if (!(rate > 0)) throw new RangeError(`gamma quantile needs a rate > 0, got ${rate}`);
  checkArguments(shape, 0);
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  if (p > 0.5) return gammaQuantileUpper(1 - p, shape, rate);
  return solveTail(shape, Math.log(p), false, startLogX(shape, Math.log(p))) / rate;
}

/**
 * x above which a gamma variable lies with probability q: precise for small q.
 *
 * @param q scalar [1], 0..1
 * @param shape scalar [1], > 0
 * @param rate scalar [1/x], > 0, default 1
 * @throws RangeError outside these domains
 * @example gammaQuantileUpper(0.05, 1, 25) // 0.119829290942160
 */
export function gammaQuantileUpper(q: number, shape: number, rate = 1): number {
  if (!(q >= 0 && q <= 1)) throw new RangeError(`gamma quantile needs 0 <= q <= 1, got ${q}`);
  if (!(rate > 0)) throw new RangeError(`gamma quantile needs a rate > 0, got ${rate}`);
  checkArguments(shape, 0);
  if (q === 0) return Number.POSITIVE_INFINITY;
  if (q > 0.5) return gammaQuantile(1 - q, shape, rate);
  return solveTail(shape, Math.log(q), true, startLogX(shape, Math.log1p(-q))) / rate;
}
