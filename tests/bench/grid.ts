import { logSpacedAxis } from '@/lib/numerics/grid';
import { DEFAULT_GRID, type MapGrid } from '@/lib/sensitivity';

/** The product's own grid; `--grid 100` takes the one of 100 by 100 nodes that targets are set on. */
export const GRIDS: Readonly<Record<string, () => MapGrid>> = {
  own: DEFAULT_GRID,
  '100': () => ({
    massMjup: logSpacedAxis(0.5, 80, 100),
    semiMajorAxisAu: logSpacedAxis(1, 1000, 100),
  }),
};

/** Read before any argument is checked: every group of lines is made on this grid. */
function chosenGrid(): MapGrid {
  const at = process.argv.findIndex((word) => word === '--grid' || word.startsWith('--grid='));
  const name = process.argv[at]?.split('=')[1] ?? process.argv[at + 1];
  return (at < 0 ? DEFAULT_GRID : (GRIDS[name] ?? DEFAULT_GRID))();
}

export const GRID = chosenGrid();
