import { logSpacedAxis, requirePositiveAxis } from '@/lib/numerics/grid';
import type { MapGrid } from './types';

/** The grid used unless another is chosen: 56 masses 0.5–80 M_Jup by 64 axes 1–1000 au, log spaced. */
export const DEFAULT_GRID = (): MapGrid => ({
  massMjup: logSpacedAxis(0.5, 80, 56),
  semiMajorAxisAu: logSpacedAxis(1, 1000, 64),
});

/**
 * Refuses a grid whose axes are not positive, finite and strictly increasing.
 *
 * @throws RangeError naming the axis, the index and the value
 */
export function requireGrid(grid: MapGrid): void {
  requirePositiveAxis(grid.massMjup, 'massMjup', 1);
  requirePositiveAxis(grid.semiMajorAxisAu, 'semiMajorAxisAu', 1);
}
