/**
 * Sum that does not lose small terms beside large ones (Neumaier's compensated sum).
 *
 * @param values any length, finite, taken in order, not modified
 * @returns the sum; 0 for no values
 * Accuracy: one rounding of the exact sum unless terms cancel almost completely. Cost: four additions each.
 * @source Neumaier 1974, ZAMM 54, 39
 * @example compensatedSum([1, 1e100, 1, -1e100]) // 2
 */
export function compensatedSum(values: ArrayLike<number>): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < values.length; i++) {
    const x = values[i];
    const next = sum + x;
    lost += Math.abs(sum) >= Math.abs(x) ? sum - next + x : x - next + sum;
    sum = next;
  }
  return sum + lost;
}

/**
 * ln Σ exp(x), without overflow.
 *
 * @param values logarithms; -Infinity stands for a term of 0
 * @returns -Infinity for no values
 * @example logSumExp([Math.log(2), Math.log(3)]) // ln 5
 */
export function logSumExp(values: ArrayLike<number>): number {
  let max = -Infinity;
  for (let i = 0; i < values.length; i++) if (values[i] > max) max = values[i];
  if (!Number.isFinite(max)) return max;
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += Math.exp(values[i] - max);
  return max + Math.log(sum);
}
