import { powerLawIntegral } from '@/lib/numerics/special';
import type { AxisLaw } from './law';

/**
 * dN/d ln x proportional to x^index.
 *
 * @param index scalar [1], per natural logarithm
 * Quantiles: x = from (1 + p ((to/from)^index - 1))^(1/index), from (to/from)^p at index 0.
 */
export function powerLaw(index: number): AxisLaw {
  return {
    shape: (x) => x ** index,
    integral: (from, to) => powerLawIntegral(index, from, to),
    quantile(p, from, to) {
      const logRatio = Math.log(to / from);
      const product = index * logRatio;
      if (Math.abs(product) < 1e-9) return from * Math.exp(p * logRatio);
      return from * Math.exp(Math.log1p(p * Math.expm1(product)) / index);
    },
    breaks: [],
  };
}
