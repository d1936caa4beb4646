import { gridBands, gridLines, type Isoline, type PlacedGrid } from './grid-contours';

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

interface Projection {
  x(semiMajorAxisAu: number): number;
  y(massMjup: number): number;
}

function placed(map: MapData, { x, y }: Projection): PlacedGrid {
  return {
    values: map.completeness,
    columnsPx: Array.from(map.semiMajorAxisAu, x),
    rowsPx: Array.from(map.massMjup, y),
  };
}

/** Filled bands of 5 %, from the lowest level up, to be painted over each other. */
export function isobands(map: MapData, projection: Projection): { level: number; path: string }[] {
  return gridBands(placed(map, projection), bandLevels);
}

/** Contours without the stretches that only follow the edge of the grid. */
export function isolines(map: MapData, levels: number[], projection: Projection): Isoline[] {
  return gridLines(placed(map, projection), levels);
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
