const HALF_LOG_2PI = 0.5 * Math.log(2 * Math.PI);

/** Bernoulli terms B_2n / (2n (2n-1)) of Stirling's series. */
const STIRLING = [
  1 / 12,
  -1 / 360,
  1 / 1260,
  -1 / 1680,
  1 / 1188,
  -691 / 360360,
  1 / 156,
  -3617 / 122400,
];

/**
 * Natural logarithm of the gamma function.
 *
 * Stirling's series above 12; smaller arguments are raised there by the recurrence.
 *
 * @param x scalar [1], > 0
 * @throws RangeError for x <= 0
 * Accuracy: 2e-15 relative, absolute near the zeros at 1 and 2.
 * @source Abramowitz & Stegun 1964, 6.1.40
 * @example logGamma(0.5) // 0.572364942924700
 */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`log gamma needs x > 0, got ${x}`);
  if (x === 1 || x === 2) return 0;
  let shifted = x;
  let product = 1;
  while (shifted < 12) {
    product *= shifted;
    shifted++;
  }
  const inverseSquare = 1 / (shifted * shifted);
  let series = 0;
  for (let n = STIRLING.length - 1; n >= 0; n--) series = series * inverseSquare + STIRLING[n];
  const stirling = (shifted - 0.5) * Math.log(shifted) - shifted + HALF_LOG_2PI + series / shifted;
  return stirling - Math.log(product);
}

/** Natural logarithm of the beta function B(a, b), a and b > 0. */
export function logBeta(a: number, b: number): number {
  return logGamma(a) + logGamma(b) - logGamma(a + b);
}
