import { countsAtRate, predictCounts, ratePosterior } from '@/lib/inference';
import type { ResultOf } from '@/lib/schemas/study-results';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface CountsInput {
  question: RunQuestion;
  /** Absent: the median of the posterior. */
  rate: number | undefined;
}

/** How many companions the survey would show, exactly, at one rate and over the posterior. */
export function answerCounts({ question, rate }: CountsInput): ResultOf<'counts'> {
  const { rateQuestion } = rateQuestionOf(question);
  const { likelihood, completeness, rateScale, background } = rateQuestion;
  const sample = { likelihood, completeness, ...(rateScale && { rateScale }) };
  const posterior = ratePosterior(rateQuestion);
  const at = rate ?? posterior.median;
  const { probability } = countsAtRate(sample, at);
  const counted = posterior.detections;
  const below = probability.subarray(0, counted).reduce((sum, p) => sum + p, 0);
  const notes: string[] = [];
  if (likelihood === 'host-fraction') notes.push('A star counts once, however many it hosts');
  if (background) {
    notes.push(
      `The ${background} false detections that are expected among those counted come on top`,
    );
  }
  return {
    kind: 'counts',
    rate: at,
    atRate: [...probability],
    predictive: [...predictCounts(posterior, sample).probability],
    counted,
    atLeastCounted: Math.max(0, Math.min(1, 1 - below)),
    notes,
  };
}
