import { type Box, boxesMeet } from './map-contours';
import { valueAt } from './paths';
import type { RateCurve } from './rate-curve';
import { textWidth } from './text-width';

/** The flattest curve still reaches this share of the height; a taller one runs off the top. */
const LEAST_HEIGHT = 0.62;

/**
 * Top of the density axis of several posteriors: room above the tallest, as long as the flattest
 * stays readable. A prior that rises to a pole at zero must not flatten the rest: near the highest
 * of its values is enough.
 */
export function overlaidTop(curves: RateCurve[]): number {
  const peaks = curves.map(({ density }) => {
    const sorted = Float64Array.from(density.filter(Number.isFinite)).sort();
    return sorted[Math.floor(0.985 * (sorted.length - 1))];
  });
  return Math.min(1.12 * Math.max(...peaks), Math.min(...peaks) / LEAST_HEIGHT);
}

interface NamedCurve {
  /** What may stand beside the curve, the best first. */
  words: string[];
  curve: RateCurve;
}

interface Plane {
  x: { (rate: number): number; invert(px: number): number };
  y(density: number): number;
  frame: Box;
}

export interface NamePlace {
  words: string;
  x: number;
  y: number;
  anchor: 'start' | 'end';
  box: Box;
}

/**
 * Names beside their curves, clear of all curves, of each other and of what is taken; a curve
 * without room for any of its names has none.
 */
export function placeNames(curves: NamedCurve[], plane: Plane, taken: Box[]): NamePlace[] {
  const occupied = [...taken];
  return curves.flatMap((one) => {
    for (const words of one.words) {
      const place = freePlace(words, one.curve, curves, plane, occupied);
      if (!place) continue;
      occupied.push(place.box);
      return [place];
    }
    return [];
  });
}

/** The free place nearest to half the height. */
function freePlace(
  words: string,
  curve: RateCurve,
  curves: NamedCurve[],
  plane: Plane,
  occupied: Box[],
): NamePlace | undefined {
  const { x, y, frame } = plane;
  const width = 1.06 * textWidth(words, 13);
  const middle = (frame.top + frame.bottom) / 2;
  const isFree = (box: Box) =>
    box.left > frame.left &&
    box.right < frame.right &&
    box.top > frame.top &&
    box.bottom < frame.bottom &&
    !occupied.some((other) => boxesMeet(box, other)) &&
    !curves.some((other) => crosses(other.curve, box, plane));
  let best: NamePlace | undefined;
  for (let index = 0; index < curve.rate.length; index += 4) {
    const at = { x: x(curve.rate[index]), y: y(curve.density[index]) };
    if (best && Math.abs(at.y - middle) >= Math.abs(best.y + 4 - middle)) continue;
    for (const anchor of ['start', 'end'] as const) {
      const left = anchor === 'start' ? at.x + 10 : at.x - 10 - width;
      const box = { left, right: left + width, top: at.y - 17, bottom: at.y };
      if (!isFree(box)) continue;
      best = { words, x: anchor === 'start' ? left : left + width, y: at.y - 4, anchor, box };
      break;
    }
  }
  return best;
}

/** Whether a curve runs through a box, looked at every few px. */
function crosses({ rate, density }: RateCurve, box: Box, { x, y }: Plane): boolean {
  let before = Number.NaN;
  for (let at = box.left; at <= box.right; at += 4) {
    const height = y(valueAt(rate, density, x.invert(at)));
    if (height > box.top && height < box.bottom) return true;
    if ((before - box.top) * (height - box.top) < 0) return true;
    before = height;
  }
  return false;
}
