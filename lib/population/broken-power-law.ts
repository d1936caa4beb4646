import { powerLawIntegral } from '@/lib/numerics/special';
import type { AxisLaw } from './law';
import { powerLaw } from './power-law';

/**
 * dN/d ln x proportional to (x/breakAt)^innerIndex below the break and (x/breakAt)^outerIndex above:
 * continuous, 1 at the break.
 *
 * @param breakAt scalar [unit of the axis], > 0
 * @param innerIndex scalar [1], per natural logarithm
 * @param outerIndex scalar [1], per natural logarithm
 * @throws RangeError for a break that is not positive or an index that is not finite
 * Edges: a break outside the range leaves one power law inside it (`populationWarnings` says so).
 * Accuracy: as `powerLawIntegral`, the two sides being exact each.
 * @example brokenPowerLaw(3, 0.8, -1.2).integral(0.5, 100) // 1.77281641427871
 */
export function brokenPowerLaw(breakAt: number, innerIndex: number, outerIndex: number): AxisLaw {
  if (!(breakAt > 0) || !Number.isFinite(breakAt)) {
    throw new RangeError(`breakAt must be a positive number, got ${breakAt}`);
  }
  const inner = powerLaw(innerIndex);
  const outer = powerLaw(outerIndex);
  const below = (from: number, to: number) =>
    powerLawIntegral(innerIndex, from / breakAt, to / breakAt);
  const above = (from: number, to: number) =>
    powerLawIntegral(outerIndex, from / breakAt, to / breakAt);
  return {
    shape: (x) => (x < breakAt ? inner : outer).shape(x / breakAt),
    integral(from, to) {
      if (to <= breakAt) return below(from, to);
      if (from >= breakAt) return above(from, to);
      return below(from, breakAt) + above(breakAt, to);
    },
    quantile(p, from, to) {
      if (to <= breakAt) return inner.quantile(p, from, to);
      if (from >= breakAt) return outer.quantile(p, from, to);
      const first = below(from, breakAt);
      const second = above(breakAt, to);
      const wanted = p * (first + second);
      return wanted <= first
        ? inner.quantile(wanted / first, from, breakAt)
        : outer.quantile(Math.min(1, (wanted - first) / second), breakAt, to);
    },
    breaks: [breakAt],
  };
}
