import { intervalIndex } from '@/lib/numerics/grid';
import { type FillRow, newRow, type SeparationRow } from './separation-rows';
import type { PreparedCurve, PreparedStar } from './star-model';
import { thresholdTable } from './threshold-table';
import type { SensitivitySettings } from './types';

/** Places closer than this in ln θ are one. */
const SAME_PLACE = 1e-9;
/** Under the smooth rule no limit may move by more than this between places, [mag]. */
const SMOOTH_STEP_MAG = 0.05;
/** Several coverages multiply: a product of straight lines is followed in steps of this in ln θ. */
const COVERAGE_STEP = 0.1;
const NEGLIGIBLE = 1e-14;

/** One curve over one interval of ln θ: its limit and coverage at both ends. */
interface Stretch {
  curve: PreparedCurve;
  fromLimit: number;
  toLimit: number;
  fromCoverage: number;
  toCoverage: number;
}

interface Interval {
  fromY: number;
  toY: number;
  /** The curves that reach over the interval. */
  stretches: Stretch[];
}

/** Adds the integral of a straight line v over an interval of ln s against dF. */
type AddPiece = (fromY: number, toY: number, fromValue: number, toValue: number) => void;

/**
 * Completeness summed over separation, node by node of age and distance: the form that holds for
 * any number of curves, p = 1 - Π (1 - c_s p_s), and for a hard threshold, whose crossings are
 * found in closed form.
 *
 * Between places p is a straight line in ln θ, and its integral against dF is exact.
 *
 * @param star prepared star
 * @param fill rows of the eccentricity law; the second antiderivative is not used
 * @param masses number of mass nodes
 * @param columns number of semi-major axes
 * @param threshold rule
 * @returns shape [mass, semiMajorAxis], row-major, not yet cut to 0…1
 */
export function directIntegral(
  star: PreparedStar,
  fill: FillRow,
  masses: number,
  columns: number,
  threshold: SensitivitySettings['threshold'],
): Float64Array {
  const intervals = cutIntervals(star.curves, threshold);
  const completeness = new Float64Array(masses * columns);
  for (let l = 0; l < star.modulus.length; l++) {
    const sum = newRowSum(fill, columns, star.logDistance[l], intervals);
    for (let m = 0; m < masses; m++) {
      sum.restart();
      if (threshold === 'hard') addHard(star, intervals, m, star.modulus[l], sum.add);
      else addSmooth(star, intervals, m, star.modulus[l], sum.add);
      sum.addTo(completeness, m * columns, star.distances.weights[l]);
    }
  }
  return completeness;
}

/** Every place at which some curve has a point, cut finer where the rule asks for it. */
function cutIntervals(
  curves: readonly PreparedCurve[],
  threshold: SensitivitySettings['threshold'],
): Interval[] {
  const points = curves.flatMap((curve) => [...curve.logSeparation]).sort((a, b) => a - b);
  const places = points.filter((y, i) => i === 0 || y - points[i - 1] > SAME_PLACE);
  const intervals: Interval[] = [];
  for (let i = 0; i + 1 < places.length; i++) {
    const whole = intervalBetween(curves, places[i], places[i + 1]);
    if (whole.stretches.length === 0) continue;
    const steps = stepsWithin(whole, threshold);
    const at = (k: number) => places[i] + ((places[i + 1] - places[i]) * k) / steps;
    for (let k = 0; k < steps; k++) intervals.push(intervalBetween(curves, at(k), at(k + 1)));
  }
  return intervals;
}

function stepsWithin(interval: Interval, threshold: SensitivitySettings['threshold']): number {
  const { stretches, fromY, toY } = interval;
  const climb = Math.max(...stretches.map((s) => Math.abs(s.toLimit - s.fromLimit)));
  const bothVary = stretches.length > 1 || threshold === 'smooth';
  const isCovered = stretches.every((s) => s.fromCoverage === s.toCoverage);
  const forCoverage = bothVary && !isCovered ? Math.ceil((toY - fromY) / COVERAGE_STEP) : 1;
  const forLimit = threshold === 'smooth' ? Math.ceil(climb / SMOOTH_STEP_MAG) : 1;
  return Math.max(1, forCoverage, forLimit);
}

function intervalBetween(curves: readonly PreparedCurve[], fromY: number, toY: number): Interval {
  const middle = 0.5 * (fromY + toY);
  const stretches: Stretch[] = [];
  for (const curve of curves) {
    const { logSeparation, limitMag, coverage } = curve;
    if (middle < logSeparation[0] || middle > logSeparation[logSeparation.length - 1]) continue;
    const i = intervalIndex(logSeparation, middle);
    const line = (values: Float64Array, y: number) => {
      const share = (y - logSeparation[i]) / (logSeparation[i + 1] - logSeparation[i]);
      return values[i] + (values[i + 1] - values[i]) * Math.min(1, Math.max(0, share));
    };
    stretches.push({
      curve,
      fromLimit: line(limitMag, fromY),
      toLimit: line(limitMag, toY),
      fromCoverage: line(coverage, fromY),
      toCoverage: line(coverage, toY),
    });
  }
  return { fromY, toY, stretches };
}

/** Hard rule: each age node cuts the intervals where a limit crosses the companion's magnitude. */
function addHard(
  star: PreparedStar,
  intervals: readonly Interval[],
  mass: number,
  modulus: number,
  add: AddPiece,
): void {
  const ages = star.ages.weights.length;
  for (let k = 0; k < ages; k++) {
    const weight = star.ages.weights[k];
    const apparentOf = (curve: PreparedCurve) => curve.magnitudes[mass * ages + k] + modulus;
    for (const interval of intervals) {
      const cuts = crossings(interval, apparentOf);
      for (let c = 0; c + 1 < cuts.length; c++) {
        addDetected(interval, cuts[c], cuts[c + 1], weight, apparentOf, add);
      }
    }
  }
}

/** Shares of the interval, 0 to 1, between which no limit crosses its magnitude. */
function crossings(interval: Interval, apparentOf: (curve: PreparedCurve) => number): number[] {
  const cuts = [0];
  for (const { curve, fromLimit, toLimit } of interval.stretches) {
    const share = (apparentOf(curve) - fromLimit) / (toLimit - fromLimit);
    if (share > 0 && share < 1) cuts.push(share);
  }
  cuts.push(1);
  return cuts.length > 3 ? cuts.sort((a, b) => a - b) : cuts;
}

function addDetected(
  interval: Interval,
  from: number,
  to: number,
  weight: number,
  apparentOf: (curve: PreparedCurve) => number,
  add: AddPiece,
): void {
  const middle = 0.5 * (from + to);
  let missedFrom = 1;
  let missedTo = 1;
  for (const s of interval.stretches) {
    const limit = s.fromLimit + (s.toLimit - s.fromLimit) * middle;
    if (!(limit >= apparentOf(s.curve))) continue;
    const rise = s.toCoverage - s.fromCoverage;
    missedFrom *= 1 - (s.fromCoverage + rise * from);
    missedTo *= 1 - (s.fromCoverage + rise * to);
  }
  if (missedFrom === 1 && missedTo === 1) return;
  const length = interval.toY - interval.fromY;
  add(
    interval.fromY + length * from,
    interval.fromY + length * to,
    weight * (1 - missedFrom),
    weight * (1 - missedTo),
  );
}

/** Smooth rule: p at the interval's ends, averaged over the age nodes, which share the companion. */
function addSmooth(
  star: PreparedStar,
  intervals: readonly Interval[],
  mass: number,
  modulus: number,
  add: AddPiece,
): void {
  const ages = star.ages.weights.length;
  for (const interval of intervals) {
    let from = 0;
    let to = 0;
    for (let k = 0; k < ages; k++) {
      let missedFrom = 1;
      let missedTo = 1;
      for (const s of interval.stretches) {
        const magnitude = s.curve.magnitudes[mass * ages + k];
        if (magnitude === Infinity) continue;
        const { probability } = thresholdTable(s.curve.nSigma);
        const apparent = magnitude + modulus;
        missedFrom *= 1 - s.fromCoverage * probability(s.fromLimit - apparent);
        missedTo *= 1 - s.toCoverage * probability(s.toLimit - apparent);
      }
      from += star.ages.weights[k] * (1 - missedFrom);
      to += star.ages.weights[k] * (1 - missedTo);
    }
    if (from > 0 || to > 0) add(interval.fromY, interval.toY, from, to);
  }
}

/**
 * Gathers straight pieces into one factor per place, so that a row is read once however many pieces
 * meet there: ∫ v dF = v_b F_b - v_a F_a - (v_b - v_a)(G_b - G_a)/(b - a), G the antiderivative.
 */
function newRowSum(
  fill: FillRow,
  columns: number,
  logDistance: number,
  intervals: readonly Interval[],
) {
  const rows = new Map<number, SeparationRow>();
  for (const y of new Set(intervals.flatMap(({ fromY, toY }) => [fromY, toY]))) {
    const row = newRow(columns);
    fill(y + logDistance, row);
    rows.set(y, row);
  }
  const crossing = newRow(columns);
  const forF = new Map<number, number>();
  const forG = new Map<number, number>();
  const increase = (factors: Map<number, number>, y: number, by: number) => {
    factors.set(y, (factors.get(y) ?? 0) + by);
  };
  const add: AddPiece = (fromY, toY, fromValue, toValue) => {
    increase(forF, toY, toValue);
    increase(forF, fromY, -fromValue);
    const change = toValue - fromValue;
    if (Math.abs(change) < NEGLIGIBLE) return;
    const length = toY - fromY;
    if (length < SAME_PLACE) {
      increase(forF, toY, -0.5 * change);
      increase(forF, fromY, -0.5 * change);
      return;
    }
    increase(forG, toY, -change / length);
    increase(forG, fromY, change / length);
  };
  const rowAt = (y: number) => {
    const known = rows.get(y);
    if (known) return known;
    fill(y + logDistance, crossing);
    return crossing;
  };
  return {
    add,
    restart: () => {
      forF.clear();
      forG.clear();
    },
    addTo: (out: Float64Array, start: number, weight: number) => {
      for (const [y, factor] of forF) {
        const slope = forG.get(y) ?? 0;
        if (Math.abs(factor) < NEGLIGIBLE && slope === 0) continue;
        const { cumulative, first } = rowAt(y);
        const [perF, perG] = [weight * factor, weight * slope];
        for (let j = 0; j < columns; j++) {
          out[start + j] += perF * cumulative[j] + perG * first[j];
        }
      }
    },
  };
}
