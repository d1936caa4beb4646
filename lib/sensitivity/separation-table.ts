import { singleEccentricity } from './eccentricity';
import { largestSeparation, separationCumulative } from './orbits';
import type { EccentricityLaw } from './types';

/**
 * F(y) = P(ln ρ < y) of one eccentricity law with its first two antiderivatives, on equal steps in
 * y. F is the straight line between nodes and the others are its exact integrals, so that weights
 * taken as their differences add up.
 */
export interface SeparationTable {
  /** y of node 0; F is 0 below it. */
  start: number;
  step: number;
  /** Node values, shape [n + 1]; F is 1 beyond the last. */
  cumulative: Float64Array;
  first: Float64Array;
  second: Float64Array;
}

/** ρ = 5.5e-4, below which F < 2e-7 for every law but the most eccentric. */
const START = -7.5;
const INTERVALS = 16_384;
/** A law that spreads is sampled until a cubic misses the middle of an interval by less than this. */
const SAMPLING_TOLERANCE = 1e-6;
const COARSE_INTERVAL = 256;

const tables = new Map<string, SeparationTable>();
const KEPT_TABLES = 16;

/**
 * The table of a law, built once and kept.
 *
 * @throws RangeError for parameters outside their domain
 * Accuracy: 5e-6 in F, except within 5e-4 of ρ = 1 for e = 0 (use the closed form there).
 * Cost: 20 ms for one eccentricity and for a law that spreads.
 */
export function separationTable(law: EccentricityLaw): SeparationTable {
  const key = JSON.stringify(Object.entries(law).sort());
  const known = tables.get(key);
  if (known) return known;
  const table = buildTable(law);
  if (tables.size >= KEPT_TABLES) tables.delete(tables.keys().next().value as string);
  tables.set(key, table);
  return table;
}

const joined = new WeakMap<SeparationTable, Float64Array>();

/** The three arrays of a law's table one after another, as the kernels read them. */
export function joinedTable(law: EccentricityLaw): Float64Array {
  const table = separationTable(law);
  const known = joined.get(table);
  if (known) return known;
  const { cumulative, first, second } = table;
  const values = new Float64Array(3 * cumulative.length);
  values.set(cumulative);
  values.set(first, cumulative.length);
  values.set(second, 2 * cumulative.length);
  joined.set(table, values);
  return values;
}

function buildTable(law: EccentricityLaw): SeparationTable {
  const step = (Math.log(largestSeparation(law)) - START) / INTERVALS;
  const cumulative = new Float64Array(INTERVALS + 1);
  const valueAt = (i: number) => separationCumulative(Math.exp(START + i * step), law);
  if (singleEccentricity(law) !== null) {
    for (let i = 0; i < INTERVALS; i++) cumulative[i] = valueAt(i);
  } else {
    for (let i = 0; i < INTERVALS; i += COARSE_INTERVAL) cumulative[i] = valueAt(i);
  }
  cumulative[0] = 0;
  cumulative[INTERVALS] = 1;
  if (singleEccentricity(law) === null) {
    for (let i = 0; i < INTERVALS; i += COARSE_INTERVAL) {
      sampleBetween(cumulative, i, i + COARSE_INTERVAL, valueAt);
    }
    // Where F is level a quartic may fall by 1e-8; a distribution function does not.
    for (let i = 1; i < INTERVALS; i++) {
      cumulative[i] = Math.min(1, Math.max(cumulative[i], cumulative[i - 1]));
    }
  }
  return { start: START, step, cumulative, ...antiderivatives(cumulative, step) };
}

/** Fills the nodes between two known ones, by a quartic once that is good enough. */
function sampleBetween(
  values: Float64Array,
  from: number,
  to: number,
  valueAt: (i: number) => number,
): void {
  const quarter = (to - from) >> 2;
  if (quarter < 1) {
    for (let i = from + 1; i < to; i++) values[i] = valueAt(i);
    return;
  }
  const middle = from + 2 * quarter;
  const places = [from, from + quarter, middle, to - quarter, to];
  for (const place of places.slice(1, 4)) values[place] = valueAt(place);
  const [a, b, c, d, e] = places.map((place) => values[place]);
  if (Math.abs((4 * (b + d) - a - e) / 6 - c) > SAMPLING_TOLERANCE) {
    sampleBetween(values, from, middle, valueAt);
    sampleBetween(values, middle, to, valueAt);
    return;
  }
  // Newton's form on the four differences, t in quarters.
  const [first, second] = [b - a, c - 2 * b + a];
  const third = d - 3 * c + 3 * b - a;
  const fourth = e - 4 * d + 6 * c - 4 * b + a;
  for (let i = from + 1; i < to; i++) {
    if (places.includes(i)) continue;
    const t = (i - from) / quarter;
    const inner = third / 6 + ((t - 3) / 24) * fourth;
    values[i] = a + t * (first + (t - 1) * (0.5 * second + (t - 2) * inner));
  }
}

function antiderivatives(values: Float64Array, step: number) {
  const first = new Float64Array(values.length);
  const second = new Float64Array(values.length);
  for (let i = 0; i + 1 < values.length; i++) {
    const rise = values[i + 1] - values[i];
    first[i + 1] = first[i] + step * (values[i] + 0.5 * rise);
    second[i + 1] = second[i] + step * (first[i] + step * (0.5 * values[i] + rise / 6));
  }
  return { first, second };
}
