import { gridBands } from './grid-contours';

/** A joint density of two parameters: x along the columns, y along the rows. */
export interface JointPlane {
  x: number[];
  y: number[];
  /** Shape [y, x], per unit of both. */
  density: number[][];
}

/** Width that a node stands for: half the way to each neighbour. */
function widths(at: number[]): number[] {
  return at.map((_, i) => {
    const low = i > 0 ? (at[i] - at[i - 1]) / 2 : 0;
    const high = i < at.length - 1 ? (at[i + 1] - at[i]) / 2 : 0;
    return low + high;
  });
}

/**
 * Densities above which the joint posterior holds a share of the probability: the smallest areas.
 *
 * @param plane the density at its nodes, trapezoids between them
 * @param shares shares of the probability, such as 0.68 and 0.95
 * @returns one density a share; a larger share has a lower one
 */
export function densityAtShares(plane: JointPlane, shares: number[]): number[] {
  const [dx, dy] = [widths(plane.x), widths(plane.y)];
  const cells = plane.density
    .flatMap((row, j) => row.map((density, i) => ({ density, mass: density * dx[i] * dy[j] })))
    .sort((a, b) => b.density - a.density);
  const total = cells.reduce((sum, { mass }) => sum + mass, 0);
  return shares.map((share) => {
    let held = 0;
    for (const { density, mass } of cells) {
      held += mass;
      if (held >= share * total) return density;
    }
    return 0;
  });
}

/** The areas of 95 and 68 per cent as paths, the wider first. */
export function jointAreas(
  plane: JointPlane,
  x: (value: number) => number,
  y: (value: number) => number,
): { share: number; path: string }[] {
  const [inner, outer] = densityAtShares(plane, [0.68, 0.95]);
  const grid = {
    values: plane.density.flat(),
    columnsPx: plane.x.map(x),
    rowsPx: plane.y.map(y),
  };
  return gridBands(grid, [outer, inner]).map(({ path }, index) => ({
    share: index === 0 ? 0.95 : 0.68,
    path,
  }));
}
