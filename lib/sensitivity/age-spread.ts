import { type AgeSide, fillSideMoments } from './age-sides';
import { type CoolingPaths, UNDETECTABLE } from './cooling-paths';

/** The chances of one mass's magnitudes, spread over the lattice. */
export interface SpreadAge {
  /** Cells with a weight: first and one past the last; none when end <= first. */
  first: number;
  end: number;
  /** Weights counted from the lowest cell asked for; used again for the next mass. */
  weights: Float64Array;
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
 * @returns function of a mass's index
 */
export function newAgeSpread(
  paths: CoolingPaths,
  sides: readonly AgeSide[],
  betweenPoints: boolean,
  lowest: number,
  highest: number,
): (mass: number) => SpreadAge {
  const { begins, fromLogAge, toLogAge, cell, fromShare, toShare, longest } = paths;
  const knots = new Float64Array(longest + 1);
  const chance = new Float64Array(longest + 1);
  const area = new Float64Array(longest + 1);
  const moments = { chance, area };
  const weights = new Float64Array(highest - lowest + 2);
  const spread: SpreadAge = { first: 0, end: 0, weights, total: 0, brighter: 0 };
  return (mass) => {
    weights.fill(0);
    let [first, end, total, brighter] = [highest, lowest, 0, 0];
    for (const side of sides) {
      const low = firstStretch(toLogAge, begins[mass], begins[mass + 1], side.from);
      let stretches = 0;
      for (let s = low; s < begins[mass + 1] && fromLogAge[s] < side.to; s++) {
        knots[stretches++] = fromLogAge[s];
      }
      knots[stretches] = toLogAge[low + stretches - 1];
      fillSideMoments(side, knots, 0, stretches + 1, moments);
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

/** First stretch of a path that ends after a place. */
function firstStretch(ends: Float64Array, begin: number, end: number, place: number): number {
  let low = begin;
  let high = end - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ends[middle] > place) high = middle;
    else low = middle + 1;
  }
  return low;
}
