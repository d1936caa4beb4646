import type { SwitchOption } from '@/components/ui/consequence-switch';
import type { Likelihood, RatePrior } from '@/lib/inference';

/** A floor is needed where a log-uniform prior meets no detection: the limit follows it. */
const DEFAULT_FLOOR = 0.001;

export const likelihoodOptions: SwitchOption<Likelihood>[] = [
  { value: 'host-fraction', label: 'host fraction' },
  { value: 'mean-number', label: 'Poisson' },
];

export type PriorLaw = RatePrior['law'];

export const lawNames: Record<PriorLaw, string> = {
  uniform: 'uniform',
  jeffreys: 'Jeffreys',
  'log-uniform': 'log-uniform',
  beta: 'beta',
  gamma: 'gamma',
  tabulated: 'posterior of a run',
};

/** The laws that a likelihood takes. */
export function priorLaws(likelihood: Likelihood): PriorLaw[] {
  return likelihood === 'host-fraction'
    ? ['uniform', 'jeffreys', 'log-uniform', 'beta']
    : ['uniform', 'jeffreys', 'log-uniform', 'gamma'];
}

export function priorOptions(laws: PriorLaw[]): SwitchOption<PriorLaw>[] {
  return laws.map((law) => ({ value: law, label: lawNames[law] }));
}

/** A prior of the law with the numbers that are usual for it; kept where it is the law already. */
export function priorOfLaw(law: PriorLaw, likelihood: Likelihood, present: RatePrior): RatePrior {
  if (present.law === law) return fitPrior(present, likelihood);
  switch (law) {
    case 'uniform':
      return { law, max: 1 };
    case 'log-uniform':
      return { law, min: DEFAULT_FLOOR, max: 1 };
    case 'jeffreys':
      return likelihood === 'host-fraction' ? { law } : { law, max: 1 };
    case 'beta':
      return { law, a: 1, b: 1 };
    case 'gamma':
      return { law, shape: 1, rate: 1 };
    case 'tabulated':
      // A table comes from another run: without one what is there stays.
      return present;
  }
}

/** The prior after a change of the quantity; the posterior of another run was of the one before. */
export function fitLikelihood(prior: RatePrior, before: Likelihood, after: Likelihood): RatePrior {
  return prior.law === 'tabulated' && before !== after
    ? { law: 'uniform', max: 1 }
    : fitPrior(prior, after);
}

/** The nearest prior that the likelihood allows: a fraction ends at 1 and takes no gamma law. */
export function fitPrior(prior: RatePrior, likelihood: Likelihood): RatePrior {
  if (likelihood === 'host-fraction') {
    if (prior.law === 'gamma') return { law: 'uniform', max: 1 };
    if (prior.law === 'tabulated' && prior.value[prior.value.length - 1] > 1) {
      return { law: 'uniform', max: 1 };
    }
    if (prior.law === 'log-uniform' && prior.max > 1) {
      return { law: 'log-uniform', min: Math.min(prior.min, DEFAULT_FLOOR), max: 1 };
    }
    if (prior.law === 'uniform' && prior.max > 1) return { law: 'uniform', max: 1 };
    if (prior.law === 'jeffreys' && prior.max !== undefined && prior.max > 1) {
      return { law: 'jeffreys' };
    }
    return prior;
  }
  return prior.law === 'beta' ? { law: 'uniform', max: 1 } : prior;
}
