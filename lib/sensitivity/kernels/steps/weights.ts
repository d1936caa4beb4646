import { clear, convolve, move, put, real, whole } from '../machine';
import {
  clearSpread,
  openSpread,
  spreadAge,
  spreadBrighter,
  spreadEnd,
  spreadFirst,
  spreadTotal,
} from './age-spread';

// How the chance of a detection rises over the cells around a companion, see MagnitudeKernel.
let taps: i32 = 0;
let tapCount: i32 = 0;
let firstTap: i32 = 0;
let lastTap: i32 = 0;
let base: f64 = 0;
let isBetweenPoints: i32 = 0;

/** @param tapsAt the first of `count` rises: a 0 stands before it, two stand after the last */
export function setKernel(
  tapsAt: i32,
  count: i32,
  from: i32,
  to: i32,
  chanceOfNone: f64,
  betweenPoints: i32,
): void {
  taps = tapsAt;
  tapCount = count;
  firstTap = from;
  lastTap = to;
  base = chanceOfNone;
  isBetweenPoints = betweenPoints;
}

// Single ages: weights, and magnitudes of every mass; the smooth threshold's table and its cells.
let ages: i32 = 0;
let ageWeights: i32 = 0;
let magnitudes: i32 = 0;
let threshold: i32 = 0;
let thresholdSteps: i32 = 0;
let thresholdStart: f64 = 0;
let thresholdPerStep: f64 = 0;
let cellMag: f64 = 0;
let perCell: f64 = 0;
let cellOfZero: i32 = 0;
let spread: f64 = 0;

/** @param count 0 for none: the rest is not looked at */
export function setSingleAges(
  count: i32,
  weightsAt: i32,
  magnitudesAt: i32,
  tableAt: i32,
  tableSteps: i32,
  tableStart: f64,
  perStep: f64,
  cell: f64,
  cellsPerMag: f64,
  zero: i32,
  secondDifference: f64,
): void {
  ages = count;
  ageWeights = weightsAt;
  magnitudes = magnitudesAt;
  threshold = tableAt;
  thresholdSteps = tableSteps;
  thresholdStart = tableStart;
  thresholdPerStep = perStep;
  cellMag = cell;
  perCell = cellsPerMag;
  cellOfZero = zero;
  spread = secondDifference;
}

/** Chance of a detection where the limit is so many cells fainter than the companion. */
function chanceAt(cells: f64): f64 {
  const place: f64 = (cells * cellMag - thresholdStart) * thresholdPerStep;
  if (!(place > 0)) return real(threshold);
  if (place >= thresholdSteps) return 1;
  const i = whole(place);
  const low = real(threshold + i);
  return low + (real(threshold + i + 1) - low) * (place - i);
}

/** The same with the spread of cells taken back; what little lies further down counts at once. */
function sharpenedAt(cells: f64, below: f64, here: f64, above: f64): f64 {
  return cells <= firstTap + 1 ? base : here - spread * (above - 2 * here + below);
}

/**
 * W: how Π(q) = E p(q - M), the chance of a detection where the limit is q, rises from cell to cell
 * of limiting magnitude, for every mass. Ages are integrated exactly, no nodes are used.
 *
 * @param masses number of masses
 * @param first first cell of the star
 * @param cells number of its cells
 * @param at where the rows of cells + 1 go; the first entry is Π below every cell
 * @param bands where the row is not 0, first and one past the last entry, shape [mass, 2]; entry 0
 *   counts apart
 * @param scratch where so many doubles as weightScratch tells may be written
 */
export function fillWeights(
  masses: i32,
  first: i32,
  cells: i32,
  at: i32,
  bands: i32,
  scratch: i32,
): void {
  // Places whose rises reach the cells: any other counts in full, or not at all.
  const lowest = first - lastTap;
  const highest = first + cells - firstTap;
  const deposit = scratch;
  const rises = deposit + highest - lowest + 4;
  const origin = lowest + firstTap;
  clear(scratch, rises + highest + lastTap - origin + 8 - scratch);
  clear(at, masses * (cells + 1));
  openSpread(lowest, highest, deposit, isBetweenPoints);
  for (let m: i32 = 0; m < masses; m++) {
    spreadAge(m);
    let from = spreadFirst + firstTap;
    let end = spreadEnd + lastTap;
    let sum: f64 = spreadBrighter + base * (spreadTotal - spreadBrighter);
    if (spreadEnd > spreadFirst) {
      const places = spreadEnd - spreadFirst;
      convolve(
        rises + from - origin,
        deposit + spreadFirst - lowest,
        places + (places & 1),
        taps,
        tapCount,
      );
      clearSpread();
    }
    for (let k: i32 = 0; k < ages; k++) {
      const magnitude = real(magnitudes + m * ages + k);
      if (magnitude === Infinity) continue;
      const weight = real(ageWeights + k);
      const place: f64 = magnitude * perCell + cellOfZero;
      const floor: f64 = Math.floor(place);
      sum += weight * (floor < lowest ? 1 : base);
      if (floor < lowest || floor >= highest) continue;
      const cell = whole(floor);
      if (cell + firstTap < from) from = cell + firstTap;
      if (cell + lastTap + 2 > end) end = cell + lastTap + 2;
      addSingle(cell, place, weight, rises - origin);
    }
    if (end <= from) {
      put(at + m * (cells + 1), sum);
      put(bands + 2 * m, cells + 1);
      put(bands + 2 * m + 1, 0);
      continue;
    }
    const last: i32 = end - first < cells ? end - first : cells;
    const begin: i32 = from > first ? from - first : 0;
    for (let c = from; c < first && c < end; c++) sum += real(rises + c - origin);
    const row = at + m * (cells + 1);
    put(row, sum);
    const isReached = last > begin;
    if (isReached) move(row + 1 + begin, rises + first + begin - origin, last - begin);
    put(bands + 2 * m, isReached ? begin + 1 : cells + 1);
    put(bands + 2 * m + 1, isReached ? last + 1 : 0);
    clear(rises + from - origin, end - from + 2);
  }
}

function addSingle(cell: i32, place: f64, weight: f64, rises: i32): void {
  let before = base;
  let c: i32 = cell + firstTap;
  let under = chanceAt(c - place);
  let here = chanceAt(c + 1 - place);
  for (; c <= cell + 1 + lastTap; c++) {
    const cells: f64 = c + 1 - place;
    const over = chanceAt(cells + 1);
    const next = sharpenedAt(cells, under, here, over);
    put(rises + c, real(rises + c) + weight * (next - before));
    before = next;
    under = here;
    here = over;
  }
}
