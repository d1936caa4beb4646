import {
  equalTailedInterval,
  type Likelihood,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  upperLimit,
} from '@/lib/inference';
import { draw, type Inputs, type LiveCheck, liveCheck } from './check';

interface Row {
  likelihood: Likelihood;
  completeness: number[];
  detections: number;
  prior: RatePrior;
  level: number;
}

const PRIORS: Record<Likelihood, ((inputs: Inputs) => RatePrior)[]> = {
  'mean-number': [
    ({ between }) => ({ law: 'uniform', max: between(0.5, 3) }),
    ({ logBetween }) => ({ law: 'log-uniform', min: logBetween(1e-4, 1e-2), max: 1 }),
    () => ({ law: 'jeffreys' }),
    ({ between }) => ({ law: 'gamma', shape: between(0.5, 4), rate: between(1, 40) }),
  ],
  'host-fraction': [
    ({ between }) => ({ law: 'uniform', max: between(0.5, 1) }),
    ({ logBetween }) => ({ law: 'log-uniform', min: logBetween(1e-4, 1e-2), max: 1 }),
    () => ({ law: 'jeffreys' }),
    ({ between }) => ({ law: 'beta', a: between(0.5, 3), b: between(0.5, 6) }),
  ],
};

const rowsOf = (likelihood: Likelihood): Row[] =>
  PRIORS[likelihood].flatMap((prior, which) =>
    draw(`${likelihood} ${which}`, 4, (inputs) => {
      const stars = inputs.whole(5, 200);
      return {
        likelihood,
        completeness: Array.from({ length: stars }, () => inputs.between(0.02, 0.95)),
        detections: inputs.whole(0, 4),
        prior: prior(inputs),
        level: inputs.between(0.6, 0.999),
      };
    }),
  );

function questionOf({ likelihood, completeness, detections, prior }: Row): RateQuestion {
  return {
    likelihood,
    completeness: Float64Array.from(completeness),
    detectedStars: Array.from({ length: detections }, (_, star) => star),
    prior,
  };
}

export const posteriorChecks: LiveCheck[] = (['mean-number', 'host-fraction'] as const).map(
  (likelihood) =>
    liveCheck<Row>({
      program: 'SciPy',
      what: 'posterior',
      name: `limit, interval and mean of the posterior, ${likelihood}`,
      rows: rowsOf(likelihood),
      ours: (row) => {
        const posterior = ratePosterior(questionOf(row));
        return [
          upperLimit(posterior, row.level),
          ...equalTailedInterval(posterior, row.level),
          posterior.mean,
        ];
      },
      tolerance: {
        rel: 1e-10,
        because: 'adaptive quadrature is asked for 1e-11 in each of sixty pieces',
      },
    }),
);
