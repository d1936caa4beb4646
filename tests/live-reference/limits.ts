import {
  binomialLowerLimit,
  binomialUpperLimit,
  poissonBinomial,
  poissonLowerLimit,
  poissonUpperLimit,
  wilsonInterval,
} from '@/lib/inference/frequentist';
import { gammaQ, regularisedBeta } from '@/lib/numerics/special';
import { draw, type LiveCheck, liveCheck, type Tolerance } from './check';

const ROWS = 40;

const quantiles: Tolerance = {
  rel: 2e-12,
  abs: 1e-15,
  because: 'limits are quantiles: where the density is low their last digits differ',
};
const sums: Tolerance = {
  rel: 2e-12,
  abs: 1e-300,
  because: 'exponents of some hundreds cost three of the fifteen digits',
};

type Pair = [number, number];
type Triple = [number, number, number];

const counts = draw<Pair>('counts', ROWS, ({ whole, between }) => [
  whole(0, 60),
  between(0.5, 0.999),
]);
const trials = draw<Triple>('trials', ROWS, ({ whole, between }) => {
  const n = whole(1, 400);
  return [whole(0, n), n, between(0.5, 0.999)];
});
const means = draw<Pair>('means', ROWS, ({ whole, logBetween }) => [
  whole(0, 60),
  logBetween(0.1, 120),
]);
const oneShort = draw<Triple>('successes', ROWS, ({ whole, between }) => {
  const n = whole(2, 400);
  return [whole(0, n - 1), n, between(0.001, 0.999)];
});
const equalTrials = draw<Pair>('equal trials', 10, ({ whole, between }) => [
  whole(1, 60),
  between(0.01, 0.99),
]);

/** One tail of a central interval. */
const oneSided = (level: number) => 0.5 * (1 + level);

const inBoth: LiveCheck[] = (['R', 'SciPy'] as const).flatMap((program) => [
  liveCheck<Pair>({
    program,
    what: 'poisson-at-most',
    name: 'a Poisson count of at most k is Q(k + 1, mean)',
    rows: means,
    ours: ([k, mean]) => gammaQ(k + 1, mean),
    tolerance: sums,
  }),
  liveCheck<Triple>({
    program,
    what: 'binomial-at-most',
    name: 'a binomial count of at most k is I_(1-p)(n - k, k + 1)',
    rows: oneShort,
    ours: ([k, n, p]) => regularisedBeta(1 - p, n - k, k + 1),
    tolerance: sums,
  }),
  liveCheck<Pair>({
    program,
    what: 'binomial-counts',
    name: 'exact counts of unequal trials are binomial where the trials are equal',
    rows: equalTrials,
    ours: ([n, p]) => poissonBinomial(new Float64Array(n).fill(p)),
    tolerance: sums,
  }),
  liveCheck<Pair>({
    program,
    what: 'poisson-interval',
    name: 'Garwood interval of a Poisson mean',
    rows: counts,
    ours: ([k, level]) => [
      poissonLowerLimit(k, 1, oneSided(level)),
      poissonUpperLimit(k, 1, oneSided(level)),
    ],
    tolerance: quantiles,
  }),
  liveCheck<Triple>({
    program,
    what: 'clopper-pearson',
    name: 'Clopper-Pearson interval of a fraction',
    rows: trials,
    ours: ([k, n, level]) => [
      binomialLowerLimit(k, n, oneSided(level)),
      binomialUpperLimit(k, n, oneSided(level)),
    ],
    tolerance:
      program === 'R'
        ? quantiles
        : { ...quantiles, rel: 1e-9, because: 'SciPy searches its exact interval by bracketing' },
  }),
]);

export const limitChecks: LiveCheck[] = [
  ...inBoth,
  liveCheck<Triple>({
    program: 'R',
    what: 'wilson',
    name: 'Wilson interval of a fraction',
    rows: trials,
    ours: ([k, n, level]) => wilsonInterval(k, n, level),
    tolerance: {
      rel: 1e-12,
      abs: 1e-15,
      because: 'a closed form; near 0 its two terms cancel to the last digit',
    },
  }),
];
