import type { RateCurve } from '@/components/charts/rate-curve';
import type { RateAnswer } from '@/lib/schemas/runs';

/** One posterior, summed up at the level of the setting. */
export interface LimitAnswer {
  limit: number;
  median: number;
  interval68: [number, number];
  isConstrained: boolean;
  isSetByPrior: boolean;
  curve: RateCurve;
  /** At the rates of the curve; NaN where the prior has no density. */
  prior: Float64Array;
}

/** What a finished run says, in the shape in which a live answer comes. */
export function savedAnswer(answer: RateAnswer): LimitAnswer {
  const { curve } = answer;
  return {
    limit: answer.limit,
    median: answer.median,
    interval68: answer.interval68,
    isConstrained: answer.isConstrained,
    isSetByPrior: answer.isSetByPrior,
    curve: {
      rate: Float64Array.from(curve.value),
      density: Float64Array.from(curve.density),
      cumulative: Float64Array.from(curve.cumulative),
    },
    prior: Float64Array.from(curve.value, (_, point) => curve.prior[point] ?? Number.NaN),
  };
}
