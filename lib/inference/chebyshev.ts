/** Terms of a series and points per panel. */
export const NODES = 16;

/** Chebyshev points of the first kind on (-1, 1), increasing; the ends are not among them. */
export const chebyshevNodes = Float64Array.from(
  { length: NODES },
  (_, j) => -Math.cos(((j + 0.5) * Math.PI) / NODES),
);

/** transform[k * NODES + j]: weight of the value at node j in coefficient k. */
const transform = new Float64Array(NODES * NODES);
for (let k = 0; k < NODES; k++) {
  for (let j = 0; j < NODES; j++) {
    const angle = ((NODES - 1 - j + 0.5) * Math.PI * k) / NODES;
    transform[k * NODES + j] = ((k === 0 ? 1 : 2) / NODES) * Math.cos(angle);
  }
}

/** Weights of the nodes for the integral over [-1, 1] (Fejer's first rule). */
export const nodeWeights = new Float64Array(NODES);
for (let j = 0; j < NODES; j++) {
  for (let k = 0; k < NODES; k += 2) {
    nodeWeights[j] += (transform[k * NODES + j] * 2) / (1 - k * k);
  }
}

/**
 * Coefficients of the Chebyshev series through values at the nodes.
 *
 * @param values shape [NODES]
 * @returns shape [NODES]: f(t) = sum of c_k T_k(t), -1 <= t <= 1
 */
export function coefficients(values: Float64Array): Float64Array {
  const series = new Float64Array(NODES);
  for (let k = 0; k < NODES; k++) {
    let sum = 0;
    for (let j = 0; j < NODES; j++) sum += transform[k * NODES + j] * values[j];
    series[k] = sum;
  }
  return series;
}

/**
 * Series of the integral of a series from -1 to t, times a scale.
 *
 * @param series shape [NODES]
 * @param scale half the panel's width, in units of the coordinate
 * @returns shape [NODES + 1]
 */
export function antiderivative(series: Float64Array, scale: number): Float64Array {
  const integral = new Float64Array(NODES + 1);
  const at = (k: number) => (k < NODES ? series[k] : 0);
  integral[1] = scale * (at(0) - 0.5 * at(2));
  for (let k = 2; k <= NODES; k++) integral[k] = (scale * (at(k - 1) - at(k + 1))) / (2 * k);
  let atStart = 0;
  for (let k = 1; k <= NODES; k++) atStart += k % 2 === 0 ? integral[k] : -integral[k];
  integral[0] = -atStart;
  return integral;
}

/** Value of a series at t, -1..1, by Clenshaw's recurrence. */
export function evaluateSeries(series: Float64Array, t: number): number {
  let next = 0;
  let afterNext = 0;
  for (let k = series.length - 1; k > 0; k--) {
    const current = 2 * t * next - afterNext + series[k];
    afterNext = next;
    next = current;
  }
  return t * next - afterNext + series[0];
}
