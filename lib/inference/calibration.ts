import { createRandom, deriveSeed } from '@/lib/numerics/random';
import type { Likelihood, RatePosterior, RatePrior, RateQuestion } from './contract';
import { fractionPlacer, type Placed } from './fraction-fast';
import { type IntegratedDensity, integrateDensity } from './integrated-density';
import { type RateModel, rateModel, ratePosterior } from './posterior';
import { NO_DATA, stretchesOf } from './product';

/** A study of invented surveys: what the analysis assumes, and what is true. */
export interface CalibrationSetup {
  likelihood: Likelihood;
  /** What the analysis assumes, shape [entry], 0..1. */
  completeness: Float64Array;
  /** s_j, shape [entry]. */
  rateScale?: Float64Array;
  /** Proper: the truth is drawn from it. */
  prior: RatePrior;
  /** b, mean number only. */
  background?: number;
  /** Where the truth differs from what is assumed, such as another population. */
  truth?: {
    /** Shape [entry]. */
    completeness?: Float64Array;
    /** Law that true rates are drawn from. */
    prior?: RatePrior;
    /** Star of each entry, shape [entry]: entries of one star have one outcome. */
    star?: Int32Array;
  };
  /** True rates at which surveys are invented as well. */
  rates: readonly number[];
  /** Surveys with a truth from the prior, and as many at each of `rates`. */
  surveys: number;
  parts: number;
  seed: string;
}

/** What one part found; plain numbers, to be stored and merged. */
export interface CalibrationPart {
  part: number;
  /** Posterior probability below the truth, the truth drawn from its law; one a survey. */
  below: number[];
  /** Rank of the truth among 99 posterior draws; one a survey. */
  ranks: number[];
  /** Median of the posterior less the truth; one a survey. */
  medianOffset: number[];
  /** As `below` at each of the setup's rates. */
  belowAtRate: number[][];
}

/** Draws from the posterior that a truth is ranked among. */
export const RANK_DRAWS = 99;

/** Surveys of one part: the whole number is shared out evenly. */
function surveysOf({ surveys, parts }: CalibrationSetup, part: number): number {
  return Math.floor(((part + 1) * surveys) / parts) - Math.floor((part * surveys) / parts);
}

function checkSetup(setup: CalibrationSetup, part: number): void {
  const { surveys, parts, completeness, truth = {}, likelihood, background = 0 } = setup;
  if (!(Number.isInteger(surveys) && surveys >= 1 && Number.isInteger(parts) && parts >= 1)) {
    throw new RangeError(`a whole number of surveys and parts, got ${surveys} and ${parts}`);
  }
  if (!(Number.isInteger(part) && part >= 0 && part < parts)) {
    throw new RangeError(`parts are numbered 0 to ${parts - 1}, got ${part}`);
  }
  for (const values of [truth.completeness, truth.star]) {
    if (values && values.length !== completeness.length) {
      throw new RangeError(
        `the truth has one value an entry, got ${values.length} for ${completeness.length}`,
      );
    }
  }
  if (background > 0 && likelihood === 'host-fraction') {
    throw new RangeError('a known background belongs to the mean number');
  }
}

/** The analysis that every invented survey gets, before anything is found. */
export function assumedQuestion(setup: CalibrationSetup): RateQuestion {
  const { likelihood, completeness, rateScale, prior, background } = setup;
  return { likelihood, completeness, rateScale, prior, background, detectedStars: [] };
}

/** @throws RangeError for a prior that has no integral: no truth can be drawn from it */
function priorOf(question: RateQuestion): { model: RateModel; density: IntegratedDensity } {
  const model = rateModel(question);
  if (model.law.logNorm === null) {
    throw new RangeError(
      'this prior cannot be normalised, so no true rate can be drawn from it: give it an upper end',
    );
  }
  return { model, density: integrateDensity(stretchesOf(model.law, NO_DATA)) };
}

type Random = ReturnType<typeof createRandom>;

/** Poisson draw by exponential waiting times. */
function drawPoisson(mean: number, { uniform }: Random): number {
  let count = 0;
  for (let time = -Math.log(uniform()); time < mean; count++) time -= Math.log(uniform());
  return count;
}

/** Entries with a detection in an invented survey (host fraction). */
function drawEntries(
  chance: Float64Array,
  star: Int32Array | undefined,
  rate: number,
  random: Random,
) {
  const found: number[] = [];
  const turns = new Map<number, number>();
  for (let entry = 0; entry < chance.length; entry++) {
    let turn: number;
    if (star === undefined) turn = random.uniform();
    else {
      turn = turns.get(star[entry]) ?? random.uniform();
      turns.set(star[entry], turn);
    }
    if (turn < rate * chance[entry]) found.push(entry);
  }
  return found;
}

/** Exposure by how many entries a companion shows up in: one each unless stars repeat. */
function exposures(chance: Float64Array, star: Int32Array | undefined): Map<number, number> {
  const ofStar = new Map<number, { entries: number; chance: number }>();
  chance.forEach((c, entry) => {
    const key = star === undefined ? entry : star[entry];
    const known = ofStar.get(key);
    ofStar.set(key, {
      entries: (known?.entries ?? 0) + 1,
      chance: Math.max(known?.chance ?? 0, c),
    });
  });
  const sums = new Map<number, number>();
  for (const one of ofStar.values()) {
    sums.set(one.entries, (sums.get(one.entries) ?? 0) + one.chance);
  }
  return sums;
}

/** Invents a survey at a true rate and says where the truth lies in its posterior. */
export type Inventor = (rate: number, random: Random) => Placed;

function numberInventor(setup: CalibrationSetup, chance: Float64Array): Inventor {
  const question = assumedQuestion(setup);
  const sums = [...exposures(chance, setup.truth?.star)];
  const background = setup.background ?? 0;
  // The posterior depends on the count alone.
  const posteriors = new Map<number, RatePosterior>();
  return (rate, random) => {
    let count = background > 0 ? drawPoisson(background, random) : 0;
    for (const [entries, exposure] of sums) count += entries * drawPoisson(rate * exposure, random);
    let posterior = posteriors.get(count);
    if (posterior === undefined) {
      posterior = ratePosterior({ ...question, detectedStars: new Array<number>(count).fill(0) });
      posteriors.set(count, posterior);
    }
    return { below: posterior.cumulative(rate), median: posterior.median };
  };
}

function fractionInventor(
  setup: CalibrationSetup,
  chance: Float64Array,
  { checked, law }: RateModel,
): Inventor {
  const place = fractionPlacer(checked, law);
  const { unit } = checked;
  return (rate, random) => {
    const found = drawEntries(chance, setup.truth?.star, rate, random);
    const { below, median } = place(found, rate / unit);
    return { below, median: unit * median };
  };
}

/**
 * One part of a calibration study: surveys invented from a seed of its own and analysed.
 *
 * The truth is drawn from the prior, the detections from the likelihood; each survey gives the
 * posterior probability below the truth, the truth's rank among 99 posterior draws, and how far the
 * median lies from it. The same is done at each of the stated rates.
 *
 * @param part 0 to parts - 1; parts may be computed anywhere in any order
 * @throws RangeError for a prior that cannot be normalised, shapes that do not fit, and as
 *   `ratePosterior`
 * Cost: host fraction, some hundred places a survey and detected star; mean number, one posterior a
 *   count that occurs.
 * @source Talts et al. 2018, arXiv:1804.06788, for the ranks
 */
export function calibrationPart(setup: CalibrationSetup, part: number): CalibrationPart {
  checkSetup(setup, part);
  const { rateScale, truth = {}, likelihood, seed, rates } = setup;
  const { model, density } = priorOf(assumedQuestion(setup));
  const trueLaw = truth.prior
    ? priorOf({ ...assumedQuestion(setup), prior: truth.prior })
    : { model, density };
  const chance = (truth.completeness ?? setup.completeness).map(
    (c, entry) => c * (rateScale?.[entry] ?? 1),
  );
  const invent =
    likelihood === 'mean-number'
      ? numberInventor(setup, chance)
      : fractionInventor(setup, chance, model);
  const random = createRandom(deriveSeed(seed, part));
  const count = surveysOf(setup, part);
  const result: CalibrationPart = {
    part,
    below: [],
    ranks: [],
    medianOffset: [],
    belowAtRate: [],
  };
  for (let survey = 0; survey < count; survey++) {
    const rate = trueLaw.model.checked.unit * trueLaw.density.quantile(random.uniform());
    const { below, median } = invent(rate, random);
    let rank = 0;
    // A draw from the posterior lies below the truth with this probability.
    for (let draw = 0; draw < RANK_DRAWS; draw++) if (random.uniform() < below) rank++;
    result.below.push(below);
    result.ranks.push(rank);
    result.medianOffset.push(median - rate);
  }
  for (const rate of rates) {
    const own = createRandom(deriveSeed(deriveSeed(seed, part), `rate ${rate}`));
    result.belowAtRate.push(Array.from({ length: count }, () => invent(rate, own).below));
  }
  return result;
}
