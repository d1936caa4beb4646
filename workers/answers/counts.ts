import { poissonBinomial, ratePosterior } from '@/lib/inference';
import { logGamma } from '@/lib/numerics/special';
import type { ResultOf } from '@/lib/schemas/study-results';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface CountsInput {
  question: RunQuestion;
  /** Absent: the median of the posterior. */
  rate: number | undefined;
}

/** Counts beyond which no more than this share of the probability lies are not listed. */
const REST = 1e-10;

function poisson(mean: number, length: number): Float64Array {
  const out = new Float64Array(length);
  for (let k = 0; k < length; k++) {
    out[k] = mean === 0 ? Number(k === 0) : Math.exp(k * Math.log(mean) - mean - logGamma(k + 1));
  }
  return out;
}

/** Counts that a Poisson law of this mean does not exceed, but for less than 1e-10. */
const reach = (mean: number) => Math.ceil(mean + 8 * Math.sqrt(mean) + 24);

function withoutTail(probabilities: Float64Array): number[] {
  let rest = 0;
  let end = probabilities.length;
  while (end > 1 && rest + probabilities[end - 1] < REST) rest += probabilities[--end];
  return [...probabilities.subarray(0, end)];
}

/** How many detections the survey would give, exactly, at one rate and over the posterior. */
export function answerCounts({ question, rate }: CountsInput): ResultOf<'counts'> {
  const { completeness, exposure, rateQuestion } = rateQuestionOf(question);
  const { likelihood, background, rateScale } = rateQuestion;
  const posterior = ratePosterior(rateQuestion);
  const at = rate ?? posterior.median;
  const nodes = posterior.nodes();
  const largest = Math.max(at, ...nodes.rate) * exposure + (background ?? 0);
  const length = likelihood === 'host-fraction' ? completeness.length + 1 : reach(largest) + 1;
  const chances = (value: number): Float64Array => {
    if (likelihood === 'mean-number') return poisson(value * exposure + (background ?? 0), length);
    return poissonBinomial(
      completeness.map((c, star) => Math.min(1, value * (rateScale?.[star] ?? 1) * c)),
    );
  };
  const predictive = new Float64Array(length);
  for (let i = 0; i < nodes.rate.length; i++) {
    if (nodes.weight[i] < 1e-14) continue;
    const one = chances(nodes.rate[i]);
    for (let k = 0; k < length; k++) predictive[k] += nodes.weight[i] * one[k];
  }
  const atRate = chances(at);
  const counted = posterior.detections;
  const below = atRate.slice(0, counted).reduce((sum, p) => sum + p, 0);
  const notes: string[] = [];
  if (likelihood === 'host-fraction') notes.push('A star counts once, however many it hosts');
  if (background) notes.push(`${background} false detections are expected among them`);
  return {
    kind: 'counts',
    rate: at,
    atRate: withoutTail(atRate),
    predictive: withoutTail(predictive),
    counted,
    atLeastCounted: Math.max(0, Math.min(1, 1 - below)),
    notes,
  };
}
