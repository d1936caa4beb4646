import type { CheckedQuestion } from './checked-question';
import type { RatePrior } from './contract';
import type { PriorLaw } from './prior-law';
import { priorLaw } from './priors';
import { cutTable } from './tabulated-prior';

/** A prior of the fraction cut at its largest value allowed, in units of that value. */
function cutPrior(prior: Exclude<RatePrior, { law: 'beta' | 'gamma' }>, unit: number): RatePrior {
  switch (prior.law) {
    case 'uniform':
      return { law: 'uniform', max: Math.min(prior.max, unit) / unit };
    case 'log-uniform':
      if (prior.min >= unit) {
        throw new RangeError(
          `log-uniform prior: it begins at ${prior.min}, but the rates of single stars end the ` +
            `fraction at ${unit}`,
        );
      }
      return { law: 'log-uniform', min: prior.min / unit, max: Math.min(prior.max, unit) / unit };
    case 'jeffreys':
      return { law: 'jeffreys', max: Math.min(prior.max ?? 1, unit) / unit };
    case 'tabulated': {
      const { value, density } = cutTable(prior, unit);
      return { law: 'tabulated', value: value.map((x) => Math.min(1, x / unit)), density };
    }
  }
}

/** A beta prior cut below 1: its power at 1 has become a smooth factor. */
function betaBelow({ a, b }: { a: number; b: number }, unit: number): PriorLaw {
  return {
    support: [0, 1],
    exponentAtZero: a,
    exponentAtOne: 1,
    decay: 0,
    logRegular: (_x, complement) => (b - 1) * Math.log(1 - unit + unit * complement),
    logNorm: 'numerical',
  };
}

/**
 * The law of a question's prior in x, the rate over the largest one allowed.
 *
 * Where the stars' own rates are scaled up, a fraction of stars must end below 1 so that none of
 * them exceeds 1: the prior is cut there and normalised anew.
 *
 * @throws RangeError as `priorLaw`, and for a prior that has nothing below the cut
 */
export function lawBelow({ prior, likelihood, completeness, unit }: CheckedQuestion): PriorLaw {
  const whole = priorLaw(prior, likelihood, completeness);
  if (unit === 1 || prior.law === 'gamma') return whole;
  if (prior.law === 'beta') return betaBelow(prior, unit);
  return priorLaw(cutPrior(prior, unit), likelihood, completeness);
}
