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

const HALF = NODES / 2;
/** pairs[j * NODES + k]: weight in coefficient k of the node opposite to node j, 0 <= j < HALF. */
const pairs = new Float64Array(HALF * NODES);
for (let j = 0; j < HALF; j++) {
  for (let k = 0; k < NODES; k++) pairs[j * NODES + k] = transform[k * NODES + NODES - 1 - j];
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
 * @param series where to write them, all 0
 * @returns shape [NODES]: f(t) = sum of c_k T_k(t), -1 <= t <= 1
 */
export function coefficients(
  values: Float64Array,
  series: Float64Array = new Float64Array(NODES),
): Float64Array {
  // Nodes lie in pairs about 0, on which a term is even or odd.
  for (let j = 0; j < HALF; j++) {
    const even = values[NODES - 1 - j] + values[j];
    const odd = values[NODES - 1 - j] - values[j];
    for (let k = 0; k < NODES; k += 2) {
      series[k] += pairs[j * NODES + k] * even;
      series[k + 1] += pairs[j * NODES + k + 1] * odd;
    }
  }
  return series;
}

/**
 * Series of the integral of a series from -1 to t, times a scale.
 *
 * @param series shape [NODES]
 * @param scale half the panel's width, in units of the coordinate
 * @param integral where to write it
 * @returns shape [NODES + 1]
 */
export function antiderivative(
  series: Float64Array,
  scale: number,
  integral: Float64Array = new Float64Array(NODES + 1),
): Float64Array {
  integral[1] = scale * (series[0] - 0.5 * series[2]);
  for (let k = 2; k < NODES - 1; k++)
    integral[k] = (scale * (series[k - 1] - series[k + 1])) / (2 * k);
  integral[NODES - 1] = (scale * series[NODES - 2]) / (2 * NODES - 2);
  integral[NODES] = (scale * series[NODES - 1]) / (2 * NODES);
  let atStart = 0;
  for (let k = 1; k <= NODES; k++) atStart += k % 2 === 0 ? integral[k] : -integral[k];
  integral[0] = -atStart;
  return integral;
}

/** Value of a series at t, -1..1, by Clenshaw's recurrence. */
export function evaluateSeries(series: Float64Array, t: number): number {
  const twice = 2 * t;
  let next = 0;
  let afterNext = 0;
  for (let k = series.length - 1; k > 0; k--) {
    const current = twice * next + (series[k] - afterNext);
    afterNext = next;
    next = current;
  }
  return t * next + (series[0] - afterNext);
}
