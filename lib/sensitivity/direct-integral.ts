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
  /** Where the ends stand in the list of places. */
  fromPlace: number;
  toPlace: number;
  /** The curves that reach over the interval. */
  stretches: Stretch[];
}

/** Between the places: a crossing, whose row is not kept. */
const NO_PLACE = -1;

/** A straight line v over [fromY, toY], to be integrated against dF. */
type AddPiece = (
  fromY: number,
  toY: number,
  fromValue: number,
  toValue: number,
  fromPlace: number,
  toPlace: number,
) => void;

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
  const { intervals, places } = cutIntervals(star.curves, threshold);
  const completeness = new Float64Array(masses * columns);
  for (let l = 0; l < star.modulus.length; l++) {
    const sum = newRowSum(fill, columns, star.logDistance[l], places);
    for (let m = 0; m < masses; m++) {
      if (threshold === 'hard') addHard(star, intervals, m, star.modulus[l], sum.add);
      else addSmooth(star, intervals, m, star.modulus[l], sum.add);
      sum.emptyInto(completeness, m * columns, star.distances.weights[l]);
    }
  }
  return completeness;
}

/** Every place at which some curve has a point, cut finer where the rule asks for it. */
function cutIntervals(
  curves: readonly PreparedCurve[],
  threshold: SensitivitySettings['threshold'],
): { intervals: Interval[]; places: number[] } {
  const points = curves.flatMap((curve) => [...curve.logSeparation]).sort((a, b) => a - b);
  const ends = points.filter((y, i) => i === 0 || y - points[i - 1] > SAME_PLACE);
  const intervals: Interval[] = [];
  const places = [ends[0]];
  for (let i = 0; i + 1 < ends.length; i++) {
    const whole = stretchesBetween(curves, ends[i], ends[i + 1]);
    const steps = stepsWithin(whole, ends[i + 1] - ends[i], threshold);
    for (let k = 1; k <= steps; k++) {
      const fromPlace = places.length - 1;
      const fromY = places[fromPlace];
      const toY = k === steps ? ends[i + 1] : ends[i] + ((ends[i + 1] - ends[i]) * k) / steps;
      places.push(toY);
      const stretches = stretchesBetween(curves, fromY, toY);
      if (stretches.length === 0) continue;
      intervals.push({ fromY, toY, fromPlace, toPlace: fromPlace + 1, stretches });
    }
  }
  return { intervals, places };
}

function stepsWithin(
  stretches: readonly Stretch[],
  length: number,
  threshold: SensitivitySettings['threshold'],
): number {
  const climb = Math.max(0, ...stretches.map((s) => Math.abs(s.toLimit - s.fromLimit)));
  const bothVary = stretches.length > 1 || threshold === 'smooth';
  const isCovered = stretches.every((s) => s.fromCoverage === s.toCoverage);
  const forCoverage = bothVary && !isCovered ? Math.ceil(length / COVERAGE_STEP) : 1;
  const forLimit = threshold === 'smooth' ? Math.ceil(climb / SMOOTH_STEP_MAG) : 1;
  return Math.max(1, forCoverage, forLimit);
}

function stretchesBetween(curves: readonly PreparedCurve[], fromY: number, toY: number): Stretch[] {
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
  return stretches;
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
    from === 0 ? interval.fromPlace : NO_PLACE,
    to === 1 ? interval.toPlace : NO_PLACE,
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
    if (from === 0 && to === 0) continue;
    add(interval.fromY, interval.toY, from, to, interval.fromPlace, interval.toPlace);
  }
}

/**
 * Gathers straight pieces into one factor per place, so that a row is read once however many pieces
 * meet there: ∫ v dF = v_b F_b - v_a F_a - (v_b - v_a)(G_b - G_a)/(b - a), G the antiderivative.
 */
function newRowSum(fill: FillRow, columns: number, logDistance: number, places: readonly number[]) {
  const rows = places.map((y) => {
    const row = newRow(columns);
    fill(y + logDistance, row);
    return row;
  });
  const crossing = newRow(columns);
  const forF = new Float64Array(places.length);
  const forG = new Float64Array(places.length);
  const crossings: { y: number; perF: number; perG: number }[] = [];
  const increase = (y: number, place: number, perF: number, perG: number) => {
    if (place === NO_PLACE) {
      crossings.push({ y, perF, perG });
      return;
    }
    forF[place] += perF;
    forG[place] += perG;
  };
  const add: AddPiece = (fromY, toY, fromValue, toValue, fromPlace, toPlace) => {
    const change = toValue - fromValue;
    const length = toY - fromY;
    // A piece too short to divide by counts as a jump half-way up.
    const isJump = length < SAME_PLACE;
    const perG = isJump ? 0 : change / length;
    const half = isJump ? 0.5 * change : 0;
    increase(toY, toPlace, toValue - half, -perG);
    increase(fromY, fromPlace, -fromValue - half, perG);
  };
  const addRow = (row: SeparationRow, perF: number, perG: number, out: Float64Array) => {
    const { cumulative, first } = row;
    for (let j = 0; j < columns; j++) out[j] += perF * cumulative[j] + perG * first[j];
  };
  return {
    add,
    /** Adds the weighted integral of every piece to a map's row, and starts again. */
    emptyInto: (map: Float64Array, start: number, weight: number) => {
      const out = map.subarray(start, start + columns);
      for (let place = 0; place < rows.length; place++) {
        const isNothing = Math.abs(forF[place]) < NEGLIGIBLE && Math.abs(forG[place]) < NEGLIGIBLE;
        if (!isNothing) addRow(rows[place], weight * forF[place], weight * forG[place], out);
      }
      for (const { y, perF, perG } of crossings) {
        fill(y + logDistance, crossing);
        addRow(crossing, weight * perF, weight * perG, out);
      }
      forF.fill(0);
      forG.fill(0);
      crossings.length = 0;
    },
  };
}
