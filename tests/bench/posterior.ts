import { type RateQuestion, ratePosterior, upperLimit } from '@/lib/inference';
import type { Amount } from './amount';
import { freePosteriorLines } from './posterior-free';
import type { Line } from './report';
import { compare } from './rounds';
import { type MappedSurvey, mapSurvey } from './survey';
import { gridLimit } from './yardsticks';

export const LEVEL = 0.95;
const GRID_POINTS = 2000;
const REFERENCE_POINTS = 20_000;

/** The limit on a grid that is fine where the likelihood is more than e^-40 of its peak. */
export function referenceLimit({ completeness, detections }: MappedSurvey): number {
  const stars = detections.map(({ star }) => star);
  const { range } = gridLimit(completeness, stars, LEVEL, GRID_POINTS);
  return gridLimit(completeness, stars, LEVEL, REFERENCE_POINTS, range).limit;
}

export function relativeError(value: number, reference: number): number {
  return Math.abs(value / reference - 1);
}

/** The host fraction with fixed indices, and with both free. */
export function posteriorLines(amount: Amount): Line[] {
  return [...fixedLines(amount), ...freePosteriorLines(amount)];
}

/** Host fraction of a fixed population: posterior and limit, against a plain grid. */
function fixedLines({ rounds }: Amount): Line[] {
  return [78, 400].map((stars) => {
    const survey = mapSurvey(stars);
    const { completeness } = survey;
    const detectedStars = survey.detections.map(({ star }) => star);
    const prior = { law: 'uniform', max: 1 } as const;
    const question: RateQuestion = {
      likelihood: 'host-fraction',
      completeness,
      detectedStars,
      prior,
    };
    const product = () => upperLimit(ratePosterior(question), LEVEL);
    const plain = () => gridLimit(completeness, detectedStars, LEVEL, GRID_POINTS).limit;
    const reference = referenceLimit(survey);
    compare({ run: product, leastMs: 100 }, { run: plain }, 1);
    const compared = compare({ run: product, leastMs: 50 }, { run: plain, leastMs: 50 }, rounds);
    const plainError = relativeError(plain(), reference).toExponential(1);
    return {
      name: `posterior, host fraction, ${detectedStars.length} found`,
      stars,
      rounds,
      medianMs: compared.medianMs,
      ratio: compared.ratio,
      unit: 'times',
      yardstick: `log1p grid, ${GRID_POINTS} points (limit ${plainError})`,
      errors: { limit: relativeError(product(), reference) },
      targets: [{ of: 'limit', bound: 'at most', must: 1e-4 }],
    };
  });
}
