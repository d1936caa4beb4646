import { valueAt } from './paths';
import type { PosteriorData } from './posterior-words';
import type { RateCurve } from './rate-curve';

/**
 * Top of the density axis: room above the first curve's peak for a name. A density that climbs
 * without end at zero is cut at four times its value at the median; a second curve may
 * raise the axis by a third, and is cut there.
 */
export function densityTop(data: Pick<PosteriorData, 'curve' | 'second'>): number {
  const own = peak(data.curve) * 1.3;
  if (!data.second) return own;
  return Math.min(Math.max(own, peak(data.second.curve) * 1.08), own * 1.3);
}

function peak(curve: RateCurve): number {
  const atMedian = valueAt(curve.rate, curve.density, rateAt(curve, 0.5));
  let highest = 0;
  for (const density of curve.density) {
    if (Number.isFinite(density) && density > highest) highest = density;
  }
  return atMedian > 0 ? Math.min(highest, 4 * atMedian) : highest;
}

/** Rate at which the cumulative probability reaches a share. */
function rateAt(curve: RateCurve, share: number): number {
  const index = curve.cumulative.findIndex((value) => value >= share);
  return curve.rate[index < 0 ? curve.rate.length - 1 : index];
}

/** Largest rate at which a curve still stands at or above a density; undefined if it never does. */
export function lastCrossing(curve: RateCurve, values: Float64Array, level: number) {
  for (let index = values.length - 1; index >= 0; index -= 1) {
    if (values[index] >= level) return curve.rate[index];
  }
  return undefined;
}
