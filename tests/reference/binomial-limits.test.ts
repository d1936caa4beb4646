import {
  binomialLowerLimit,
  binomialUpperLimit,
  equalTailedInterval,
  ratePosterior,
  wilsonInterval,
} from '@/lib/inference';
import { runCheckFile } from './support/check-file';

interface Counts {
  successes: number;
  trials: number;
  level: number;
}

/** Equal-tailed interval of a fraction with a beta prior, every star fully seen. */
const betaInterval =
  (shape: number) =>
  ({ successes, trials, level }: Counts) =>
    equalTailedInterval(
      ratePosterior({
        likelihood: 'host-fraction',
        completeness: new Float64Array(trials).fill(1),
        detectedStars: Array.from({ length: successes }, (_, star) => star),
        prior: { law: 'beta', a: shape, b: shape },
      }),
      level,
    );

runCheckFile('binomial-limits', {
  runners: {
    'Clopper-Pearson ': ({ successes, trials, level }: Counts) => [
      binomialLowerLimit(successes, trials, 0.5 * (1 + level)),
      binomialUpperLimit(successes, trials, 0.5 * (1 + level)),
    ],
    'Clopper-Pearson one-sided upper': ({ successes, trials, level }: Counts) =>
      binomialUpperLimit(successes, trials, level),
    Wilson: ({ successes, trials, level }: Counts) => wilsonInterval(successes, trials, level),
    'Beta(1,1) posterior equal-tailed': betaInterval(1),
    'Beta(1/2,1/2) posterior equal-tailed': betaInterval(0.5),
  },
});
