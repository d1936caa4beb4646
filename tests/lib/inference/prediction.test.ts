import { describe, expect, it } from 'vitest';
import {
  countInterval,
  countsAtRate,
  negativeBinomial,
  poissonBinomial,
  predictCounts,
  ratePosterior,
} from '@/lib/inference';
import { integrate } from '@/lib/numerics/quadrature';
import { buildCompleteness, buildQuestion } from './build-question';

const planned = buildCompleteness(30, 'planned');

describe('counts at a rate', () => {
  it('are the exact sum of unequal trials', () => {
    const { probability, mean } = countsAtRate(
      { likelihood: 'host-fraction', completeness: planned },
      0.3,
    );
    const exact = poissonBinomial(planned.map((c) => 0.3 * c));
    probability.forEach((p, n) => {
      expect(p).toBeCloseTo(exact[n], 13);
    });
    expect(mean).toBeCloseTo(0.3 * planned.reduce((a, b) => a + b, 0), 9);
  });

  it('are refused where a chance exceeds 1 or the rate is negative', () => {
    const sample = { likelihood: 'host-fraction', completeness: Float64Array.of(0.9) } as const;
    const rateScale = Float64Array.of(2);
    expect(() => countsAtRate({ ...sample, rateScale }, 0.6)).toThrow(/would be 1.08/);
    expect(() => countsAtRate(sample, -0.1)).toThrow(/>= 0, got -0.1/);
  });
});

describe('counts with the rate from a posterior', () => {
  it('average over it: host fraction, against plain quadrature', () => {
    const posterior = ratePosterior(buildQuestion({ detectedStars: [2] }));
    const { probability } = predictCounts(posterior, {
      likelihood: 'host-fraction',
      completeness: planned,
    });
    for (const n of [0, 1, 4]) {
      const expected = integrate(
        (f) => posterior.density(f) * poissonBinomial(planned.map((c) => f * c))[n],
        0,
        1,
        100,
      );
      expect(Math.abs(probability[n] - expected)).toBeLessThan(1e-9);
    }
  });

  it('integrate to the closed form: uniform far above the data is flat', () => {
    const question = buildQuestion({ likelihood: 'mean-number', detectedStars: [0, 1] });
    const flat = ratePosterior({ ...question, prior: { law: 'gamma', shape: 1, rate: 0 } });
    const wide = ratePosterior({ ...question, prior: { law: 'uniform', max: 40 } });
    const sample = { likelihood: 'mean-number', completeness: planned } as const;
    const [closed, numeric] = [predictCounts(flat, sample), predictCounts(wide, sample)];
    for (let n = 0; n < 12; n++) {
      expect(Math.abs(closed.probability[n] - numeric.probability[n])).toBeLessThan(1e-9);
    }
    expect(closed.probability.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 10);
    const [low, high] = countInterval(closed, 0.68);
    expect(low).toBeLessThan(closed.mean);
    expect(high).toBeGreaterThan(closed.mean);
  });

  it('need the same quantity', () => {
    const sample = { likelihood: 'mean-number', completeness: planned } as const;
    expect(() => predictCounts(ratePosterior(buildQuestion()), sample)).toThrow(/other quantity/);
    expect(() => negativeBinomial(0, 1, 1, 3)).toThrow(/shape > 0/);
  });
});
