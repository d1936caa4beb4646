/** `linear`: index of dN/dm or dN/da; `log`: index of dN/d ln m, which dN/d log10 m shares. */
export type IndexConvention = 'linear' | 'log';

/** What an index of the semi-major axis may be stated in: `period` is that of dN/d ln P. */
export type AxisConvention = IndexConvention | 'log10' | 'period' | 'linear-period';

/** What an index of the mass or the mass ratio may be stated in. */
export type MassConvention = IndexConvention | 'log10';

/** dN/d log10 x exceeds dN/d ln x by this factor; the index is the same. */
export const LOG10_DENSITY_FACTOR = Math.LN10;

/** dN/d ln a exceeds dN/d ln P by this factor, because P^2 is proportional to a^3. */
export const AXIS_PER_PERIOD_FACTOR = 1.5;

/**
 * Index per natural logarithm, the stored one, of an index given in another convention.
 *
 * dN/dx proportional to x^(i-1) is the same law as dN/d ln x proportional to x^i; an index of the
 * period counts 3/2 times in the semi-major axis.
 *
 * @param index scalar [1]
 * @param from convention in which the index was given
 * @example toLogIndex(-1.31, 'linear') // -0.31
 */
export function toLogIndex(index: number, from: AxisConvention): number {
  switch (from) {
    case 'linear':
      return index + 1;
    case 'log':
    case 'log10':
      return index;
    case 'period':
      return axisIndexFromPeriodIndex(index);
    case 'linear-period':
      return axisIndexFromPeriodIndex(index + 1);
  }
}

/**
 * Index in any convention of a stored index per natural logarithm.
 *
 * @param index scalar [1], per natural logarithm
 * @param to convention wanted
 * @example fromLogIndex(-0.31, 'linear') // -1.31
 */
export function fromLogIndex(index: number, to: AxisConvention): number {
  switch (to) {
    case 'linear':
      return index - 1;
    case 'log':
    case 'log10':
      return index;
    case 'period':
      return index / AXIS_PER_PERIOD_FACTOR;
    case 'linear-period':
      return index / AXIS_PER_PERIOD_FACTOR - 1;
  }
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
