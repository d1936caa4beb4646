import { logBeta, logGamma } from '@/lib/numerics/special';
import type { Likelihood, RatePrior } from './contract';
import type { PriorLaw } from './prior-law';
import { tabulatedLaw } from './tabulated-prior';

/** The parts that most priors share: no power at 1, nothing regular, no decay. */
const PLAIN = { exponentAtOne: 1, logRegular: () => 0, decay: 0 };

const FLOOR_TEXT =
  'a log-uniform prior needs a floor min > 0: with no detection its posterior goes as exp(-F S)/F, ' +
  'which puts all its weight at zero without a floor, and the limit then follows the floor rather ' +
  'than the data';

function checkMax(max: number, likelihood: Likelihood, law: string): void {
  if (!(max > 0) || !Number.isFinite(max)) {
    throw new RangeError(`${law} prior: max must be a positive number, got ${max}`);
  }
  if (likelihood === 'host-fraction' && max > 1) {
    throw new RangeError(
      `${law} prior: a fraction of stars cannot exceed 1, got max ${max}; use max <= 1, or the ` +
        'mean number of companions per star',
    );
  }
}

function checkPositive(value: number, name: string): void {
  if (!(value > 0) || !Number.isFinite(value)) {
    throw new RangeError(`${name} must be a positive number, got ${value}`);
  }
}

function logUniform(prior: { min: number; max: number }, likelihood: Likelihood): PriorLaw {
  checkMax(prior.max, likelihood, 'log-uniform');
  if (!(prior.min > 0)) throw new RangeError(`${FLOOR_TEXT}; got min ${prior.min}`);
  if (!(prior.min < prior.max)) {
    throw new RangeError(
      `log-uniform prior: min must be below max, got ${prior.min} and ${prior.max}`,
    );
  }
  return {
    ...PLAIN,
    support: [prior.min, prior.max],
    exponentAtZero: 0,
    logNorm: Math.log(Math.log(prior.max / prior.min)),
  };
}

function jeffreysNumber(max: number | undefined): PriorLaw {
  if (max !== undefined) checkMax(max, 'mean-number', 'Jeffreys');
  return {
    ...PLAIN,
    support: [0, max ?? Number.POSITIVE_INFINITY],
    exponentAtZero: 0.5,
    logNorm: max === undefined ? null : Math.log(2) + 0.5 * Math.log(max),
  };
}

/**
 * Jeffreys prior of the host fraction, from the Fisher information of one trial per star:
 * sqrt(sum C_j / (f (1 - f C_j))). Where no star shows anything it tends to f^(-1/2).
 */
function jeffreysFraction(max: number | undefined, completeness: Float64Array): PriorLaw {
  const top = max ?? 1;
  checkMax(top, 'host-fraction', 'Jeffreys');
  const partial = completeness.filter((c) => c > 0 && c < 1);
  const certain = completeness.filter((c) => c === 1).length;
  if (partial.length + certain === 0) {
    return jeffreysNumber(top);
  }
  return {
    support: [0, top],
    exponentAtZero: 0.5,
    exponentAtOne: certain > 0 ? 0.5 : 1,
    decay: 0,
    logRegular(_x, complement) {
      let information = 0;
      for (let j = 0; j < partial.length; j++) {
        information += partial[j] / (1 - partial[j] + partial[j] * complement);
      }
      return 0.5 * Math.log(certain > 0 ? certain + complement * information : information);
    },
    logNorm: 'numerical',
  };
}

function gamma(prior: { shape: number; rate: number }): PriorLaw {
  const { shape, rate } = prior;
  checkPositive(shape, 'gamma prior: shape');
  if (!(rate >= 0) || !Number.isFinite(rate)) {
    throw new RangeError(`gamma prior: rate must be >= 0 stars, got ${rate}`);
  }
  return {
    support: [0, Number.POSITIVE_INFINITY],
    exponentAtZero: shape,
    exponentAtOne: 1,
    logRegular: (x) => -rate * x,
    decay: rate,
    logNorm: rate > 0 ? logGamma(shape) - shape * Math.log(rate) : null,
  };
}

function beta(prior: { a: number; b: number }): PriorLaw {
  const { a, b } = prior;
  checkPositive(a, 'beta prior: a');
  checkPositive(b, 'beta prior: b');
  return {
    ...PLAIN,
    support: [0, 1],
    exponentAtZero: a,
    exponentAtOne: b,
    logNorm: logBeta(a, b),
  };
}

/**
 * The law of a prior, after checking that it fits the likelihood.
 *
 * @param completeness shape [star], 0..1: only the Jeffreys prior of the host fraction reads it
 * @throws RangeError for a maximum that is not positive, a floor that is missing or not below the
 *   maximum, a fraction above 1, a shape that is not positive, a table that cannot be used, a gamma
 *   prior of a fraction and a beta prior of a mean number: each with the reason
 * @source Jeffreys 1946, Proc. R. Soc. A 186, 453, for the two Jeffreys priors
 */
export function priorLaw(
  prior: RatePrior,
  likelihood: Likelihood,
  completeness: Float64Array,
): PriorLaw {
  switch (prior.law) {
    case 'uniform':
      checkMax(prior.max, likelihood, 'uniform');
      return {
        ...PLAIN,
        support: [0, prior.max],
        exponentAtZero: 1,
        logNorm: Math.log(prior.max),
      };
    case 'log-uniform':
      return logUniform(prior, likelihood);
    case 'jeffreys':
      return likelihood === 'mean-number'
        ? jeffreysNumber(prior.max)
        : jeffreysFraction(prior.max, completeness);
    case 'gamma':
      if (likelihood === 'host-fraction') {
        throw new RangeError(
          'a gamma prior belongs to the mean number of companions per star: a fraction of stars ' +
            'ends at 1; use a beta prior',
        );
      }
      return gamma(prior);
    case 'beta':
      if (likelihood === 'mean-number') {
        throw new RangeError(
          'a beta prior belongs to the fraction of stars: the mean number of companions may ' +
            'exceed 1; use a gamma prior',
        );
      }
      return beta(prior);
    case 'tabulated':
      return tabulatedLaw(prior, likelihood);
  }
}
