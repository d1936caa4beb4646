import { intervalIndex } from '@/lib/numerics/grid';
import type { AxisLaw } from './law';

function checkTable(at: readonly number[], perLog: readonly number[]): void {
  if (at.length < 2 || at.length !== perLog.length) {
    throw new RangeError(
      `a tabulated law needs two or more places with one density each, got ${at.length} and ${perLog.length}`,
    );
  }
  for (let i = 0; i < at.length; i++) {
    if (!(at[i] > 0) || !Number.isFinite(at[i]) || (i > 0 && !(at[i] > at[i - 1]))) {
      throw new RangeError(
        `the places of a tabulated law must be positive and increase, got ${at[i]}`,
      );
    }
    if (!(perLog[i] >= 0) || !Number.isFinite(perLog[i])) {
      throw new RangeError(`a density must be 0 or more, got ${perLog[i]} at ${at[i]}`);
    }
  }
  if (!perLog.some((density) => density > 0)) {
    throw new RangeError('a tabulated law needs a density above 0 somewhere');
  }
}

/**
 * A distribution of one's own: density per d ln x given at places, linear in ln x between them and
 * 0 outside.
 *
 * @param at shape [place] [unit of the axis], > 0, increasing, at least two
 * @param perLog shape [place], density per d ln x, >= 0 and not all 0; the scale is free
 * @throws RangeError for a table that cannot be used
 * Edges: a range outside the table holds nothing; its integral is 0.
 * Accuracy: integrals are exact sums of trapezia, quantiles solve one quadratic equation.
 * @example tabulatedLaw([1, Math.E], [0, 2]).integral(1, Math.E) // 1
 */
export function tabulatedLaw(at: readonly number[], perLog: readonly number[]): AxisLaw {
  checkTable(at, perLog);
  const last = at.length - 1;
  const logAt = at.map(Math.log);
  /** Integral from the first place to each. */
  const upTo = new Float64Array(at.length);
  for (let i = 0; i < last; i++) {
    upTo[i + 1] = upTo[i] + 0.5 * (perLog[i] + perLog[i + 1]) * (logAt[i + 1] - logAt[i]);
  }
  const densityAt = (i: number, y: number) =>
    perLog[i] + ((perLog[i + 1] - perLog[i]) * (y - logAt[i])) / (logAt[i + 1] - logAt[i]);
  const placeOf = (x: number) => Math.min(last - 1, Math.max(0, intervalIndex(at, x)));
  const cumulative = (x: number) => {
    if (x <= at[0]) return 0;
    if (x >= at[last]) return upTo[last];
    const i = placeOf(x);
    const y = Math.log(x);
    return upTo[i] + 0.5 * (perLog[i] + densityAt(i, y)) * (y - logAt[i]);
  };
  return {
    shape(x) {
      if (x < at[0] || x > at[last]) return 0;
      return densityAt(placeOf(x), Math.log(x));
    },
    integral(from, to) {
      const low = Math.max(from, at[0]);
      const high = Math.min(to, at[last]);
      if (!(low < high)) return 0;
      const first = placeOf(low);
      if (high > at[first + 1]) return cumulative(high) - cumulative(low);
      const [y1, y2] = [Math.log(low), Math.log(high)];
      return 0.5 * (densityAt(first, y1) + densityAt(first, y2)) * (y2 - y1);
    },
    quantile(p, from, to) {
      const start = cumulative(from);
      const wanted = start + p * (cumulative(to) - start);
      let i = 0;
      while (i < last - 1 && upTo[i + 1] < wanted) i++;
      const rest = Math.max(0, wanted - upTo[i]);
      const slope = (perLog[i + 1] - perLog[i]) / (logAt[i + 1] - logAt[i]);
      const root = Math.sqrt(Math.max(0, perLog[i] ** 2 + 2 * slope * rest));
      const step = rest === 0 ? 0 : (2 * rest) / (perLog[i] + root);
      return Math.min(to, Math.max(from, Math.exp(logAt[i] + step)));
    },
    breaks: [...at],
  };
}
