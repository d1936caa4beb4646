export interface RootOptions {
  /** Half-width of the answer, absolute; default 0: as close as the numbers allow. */
  absoluteTolerance?: number;
  /** Half-width relative to the answer; default 4e-16. */
  relativeTolerance?: number;
  /** Most evaluations; default 2000: enough to halve down to the smallest number. */
  maxEvaluations?: number;
}

/**
 * Root of a continuous function between two points where it has opposite signs (Brent's method).
 *
 * @param f the function
 * @param a one end
 * @param b other end; f(a) and f(b) must differ in sign, or one of them be 0
 * @returns x with a sign change within the tolerance
 * @throws RangeError for equal signs, for a value that is not a number, and when the evaluations
 *   run out: an unfinished answer is not returned
 * @source Brent 1973, Algorithms for Minimization without Derivatives, chapter 4
 * @example findRoot((x) => x * x - 2, 0, 2) // 1.41421356…
 */
export function findRoot(
  f: (x: number) => number,
  a: number,
  b: number,
  options: RootOptions = {},
): number {
  const { absoluteTolerance = 0, relativeTolerance = 4e-16, maxEvaluations = 2000 } = options;
  let [x0, x1] = [a, b];
  let f0 = f(x0);
  let f1 = f(x1);
  if (f0 === 0) return x0;
  if (f1 === 0) return x1;
  if (!(f0 * f1 < 0)) {
    throw new RangeError(`f must change sign between ${a} and ${b}, got ${f0} and ${f1}`);
  }
  let [x2, f2] = [x0, f0];
  let step = x1 - x0;
  let lastStep = step;
  for (let count = 2; count < maxEvaluations; count++) {
    if (f1 * f2 > 0) {
      [x2, f2] = [x0, f0];
      step = x1 - x0;
      lastStep = step;
    }
    if (Math.abs(f2) < Math.abs(f1)) {
      [x0, x1, x2] = [x1, x2, x1];
      [f0, f1, f2] = [f1, f2, f1];
    }
    const tolerance = relativeTolerance * Math.abs(x1) + 0.5 * absoluteTolerance + 5e-324;
    const half = 0.5 * (x2 - x1);
    if (Math.abs(half) <= tolerance || f1 === 0) return x1;
    const trial = interpolatedStep(x0, f0, x1, f1, x2, f2, half);
    const isShort = Math.abs(trial) < Math.min(1.5 * Math.abs(half), 0.5 * Math.abs(lastStep));
    if (isShort && Math.abs(f0) > Math.abs(f1) && trial * half > 0) {
      lastStep = step;
      step = trial;
    } else {
      step = half;
      lastStep = half;
    }
    [x0, f0] = [x1, f1];
    x1 += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    f1 = f(x1);
    if (Number.isNaN(f1)) throw new RangeError(`f(${x1}) must be a number, got NaN`);
  }
  throw new RangeError(`no root within ${maxEvaluations} evaluations between ${a} and ${b}`);
}

/** Step of the secant, or of the inverse parabola where three points are known. */
function interpolatedStep(
  x0: number,
  f0: number,
  x1: number,
  f1: number,
  x2: number,
  f2: number,
  half: number,
): number {
  const s = f1 / f0;
  if (x0 === x2) return (2 * half * s) / (s - 1);
  const q = f0 / f2;
  const r = f1 / f2;
  const top = s * (2 * half * q * (q - r) - (x1 - x0) * (r - 1));
  return -top / ((q - 1) * (r - 1) * (s - 1));
}
