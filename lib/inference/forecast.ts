import type { RatePrior, RateQuestion } from './contract';
import { integrateDensity } from './integrated-density';
import { upperLimit } from './intervals';
import { posteriorOf, rateModel, ratePosterior } from './posterior';
import {
  type CountDistribution,
  countInterval,
  countQuantile,
  countsAtRate,
  predictCounts,
  type Sample,
} from './prediction';
import { stretchesOf } from './product';

/** What a planned survey is expected to bring. */
export interface Forecast {
  stars: number;
  /** S' [stars]. */
  exposure: number;
  /** Detections: at the assumed rate, or with the rate from what is known. */
  yield: CountDistribution;
  median: number;
  interval68: [number, number];
  chanceOfNone: number;
  /** Limit from the planned stars alone, nothing found. */
  limitIfNone: number;
  /** With what is known already. */
  limitIfNoneTogether: number;
}

const sumOf = (values: Float64Array) => values.reduce((sum, x) => sum + x, 0);

/** The planned stars as a question of their own, some of them with a detection. */
function plannedQuestion(planned: Sample, prior: RatePrior, detections: number): RateQuestion {
  const { likelihood, completeness, rateScale } = planned;
  const chance = completeness.map((c, j) => c * (rateScale?.[j] ?? 1));
  // Which stars have it hardly matters: the most promising are taken.
  const order = Array.from(chance.keys()).sort((a, b) => chance[b] - chance[a] || a - b);
  const isFraction = likelihood === 'host-fraction';
  const detectedStars = Array.from({ length: detections }, (_, i) => order[isFraction ? i : 0]);
  return { ...planned, prior, detectedStars };
}

/**
 * What is known with the planned stars added, nothing found among them.
 *
 * @throws RangeError where the two ask for different quantities
 */
export function addSample(known: RateQuestion, planned: Sample): RateQuestion {
  if (known.likelihood !== planned.likelihood) {
    throw new RangeError('the planned survey asks for the other quantity than what is known');
  }
  const join = (a: Float64Array, b: Float64Array) => {
    const joined = new Float64Array(a.length + b.length);
    joined.set(a);
    joined.set(b, a.length);
    return joined;
  };
  const ones = ({ completeness }: Sample) => new Float64Array(completeness.length).fill(1);
  const isScaled = known.rateScale !== undefined || planned.rateScale !== undefined;
  return {
    ...known,
    completeness: join(known.completeness, planned.completeness),
    ...(isScaled && {
      rateScale: join(known.rateScale ?? ones(known), planned.rateScale ?? ones(planned)),
    }),
  };
}

/**
 * Expected yield of a planned survey, and the limit it would set if nothing is found.
 *
 * @param known data so far, with prior: the rate is taken from their posterior
 * @param planned completeness of the planned stars, the same likelihood
 * @param level credible level of the limits [fraction], 0 < level < 1
 * @param assumedRate the rate is this one instead [planets per star, or fraction of stars]
 * @throws RangeError as `ratePosterior` and `countsAtRate`
 */
export function forecastSurvey(
  known: RateQuestion,
  planned: Sample,
  level: number,
  assumedRate?: number,
): Forecast {
  const together = addSample(known, planned);
  const expected =
    assumedRate === undefined
      ? predictCounts(ratePosterior(known), planned)
      : countsAtRate(planned, assumedRate);
  const alone = ratePosterior(plannedQuestion(planned, known.prior, 0));
  return {
    stars: planned.completeness.length,
    exposure: alone.exposure,
    yield: expected,
    median: countQuantile(expected.probability, 0.5),
    interval68: countInterval(expected, 0.68),
    chanceOfNone: expected.probability[0],
    limitIfNone: upperLimit(alone, level),
    limitIfNoneTogether: upperLimit(ratePosterior(together), level),
  };
}

/**
 * n stars like those of a sample: evenly spaced among them by falling completeness, so that the mean
 * stays and the same stars are taken every time.
 *
 * @param count integer >= 1
 */
export function starsLikeThese(sample: Sample, count: number): Sample {
  const { completeness, rateScale } = sample;
  if (!(Number.isInteger(count) && count >= 1) || completeness.length === 0) {
    throw new RangeError(`a whole number of stars like some that are there, got ${count}`);
  }
  const chance = completeness.map((c, j) => c * (rateScale?.[j] ?? 1));
  const order = Array.from(chance.keys()).sort((a, b) => chance[b] - chance[a] || a - b);
  const taken = Array.from(
    { length: count },
    (_, i) => order[Math.floor(((i + 0.5) / count) * order.length)],
  );
  return {
    ...sample,
    completeness: Float64Array.from(taken, (j) => completeness[j]),
    ...(rateScale && { rateScale: Float64Array.from(taken, (j) => rateScale[j]) }),
  };
}

/** The limit against the number of stars; arrays of one length. */
export interface LimitByStars {
  stars: number[];
  limitIfNone: number[];
  /** Limits for the fewest and most detections within 68 % at the rate. */
  low: number[];
  high: number[];
}

/**
 * The limit against the number of planned stars, and how it spreads when some are found.
 *
 * @param planned stars that others are to be like
 * @param numbers of stars, each an integer >= 1
 * @param rate at which detections are expected
 * @throws RangeError as `ratePosterior` and `countsAtRate`
 * Edges: for the host fraction the most complete stars are taken as those with a detection.
 */
export function limitByStars(
  planned: Sample,
  prior: RatePrior,
  numbers: readonly number[],
  rate: number,
  level: number,
): LimitByStars {
  const limits = numbers.map((count) => {
    const sample = starsLikeThese(planned, count);
    const limit = (detections: number) =>
      upperLimit(ratePosterior(plannedQuestion(sample, prior, detections)), level);
    const seen = sample.completeness.filter((c) => c > 0).length;
    const most = sample.likelihood === 'host-fraction' ? seen : Number.POSITIVE_INFINITY;
    const [few, many] = countInterval(countsAtRate(sample, rate), 0.68);
    return { none: limit(0), low: limit(Math.min(few, most)), high: limit(Math.min(many, most)) };
  });
  return {
    stars: [...numbers],
    limitIfNone: limits.map(({ none }) => none),
    low: limits.map(({ low }) => low),
    high: limits.map(({ high }) => high),
  };
}

/** Which stars to look at next. */
export interface StarGain {
  /** Planned stars by falling gain (ties by index). */
  order: Int32Array;
  /** Limit with that star alone added and nothing found, in the order of the input. */
  limitWithItAlone: Float64Array;
  /** Limit with the first n of the order added, n = 1, 2, ..., `cumulativeTo`. */
  limitWithFirst: Float64Array;
}

/**
 * Planned stars by how much each would lower the limit, nothing found.
 *
 * The more complete star always lowers it more, so the best n are the first n of the order.
 *
 * @param known data so far, with prior
 * @param level credible level [fraction], 0 < level < 1
 * @param first how many of the order are added up in `limitWithFirst`, default 20
 * @throws RangeError as `ratePosterior`
 * Cost: one evaluation of some hundred places a star, and a posterior for each of the first.
 */
export function starGains(
  known: RateQuestion,
  planned: Sample,
  level: number,
  first = 20,
): StarGain {
  const model = rateModel(known);
  const integrated = integrateDensity(stretchesOf(model.law, model.likelihood));
  const now = posteriorOf(model, integrated);
  const { rate } = now.nodes();
  const chance = planned.completeness.map((c, j) => c * (planned.rateScale?.[j] ?? 1));
  const order = Int32Array.from(chance.keys()).sort((a, b) => chance[b] - chance[a] || a - b);
  const pick = (stars: ArrayLike<number>): Sample => ({
    ...planned,
    completeness: Float64Array.from(stars, (j) => planned.completeness[j]),
    ...(planned.rateScale && {
      rateScale: Float64Array.from(stars, (j) => planned.rateScale?.[j] ?? 1),
    }),
  });
  const isNumber = known.likelihood === 'mean-number';
  // A star that changes more than a factor: the prior, its end, or how candidates weigh.
  const isPlain =
    model.constrained &&
    (known.background ?? 0) === 0 &&
    known.candidates === undefined &&
    (isNumber || (known.prior.law !== 'jeffreys' && planned.rateScale === undefined));
  const exact = (stars: ArrayLike<number>) =>
    upperLimit(ratePosterior(addSample(known, pick(stars))), level);
  const limitWithItAlone = chance.map((c, star) => {
    const isSmall = c < (isNumber ? 0.3 * sumOf(model.checked.completeness) : 0.999);
    const density =
      isPlain && isSmall
        ? integrated.reweigh(rate.map((x) => (isNumber ? -c * x : Math.log1p(-c * x))))
        : null;
    return density === null ? exact([star]) : model.checked.unit * density.quantile(level);
  });
  const counted = Math.min(first, order.length);
  const limitWithFirst = Float64Array.from({ length: counted }, (_, n) =>
    exact(order.subarray(0, n + 1)),
  );
  return { order, limitWithItAlone, limitWithFirst };
}
