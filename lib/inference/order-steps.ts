/** What one change does to a value, counted over the orders in which changes can be made. */
export interface OrderStep {
  name: string;
  /** Mean over all orders. */
  averaged: number;
  /** In the order in which the names were given. */
  inOrder: number;
}

/**
 * Splits the way from one value to another into one step a change.
 *
 * The step of a change depends on which others were made before it; its mean over all orders is its
 * fair share, and the shares add up to the whole way.
 *
 * @param names of the changes, 1 to 10
 * @param measure the value once the changes of a set are made, shape of the set: bit i is name i;
 *   called once for each of the 2ⁿ sets, as `stepsOverOrders` asks for them
 * @returns one step a name, in the same order; NaN where a value that it needs is NaN
 * @throws RangeError for no change or more than 10
 * @source Shapley 1953, A value for n-person games, Contributions to the Theory of Games II, 307–317
 * @example stepsOverOrders(['a', 'b'], (made) => made) // a: 1, b: 2
 */
export function stepsOverOrders(
  names: readonly string[],
  measure: (made: number) => number,
): OrderStep[] {
  const count = names.length;
  if (count < 1 || count > 10) throw new RangeError(`names must be 1 to 10, got ${count}`);
  const values = Array.from({ length: 2 ** count }, (_, made) => measure(made));
  const weights = orderWeights(count);
  return names.map((name, index) => {
    const bit = 1 << index;
    let averaged = 0;
    for (let before = 0; before < values.length; before += 1) {
      if (before & bit) continue;
      averaged += weights[bitCount(before)] * (values[before | bit] - values[before]);
    }
    return { name, averaged, inOrder: values[2 * bit - 1] - values[bit - 1] };
  });
}

/** Share of the orders in which exactly a given set of so many others comes before. */
function orderWeights(count: number): number[] {
  const weights: number[] = [1 / count];
  for (let before = 1; before < count; before += 1) {
    weights.push((weights[before - 1] * before) / (count - before));
  }
  return weights;
}

function bitCount(set: number): number {
  let bits = 0;
  for (let rest = set; rest > 0; rest &= rest - 1) bits += 1;
  return bits;
}
