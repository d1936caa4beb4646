import { describe, expect, it } from 'vitest';
import {
  type CalibrationSetup,
  calibrationPart,
  coverageAtRates,
  exactCoverage,
  kolmogorovP,
  mergeCalibration,
  type RatePrior,
  ratePosterior,
} from '@/lib/inference';
import { fractionPlacer } from '@/lib/inference/fraction-fast';
import { rateModel } from '@/lib/inference/posterior';
import { buildCompleteness } from './build-question';

const completeness = buildCompleteness(40, 'calibrated', 0.05, 0.85);
const LEVELS = [0.5, 0.68, 0.9, 0.95];

function setup(overrides: Partial<CalibrationSetup> = {}): CalibrationSetup {
  return {
    likelihood: 'host-fraction',
    completeness,
    prior: { law: 'uniform', max: 1 },
    rates: [],
    surveys: 1000,
    parts: 2,
    seed: 'a',
    ...overrides,
  };
}

const partsOf = (one: CalibrationSetup) =>
  Array.from({ length: one.parts }, (_, part) => calibrationPart(one, part));
const judge = (one: CalibrationSetup) => mergeCalibration(one, partsOf(one), LEVELS);

const proper: [CalibrationSetup['likelihood'], RatePrior][] = [
  ['host-fraction', { law: 'uniform', max: 1 }],
  ['host-fraction', { law: 'log-uniform', min: 1e-3, max: 1 }],
  ['host-fraction', { law: 'jeffreys' }],
  ['host-fraction', { law: 'beta', a: 0.8, b: 3 }],
  ['host-fraction', { law: 'tabulated', value: [0, 0.2, 0.9], density: [0, 1, 0.2] }],
  ['mean-number', { law: 'uniform', max: 2 }],
  ['mean-number', { law: 'log-uniform', min: 1e-3, max: 2 }],
  ['mean-number', { law: 'jeffreys', max: 2 }],
  ['mean-number', { law: 'gamma', shape: 2, rate: 4 }],
];

describe('the fast posterior of many outcomes', () => {
  it.each(proper.slice(0, 5))('is the one of a single question: %s, %o', (likelihood, prior) => {
    const question = { likelihood, completeness, prior, detectedStars: [] as number[] };
    const { checked, law } = rateModel(question);
    const place = fractionPlacer(checked, law);
    for (const detectedStars of [[], [3], [0, 7, 20, 31, 39]]) {
      const exact = ratePosterior({ ...question, detectedStars });
      for (const rate of [0.01, 0.12, 0.4, 0.7]) {
        const { below, median } = place(detectedStars, rate);
        expect(Math.abs(below - exact.cumulative(rate))).toBeLessThan(1e-7);
        expect(Math.abs(median / exact.median - 1)).toBeLessThan(1e-6);
      }
    }
  });
});

describe('calibration of a right analysis', () => {
  it.each(proper)('passes with three seeds: %s, %o', (likelihood, prior) => {
    for (const seed of ['a', 'b', 'c']) {
      const { passes, verdict, surveys } = judge(setup({ likelihood, prior, seed }));
      expect(passes, verdict).toBe(true);
      expect(surveys).toBe(1000);
    }
  });

  it('passes with scaled rates and with a background', () => {
    const rateScale = buildCompleteness(40, 'scale', 0.5, 1.8);
    expect(judge(setup({ rateScale })).passes).toBe(true);
    const number = setup({ likelihood: 'mean-number', background: 2 });
    expect(judge(number).passes).toBe(true);
  });
});

describe('calibration of a wrong analysis fails', () => {
  it('whose completeness is 1.3 times the true one', () => {
    const truth = { completeness: completeness.map((c) => c / 1.3) };
    const wrong = judge(setup({ truth, surveys: 3000 }));
    expect(wrong.passes).toBe(false);
    expect(wrong.verdict).toMatch(
      /^Limits do not hold as often as they say: furthest off of the \d levels asked, the [\d.]+\u2009% limit held/,
    );
    expect(judge(setup({ likelihood: 'mean-number', truth, surveys: 3000 })).passes).toBe(false);
  });

  it('whose prior is not where the truth is from', () => {
    const truth = { prior: { law: 'beta', a: 1, b: 3 } } as const;
    expect(judge(setup({ truth })).passes).toBe(false);
  });

  it('that counts every star twice', () => {
    const twice = Float64Array.of(...completeness, ...completeness);
    const star = Int32Array.from(twice.keys(), (entry) => entry % 40);
    for (const likelihood of ['host-fraction', 'mean-number'] as const) {
      const wrong = setup({ likelihood, completeness: twice, truth: { star } });
      expect(judge(wrong).passes).toBe(false);
    }
  });
});

describe('coverage at a true rate', () => {
  it.each(proper)('lies within four errors of the exact one: %s, %o', (likelihood, prior) => {
    const alike = new Float64Array(40).fill(0.45);
    const one = setup({
      likelihood,
      prior,
      completeness: alike,
      rates: [0.06, 0.3],
      surveys: 10_000,
      parts: 4,
    });
    for (const { exact, observed, expected, standardError } of coverageAtRates(
      one,
      partsOf(one),
      0.9,
    )) {
      expect(exact.high).toBe(exact.low);
      expect(Math.abs(observed - expected)).toBeLessThanOrEqual(4 * standardError + 1e-12);
    }
  });

  it('lies between the bounds where stars differ', () => {
    const one = setup({ rates: [0.08], surveys: 4000 });
    const [{ exact, observed }] = coverageAtRates(one, partsOf(one), 0.9);
    const error = 4 * Math.sqrt(0.25 / 4000);
    expect(exact.high).toBeGreaterThanOrEqual(exact.low);
    expect(observed).toBeGreaterThan(exact.low - error);
    expect(observed).toBeLessThan(exact.high + error);
  });

  it('of a Jeffreys limit falls short where it must', () => {
    // Exposure 8, level 0.9, F = 0.2: P(K >= 1) of a Poisson count of mean 1.6.
    const one = setup({
      likelihood: 'mean-number',
      completeness: Float64Array.of(8),
      prior: { law: 'jeffreys' },
    });
    expect(exactCoverage(one, 0.2, 0.9).low).toBeCloseTo(1 - Math.exp(-1.6), 10);
  });
});

describe('parts', () => {
  it('are the same whatever order they are computed in, and merge in any', () => {
    const one = setup({ surveys: 101, parts: 3, rates: [0.1] });
    const backwards = [2, 1, 0].map((part) => calibrationPart(one, part));
    expect(mergeCalibration(one, backwards, LEVELS)).toEqual(judge(one));
    expect(backwards.map(({ below }) => below.length)).toEqual([34, 34, 33]);
  });

  it('are all needed, once each', () => {
    const one = setup({ surveys: 10 });
    const first = calibrationPart(one, 0);
    expect(() => mergeCalibration(one, [first], LEVELS)).toThrow(/parts 0 to 1, each once, got 0/);
    expect(() => mergeCalibration(one, [first, first], LEVELS)).toThrow(/got 0, 0/);
    expect(() => calibrationPart(one, 2)).toThrow(/numbered 0 to 1, got 2/);
  });

  it('need a prior that can be normalised', () => {
    const prior: RatePrior = { law: 'jeffreys' };
    expect(() => calibrationPart(setup({ likelihood: 'mean-number', prior }), 0)).toThrow(
      /cannot be normalised/,
    );
  });
});

describe('kolmogorovP', () => {
  it('is 0.05 and 0.001 at the tabulated distances', () => {
    // Asymptotic points 1.358 and 1.949 over the root of n (Smirnov 1948, from memory).
    expect(kolmogorovP(1.358 / Math.sqrt(1e8), 1e8)).toBeCloseTo(0.05, 3);
    expect(kolmogorovP(1.949 / Math.sqrt(1e8), 1e8)).toBeCloseTo(0.001, 4);
    expect(kolmogorovP(0.0001, 10)).toBe(1);
  });
});
