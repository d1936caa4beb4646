import type { ResultOf } from '@/lib/schemas/study-results';

/** Invented answers with the shapes of real ones: from one toy survey, so that they agree. */

const logAxis = (min: number, max: number, n: number) =>
  Array.from({ length: n }, (_, i) => Number((min * (max / min) ** (i / (n - 1))).toPrecision(6)));
const linAxis = (min: number, max: number, n: number) =>
  Array.from({ length: n }, (_, i) => Number((min + ((max - min) * i) / (n - 1)).toPrecision(6)));

const STARS = 287;
const NO_EVENT_95 = 2.9957;

/** Toy sum over the stars: best near 60 au, growing with mass. */
function summedAt(massMjup: number, semiMajorAxisAu: number): number {
  const near = Math.exp(-((Math.log(semiMajorAxisAu / 60) / 1.3) ** 2));
  return 0.9 * STARS * near * (1 / (1 + (4 / massMjup) ** 2));
}
/** Uniform prior to 1 and no detection: S F / (1 − e^−S) stays below 1. */
const limitOf = (summed: number) =>
  Math.min(
    0.95,
    -Math.log(1 - 0.95 * (1 - Math.exp(-Math.max(summed, 1e-6)))) / Math.max(summed, 1e-6),
  );

export function buildLimitMap(): ResultOf<'limit-map'> {
  const massMjup = logAxis(0.5, 50, 33);
  const semiMajorAxisAu = logAxis(1, 1000, 49);
  const summed = massMjup.map((m) => semiMajorAxisAu.map((a) => summedAt(m, a)));
  const limit = summed.map((row) => row.map(limitOf));
  return {
    kind: 'limit-map',
    massMjup,
    semiMajorAxisAu,
    limit,
    summed,
    isSetByPrior: limit.map((row) => row.map((value) => value > 0.9 * 0.95)),
    tail: limit.map((row, i) =>
      row.map((value, j) => (i > 30 || j > 46 ? null : Math.min(0.95, 1.6 * value))),
    ),
    notes: ['The map is not one statement about all nodes: each holds by itself.'],
  };
}

export function buildSweep(): ResultOf<'sweep'> {
  const value = logAxis(30, 1000, 31);
  const limitZero = value.map((au) => 0.0105 + 0.00075 * (au / 30) ** 1.35);
  return {
    kind: 'sweep',
    over: 'semi-major-axis-max',
    value,
    limitZero,
    limit: limitZero.map((limit, i) =>
      value[i] < 45 ? limit : limit * (value[i] < 90 ? 1.6 : 2.1),
    ),
    exposure: value.map((au) => 160 * Math.exp(-au / 700)),
    detections: value.map((au) => (au < 45 ? 0 : au < 90 ? 1 : 2)),
    isSetByPrior: value.map((au) => au > 850),
    plane: null,
    notes: [],
  };
}

export function buildPlaneSweep(): ResultOf<'sweep'> {
  const massIndex = linAxis(-2, 1, 21);
  const semiMajorAxisIndex = linAxis(-2, 1, 21);
  const limit = massIndex.map((alpha) =>
    semiMajorAxisIndex.map(
      (beta) => 0.058 * Math.exp(-0.55 * (alpha + 0.3) + 0.3 * (beta - 0.4) ** 2),
    ),
  );
  const middle = limit[10];
  return {
    kind: 'sweep',
    over: 'both-indices',
    value: semiMajorAxisIndex,
    limit: middle,
    limitZero: middle.map((one) => one / 2),
    exposure: middle.map((one) => NO_EVENT_95 / one),
    detections: middle.map(() => 2),
    isSetByPrior: middle.map(() => false),
    plane: { massIndex, semiMajorAxisIndex, limit },
    notes: [],
  };
}

const bell = (x: number, mean: number, sigma: number) =>
  Math.exp(-0.5 * ((x - mean) / sigma) ** 2) / (sigma * Math.sqrt(2 * Math.PI));

function bellParameter(mean: number, sigma: number, value: number[]) {
  return {
    mean,
    median: mean,
    standardDeviation: sigma,
    interval68: [mean - sigma, mean + sigma] as [number, number],
    interval95: [mean - 1.96 * sigma, mean + 1.96 * sigma] as [number, number],
    marginal: { value, density: value.map((x) => bell(x, mean, sigma)) },
  };
}

/** Density of two bells with a correlation. */
function bellPlane(
  [x, meanX, sigmaX]: [number[], number, number],
  [y, meanY, sigmaY]: [number[], number, number],
  rho: number,
) {
  const norm = 2 * Math.PI * sigmaX * sigmaY * Math.sqrt(1 - rho * rho);
  return {
    x,
    y,
    density: y.map((b) =>
      x.map((a) => {
        const [u, v] = [(a - meanX) / sigmaX, (b - meanY) / sigmaY];
        return Math.exp(-(u * u - 2 * rho * u * v + v * v) / (2 * (1 - rho * rho))) / norm;
      }),
    ),
  };
}

export function buildFreeIndices(): ResultOf<'free-indices'> {
  const rates = linAxis(0, 0.14, 61);
  const indices = linAxis(-2, 1, 61);
  const rate = bellParameter(0.045, 0.018, rates);
  const massIndex = bellParameter(-0.5, 0.45, indices);
  const semiMajorAxisIndex = bellParameter(-0.2, 0.5, indices);
  return {
    kind: 'free-indices',
    limit: 0.0763,
    limitFixed: 0.0576,
    levels: [
      { level: 0.68, limit: 0.052 },
      { level: 0.95, limit: 0.0763 },
    ],
    rate,
    massIndex,
    semiMajorAxisIndex,
    rateByMassIndex: bellPlane([indices, -0.5, 0.45], [rates, 0.045, 0.018], -0.5),
    rateBySemiMajorAxisIndex: bellPlane([indices, -0.2, 0.5], [rates, 0.045, 0.018], 0.3),
    massIndexBySemiMajorAxisIndex: bellPlane([indices, -0.5, 0.45], [indices, -0.2, 0.5], -0.1),
    correlations: { rateMassIndex: -0.5, rateSemiMajorAxisIndex: 0.3, indices: -0.1 },
    logEvidence: -11.42,
    nodes: 1024,
    movedBy: 2.4e-7,
    notes: ['Both indices are uniform per natural logarithm from −2 to 1.'],
  };
}

export function buildComparison(): ResultOf<'population-comparison'> {
  const row = (number: number, name: string, logBayesFactor: number | null) => ({
    populationId: `00000000-0000-4000-8000-00000000000${number}`,
    key: `P-${number}`,
    version: 1,
    name,
    words: 'dN/dM ∝ M^−1.3 between 2 and 30 MJ, dN/da ∝ a^−0.6 between 20 and 300 AU',
    isOwn: number === 1,
    limit: logBayesFactor === null ? null : 0.058 + 0.004 * number,
    exposure: logBayesFactor === null ? null : 109.4 - 8 * number,
    detections: logBayesFactor === null ? null : 2,
    logEvidence: logBayesFactor === null ? null : -9.1 + logBayesFactor,
    logBayesFactor,
    fault:
      logBayesFactor === null
        ? 'NTY 2037−0818 b lies outside its ranges, so it has no evidence.'
        : null,
  });
  return {
    kind: 'population-comparison',
    rows: [
      row(1, 'Single power laws', 0),
      row(2, 'Steeper in mass', 1.64),
      row(3, 'Flat in both', -3.92),
      row(4, 'Close in only', null),
    ],
    notes: ['The rate prior is uniform in host fraction f, 0 to 1, for all of them.'],
  };
}

export function buildCounts(): ResultOf<'counts'> {
  const factorial = (k: number): number => (k < 2 ? 1 : k * factorial(k - 1));
  const poisson = (k: number, mean: number) => (Math.exp(-mean) * mean ** k) / factorial(k);
  const ks = Array.from({ length: 19 }, (_, k) => k);
  const atRate = ks.map((k) => poisson(k, 2.7));
  const predictive = ks.map(
    (k) => [1.2, 2.2, 3.2, 4.6].reduce((sum, mean) => sum + poisson(k, mean), 0) / 4,
  );
  return {
    kind: 'counts',
    rate: 0.0247,
    atRate,
    predictive,
    counted: 2,
    atLeastCounted: 1 - atRate[0] - atRate[1],
    notes: [],
  };
}

export function buildOverlaps(): ResultOf<'overlap-rules'> {
  return {
    kind: 'overlap-rules',
    ruleUsed: 'same-position',
    rules: [
      { rule: 'same-position', limit: 0.0576, exposure: 109.4, fault: null },
      { rule: 'deepest', limit: 0.0589, exposure: 107.1, fault: null },
      { rule: 'independent', limit: 0.0561, exposure: 112.6, fault: null },
      {
        rule: 'refuse',
        limit: null,
        exposure: null,
        fault: '53 stars are in several surveys: this rule gives no limit.',
      },
    ],
    bracket: { lowest: 0.0554, highest: 0.0589 },
    shared: Array.from({ length: 12 }, (_, i) => ({
      starId: `00000000-0000-4000-8000-0000000000${10 + i}`,
      name: `NTY ${1017 + 31 * i}−${2217 - 97 * i}`,
      surveys: i % 3 === 0 ? ['HALYARD', 'CURLEW', 'PETREL'] : ['HALYARD', 'CURLEW'],
      probability: {
        samePosition: i === 5 ? null : 0.46 - 0.02 * i,
        deepest: 0.44 - 0.02 * i,
        independent: 0.55 - 0.02 * i,
      },
    })),
    notes: [],
  };
}
