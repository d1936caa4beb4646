import { intervalIndex } from './grid';

/**
 * Straight line between tabulated points; the edge values outside.
 *
 * @param x where
 * @param xs strictly increasing, at least 2, not modified
 * @param ys same length
 * @example interpolateLinear(1.5, [1, 2], [10, 20]) // 15
 */
export function interpolateLinear(x: number, xs: ArrayLike<number>, ys: ArrayLike<number>): number {
  const last = xs.length - 1;
  if (x <= xs[0]) return ys[0];
  if (x >= xs[last]) return ys[last];
  const i = intervalIndex(xs, x);
  return ys[i] + ((ys[i + 1] - ys[i]) * (x - xs[i])) / (xs[i + 1] - xs[i]);
}

/** Place of a point between two nodes: value = (1 - share) v[index] + share v[index + 1]. */
export interface Bracket {
  index: number;
  /** 0 at the left node, 1 at the right. */
  share: number;
}

/**
 * The two nodes around a point, or null outside the axis (ends belong to it).
 *
 * @param axis strictly increasing, at least 2
 * @param x any number
 */
export function bracket(axis: ArrayLike<number>, x: number): Bracket | null {
  if (!(x >= axis[0] && x <= axis[axis.length - 1])) return null;
  const index = intervalIndex(axis, x);
  return { index, share: (x - axis[index]) / (axis[index + 1] - axis[index]) };
}
