import { intervalIndex } from '@/lib/numerics/grid';
import type { Likelihood, RatePosterior } from './contract';
import type { PriorLaw } from './prior-law';

/** A density of the rate, straight between points. */
export interface DensityTable {
  /** Rate, increasing, >= 0. */
  value: number[];
  /** Per unit of the rate, >= 0, of any scale: it is normalised. */
  density: number[];
}

/** Most points of a table: each is a piece of its own in the integral. */
const MOST_POINTS = 2000;

function checkTable({ value, density }: DensityTable, likelihood: Likelihood): void {
  if (value.length !== density.length) {
    throw new RangeError(
      `tabulated prior: one density for each value, got ${density.length} for ${value.length}`,
    );
  }
  if (value.length < 2 || value.length > MOST_POINTS) {
    throw new RangeError(`tabulated prior: 2 to ${MOST_POINTS} points, got ${value.length}`);
  }
  for (let i = 0; i < value.length; i++) {
    if (!(value[i] >= 0) || !Number.isFinite(value[i])) {
      throw new RangeError(`tabulated prior: a rate must be a number >= 0, got ${value[i]}`);
    }
    if (i > 0 && !(value[i] > value[i - 1])) {
      throw new RangeError(
        `tabulated prior: values must increase, got ${value[i]} after ${value[i - 1]}`,
      );
    }
    if (!(density[i] >= 0) || !Number.isFinite(density[i])) {
      throw new RangeError(`tabulated prior: a density must be a number >= 0, got ${density[i]}`);
    }
  }
  const last = value[value.length - 1];
  if (likelihood === 'host-fraction' && last > 1) {
    throw new RangeError(`tabulated prior: a fraction of stars cannot exceed 1, got ${last}`);
  }
}

/** The table without the empty pieces at its ends, which carry nothing. */
function trimmed({ value, density }: DensityTable): DensityTable {
  const first = Math.max(0, density.findIndex((d) => d > 0) - 1);
  let last = density.length - 1;
  while (last > 0 && density[last] === 0 && density[last - 1] === 0) last--;
  return { value: value.slice(first, last + 1), density: density.slice(first, last + 1) };
}

function areaOf({ value, density }: DensityTable): number {
  let area = 0;
  for (let i = 1; i < value.length; i++) {
    area += 0.5 * (density[i] + density[i - 1]) * (value[i] - value[i - 1]);
  }
  return area;
}

/**
 * Density at x, straight between the points; 0 outside.
 *
 * @example densityAt({ value: [0, 1], density: [2, 0] }, 0.25) // 1.5
 */
export function densityAt({ value, density }: DensityTable, x: number): number {
  const last = value.length - 1;
  if (!(x >= value[0] && x <= value[last])) return 0;
  const i = intervalIndex(value, x);
  const share = (x - value[i]) / (value[i + 1] - value[i]);
  return density[i] * (1 - share) + density[i + 1] * share;
}

/**
 * Prior from a table: the density is straight between points and 0 outside.
 *
 * @throws RangeError for values that do not increase, a density that is negative or zero
 *   everywhere, tables of fewer than 2 or more than 2000 points, and a fraction above 1
 */
export function tabulatedLaw(table: DensityTable, likelihood: Likelihood): PriorLaw {
  checkTable(table, likelihood);
  if (table.density.every((d) => d === 0)) {
    throw new RangeError('tabulated prior: the density is zero everywhere');
  }
  const kept = trimmed(table);
  return {
    support: [kept.value[0], kept.value[kept.value.length - 1]],
    exponentAtZero: 1,
    exponentAtOne: 1,
    logRegular: (x) => Math.log(densityAt(kept, x)),
    decay: 0,
    logNorm: Math.log(areaOf(kept)),
    breaks: kept.value,
  };
}

/**
 * The part of a table below a rate, for a prior that is cut there.
 *
 * @throws RangeError where nothing of the table lies below
 */
export function cutTable(table: DensityTable, top: number): DensityTable {
  const count = table.value.filter((x) => x < top).length;
  if (count === table.value.length) return table;
  const kept = {
    value: [...table.value.slice(0, count), top],
    density: [...table.density.slice(0, count), densityAt(table, top)],
  };
  if (count === 0 || areaOf(kept) === 0) {
    throw new RangeError(`tabulated prior: it has nothing below ${top}, where the rate must end`);
  }
  return kept;
}

/** Probability left out where the density is infinite, or where an unbounded one is cut. */
const TAIL = 1e-9;
/** Pieces at the start, and at most. */
const FIRST_PIECES = 32;
const MOST_PIECES = 999;

/**
 * A posterior as a table, to be the prior of a later survey.
 *
 * Points are put where the density bends: the piece whose straight line misses most area is halved
 * until no piece misses 1e-7 of the whole, or 1000 points are there.
 *
 * @returns at most 1000 points; 1e-9 of the probability is left out at an end where the density is
 *   infinite or the support has no end
 * Accuracy: a limit under the table is within 1e-4 of the one under the posterior, mostly 1e-6.
 */
export function tabulatePosterior(posterior: RatePosterior): DensityTable {
  const [low, top] = posterior.support;
  const ends: [number, number] = [
    Number.isFinite(posterior.density(low)) ? low : posterior.quantile(TAIL),
    Number.isFinite(top) && Number.isFinite(posterior.density(top))
      ? top
      : posterior.quantile(1 - TAIL),
  ];
  const inner = Array.from({ length: FIRST_PIECES - 1 }, (_, i) =>
    posterior.quantile((i + 1) / FIRST_PIECES),
  );
  const starts = [...new Set([ends[0], ...inner, ends[1]])].sort((a, b) => a - b);
  const pieces = starts.slice(1).map((to, i) => pieceOf(posterior, starts[i], to));
  while (pieces.length < MOST_PIECES) {
    let worst = 0;
    for (let i = 1; i < pieces.length; i++) if (pieces[i].missed > pieces[worst].missed) worst = i;
    const { from, middle, to, missed } = pieces[worst];
    if (missed < 1e-7) break;
    pieces.splice(worst, 1, pieceOf(posterior, from, middle), pieceOf(posterior, middle, to));
  }
  const value = [pieces[0].from, ...pieces.map(({ to }) => to)];
  return { value, density: value.map((x) => posterior.density(x)) };
}

function pieceOf(posterior: RatePosterior, from: number, to: number) {
  const middle = 0.5 * (from + to);
  const straight = 0.5 * (posterior.density(from) + posterior.density(to));
  return { from, middle, to, missed: Math.abs(posterior.density(middle) - straight) * (to - from) };
}
