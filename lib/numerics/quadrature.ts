/** Nodes and weights of a rule; both of shape [n], shared and not to be modified. */
export interface QuadratureRule {
  nodes: Float64Array;
  weights: Float64Array;
}

const legendreRules = new Map<number, QuadratureRule>();
const hermiteRules = new Map<number, QuadratureRule>();

/**
 * Gauss–Legendre rule on [-1, 1]: exact for polynomials up to degree 2n - 1.
 *
 * Nodes by Newton's method on the Legendre recurrence, mirrored, so that they are symmetric to the
 * last bit.
 *
 * @param n number of nodes, integer 1 to 512
 * @returns nodes increasing, weights that sum to 2
 * @throws RangeError for n outside its domain
 * Accuracy: 1e-15. Cost: n² once per n; kept afterwards.
 * @source Press et al. 2007, Numerical Recipes, 3rd ed., section 4.6
 */
export function gaussLegendre(n: number): QuadratureRule {
  if (!Number.isInteger(n) || n < 1 || n > 512) {
    throw new RangeError(`n must be an integer between 1 and 512, got ${n}`);
  }
  const known = legendreRules.get(n);
  if (known) return known;
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n / 2; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 0;
    for (let step = 0; step < 100; step++) {
      const [value, previous] = legendrePair(n, x);
      slope = (n * (x * value - previous)) / (x * x - 1);
      const shift = value / slope;
      x -= shift;
      if (Math.abs(shift) < 1e-16) break;
    }
    if (2 * i + 1 === n) x = 0;
    const [value, previous] = legendrePair(n, x);
    slope = (n * (x * value - previous)) / (x * x - 1);
    nodes[i] = -x;
    nodes[n - 1 - i] = x;
    weights[i] = 2 / ((1 - x * x) * slope * slope);
    weights[n - 1 - i] = weights[i];
  }
  const rule = { nodes, weights };
  legendreRules.set(n, rule);
  return rule;
}

/** P_n(x) and P_{n-1}(x). */
function legendrePair(n: number, x: number): [number, number] {
  let previous = 1;
  let value = x;
  for (let k = 2; k <= n; k++) {
    const next = ((2 * k - 1) * x * value - (k - 1) * previous) / k;
    previous = value;
    value = next;
  }
  return [value, previous];
}

/**
 * Gauss–Hermite rule for a standard normal variable: Σ w f(z) = E f(Z), exact to degree 2n - 1.
 *
 * @param n number of nodes, integer 1 to 64
 * @returns nodes increasing, weights that sum to 1; worked out once, kept, not to be modified
 * @throws RangeError for n outside its domain
 * @example gaussHermite(3) // nodes -√3, 0, √3; weights 1/6, 2/3, 1/6
 */
export function gaussHermite(n: number): QuadratureRule {
  if (!Number.isInteger(n) || n < 1 || n > 64) {
    throw new RangeError(`n must be an integer between 1 and 64, got ${n}`);
  }
  const known = hermiteRules.get(n);
  if (known) return known;
  // Sturm bisection: the recurrence changes sign once per node passed, so no start value can fail.
  const bound = 2 * Math.sqrt(n) + 1;
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = Math.ceil(n / 2); i < n; i++) {
    let low = 0;
    let high = bound;
    for (let step = 0; step < 200 && high - low > 1e-16 * high; step++) {
      const middle = 0.5 * (low + high);
      if (nodesBelow(n, middle) > i) high = middle;
      else low = middle;
    }
    nodes[i] = 0.5 * (low + high);
    nodes[n - 1 - i] = -nodes[i];
  }
  for (let i = 0; i < n; i++) {
    let total = 0;
    let previous = 0;
    let value = 1;
    for (let k = 0; k < n; k++) {
      total += value * value;
      const next = (nodes[i] * value - Math.sqrt(k) * previous) / Math.sqrt(k + 1);
      previous = value;
      value = next;
    }
    weights[i] = 1 / total;
  }
  const rule = { nodes, weights };
  hermiteRules.set(n, rule);
  return rule;
}

/** How many roots of the n-th Hermite polynomial lie below x (signs of the Sturm sequence). */
function nodesBelow(n: number, x: number): number {
  let ratio = x;
  let count = ratio > 0 ? 1 : 0;
  for (let k = 1; k < n; k++) {
    ratio = x - k / (ratio === 0 ? 1e-300 : ratio);
    if (ratio > 0) count++;
  }
  return count;
}

/**
 * Composite Gauss–Legendre integral of f over [a, b].
 *
 * @param f integrand, finite on the open interval (ends are never evaluated)
 * @param a lower end, finite
 * @param b upper end, finite; b < a gives the negative
 * @param panels equal panels, integer >= 1, default 1
 * @param order nodes per panel, default 24
 * @throws RangeError for ends that are not finite or panels below 1
 */
export function integrate(
  f: (x: number) => number,
  a: number,
  b: number,
  panels = 1,
  order = 24,
): number {
  if (!Number.isFinite(a) || !Number.isFinite(b)) {
    throw new RangeError(`the ends must be finite, got ${a} and ${b}`);
  }
  if (!Number.isInteger(panels) || panels < 1) {
    throw new RangeError(`panels must be an integer >= 1, got ${panels}`);
  }
  const { nodes, weights } = gaussLegendre(order);
  const half = (b - a) / (2 * panels);
  let total = 0;
  for (let panel = 0; panel < panels; panel++) {
    const middle = a + (2 * panel + 1) * half;
    for (let i = 0; i < order; i++) total += weights[i] * f(middle + half * nodes[i]);
  }
  return total * half;
}
