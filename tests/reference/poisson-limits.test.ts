import { poissonLowerLimit, poissonUpperLimit } from '@/lib/inference';
import { runCheckFile } from './support/check-file';

interface Counts {
  counts: number[];
  level: number;
}

runCheckFile('poisson-limits', {
  runners: {
    'poisson upper limit one-sided': ({ counts, level }: Counts) =>
      counts.map((k) => poissonUpperLimit(k, 1, level)),
    'poisson lower limit one-sided': ({ counts, level }: Counts) =>
      counts.map((k) => poissonLowerLimit(k, 1, level)),
    'poisson central interval': ({ counts, level }: Counts) => ({
      lower: counts.map((k) => poissonLowerLimit(k, 1, 0.5 * (1 + level))),
      upper: counts.map((k) => poissonUpperLimit(k, 1, 0.5 * (1 + level))),
    }),
  },
});
