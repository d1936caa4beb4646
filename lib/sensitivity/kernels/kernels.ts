import type * as steps from './steps';

/** The steps of a completeness map: places are counted in doubles of their memory. */
export type Steps = typeof steps;

/**
 * The steps with the memory they work on. Two sets exist, compiled and plain, from one source; both
 * add in the same order and give the same bits.
 */
export interface Kernels extends Steps {
  name: 'compiled' | 'plain';
  /** Memory of at least so many doubles; what it held stays, older views of it end. */
  reserve(doubles: number): Float64Array;
}
