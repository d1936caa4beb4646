/** Value and slope of a function at a point. */
export interface ValueAndSlope {
  value: number;
  slope: number;
}

/**
 * Root of an increasing function by Newton steps kept inside a shrinking bracket.
 *
 * An open end of the bracket (infinite) is found by doubling steps; a Newton step that leaves the
 * bracket, or that no longer halves the residual, is replaced by bisection.
 *
 * @param f value and slope, value increasing in x
 * @param start first guess, inside the bracket
 * @param low lower end, where value <= 0, or -Infinity
 * @param high upper end, where value >= 0, or Infinity
 * @returns the root, to the last digits that f resolves
 * Cost: about 6 evaluations from a fair start, 60 at worst on a finite bracket.
 */
export function solveIncreasing(
  f: (x: number) => ValueAndSlope,
  start: number,
  low: number,
  high: number,
): number {
  let x = start;
  let lower = low;
  let upper = high;
  let stride = 1;
  let previous = Number.POSITIVE_INFINITY;
  for (let step = 0; step < 300; step++) {
    const { value, slope } = f(x);
    if (value === 0) return x;
    if (value < 0) lower = x;
    else upper = x;
    const newton = x - value / slope;
    const size = Math.abs(value);
    const trusted = size < 0.5 * previous || step === 0;
    previous = size;
    let next = newton;
    if (!(newton > lower && newton < upper) || (!trusted && Number.isFinite(upper - lower))) {
      if (Number.isFinite(upper - lower)) {
        next = 0.5 * (lower + upper);
      } else {
        next = value < 0 ? x + stride : x - stride;
        stride *= 2;
      }
    }
    const tolerance = 4e-16 * Math.max(Math.abs(next), Number.MIN_VALUE);
    if (Math.abs(next - x) <= tolerance || next === lower || next === upper) return next;
    x = next;
  }
  return x;
}
