/** A value with its 16 % and 84 % points, or hard bounds; what is not known is null. */
export interface StatedValue {
  value: number | null;
  lower: number | null;
  upper: number | null;
  min: number | null;
  max: number | null;
}

/** Two values of one quantity differ by more than this many standard deviations: a conflict. */
export const CONFLICT_SIGMA = 2;

/** Without any error, values this close are taken for one. */
const SAME_SHARE = 0.05;

interface Spread {
  value: number;
  below: number;
  above: number;
}

/** Bounds alone mean uniform in the logarithm between them. */
function spreadOf({ value, lower, upper, min, max }: StatedValue): Spread | null {
  if (value !== null) {
    return { value, below: value - (lower ?? value), above: (upper ?? value) - value };
  }
  if (min === null || max === null) return null;
  const at = (share: number) => min * (max / min) ** share;
  return { value: at(0.5), below: at(0.5) - at(0.16), above: at(0.84) - at(0.5) };
}

/**
 * How far two statements of one quantity lie apart, in units of their errors on the sides that face
 * each other, added in quadrature.
 *
 * @returns null where one of them states nothing; Infinity where they differ by more than 5 % and neither
 *   has an error
 */
export function sigmasApart(one: StatedValue, other: StatedValue): number | null {
  const a = spreadOf(one);
  const b = spreadOf(other);
  if (!a || !b) return null;
  const [low, high] = a.value < b.value ? [a, b] : [b, a];
  const error = Math.hypot(low.above, high.below);
  if (error > 0) return (high.value - low.value) / error;
  return high.value - low.value <= SAME_SHARE * high.value ? 0 : Number.POSITIVE_INFINITY;
}

/** The largest of sigmasApart over all pairs; null where fewer than two state a value. */
export function worstDisagreement(values: readonly StatedValue[]): number | null {
  let worst: number | null = null;
  values.forEach((one, i) => {
    for (const other of values.slice(i + 1)) {
      const apart = sigmasApart(one, other);
      if (apart !== null && (worst === null || apart > worst)) worst = apart;
    }
  });
  return worst;
}
