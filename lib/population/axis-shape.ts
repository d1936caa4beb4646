import { brokenPowerLaw } from './broken-power-law';
import type { AxisLaw } from './law';
import { logNormal } from './log-normal';
import { powerLaw } from './power-law';
import { tabulatedLaw } from './tabulated';

/** How companions are spread along one axis, as a definition holds it; densities per d ln x. */
export type AxisShape =
  | PowerLawShape
  | BrokenPowerLawShape
  | LogNormalShape
  /** A distribution of one's own, linear in ln x between its points and 0 outside them. */
  | TabulatedShape;

export interface PowerLawShape {
  shape: 'power-law';
  /** Per natural logarithm [1]. */
  index: number;
}

export interface BrokenPowerLawShape {
  shape: 'broken-power-law';
  /** Where the index changes, > 0 [unit of the axis]. */
  breakAt: number;
  /** Index below the break, per natural logarithm [1]. */
  innerIndex: number;
  /** Index above the break, per natural logarithm [1]. */
  outerIndex: number;
}

export interface LogNormalShape {
  shape: 'log-normal';
  /** Median of the law before it is cut to the range, > 0 [unit of the axis]. */
  median: number;
  /** Standard deviation of log10 x, > 0 [dex]. */
  sigmaDex: number;
}

export interface TabulatedShape {
  shape: 'tabulated';
  /** Increasing, > 0, at least two [unit of the axis]. */
  at: number[];
  /** Density per d ln x at each of them, >= 0; the scale is free. */
  perLog: number[];
}

const laws: { [S in AxisShape['shape']]: (shape: Extract<AxisShape, { shape: S }>) => AxisLaw } = {
  'power-law': ({ index }) => powerLaw(index),
  'broken-power-law': ({ breakAt, innerIndex, outerIndex }) =>
    brokenPowerLaw(breakAt, innerIndex, outerIndex),
  'log-normal': ({ median, sigmaDex }) => logNormal(median, sigmaDex * Math.LN10),
  tabulated: ({ at, perLog }) => tabulatedLaw(at, perLog),
};

/**
 * The law of a shape.
 *
 * @throws RangeError for parameters that cannot be used: an index that is not finite, a break or a
 *   median that is not positive, sigma <= 0, a table whose places do not increase
 */
export function axisLaw(shape: AxisShape): AxisLaw {
  return (laws[shape.shape] as (shape: AxisShape) => AxisLaw)(shape);
}

/** Indices of a shape with the names of their fields; none where the shape has none. */
export function indicesOf(shape: AxisShape): { field: string; index: number }[] {
  if (shape.shape === 'power-law') return [{ field: 'index', index: shape.index }];
  if (shape.shape !== 'broken-power-law') return [];
  return [
    { field: 'innerIndex', index: shape.innerIndex },
    { field: 'outerIndex', index: shape.outerIndex },
  ];
}

/** The same shape with each of its indices changed, as by a conversion between conventions. */
export function mapIndices(shape: AxisShape, change: (index: number) => number): AxisShape {
  if (shape.shape === 'power-law') return { ...shape, index: change(shape.index) };
  if (shape.shape !== 'broken-power-law') return shape;
  const { innerIndex, outerIndex } = shape;
  return { ...shape, innerIndex: change(innerIndex), outerIndex: change(outerIndex) };
}
