import { negativeBinomial } from '@/lib/inference';
import { normalCumulative } from '@/lib/numerics/normal';
import { betaQuantile, gammaP, gammaQuantile, logGamma } from '@/lib/numerics/special';
import { runCheckFile } from './support/check-file';

runCheckFile('distributions', {
  runners: {
    'gamma quantile': ({ shape, rate, probabilities }) =>
      probabilities.map((p: number) => gammaQuantile(p, shape, rate)),
    'gamma cdf': ({ shape, rate, values }) => values.map((x: number) => gammaP(shape, rate * x)),
    'beta quantile': ({ a, b, probabilities }) =>
      probabilities.map((p: number) => betaQuantile(p, a, b)),
    'normal cdf': ({ values }) => values.map(normalCumulative),
    'poisson pmf': ({ mean, counts }) =>
      counts.map((k: number) => Math.exp(k * Math.log(mean) - mean - logGamma(k + 1))),
    'predictive count': ({ posterior_shape, posterior_rate, planned_exposure, counts }) =>
      negativeBinomial(posterior_shape, posterior_rate, planned_exposure, counts.length - 1),
  },
});
