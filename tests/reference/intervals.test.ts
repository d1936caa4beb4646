import {
  equalTailedInterval,
  feldmanCousinsInterval,
  highestDensityInterval,
  poissonLowerLimit,
  poissonUpperLimit,
  ratePosterior,
  upperLimit,
  wilsonInterval,
} from '@/lib/inference';
import { runCheckFile } from './support/check-file';

interface Count {
  count: number;
  background: number;
  level: number;
}

interface Binomial {
  successes: number;
  trials: number;
  level: number;
}

/** Flat prior without an end: the posterior of the expected count itself. */
const flatPosterior = ({ count, background }: Count) =>
  ratePosterior({
    likelihood: 'mean-number',
    completeness: Float64Array.of(1),
    detectedStars: new Array<number>(count).fill(0),
    prior: { law: 'gamma', shape: 1, rate: 0 },
    background,
  });

const shortest = (inputs: Count) => highestDensityInterval(flatPosterior(inputs), inputs.level);
const upper = (inputs: Count) => upperLimit(flatPosterior(inputs), inputs.level);

/**
 * Equal-tailed interval of a fraction with a beta prior, every star fully seen. Astropy puts the
 * lower end at 0 when nothing succeeded, where the equal-tailed one lies above it.
 */
const betaInterval =
  (shape: number) =>
  ({ successes, trials, level }: Binomial): [number, number] => {
    const posterior = ratePosterior({
      likelihood: 'host-fraction',
      completeness: new Float64Array(trials).fill(1),
      detectedStars: Array.from({ length: successes }, (_, star) => star),
      prior: { law: 'beta', a: shape, b: shape },
    });
    const [low, high] = equalTailedInterval(posterior, level);
    return [successes === 0 ? 0 : low, high];
  };

runCheckFile('intervals', {
  runners: {
    'Kraft-Burrows-Nousek': shortest,
    'credible upper limit with background': upper,
    'Feldman-Cousins': ({ count, background, level }: Count) =>
      feldmanCousinsInterval(count, background, level),
    'Feldman-Cousins table': ({ counts, background, level }) =>
      counts.map((count: number) => feldmanCousinsInterval(count, background, level)),
    'Feldman-Cousins table IV, n = 0': ({ count, backgrounds, level }) =>
      backgrounds.map((b: number) => feldmanCousinsInterval(count, b, level)[1]),
    'astropy binomial wilson': ({ successes, trials, level }: Binomial) =>
      wilsonInterval(successes, trials, level),
    'astropy binomial flat': betaInterval(1),
    'astropy binomial jeffreys': betaInterval(0.5),
    'Gehrels table 1 upper': ({ counts, level }) =>
      counts.map((k: number) => poissonUpperLimit(k, 1, level)),
    'Gehrels table 2 lower': ({ counts, level }) =>
      counts.map((k: number) => poissonLowerLimit(k, 1, level)),
  },
});
