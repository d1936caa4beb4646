import { clear, put, real, whole } from '../machine';

/** Doubles of a stretch: ln t where it begins, its cell, and its places in the cell at both ends. */
export const STRETCH: i32 = 4;
/** Doubles of a side, see writeSide. */
export const SIDE: i32 = 10;
/** Doubles that are kept of a side from mass to mass: where its two searches ended. */
export const HINTS: i32 = 2;

// Chance and area at the place that was last asked for, see momentsAt.
let chance: f64 = 0;
let area: f64 = 0;

// The masses' paths through the cooling relation, see CoolingPaths.
let stretches: i32 = 0;
let begins: i32 = 0;
let fades: i32 = 0;

export function setPaths(stretchesAt: i32, beginsAt: i32, fadesAt: i32): void {
  stretches = stretchesAt;
  begins = beginsAt;
  fades = fadesAt;
}

// Where the age is uncertain.
let sides: i32 = 0;
let sideCount: i32 = 0;
let normal: i32 = 0;
let normalStep: f64 = 0;
let searches: i32 = 0;

/**
 * @param normalAt Φ and its integral at equal steps of z, shape [node, 2]
 * @param searchesAt where HINTS doubles a side are kept
 */
export function setSides(
  sidesAt: i32,
  count: i32,
  normalAt: i32,
  stepOfNormal: f64,
  searchesAt: i32,
): void {
  sides = sidesAt;
  sideCount = count;
  normal = normalAt;
  normalStep = stepOfNormal;
  searches = searchesAt;
}

/**
 * P(age < t) of one side, from 0 to the side's weight; areaHere tells its integral over ln t from
 * the side's beginning.
 *
 * @param side place of its numbers, see writeSide
 * @param x ln t, [ln Myr], may be infinite
 * Accuracy: 2e-6 of the side's weight; area is the exact integral of the lines behind chance.
 */
export function chanceBefore(side: i32, x: f64): f64 {
  const weight = real(side);
  const from = real(side + 1);
  const to = real(side + 2);
  const sigma = real(side + 3);
  if (x <= from) {
    chance = 0;
    area = 0;
  } else if (sigma > 0) {
    if (x >= to) {
      chance = weight;
      area = real(side + 9) + weight * (x - to);
      return chance;
    }
    const place: f64 = (x - real(side + 4)) * real(side + 5);
    const k = whole(place);
    const t: f64 = place - k;
    const node = normal + 2 * k;
    const low = real(node);
    const rise: f64 = real(node + 2) - low;
    const sum: f64 = real(node + 1) + t * (low + 0.5 * t * rise) * normalStep;
    const scale = real(side + 6);
    const start = real(side + 7);
    chance = scale * (low + t * rise - start);
    area = scale * (sigma * (sum - real(side + 8)) - start * (x - from));
  } else {
    const length: f64 = to - from;
    const along: f64 = Math.min(length, x - from);
    chance = (weight * along) / length;
    area = (weight * along * along) / (2 * length) + weight * Math.max(0, x - to);
  }
  return chance;
}

export function areaHere(): f64 {
  return area;
}

// What is wanted of a spread, and where it is written, counted from the lowest cell.
let lowest: i32 = 0;
let highest: i32 = 0;
let deposit: i32 = 0;
let isBetweenPoints: boolean = false;

/**
 * @param lowestCell lowest cell wanted
 * @param highestCell one past the highest
 * @param depositAt where the weights go, 0 at first
 * @param betweenPoints 1 to spread over the cells' ends rather than the cells
 */
export function openSpread(
  lowestCell: i32,
  highestCell: i32,
  depositAt: i32,
  betweenPoints: i32,
): void {
  lowest = lowestCell;
  highest = highestCell;
  deposit = depositAt;
  isBetweenPoints = betweenPoints !== 0;
  clear(searches, HINTS * sideCount);
}

// Of the mass that was last spread: its first cell and one past its last, none when these cross;
// the chance of a magnitude at all, and of one brighter than every cell wanted.
export let spreadFirst: i32 = 0;
export let spreadEnd: i32 = 0;
export let spreadTotal: f64 = 0;
export let spreadBrighter: f64 = 0;

/**
 * Spreads an uncertain age over magnitudes, exactly: every stretch of a path has the chance that
 * the age law gives it. Between points, a companion counts at both neighbours in the proportion of
 * its place; otherwise in its cell.
 */
export function spreadAge(mass: i32): void {
  spreadFirst = highest;
  spreadEnd = lowest;
  spreadTotal = 0;
  spreadBrighter = 0;
  for (let s: i32 = 0; s < sideCount; s++) spreadSide(mass, sides + s * SIDE, searches + s * HINTS);
  if (isBetweenPoints && spreadEnd > spreadFirst) spreadEnd++;
}

/** Takes what was spread away again. */
export function clearSpread(): void {
  if (spreadEnd > spreadFirst) {
    clear(deposit + spreadFirst - lowest, spreadEnd - spreadFirst);
  }
}

function spreadSide(mass: i32, side: i32, hints: i32): void {
  const weight = real(side);
  const to = real(side + 2);
  const isFading = real(fades + mass) !== 0;
  const begin = whole(real(begins + mass));
  // The last record of a mass only tells where its last stretch ends.
  const end = whole(real(begins + mass + 1)) - 1;
  let low = firstAbove(STRETCH, begin, end, real(side + 1), hints);
  // What fades is seen at first, then among the cells, then no more: the rest needs no walk.
  if (isFading && low < end && real(stretches + STRETCH * low + 1) < lowest) {
    low = firstAbove(1, begin, end, lowest - 1, hints + 1);
  }
  let record = stretches + STRETCH * low;
  let x: f64 = low < end ? real(record) : Infinity;
  const before = chanceBefore(side, x);
  if (isFading) {
    spreadTotal += weight;
    spreadBrighter += before;
  }
  let chanceB = chance;
  let areaB = area;
  const past = stretches + STRETCH * end;
  for (; record < past && x < to; record += STRETCH) {
    const c = whole(real(record + 1));
    if (isFading && c >= highest) break;
    const xA: f64 = x;
    const chanceA: f64 = chanceB;
    const areaA: f64 = areaB;
    x = real(record + STRETCH);
    chanceB = chanceBefore(side, x);
    areaB = area;
    const here: f64 = chanceB - chanceA;
    // A cell below 0 has no magnitude.
    if (c < 0 || !(here > 0)) continue;
    if (!isFading) {
      spreadTotal += here;
      if (c < lowest) spreadBrighter += here;
      if (c < lowest || c >= highest) continue;
    }
    if (c < spreadFirst) spreadFirst = c;
    if (c >= spreadEnd) spreadEnd = c + 1;
    const place = deposit + c - lowest;
    if (!isBetweenPoints) {
      put(place, real(place) + here);
      continue;
    }
    const a = real(record + 2);
    const b = real(record + 3);
    const tilt: f64 = a === b ? 0 : (b - a) / (x - xA);
    const above: f64 = tilt === 0 ? a * here : b * chanceB - a * chanceA - tilt * (areaB - areaA);
    put(place, real(place) + (here - above));
    put(place + 1, real(place + 1) + above);
  }
}

/**
 * First stretch from begin to end of which an increasing number is above a bound; end for none. It
 * is looked for around the place where the last mass had it: neighbours in mass fade alike.
 *
 * @param field of the stretch's record: STRETCH is where the stretch ends
 * @param hint where the place is kept, counted from the mass's first stretch
 */
function firstAbove(field: i32, begin: i32, end: i32, bound: f64, hint: i32): i32 {
  const at = stretches + field;
  let low = begin;
  let high = end;
  let step: i32 = 1;
  let place = begin + whole(real(hint));
  if (place > end) place = end;
  if (place < end && !(real(at + STRETCH * place) > bound)) {
    // Upwards in growing steps: what is not above lies below `low`.
    low = place + 1;
    while (low + step < end && !(real(at + STRETCH * (low + step)) > bound)) {
      low += step + 1;
      step <<= 1;
    }
    if (low + step < end) high = low + step;
  } else {
    high = place;
    while (high - step > begin && real(at + STRETCH * (high - step)) > bound) {
      high -= step;
      step <<= 1;
    }
    if (high - step > begin) low = high - step;
  }
  while (low < high) {
    const middle = (low + high) >> 1;
    if (real(at + STRETCH * middle) > bound) high = middle;
    else low = middle + 1;
  }
  put(hint, low - begin);
  return low;
}
