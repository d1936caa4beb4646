import { type AgeSide, momentsAt, prepareSide } from './age-sides';
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
  const { begins, fromLogAge, toLogAge, cell, fromShare, toShare, fades } = paths;
  const prepared = sides.map(prepareSide);
  // Chance and area at a place: written anew for every stretch's end.
  const at = new Float64Array(2);
  const spread: SpreadAge = { first: 0, end: 0, total: 0, brighter: 0 };
  return (mass) => {
    weights.fill(0);
    let [first, end, total, brighter] = [highest, lowest, 0, 0];
    for (const side of prepared) {
      let low = firstAbove(toLogAge, begins[mass], begins[mass + 1], side.from);
      let last = begins[mass + 1];
      if (fades[mass]) {
        // What is brighter or fainter than the cells lies before or after them in one piece.
        low = Math.max(low, firstAbove(cell, begins[mass], last, lowest - 1));
        last = firstAbove(cell, low, last, highest - 1);
      }
      if (!(low < last && fromLogAge[low] < side.to)) {
        if (!fades[mass]) continue;
        // One place tells the share before the cells; none of the rest is among them.
        momentsAt(side, low < begins[mass + 1] ? fromLogAge[low] : Infinity, at);
        total += side.weight;
        brighter += at[0];
        continue;
      }
      let x = fromLogAge[low];
      if (fades[mass]) {
        momentsAt(side, Math.min(toLogAge[last - 1], side.to), at);
        const after = at[0];
        momentsAt(side, x, at);
        total += side.weight - (after - at[0]);
        brighter += at[0];
      } else {
        momentsAt(side, x, at);
      }
      let [chance, area] = [at[0], at[1]];
      for (let s = low; s < last && x < side.to; s++) {
        const [xA, chanceA, areaA] = [x, chance, area];
        x = s + 1 < last ? fromLogAge[s + 1] : toLogAge[s];
        momentsAt(side, x, at);
        [chance, area] = [at[0], at[1]];
        const c = cell[s];
        const here = chance - chanceA;
        if (c === UNDETECTABLE || !(here > 0)) continue;
        total += here;
        if (c < lowest) brighter += here;
        if (c < lowest || c >= highest) continue;
        if (c < first) first = c;
        if (c >= end) end = c + 1;
        const place = c - lowest;
        if (!betweenPoints) {
          weights[place] += here;
          continue;
        }
        const a = fromShare[s];
        const b = toShare[s];
        const tilt = a === b ? 0 : (b - a) / (x - xA);
        const above = tilt === 0 ? a * here : b * chance - a * chanceA - tilt * (area - areaA);
        weights[place] += here - above;
        weights[place + 1] += above;
      }
    }
    spread.first = first;
    spread.end = betweenPoints && end > first ? end + 1 : end;
    spread.total = total;
    spread.brighter = brighter;
    return spread;
  };
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
