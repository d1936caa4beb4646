import { fixedMixture, rateDependentLikelihood, settledLikelihood } from './candidates';
import { type CheckedQuestion, checkQuestion } from './checked-question';
import type { RatePosterior, RatePrior, RateQuestion } from './contract';
import { type IntegratedDensity, integrateDensity } from './integrated-density';
import type { RateLikelihood } from './poisson';
import type { PriorLaw } from './prior-law';
import { logPriorNorm, multiply, NO_DATA, stretchesOf } from './product';
import { lawBelow } from './rate-scale';
import { placeAt } from './stretches';

/** Below this many expected detections at the largest rate the data say nothing. */
const NOTHING_OBSERVABLE = 1e-9;

/** Prior and likelihood of a question in x, the rate in units of the largest one allowed. */
export interface RateModel {
  checked: CheckedQuestion;
  law: PriorLaw;
  likelihood: RateLikelihood;
  constrained: boolean;
}

/**
 * Prior and likelihood of a question, before they are integrated.
 *
 * @throws RangeError as `ratePosterior`
 */
export function rateModel(question: RateQuestion): RateModel {
  const checked = checkQuestion(question);
  const { exposure, counted, undecided, background, unit } = checked;
  const law = lawBelow(checked);
  const found = counted.length + undecided.length;
  if (found > 0 && exposure === 0 && background === 0) {
    throw new RangeError(
      `${found} detections, but no star shows anything of this population (exposure 0): ` +
        'check the maps, the ranges of the population or the detections',
    );
  }
  const largest = exposure === 0 ? 0 : exposure * unit * law.support[1];
  const constrained = (found > 0 && background === 0) || largest >= NOTHING_OBSERVABLE;
  return {
    checked,
    law,
    constrained,
    likelihood: constrained ? fullLikelihood(checked, law) : NO_DATA,
  };
}

function fullLikelihood(checked: CheckedQuestion, law: PriorLaw): RateLikelihood {
  if (checked.undecided.length === 0) return settledLikelihood(checked, checked.counted);
  return checked.treatment === 'fixed'
    ? fixedMixture(checked, law)
    : rateDependentLikelihood(checked);
}

/** Where the rates of single stars end a prior that reaches further; else null. */
function cutOf(prior: RatePrior, likelihood: RateQuestion['likelihood'], unit: number) {
  if (likelihood === 'mean-number' || unit === 1) return null;
  let top = 1;
  if (prior.law === 'tabulated') top = prior.value[prior.value.length - 1];
  else if ('max' in prior && prior.max !== undefined) top = prior.max;
  return unit < top ? unit : null;
}

/** A model's posterior from its integral. */
export function posteriorOf(model: RateModel, integrated: IntegratedDensity): RatePosterior {
  const { checked, law, likelihood, constrained } = model;
  const { unit, counted, undecided, background } = checked;
  const { logDensity } = multiply(law, likelihood);
  const priorOnly = multiply(law, NO_DATA);
  const [low, top] = law.support;
  const isOutside = (x: number) => !(x >= low && x <= top) || x === Number.POSITIVE_INFINITY;
  let knownNorm: number | undefined;
  const priorNorm = () => {
    knownNorm ??= logPriorNorm(law);
    return knownNorm;
  };
  const isMixed = constrained && undecided.length > 0 && checked.treatment === 'fixed';
  const logUnit = Math.log(unit);
  return {
    quantity: checked.likelihood === 'mean-number' ? 'companions_per_star' : 'host_fraction',
    exposure: checked.exposure,
    detections: counted.length,
    undecided: undecided.length,
    background,
    prior: checked.prior,
    support: [unit * low, unit * top],
    cutAt: cutOf(checked.prior, checked.likelihood, unit),
    mean: unit * integrated.mean,
    median: unit * integrated.quantile(0.5),
    standardDeviation: unit * integrated.standardDeviation,
    constrained,
    get logEvidence() {
      if (isMixed) return Number.NaN;
      return integrated.logMass - priorNorm() + counted.length * logUnit;
    },
    density(rate) {
      const x = rate / unit;
      if (isOutside(x)) return 0;
      return Math.exp(logDensity(placeAt(x)) - integrated.logMass) / unit;
    },
    priorDensity(rate) {
      const x = rate / unit;
      if (isOutside(x)) return 0;
      return Math.exp(priorOnly.logDensity(placeAt(x)) - priorNorm()) / unit;
    },
    cumulative: (rate) => integrated.cumulative(rate / unit),
    quantile: (p) => unit * (p === 1 ? top : integrated.quantile(p)),
    nodes() {
      const { rate, weight } = integrated.nodes();
      return unit === 1 ? { rate, weight } : { rate: rate.map((x) => unit * x), weight };
    },
  };
}

/**
 * Posterior of the rate of companions: of F (mean number per star) or of f (fraction of stars).
 *
 * Prior times F^k exp(-F S), or times f^k and the product of 1 - f C_j over the stars without a
 * counted detection, integrated once; limits and intervals are then root finding. Stars may differ in
 * their rate, a background may be known, and candidates may be undecided.
 *
 * @param question likelihood, mean completeness of each star [fraction] (for the mean number also
 *   one entry holding the sum over stars), counted detections, prior
 * @returns mean, median, density, distribution function and quantiles of the rate
 * @throws RangeError for a prior that does not fit (see `priorLaw`), completeness out of range, a
 *   detected star whose completeness is 0 (host fraction), detections without any exposure, a
 *   prior without an upper end where nothing could be seen, or none of it below the cut that the
 *   rates of single stars need; see `checkQuestion` for the rest
 * Edges: where exposure times the largest rate is below 1e-9 the posterior is the prior and
 *   `constrained` is false: no limit may then be headlined.
 * Accuracy: limits 1e-9 relative against the closed forms. Cost: some hundred evaluations of the
 *   likelihood, each one multiply-add a star.
 * @source Gelman et al. 2013, Bayesian Data Analysis, 3rd ed., chapter 2 (Poisson and binomial
 *   models; chapter from memory); Lafreniere et al. 2007, ApJ 670, 1367 (stars of unequal completeness)
 * @example
 * ratePosterior({ likelihood: 'mean-number', completeness: Float64Array.of(25), detectedStars: [],
 *   prior: { law: 'uniform', max: 1 } }).quantile(0.95) // 0.119829290931605
 */
export function ratePosterior(question: RateQuestion): RatePosterior {
  const model = rateModel(question);
  return posteriorOf(model, integrateDensity(stretchesOf(model.law, model.likelihood)));
}
