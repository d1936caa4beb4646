import { describe, expect, test } from 'vitest';
import { ratePosterior } from '@/lib/inference';
import { logDetectionShapes } from '@/lib/inference/detection-shape';
import { type FreeIndexQuestion, freeIndexPosterior } from '@/lib/inference/free-indices';
import { limitByIndex, summariseIndices } from '@/lib/inference/index-summaries';
import { freeIndices } from '@/lib/inference/settled-indices';
import { gammaP, logGamma } from '@/lib/numerics/special';
import { meanCompletenessOfStack, populationWeights } from '@/lib/population';
import { buildMaps, buildPowerLaw, GRID } from './build-maps';

const { maps } = buildMaps(40);
const { form: _form, massIndex: _a, semiMajorAxisIndex: _b, ...box } = buildPowerLaw();

const detections = [
  {
    star: 3,
    name: 'b',
    massMjup: 9,
    semiMajorAxisAu: 40,
    measurement: {
      kind: 'values',
      mass: { value: 9, lower: 7 },
      semiMajorAxis: { value: 40, upper: 55 },
    },
  },
  { star: 8, name: 'c', massMjup: 20, semiMajorAxisAu: 90 },
] as const;

function question(overrides: Partial<FreeIndexQuestion> = {}): FreeIndexQuestion {
  return {
    maps,
    grid: GRID,
    box,
    indices: { massIndex: { min: -2, max: 1 }, semiMajorAxisIndex: { min: -1.5, max: 1.5 } },
    likelihood: 'mean-number',
    prior: { law: 'uniform', max: 2 },
    detections: [...detections],
    ...overrides,
  };
}

/** A grid of midpoints, the rate in closed form: another rule than the one under test. */
function bruteForce(n: number, level: number) {
  const at = (min: number) => Float64Array.from({ length: n }, (_, i) => min + (3 * (i + 0.5)) / n);
  const [alphas, betas] = [at(-2), at(-1.5)];
  const shapes = detections.map((one) => logDetectionShapes(box, one, alphas, betas));
  const nodes = Array.from({ length: n * n }, (_, node) => {
    const population = buildPowerLaw({
      massIndex: alphas[Math.floor(node / n)],
      semiMajorAxisIndex: betas[node % n],
    });
    const seen = meanCompletenessOfStack(maps, populationWeights(GRID, population));
    const exposure = seen.reduce((a, b) => a + b);
    return { exposure, shape: Math.exp(shapes[0][node] + shapes[1][node]) };
  });
  const below = (x: number, moment = 0) =>
    nodes.reduce(
      (sum, { exposure, shape }) =>
        sum +
        (shape * gammaP(3 + moment, x * exposure) * Math.exp(logGamma(3 + moment))) /
          exposure ** (3 + moment),
      0,
    );
  let [low, high] = [0, 2];
  for (let i = 0; i < 60; i++) {
    const middle = 0.5 * (low + high);
    if (below(middle) < level * below(2)) low = middle;
    else high = middle;
  }
  return {
    limit: low,
    mean: below(2, 1) / below(2),
    logEvidence: Math.log(below(2) / (2 * n * n)),
  };
}

describe('freeIndexPosterior', () => {
  test('agrees with a fine grid of indices and the rate in closed form', () => {
    const { rate } = freeIndexPosterior(question());
    const expected = bruteForce(36, 0.95);
    expect(Math.abs(rate.quantile(0.95) / expected.limit - 1)).toBeLessThan(3e-4);
    expect(Math.abs(rate.mean / expected.mean - 1)).toBeLessThan(3e-4);
    expect(Math.abs(rate.logEvidence - expected.logEvidence)).toBeLessThan(1e-3);
  });

  test.each(['mean-number', 'host-fraction'] as const)(
    'a narrow range of indices gives back the fixed ones: %s',
    (likelihood) => {
      const narrow = (index: number) => ({ min: index - 1e-5, max: index + 1e-5 });
      const prior = { law: 'uniform', max: 1 } as const;
      const indices = { massIndex: narrow(-0.4), semiMajorAxisIndex: narrow(0.2) };
      const free = freeIndexPosterior(question({ likelihood, prior, indices }), 3);
      const completeness = meanCompletenessOfStack(maps, populationWeights(GRID, buildPowerLaw()));
      const fixed = ratePosterior({ likelihood, completeness, detectedStars: [3, 8], prior });
      expect(Math.abs(free.rate.quantile(0.95) / fixed.quantile(0.95) - 1)).toBeLessThan(1e-8);
      const alone = { at: Float64Array.of(-0.4), beta: Float64Array.of(0.2) };
      const shapes = detections.reduce(
        (sum, one) => sum + logDetectionShapes(box, one, alone.at, alone.beta)[0],
        0,
      );
      expect(free.rate.logEvidence).toBeCloseTo(fixed.logEvidence + shapes, 7);
    },
  );

  test('the shares of the nodes repeat the evidence, and their rates its mean', () => {
    for (const likelihood of ['mean-number', 'host-fraction'] as const) {
      for (const prior of [
        { law: 'uniform', max: 1 },
        { law: 'log-uniform', min: 1e-4, max: 1 },
      ] as const) {
        const { logShare, rateMean, rate } = freeIndexPosterior(question({ likelihood, prior }));
        const total = logShare.reduce((sum, one) => sum + Math.exp(one), 0);
        const mean = logShare.reduce((sum, one, node) => sum + Math.exp(one) * rateMean[node], 0);
        expect(total).toBeCloseTo(1, 12);
        expect(Math.abs(mean / rate.mean - 1)).toBeLessThan(1e-7);
      }
    }
  });

  test('a prior without an end and one with a singular end are integrated', () => {
    const gamma = { law: 'gamma', shape: 0.7, rate: 3 } as const;
    const jeffreys = { law: 'jeffreys' } as const;
    const beta = { law: 'beta', a: 0.5, b: 0.5 } as const;
    const none = freeIndexPosterior(question({ prior: gamma, detections: [] }));
    const found = freeIndexPosterior(question({ prior: jeffreys }));
    const share = freeIndexPosterior(question({ likelihood: 'host-fraction', prior: beta }));
    for (const { rate, logShare, rateMean } of [none, found, share]) {
      const mean = logShare.reduce((sum, one, node) => sum + Math.exp(one) * rateMean[node], 0);
      expect(Math.abs(mean / rate.mean - 1)).toBeLessThan(1e-6);
    }
    expect(none.rate.quantile(0.95)).toBeLessThan(found.rate.quantile(0.95));
    expect(found.rate.logEvidence).toBeNaN();
  });

  test('a rate that scales with the host multiplies each star, and cuts the fraction', () => {
    const twice = new Float64Array(40).fill(2);
    const plain = freeIndexPosterior(question({ prior: { law: 'uniform', max: 1 } }), 6);
    const scaled = freeIndexPosterior(
      question({ prior: { law: 'uniform', max: 0.5 }, rateScale: twice }),
      6,
    );
    expect(2 * scaled.rate.quantile(0.95)).toBeCloseTo(plain.rate.quantile(0.95), 9);
    expect(scaled.rate.logEvidence).toBeCloseTo(plain.rate.logEvidence, 9);
    const fraction = question({
      likelihood: 'host-fraction',
      prior: { law: 'uniform', max: 1 },
      rateScale: twice,
    });
    const cut = freeIndexPosterior(fraction, 6).rate;
    expect(cut.support).toEqual([0, 0.5]);
    expect(cut.cutAt).toBe(0.5);
    expect(scaled.rate.cutAt).toBeNull();
    expect(cut.priorDensity(0.2)).toBeCloseTo(2, 9);
  });

  test('what cannot be answered is refused with its reason', () => {
    const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
    const summed = { summed: maps.slice(0, size), stars: 1 };
    const fraction = { likelihood: 'host-fraction', prior: { law: 'uniform', max: 1 } } as const;
    expect(() =>
      freeIndexPosterior(question({ ...fraction, maps: summed, detections: [] })),
    ).toThrow("the host fraction needs each star's map");
    expect(() =>
      freeIndexPosterior(question({ likelihood: 'host-fraction', prior: { law: 'jeffreys' } })),
    ).toThrow('the Jeffreys prior of a host fraction follows the completeness');
    const blind = maps.slice();
    blind.fill(0, 3 * size, 4 * size);
    expect(() => freeIndexPosterior(question({ ...fraction, maps: blind }))).toThrow(
      'b was detected where the map of its star says nothing can be seen',
    );
    const far = { massMjup: Float64Array.of(200), semiMajorAxisAu: Float64Array.of(40) };
    const lost = {
      ...detections[1],
      measurement: { kind: 'samples', ...far, interimPrior: 'flat' },
    } as const;
    expect(() => freeIndexPosterior(question({ detections: [lost] }))).toThrow(
      'nothing of the measurement of c lies in the ranges',
    );
  });
});

describe('freeIndices', () => {
  test('doubles the nodes until limit and means stand still', () => {
    const settled = freeIndices(question(), 0.95);
    expect(settled.isSettled).toBe(true);
    expect(settled.nodes).toBe(24);
    expect(settled.limitMovedBy).toBeLessThan(1e-4);
    expect(settled.meansMovedBy).toBeLessThan(2e-3);
    const finer = freeIndexPosterior(question(), 48).rate.quantile(0.95);
    expect(Math.abs(settled.limit / finer - 1)).toBeLessThan(1e-6);
  });

  test('says so when the most nodes allowed do not settle it', () => {
    const wide = {
      massIndex: { min: -10, max: 10 },
      semiMajorAxisIndex: { min: -10, max: 10 },
    };
    const settled = freeIndices(question({ indices: wide }), 0.95, { nodes: 3, mostNodes: 6 });
    expect(settled.isSettled).toBe(false);
    expect(settled.notes.join(' ')).toContain('6 nodes a side did not bring the answer to rest');
    expect(freeIndices(question({ indices: wide }), 0.95).isSettled).toBe(true);
  });

  test('names the ends of the ranges that limit the result, and only those', () => {
    const { limitingEnds, notes } = freeIndices(question({ detections: [] }), 0.95);
    expect(limitingEnds.length).toBeGreaterThan(0);
    expect(notes.join(' ')).toContain('The range of indices limits the result');
    expect(notes.join(' ')).toContain('Nothing was detected');
    const many = Array.from({ length: 12 }, (_, i) => ({
      star: i,
      name: `${i}`,
      massMjup: 4 + 3 * i,
      semiMajorAxisAu: 15 + 18 * i,
    }));
    const wide = { massIndex: { min: -6, max: 6 }, semiMajorAxisIndex: { min: -6, max: 6 } };
    const settled = freeIndices(question({ detections: many, indices: wide }), 0.95);
    expect(settled.limitingEnds).toEqual([]);
    expect(settled.notes).toEqual([]);
  });
});

describe('summariseIndices', () => {
  const posterior = freeIndexPosterior(question(), 16);
  const summary = summariseIndices(posterior);
  const trapezoid = (x: Float64Array, y: ArrayLike<number>) => {
    let sum = 0;
    for (let i = 1; i < x.length; i++) sum += 0.5 * (x[i] - x[i - 1]) * (y[i] + y[i - 1]);
    return sum;
  };

  test('marginals hold a probability of 1 and agree with the moments', () => {
    for (const side of ['massIndex', 'semiMajorAxisIndex'] as const) {
      const { marginal, mean, median, interval95 } = summary[side];
      expect(trapezoid(marginal.value, marginal.density)).toBeCloseTo(1, 3);
      const first = marginal.density.map((d, i) => d * marginal.value[i]);
      expect(trapezoid(marginal.value, first)).toBeCloseTo(mean, 2);
      expect(median).toBeGreaterThan(interval95[0]);
      expect(median).toBeLessThan(interval95[1]);
    }
  });

  test('joint densities sum to the marginals', () => {
    for (const [plane, across] of [
      [summary.rateByMassIndex, summary.massIndex],
      [summary.rateBySemiMajorAxisIndex, summary.semiMajorAxisIndex],
    ] as const) {
      const { x, y, density } = plane;
      const columns = x.map((_, i) =>
        trapezoid(
          y,
          y.map((_row, j) => density[j * x.length + i]),
        ),
      );
      for (const i of [5, 30, 50]) {
        expect(Math.abs(columns[i] / across.marginal.density[i] - 1)).toBeLessThan(0.01);
      }
    }
    const { x, y, density } = summary.massIndexBySemiMajorAxisIndex;
    const rows = y.map((_, j) => trapezoid(x, density.subarray(j * x.length, (j + 1) * x.length)));
    for (const j of [5, 30, 50]) {
      expect(Math.abs(rows[j] / summary.semiMajorAxisIndex.marginal.density[j] - 1)).toBeLessThan(
        1e-3,
      );
    }
  });

  test('stars that would certainly have shown a companion leave every number finite', () => {
    const certain = maps.slice();
    certain.fill(1, 0, 2 * GRID.massMjup.length * GRID.semiMajorAxisAu.length);
    const seen = freeIndexPosterior(
      question({
        maps: certain,
        likelihood: 'host-fraction',
        prior: { law: 'uniform', max: 1 },
        detections: [],
      }),
    );
    const { rateByMassIndex, massIndex } = summariseIndices(seen);
    expect(rateByMassIndex.density.every(Number.isFinite)).toBe(true);
    expect(massIndex.marginal.density.every((d) => d > 0)).toBe(true);
    expect(seen.rate.density(1)).toBeLessThan(1e-20);
  });

  test('the limit for each index lies around the limit without it, and meets a fixed one', () => {
    const { value, limit } = limitByIndex(posterior, 'massIndex', 0.95);
    const whole = posterior.rate.quantile(0.95);
    expect(Math.min(...limit)).toBeLessThan(whole);
    expect(Math.max(...limit)).toBeGreaterThan(whole);
    const near = { min: value[20] - 1e-6, max: value[20] + 1e-6 };
    const { indices } = question();
    const fixed = freeIndexPosterior(question({ indices: { ...indices, massIndex: near } }), 16);
    expect(Math.abs(limit[20] / fixed.rate.quantile(0.95) - 1)).toBeLessThan(1e-5);
  });
});
