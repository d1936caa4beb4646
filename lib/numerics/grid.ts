/**
 * Axis of n values from min to max, equal steps in the logarithm, ends exact.
 *
 * @param min first value, > 0
 * @param max last value, > min
 * @param n number of values, integer >= 2
 * @returns shape [n], strictly increasing
 * @throws RangeError for an argument outside its domain
 * @example logSpacedAxis(1, 100, 3) // 1, 10, 100
 */
export function logSpacedAxis(min: number, max: number, n: number): Float64Array {
  if (!(min > 0)) throw new RangeError(`min must be > 0, got ${min}`);
  const logMin = Math.log(min);
  const axis = linearAxis(logMin, Math.log(checkedEnd(min, max)), n).map(Math.exp);
  axis[0] = min;
  axis[n - 1] = max;
  return axis;
}

/**
 * Axis of n values from min to max, equal steps, ends exact.
 *
 * @param min first value
 * @param max last value, > min
 * @param n number of values, integer >= 2
 * @returns shape [n], strictly increasing
 * @throws RangeError for an argument outside its domain
 */
export function linearAxis(min: number, max: number, n: number): Float64Array {
  checkedEnd(min, max);
  if (!Number.isInteger(n) || n < 2) throw new RangeError(`n must be an integer >= 2, got ${n}`);
  const axis = new Float64Array(n);
  for (let i = 0; i < n; i++) axis[i] = min + ((max - min) * i) / (n - 1);
  axis[n - 1] = max;
  return axis;
}

function checkedEnd(min: number, max: number): number {
  if (!(Number.isFinite(max) && max > min)) {
    throw new RangeError(`max must be finite and > min ${min}, got ${max}`);
  }
  return max;
}

/**
 * Refuses an axis that is too short, not finite, not positive or not strictly increasing.
 *
 * @param axis values in order, not modified
 * @param name how the error calls it
 * @param minLength least number of values, default 2
 * @throws RangeError naming the first offending index and its value
 */
export function requirePositiveAxis(axis: Float64Array, name: string, minLength = 2): void {
  if (axis.length < minLength) {
    throw new RangeError(`${name} must have at least ${minLength} values, got ${axis.length}`);
  }
  for (let i = 0; i < axis.length; i++) {
    const x = axis[i];
    if (!(x > 0 && Number.isFinite(x))) {
      throw new RangeError(`${name}[${i}] must be finite and > 0, got ${x}`);
    }
    if (i > 0 && x <= axis[i - 1]) {
      throw new RangeError(`${name}[${i}] must be > ${axis[i - 1]}, got ${x}`);
    }
  }
}

/**
 * Index i of the interval with axis[i] <= x < axis[i + 1], kept inside 0 … length - 2.
 *
 * @param axis strictly increasing, at least 2 values
 * @param x any number
 * Cost: a binary search.
 */
export function intervalIndex(axis: ArrayLike<number>, x: number): number {
  let low = 0;
  let high = axis.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (axis[middle] <= x) low = middle;
    else high = middle;
  }
  return low;
}

/**
 * Sorted union of several axes, each value once.
 *
 * @param axes increasing axes, not modified
 * @returns strictly increasing
 */
export function unionAxis(axes: readonly Float64Array[]): Float64Array {
  const values = new Set<number>();
  for (const axis of axes) for (const x of axis) values.add(x);
  return Float64Array.from(values).sort();
}

/** Natural logarithms of an axis, in a new array. */
export function logOf(axis: Float64Array): Float64Array {
  return axis.map(Math.log);
}

/** Whether two axes have the same values, bit for bit. */
export function isSameAxis(a: Float64Array, b: Float64Array): boolean {
  if (a === b) return true;
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}
