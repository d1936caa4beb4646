import { contours } from 'd3';

export type Point = [number, number];

/** Values at the nodes of two axes, with the places of the nodes on the drawing. */
export interface PlacedGrid {
  /** Shape [row, column], row-major; NaN where there is none. */
  values: ArrayLike<number>;
  /** Places of the columns and rows [px]. */
  columnsPx: number[];
  rowsPx: number[];
}

export interface Isoline {
  level: number;
  path: string;
  points: Point[];
}

/** Grid index of d3 (cell centres at halves) to px, by the px of the nodes. */
function toPx(nodesPx: number[]): (index: number) => number {
  const last = nodesPx.length - 1;
  return (index) => {
    const at = Math.min(last, Math.max(0, index - 0.5));
    const low = Math.min(last - 1, Math.floor(at));
    return nodesPx[low] + (at - low) * (nodesPx[low + 1] - nodesPx[low]);
  };
}

function pathOf(points: Point[]): string {
  return points.map(([x, y]) => `${x.toFixed(1)},${y.toFixed(1)}`).join('L');
}

function rings({ values, columnsPx, rowsPx }: PlacedGrid, levels: number[]) {
  const size: [number, number] = [columnsPx.length, rowsPx.length];
  const px = toPx(columnsPx);
  const py = toPx(rowsPx);
  return contours()
    .size(size)
    .thresholds(levels)(values as unknown as number[])
    .map((shape) => ({
      level: shape.value,
      rings: shape.coordinates.flat().map((ring) => ({
        points: ring.map(([i, j]): Point => [px(i), py(j)]),
        // d3 closes its rings half a cell outside the outer nodes: such points are not contour.
        isOnEdge: ring.map(([i, j]) => i === 0 || i === size[0] || j === 0 || j === size[1]),
      })),
    }));
}

/** Filled areas above each level, from the lowest level up, to be painted over each other. */
export function gridBands(grid: PlacedGrid, levels: number[]): { level: number; path: string }[] {
  return rings(grid, levels).map((band) => ({
    level: band.level,
    path: band.rings.map((ring) => `M${pathOf(ring.points)}Z`).join(''),
  }));
}

/** Contours without the stretches that only follow the edge of the grid. */
export function gridLines(grid: PlacedGrid, levels: number[]): Isoline[] {
  return rings(grid, levels).map((line) => {
    let path = '';
    const points: Point[] = [];
    for (const ring of line.rings) {
      let run: Point[] = [];
      const finish = () => {
        if (run.length > 1) path += `M${pathOf(run)}`;
        run = [];
      };
      ring.points.forEach((point, index) => {
        if (ring.isOnEdge[index]) {
          finish();
          return;
        }
        run.push(point);
        points.push(point);
      });
      finish();
    }
    return { level: line.level, path, points };
  });
}
