import { complementaryErrorFunction } from '@/lib/numerics/error-function';
import { normalCumulative, normalDensity, normalQuantile } from '@/lib/numerics/normal';
import {
  betaQuantile,
  exponentialIntegral,
  gammaP,
  gammaQ,
  gammaQuantile,
  gammaQuantileUpper,
  logBeta,
  logGamma,
  regularisedBeta,
} from '@/lib/numerics/special';
import { draw, type Inputs, type LiveCheck, liveCheck, type Tolerance } from './check';

const ROWS = 60;

const closedForms: Tolerance = {
  rel: 2e-12,
  abs: 1e-300,
  because: 'exponents of some hundreds cost three of the fifteen digits, in every program',
};
const inverses: Tolerance = {
  rel: 2e-12,
  abs: 1e-290,
  because: 'a quantile where the density is low magnifies the last digits of the function',
};
const logarithms: Tolerance = {
  rel: 1e-13,
  abs: 1e-13,
  because: 'relative digits are lost where ln Γ passes through zero',
};
const differenceOfLogarithms: Tolerance = {
  rel: 1e-12,
  abs: 1e-12,
  because: 'ln B is a difference of ln Γ of some thousands',
};
const cephesInverses: Tolerance = {
  rel: 1e-7,
  because: 'older SciPy inverts the beta law by Cephes, which ends its search at about 1e-8',
};

/** A probability from both tails, down to one in a thousand million. */
const chance = (inputs: Inputs) =>
  inputs.pick([inputs.between(0.001, 0.999), inputs.logBetween(1e-9, 1e-3)]);

function gammaPlace(inputs: Inputs): [shape: number, x: number] {
  const shape = inputs.logBetween(0.05, 500);
  return [shape, Number((shape * inputs.logBetween(0.1, 4)).toPrecision(6))];
}
const betaShape = (inputs: Inputs) => inputs.logBetween(0.3, 300);

type Pair = [number, number];
type Triple = [number, number, number];

const gammaPairs = draw<Pair>('gamma', ROWS, gammaPlace);
const gammaChances = draw<Triple>('gamma quantile', ROWS, (inputs) => [
  chance(inputs),
  inputs.logBetween(0.3, 500),
  inputs.logBetween(0.01, 100),
]);
const betaPlaces = draw<Triple>('beta', ROWS, (inputs) => [
  inputs.between(0.001, 0.999),
  betaShape(inputs),
  betaShape(inputs),
]);
const betaChances = draw<Triple>('beta quantile', ROWS, (inputs) => [
  chance(inputs),
  betaShape(inputs),
  betaShape(inputs),
]);
const positive = draw<[number]>('positive', ROWS, (inputs) => [inputs.logBetween(1e-3, 1e3)]);
const pairs = draw<Pair>('pairs', ROWS, (inputs) => [betaShape(inputs), betaShape(inputs)]);
const deviates = draw<[number]>('deviates', ROWS, (inputs) => [inputs.between(-8, 8)]);
const chances = draw<[number]>('chances', ROWS, (inputs) => [chance(inputs)]);
const smallAndLarge = draw<[number]>('exponential integral', ROWS, ({ logBetween }) => [
  logBetween(1e-6, 100),
]);

const shared = [
  ['gamma-lower', 'P(a, x)', gammaPairs, gammaP],
  ['gamma-upper', 'Q(a, x)', gammaPairs, gammaQ],
] as const;

const inBoth: LiveCheck[] = (['R', 'SciPy'] as const).flatMap((program) => [
  ...shared.map(([what, name, rows, compute]) =>
    liveCheck<Pair>({
      program,
      what,
      name: `incomplete gamma function ${name}`,
      rows: [...rows],
      ours: ([shape, x]) => compute(shape, x),
      tolerance: closedForms,
    }),
  ),
  liveCheck<Triple>({
    program,
    what: 'beta-lower',
    name: 'incomplete beta function I_x(a, b)',
    rows: betaPlaces,
    ours: ([x, a, b]) => regularisedBeta(x, a, b),
    tolerance: closedForms,
  }),
  liveCheck<Triple>({
    program,
    what: 'gamma-quantile',
    name: 'quantile of the gamma law',
    rows: gammaChances,
    ours: ([p, shape, rate]) => gammaQuantile(p, shape, rate),
    tolerance: inverses,
  }),
  liveCheck<Triple>({
    program,
    what: 'gamma-quantile-upper',
    name: 'upper quantile of the gamma law',
    rows: gammaChances,
    ours: ([q, shape, rate]) => gammaQuantileUpper(q, shape, rate),
    tolerance: inverses,
  }),
  liveCheck<Triple>({
    program,
    what: 'beta-quantile',
    name: 'quantile of the beta law',
    rows: betaChances,
    ours: ([p, a, b]) => betaQuantile(p, a, b),
    tolerance: program === 'R' ? inverses : cephesInverses,
  }),
  liveCheck<[number]>({
    program,
    what: 'log-gamma',
    name: 'ln Γ',
    rows: positive,
    ours: ([x]) => logGamma(x),
    tolerance: logarithms,
  }),
  liveCheck<Pair>({
    program,
    what: 'log-beta',
    name: 'ln B',
    rows: pairs,
    ours: ([a, b]) => logBeta(a, b),
    tolerance: differenceOfLogarithms,
  }),
  liveCheck<[number]>({
    program,
    what: 'normal-density',
    name: 'density of the normal law',
    rows: deviates,
    ours: ([z]) => normalDensity(z),
    tolerance: closedForms,
  }),
  liveCheck<[number]>({
    program,
    what: 'normal-lower',
    name: 'cumulative of the normal law',
    rows: deviates,
    ours: ([z]) => normalCumulative(z),
    tolerance: closedForms,
  }),
  liveCheck<[number]>({
    program,
    what: 'normal-quantile',
    name: 'quantile of the normal law',
    rows: chances,
    ours: ([p]) => normalQuantile(p),
    tolerance: { rel: 1e-13, abs: 1e-14, because: 'z passes through zero at p = 1/2' },
  }),
  liveCheck<[number]>({
    program,
    what: 'error-function-upper',
    name: 'complementary error function',
    rows: deviates,
    ours: ([x]) => complementaryErrorFunction(x),
    tolerance: closedForms,
  }),
]);

export const specialFunctionChecks: LiveCheck[] = [
  ...inBoth,
  liveCheck<[number]>({
    program: 'SciPy',
    what: 'exponential-integral',
    name: 'exponential integral E1',
    rows: smallAndLarge,
    ours: ([x]) => exponentialIntegral(x),
    tolerance: closedForms,
  }),
];
