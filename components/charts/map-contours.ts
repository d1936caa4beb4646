import { contours } from 'd3';

/** A map as charts take it: probability of detection over mass and semi-major axis. */
export interface MapData {
  /** Nodes, increasing [Mjup]. */
  massMjup: Float64Array;
  /** Nodes, increasing [AU]. */
  semiMajorAxisAu: Float64Array;
  /** 0 to 1, shape [mass, semiMajorAxis], row-major. */
  completeness: Float64Array;
}

export const bandLevels = Array.from({ length: 19 }, (_, index) => (index + 1) / 20);

type Point = [number, number];

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

interface Projection {
  x(semiMajorAxisAu: number): number;
  y(massMjup: number): number;
}

function rings(map: MapData, levels: number[], { x, y }: Projection) {
  const size: [number, number] = [map.semiMajorAxisAu.length, map.massMjup.length];
  const px = toPx(Array.from(map.semiMajorAxisAu, x));
  const py = toPx(Array.from(map.massMjup, y));
  return contours()
    .size(size)
    .thresholds(levels)(map.completeness as unknown as number[])
    .map((shape) => ({
      level: shape.value,
      rings: shape.coordinates.flat().map((ring) => ({
        points: ring.map(([i, j]): Point => [px(i), py(j)]),
        // d3 closes its rings half a cell outside the outer nodes: such points are not contour.
        isOnEdge: ring.map(([i, j]) => i === 0 || i === size[0] || j === 0 || j === size[1]),
      })),
    }));
}

/** Filled bands of 5 %, from the lowest level up, to be painted over each other. */
export function isobands(map: MapData, projection: Projection): { level: number; path: string }[] {
  return rings(map, bandLevels, projection).map((band) => ({
    level: band.level,
    path: band.rings.map((ring) => `M${pathOf(ring.points)}Z`).join(''),
  }));
}

export interface Isoline {
  level: number;
  path: string;
  points: Point[];
}

/** Contours without the stretches that only follow the edge of the grid. */
export function isolines(map: MapData, levels: number[], projection: Projection): Isoline[] {
  return rings(map, levels, projection).map((line) => {
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

export interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

export function boxesMeet(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/**
 * Where a contour carries its number: on its lower branch near a wanted x, inside a box, clear of
 * the numbers already placed.
 */
export function labelPoint(line: Isoline, wantedX: number, inside: Box, taken: Box[]) {
  const candidates = line.points
    .filter(
      ([x, y]) =>
        Math.abs(x - wantedX) < 60 &&
        x > inside.left + 16 &&
        x < inside.right - 16 &&
        y > inside.top + 10 &&
        y < inside.bottom - 8,
    )
    .sort((a, b) => Math.abs(a[0] - wantedX) - b[1] / 4 - (Math.abs(b[0] - wantedX) - a[1] / 4));
  for (const [x, y] of candidates) {
    const box = { left: x - 18, right: x + 18, top: y - 9, bottom: y + 9 };
    if (!taken.some((other) => boxesMeet(box, other))) return { x, y, box };
  }
  return undefined;
}
