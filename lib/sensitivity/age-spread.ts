import { type AgeSide, sideMoments } from './age-sides';
import { type CoolingPaths, UNDETECTABLE } from './cooling-paths';

/** The chances of one mass's magnitudes, spread over the lattice. */
export interface SpreadAge {
  /** Cells with a weight: first and one past the last; none when end <= first. */
  first: number;
  end: number;
  /** Chance of a magnitude at all, and of one brighter than every cell asked for. */
  total: number;
  brighter: number;
}

/**
 * Spreads an uncertain age over magnitudes, exactly: every stretch of a path has the chance that
 * the age law gives it. Between points, a companion counts at both neighbours in the proportion of
 * its place; otherwise in its cell.
 *
 * @param paths the masses' paths through the cooling relation
 * @param sides where the age is uncertain
 * @param betweenPoints whether to spread over the cells' ends rather than the cells
 * @param lowest lowest cell wanted
 * @param highest one past the highest
 * @param weights filled anew for each mass, counted from the lowest cell, one more than the cells
 * @returns function of a mass's index
 */
export function newAgeSpread(
  paths: CoolingPaths,
  sides: readonly AgeSide[],
  betweenPoints: boolean,
  lowest: number,
  highest: number,
  weights: Float64Array,
): (mass: number) => SpreadAge {
  const { begins, fromLogAge, toLogAge, cell, fromShare, toShare, longest, fades } = paths;
  const { knots, moments } = scratchFor(longest + 1);
  const { chance, area } = moments;
  const fills = sides.map(sideMoments);
  const spread: SpreadAge = { first: 0, end: 0, total: 0, brighter: 0 };
  return (mass) => {
    weights.fill(0);
    let [first, end, total, brighter] = [highest, lowest, 0, 0];
    for (let i = 0; i < sides.length; i++) {
      const side = sides[i];
      let low = firstAbove(toLogAge, begins[mass], begins[mass + 1], side.from);
      let last = begins[mass + 1];
      if (fades[mass]) {
        // What is brighter or fainter than the cells lies before or after them in one piece.
        low = Math.max(low, firstAbove(cell, begins[mass], last, lowest - 1));
        last = firstAbove(cell, low, last, highest - 1);
      }
      let stretches = 0;
      for (let s = low; s < last && fromLogAge[s] < side.to; s++) {
        knots[stretches++] = fromLogAge[s];
      }
      if (stretches === 0) {
        if (!fades[mass]) continue;
        // One place tells the share before the cells; none of the rest is among them.
        knots[0] = low < begins[mass + 1] ? fromLogAge[low] : Infinity;
        fills[i](knots, 1, moments);
        total += side.weight;
        brighter += chance[0];
        continue;
      }
      knots[stretches] = toLogAge[low + stretches - 1];
      fills[i](knots, stretches + 1, moments);
      if (fades[mass]) {
        total += side.weight - (chance[stretches] - chance[0]);
        brighter += chance[0];
      }
      for (let k = 0; k < stretches; k++) {
        const s = low + k;
        const c = cell[s];
        const here = chance[k + 1] - chance[k];
        if (c === UNDETECTABLE || !(here > 0)) continue;
        total += here;
        if (c < lowest) brighter += here;
        if (c < lowest || c >= highest) continue;
        if (c < first) first = c;
        if (c >= end) end = c + 1;
        const at = c - lowest;
        if (!betweenPoints) {
          weights[at] += here;
          continue;
        }
        const a = fromShare[s];
        const b = toShare[s];
        const tilt = a === b ? 0 : (b - a) / (knots[k + 1] - knots[k]);
        const above =
          tilt === 0
            ? a * here
            : b * chance[k + 1] - a * chance[k] - tilt * (area[k + 1] - area[k]);
        weights[at] += here - above;
        weights[at + 1] += above;
      }
    }
    spread.first = first;
    spread.end = betweenPoints && end > first ? end + 1 : end;
    spread.total = total;
    spread.brighter = brighter;
    return spread;
  };
}

/** Written anew for every mass, so one set serves every star. */
let scratch = newScratch(1024);

function newScratch(places: number) {
  const [knots, chance, area] = [0, 1, 2].map(() => new Float64Array(places));
  return { knots, moments: { chance, area } };
}

function scratchFor(places: number) {
  if (places > scratch.knots.length) scratch = newScratch(2 * places);
  return scratch;
}

/** First index from begin to end at which increasing values are above a bound; end for none. */
function firstAbove(
  values: Float64Array | Int32Array,
  begin: number,
  end: number,
  bound: number,
): number {
  let low = begin;
  let high = end;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle] > bound) high = middle;
    else low = middle + 1;
  }
  return low;
}
