import { posteriorFigureSvg } from '@/components/charts/figure/posterior-figure';
import type { RateCurve } from '@/components/charts/rate-curve';
import { describePrior } from '@/lib/inference';
import type { RateAnswer } from '@/lib/schemas/runs';
import { type FinishedRun, standingOf, stateOf } from '@/lib/services/export-limits';

const curveOf = ({ curve }: RateAnswer): RateCurve => ({
  rate: Float64Array.from(curve.value),
  density: Float64Array.from(curve.density),
  cumulative: Float64Array.from(curve.cumulative),
});

/** The posterior of a run as a figure of its own; everything that it rests on is written below it. */
export function drawPosterior(run: FinishedRun, widthMm: 88 | 180): string {
  const { result, recipe, inputs } = run;
  const { answer, zero, quantity, credibleLevel } = result;
  const name = `${run.analysis}, run ${run.number}`;
  const surveys = inputs.surveys.map((survey) => survey.name).join(', ');
  const { prior } = answer.curve;
  return posteriorFigureSvg({
    curve: curveOf(answer),
    limit: answer.limit,
    credibleLevel,
    quantity,
    median: answer.median,
    interval68: answer.interval68,
    prior: {
      label: describePrior(recipe.prior, quantity),
      // An improper prior has no density to draw.
      density: prior.length > 0 ? Float64Array.from(prior) : undefined,
    },
    alternative:
      result.counted.length > 0
        ? { curve: curveOf(zero), limit: zero.limit, label: 'zero detections' }
        : undefined,
    title: `Posterior of ${name}`,
    description: result.statement.sentence,
    caption: [
      `${name}, ${stateOf(run)}.`,
      `${result.statement.sentence}.`,
      `${surveys}: ${result.stars} stars.`,
      ...result.statement.conditions.map((condition) => `${condition}.`),
      `SHA-256 ${run.resultDigest}`,
    ].join(' '),
    widthMm,
    standing: run.release ? `release ${run.release.version}, ${name}` : standingOf(run),
  });
}
