import { interpolateLinear } from '@/lib/numerics/interpolate';
import { normalCumulative } from '@/lib/numerics/normal';
import { studentQuantileUpper } from '@/lib/numerics/student';
import type { ContrastCurve } from './types';

/** Curves of one survey share their separations: what was found once serves the next star. */
const MOST_KNOWN = 8192;
const known = new Map<number, Map<number, number>>();
let knownCount = 0;

/** Fewer elements leave no scatter to compare with: nothing can be claimed there. */
const FEWEST_ELEMENTS = 3;
/** Between its points the corrected curve departs from the formula by no more than this, [mag]. */
const TOLERANCE_MAG = 0.002;
/** ln θ: halving ends here, whatever the tolerance asks for. */
const SHORTEST_STEP = 1e-4;

/**
 * How many times its noise a source must exceed, so that noise known from few resolution elements
 * alone passes as rarely as Gaussian noise passes n σ.
 *
 * One element is compared with the n2 = N - 1 others at its separation; the threshold is
 * τ √(1 + 1/n2), τ the Student quantile with n2 - 1 degrees of freedom at the tail beyond n σ.
 *
 * @param elements N, resolution elements at the separation, >= 3, not necessarily whole
 * @param nSigma n, > 0
 * @returns the threshold in units of the noise, > n
 * @throws RangeError outside these domains
 * @source Mawet et al. 2014, ApJ 792, 97, section 3.4
 * @example smallSampleThreshold(6, 5) // 62.27
 */
export function smallSampleThreshold(elements: number, nSigma: number): number {
  if (!(elements >= FEWEST_ELEMENTS && Number.isFinite(elements))) {
    throw new RangeError(
      `elements must be finite and at least ${FEWEST_ELEMENTS}, got ${elements}`,
    );
  }
  const others = elements - 1;
  const tail = normalCumulative(-nSigma);
  return studentQuantileUpper(tail, others - 1) * Math.sqrt(1 + 1 / others);
}

/**
 * A curve whose threshold is raised for the few resolution elements near the star.
 *
 * At separation θ there are N = 2πθ/FWHM elements. The limit becomes brighter by
 * 2.5 log10(smallSampleThreshold(N, n)/n). N is not rounded to a whole number, so that the limit
 * has no steps (our rule). The curve begins where three elements are and the raised limit is
 * fainter than the star itself; inside that nothing is detected. Points are added until straight
 * lines in ln θ follow the raised limit to 0.002 mag. The smooth threshold keeps the curve's n.
 *
 * @param curve as checkContrastCurve accepts it, not modified; its limits must not be raised already
 * @param fwhmArcsec size of a resolution element, [arcsec], > 0
 * @returns a new curve; where nothing remains, one with coverage 0
 * @throws RangeError for a size not > 0
 * @source Mawet et al. 2014, ApJ 792, 97
 */
export function correctForSmallSamples(curve: ContrastCurve, fwhmArcsec: number): ContrastCurve {
  if (!(fwhmArcsec > 0 && Number.isFinite(fwhmArcsec))) {
    throw new RangeError(`fwhmArcsec must be finite and > 0, got ${fwhmArcsec}`);
  }
  const logs = curve.separationArcsec.map(Math.log);
  const last = logs.length - 1;
  const limitAt = (y: number) =>
    interpolateLinear(y, logs, curve.contrastMag) - shift(y, fwhmArcsec, curve.nSigma);
  const innermost = Math.log((FEWEST_ELEMENTS * fwhmArcsec) / (2 * Math.PI)) + SHORTEST_STEP;
  if (innermost >= logs[last]) return withoutSensitivity(curve);
  const from = Math.max(logs[0], innermost);
  const places = [from, ...Array.from(logs).filter((y) => y > from)];
  let points: Point[] = [{ y: from, limit: limitAt(from) }];
  for (let i = 1; i < places.length; i++) {
    const end = { y: places[i], limit: limitAt(places[i]) };
    addBetween(points, points[points.length - 1], end, limitAt);
    points.push(end);
  }
  points = fromFirstPositive(points);
  if (points.length < 2) return withoutSensitivity(curve);
  const { coverage } = curve;
  return {
    ...curve,
    separationArcsec: Float64Array.from(points, ({ y }) => Math.exp(y)),
    contrastMag: Float64Array.from(points, ({ limit }) => limit),
    ...(coverage && {
      coverage: Float64Array.from(points, ({ y }) => interpolateLinear(y, logs, coverage)),
    }),
  };
}

interface Point {
  y: number;
  limit: number;
}

function shift(logSeparation: number, fwhmArcsec: number, nSigma: number): number {
  const elements = (2 * Math.PI * Math.exp(logSeparation)) / fwhmArcsec;
  const found = known.get(nSigma)?.get(elements);
  if (found !== undefined) return found;
  const magnitudes = 2.5 * Math.log10(smallSampleThreshold(elements, nSigma) / nSigma);
  if (knownCount >= MOST_KNOWN) {
    known.clear();
    knownCount = 0;
  }
  const ofThreshold = known.get(nSigma) ?? new Map<number, number>();
  known.set(nSigma, ofThreshold.set(elements, magnitudes));
  knownCount++;
  return magnitudes;
}

/** Halves until the middle lies on the straight line, and adds the points found on the way. */
function addBetween(points: Point[], from: Point, to: Point, limitAt: (y: number) => number): void {
  const y = 0.5 * (from.y + to.y);
  if (to.y - from.y < SHORTEST_STEP) return;
  const middle = { y, limit: limitAt(y) };
  const quarter = limitAt(0.5 * (from.y + y));
  const isStraight =
    Math.abs(middle.limit - 0.5 * (from.limit + to.limit)) < TOLERANCE_MAG &&
    Math.abs(quarter - 0.75 * from.limit - 0.25 * to.limit) < TOLERANCE_MAG;
  if (isStraight) return;
  addBetween(points, from, middle, limitAt);
  points.push(middle);
  addBetween(points, middle, to, limitAt);
}

/** The stretch beyond the last place where the limit would be brighter than the star. */
function fromFirstPositive(points: Point[]): Point[] {
  const last = points.map(({ limit }) => limit < 0).lastIndexOf(true);
  if (last < 0) return points;
  if (last === points.length - 1) return [];
  const [a, b] = [points[last], points[last + 1]];
  const y = a.y + ((b.y - a.y) * -a.limit) / (b.limit - a.limit);
  const rest = points.slice(last + 1);
  return y < rest[0].y ? [{ y, limit: 0 }, ...rest] : rest;
}

const withoutSensitivity = (curve: ContrastCurve): ContrastCurve => ({
  ...curve,
  coverage: new Float64Array(curve.separationArcsec.length),
});
