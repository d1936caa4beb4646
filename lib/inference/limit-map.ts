import type { MapGrid } from '@/lib/sensitivity';
import type { StackedMaps, SummedMap } from './answer';
import type { Likelihood, RatePrior } from './contract';
import { fractionLimits, type LimitWithoutDetection, numberLimit } from './node-limits';

/** What is asked of a limit map. */
export interface LimitMapQuestion {
  /** A summed map answers the mean number only. */
  maps: StackedMaps | SummedMap;
  grid: MapGrid;
  likelihood: Likelihood;
  prior: RatePrior;
  /** Credible level [fraction]. */
  level: number;
  /** s_j, shape [star]: each star's rate over the one asked for. */
  rateScale?: Float64Array;
}

/** The limit at every node as if all companions were there and none was found. */
export interface LimitMap {
  grid: MapGrid;
  /** S(m, a), the sum of s_j C_j, shape [mass, semiMajorAxis] [stars]. */
  summed: Float64Array;
  /** Shape [mass, semiMajorAxis]; planets per star, or fraction of stars. */
  limit: Float64Array;
  /** 1 where the limit is more than 0.9 of level times the prior's upper end. */
  isSetByPrior: Uint8Array;
  /** Round values of the limit within the part that the data set, increasing. */
  contourLevels: number[];
}

const sizeOf = ({ massMjup, semiMajorAxisAu }: MapGrid) => massMjup.length * semiMajorAxisAu.length;

/** Each star's completeness along one row of mass, shape [semiMajorAxis, star]. */
function starsAlongRow(
  maps: StackedMaps,
  grid: MapGrid,
  row: number,
  stars: number,
  out: Float64Array,
): void {
  const columns = grid.semiMajorAxisAu.length;
  const size = sizeOf(grid);
  const scale = maps instanceof Uint16Array ? 1 / 65535 : 1;
  for (let star = 0; star < stars; star++) {
    const start = star * size + row * columns;
    for (let j = 0; j < columns; j++) out[j * stars + star] = maps[start + j] * scale;
  }
}

/**
 * Completeness summed over the stars at every node.
 *
 * @param rateScale s_j, shape [star]; absent: 1 for all
 * @returns S(m, a), shape [mass, semiMajorAxis] [stars]
 * @throws RangeError for maps that do not fit the grid, and for a scale that is not one a star
 */
export function sumMaps(
  maps: StackedMaps | SummedMap,
  grid: MapGrid,
  rateScale?: Float64Array,
): Float64Array {
  const size = sizeOf(grid);
  if ('summed' in maps) {
    if (rateScale !== undefined) {
      throw new RangeError("a rate that differs from star to star needs each star's own map");
    }
    if (maps.summed.length !== size) throw new RangeError('the summed map does not fit the grid');
    return maps.summed;
  }
  const stars = maps.length / size;
  if (!Number.isInteger(stars)) {
    throw new RangeError(`the maps hold ${maps.length} values, not a multiple of ${size} nodes`);
  }
  if (rateScale !== undefined && rateScale.length !== stars) {
    throw new RangeError(
      `rateScale has one value a star, got ${rateScale.length} for ${stars} stars`,
    );
  }
  const summed = new Float64Array(size);
  for (let star = 0; star < stars; star++) {
    const scale = (rateScale?.[star] ?? 1) * (maps instanceof Uint16Array ? 1 / 65535 : 1);
    for (let node = 0; node < size; node++) summed[node] += scale * maps[star * size + node];
  }
  return summed;
}

function fractionMap(question: LimitMapQuestion, maps: StackedMaps): LimitWithoutDetection[] {
  const { grid, prior, level, rateScale } = question;
  const stars = maps.length / sizeOf(grid);
  const row = new Float64Array(grid.semiMajorAxisAu.length * stars);
  return Array.from(grid.massMjup).flatMap((_, i) => {
    starsAlongRow(maps, grid, i, stars, row);
    return fractionLimits(row, stars, prior, level, rateScale);
  });
}

/** 1, 2 and 5 times powers of ten between two values. */
function roundValues(low: number, high: number): number[] {
  const values: number[] = [];
  for (let power = Math.floor(Math.log10(low)); 10 ** power <= high; power++) {
    for (const digit of [1, 2, 5]) {
      const value = Number(`${digit}e${power}`);
      if (value > low && value < high) values.push(value);
    }
  }
  return values;
}

/**
 * Upper limit of the rate at every node of the grid, all companions being there and none found.
 *
 * Mean number: from S(m, a); host fraction: from every star's own completeness at the node. It is
 * no joint statement about all nodes, and with detections it holds for companions unlike those.
 *
 * @throws RangeError for maps that do not fit the grid, for the host fraction of a summed map, for a
 *   prior that does not fit, and for a level outside (0, 1)
 * Accuracy: 1e-9 relative. Cost: mean number one quantile a node; host fraction see
 *   `fractionLimits`.
 */
export function limitMap(question: LimitMapQuestion): LimitMap {
  const { maps, grid, likelihood, prior, level, rateScale } = question;
  const summed = sumMaps(maps, grid, rateScale);
  let limits: LimitWithoutDetection[];
  if (likelihood === 'mean-number') {
    const limitAt = numberLimit(prior, level);
    limits = Array.from(summed, limitAt);
  } else {
    if ('summed' in maps) {
      throw new RangeError("the host fraction needs each star's map, not only their sum");
    }
    limits = fractionMap(question, maps);
  }
  const limit = Float64Array.from(limits, (one) => one.limit);
  const shown = limits.filter(({ setByPrior }) => !setByPrior).map((one) => one.limit);
  const [lowest, highest] = shown.reduce(
    ([low, high], value) => [Math.min(low, value), Math.max(high, value)],
    [Number.POSITIVE_INFINITY, 0],
  );
  return {
    grid,
    summed,
    limit,
    isSetByPrior: Uint8Array.from(limits, ({ setByPrior }) => Number(setByPrior)),
    contourLevels: shown.length === 0 ? [] : roundValues(lowest, highest),
  };
}
