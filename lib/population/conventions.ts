/** `linear`: index of dN/dm or dN/da; `log`: index of dN/d ln m, which dN/d log10 m shares. */
export type IndexConvention = 'linear' | 'log';

/** dN/d log10 x exceeds dN/d ln x by this factor; the index is the same. */
export const LOG10_DENSITY_FACTOR = Math.LN10;

/** dN/d ln a exceeds dN/d ln P by this factor, because P^2 is proportional to a^3. */
export const AXIS_PER_PERIOD_FACTOR = 1.5;

/**
 * Index per natural logarithm, the stored one, of an index given in either convention.
 *
 * dN/dx proportional to x^(i-1) is the same law as dN/d ln x proportional to x^i.
 *
 * @param index scalar [1]
 * @param from convention in which the index was given
 * @example toLogIndex(-1.31, 'linear') // -0.31
 */
export function toLogIndex(index: number, from: IndexConvention): number {
  return from === 'linear' ? index + 1 : index;
}

/**
 * Index in either convention of a stored index per natural logarithm.
 *
 * @param index scalar [1], per natural logarithm
 * @param to convention wanted
 * @example fromLogIndex(-0.31, 'linear') // -1.31
 */
export function fromLogIndex(index: number, to: IndexConvention): number {
  return to === 'linear' ? index - 1 : index;
}

/**
 * Index of dN/d ln a of a law given as dN/d ln P proportional to P^periodIndex.
 *
 * @param periodIndex scalar [1], per natural logarithm of the period
 * @example axisIndexFromPeriodIndex(0.26) // 0.39
 */
export function axisIndexFromPeriodIndex(periodIndex: number): number {
  return AXIS_PER_PERIOD_FACTOR * periodIndex;
}
