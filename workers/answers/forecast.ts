import {
  forecastSurvey,
  limitByStars,
  type RateQuestion,
  ratePosterior,
  seenBy,
  starGains,
  starsLikeThese,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import type { Sample } from '@/lib/inference/prediction';
import { logSpacedAxis } from '@/lib/numerics/grid';
import type { ResultOf } from '@/lib/schemas/study-results';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface ForecastInput {
  question: RunQuestion;
  /** Stars of the plan, or those that its stars are to be like. */
  planned: { names: string[]; maps: Uint16Array; hostMassMsun: Float64Array };
  /** So many stars like these; absent: these. */
  count: number | undefined;
  assumedRate: number | undefined;
  wantedLimit: number | undefined;
}

type Result = ResultOf<'forecast'>;

/** Numbers of stars at which the limit is drawn. */
const CURVE_POINTS = 24;
const MOST_STARS = 100_000;

function sampleOf({ question, planned }: ForecastInput): Sample {
  const { grid, population, likelihood } = question;
  const view = viewPopulation(planned.maps, grid, population, planned.hostMassMsun);
  const { completeness } = seenBy(view, likelihood);
  return {
    likelihood,
    completeness: completeness as Float64Array,
    ...(view.rateScale !== null && { rateScale: view.rateScale }),
  };
}

function numbersUpTo(most: number): number[] {
  if (most === 1) return [1];
  const spaced = logSpacedAxis(1, most, Math.min(most, CURVE_POINTS));
  return [...new Set(Array.from(spaced, Math.round))];
}

/** Smallest number of such stars whose limit without a detection is low enough; null: too many. */
function countNeeded(
  prior: RateQuestion['prior'],
  pool: Sample,
  level: number,
  wanted: number,
): number | null {
  const limitOf = (stars: number) => {
    const completeness = starsLikeThese(pool, stars);
    return upperLimit(ratePosterior({ ...completeness, prior, detectedStars: [] }), level);
  };
  let high = Math.min(pool.completeness.length, MOST_STARS);
  while (limitOf(high) > wanted) {
    if (high === MOST_STARS) return null;
    high = Math.min(2 * high, MOST_STARS);
  }
  let low = 0;
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (limitOf(middle) > wanted) low = middle;
    else high = middle;
  }
  return high;
}

/** What a planned survey would give, under the run's population, likelihood and prior. */
export function answerForecast(input: ForecastInput): Omit<Result, 'kind'> {
  const { question, planned, count, assumedRate, wantedLimit } = input;
  const { level } = question;
  const known = rateQuestionOf(question).rateQuestion;
  const posterior = ratePosterior(known);
  const pool = sampleOf(input);
  const sample = count === undefined ? pool : starsLikeThese(pool, count);
  const forecast = forecastSurvey(known, sample, level, assumedRate);
  const rate = assumedRate ?? posterior.median;
  const wanted = wantedLimit ?? 0.5 * upperLimit(posterior, level);
  const { order, limitWithItAlone } = starGains(known, pool, level, 0);
  const { prior } = known;
  return {
    stars: forecast.stars,
    exposure: forecast.exposure,
    yield: {
      mean: forecast.yield.mean,
      median: forecast.median,
      interval68: forecast.interval68,
    },
    distribution: [...forecast.yield.probability],
    chanceOfNone: forecast.chanceOfNone,
    limitIfNone: forecast.limitIfNone,
    limitIfNoneTogether: forecast.limitIfNoneTogether,
    against: limitByStars(sample, prior, numbersUpTo(forecast.stars), rate, level),
    wantedLimit: wanted,
    starsNeeded: forecast.exposure > 0 ? countNeeded(prior, pool, level, wanted) : null,
    gain: Array.from(order, (star) => ({
      name: planned.names[star],
      probability: pool.completeness[star],
      limitWithItAlone: limitWithItAlone[star],
    })),
    notes: notesOf(known, assumedRate),
  };
}

function notesOf({ likelihood }: RateQuestion, assumedRate: number | undefined): string[] {
  const notes = [
    'A forecast, no result: it holds for the assumed curves, ages and distances',
    'The planned stars count as new ones, beside those of the run',
  ];
  if (likelihood === 'host-fraction') {
    notes.push('The band of outcomes puts detections on the stars most likely to show one');
  }
  if (assumedRate === undefined) {
    notes.push('Detections are expected with the width of the run’s posterior');
  }
  return notes;
}
