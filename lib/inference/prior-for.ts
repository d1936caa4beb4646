import type { Likelihood, RatePrior } from './contract';

/**
 * The same prior for the other quantity, for the table that shows both: cut at 1 for a fraction.
 *
 * @returns null where the law has no counterpart: gamma belongs to a mean number, beta to a
 *   fraction, a log-uniform prior may begin above 1, and a table may reach above it
 */
export function priorFor(prior: RatePrior, likelihood: Likelihood): RatePrior | null {
  if (likelihood === 'mean-number') return prior.law === 'beta' ? null : prior;
  switch (prior.law) {
    case 'uniform':
      return { ...prior, max: Math.min(prior.max, 1) };
    case 'log-uniform':
      return prior.min < 1 ? { ...prior, max: Math.min(prior.max, 1) } : null;
    case 'jeffreys':
      return prior.max === undefined ? prior : { ...prior, max: Math.min(prior.max, 1) };
    case 'gamma':
      return null;
    case 'beta':
      return prior;
    case 'tabulated':
      return prior.value[prior.value.length - 1] <= 1 ? prior : null;
  }
}
