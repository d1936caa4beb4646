import { describe, expect, it } from 'vitest';
import { type RatePrior, ratePosterior, upperLimit } from '@/lib/inference';
import { integrate } from '@/lib/numerics/quadrature';
import { buildCompleteness, buildQuestion } from './build-question';

const stars = 40;
const scale = buildCompleteness(stars, 'scale', 0.4, 2.5);
const largest = Math.max(...scale);

describe('rates that differ from star to star', () => {
  it('that are all the same and 1 change nothing', () => {
    for (const likelihood of ['host-fraction', 'mean-number'] as const) {
      const plain = ratePosterior(buildQuestion({ likelihood }));
      const same = new Float64Array(stars).fill(1);
      const scaled = ratePosterior(buildQuestion({ likelihood, rateScale: same }));
      expect(scaled.quantile(0.95)).toBe(plain.quantile(0.95));
      expect(scaled.cutAt).toBeNull();
    }
  });

  it('all doubled halve the mean number', () => {
    const prior: RatePrior = { law: 'gamma', shape: 1, rate: 0 };
    const plain = ratePosterior(buildQuestion({ likelihood: 'mean-number', prior }));
    const doubled = ratePosterior(
      buildQuestion({
        likelihood: 'mean-number',
        prior,
        rateScale: new Float64Array(stars).fill(2),
      }),
    );
    expect(doubled.quantile(0.9)).toBeCloseTo(0.5 * plain.quantile(0.9), 12);
    expect(doubled.exposure).toBeCloseTo(2 * plain.exposure, 12);
  });

  it.each<RatePrior>([
    { law: 'uniform', max: 1 },
    { law: 'uniform', max: 0.2 },
    { law: 'log-uniform', min: 1e-3, max: 1 },
    { law: 'jeffreys' },
    { law: 'beta', a: 0.8, b: 0.5 },
    { law: 'tabulated', value: [0, 0.3, 1], density: [1, 2, 0.5] },
  ])('cut a fraction where the first star reaches 1, against plain quadrature: %o', (prior) => {
    const question = buildQuestion({ prior, rateScale: scale, detectedStars: [0] });
    const posterior = ratePosterior(question);
    const top = Math.min(1 / largest, 'max' in prior && prior.max !== undefined ? prior.max : 1);
    expect(posterior.support[1]).toBeCloseTo(top, 12);
    if (top === 1 / largest) expect(posterior.cutAt).toBeCloseTo(1 / largest, 12);
    else expect(posterior.cutAt).toBeNull();
    const density = (f: number) => {
      if (prior.law === 'uniform') return 1;
      if (prior.law === 'log-uniform') return f < 1e-3 ? 0 : 1 / f;
      if (prior.law === 'beta') return f ** -0.2 * (1 - f) ** -0.5;
      if (prior.law === 'tabulated') return f < 0.3 ? 1 + f / 0.3 : 2 - (1.5 * (f - 0.3)) / 0.7;
      let information = 0;
      question.completeness.forEach((c, j) => {
        information += (scale[j] * c) / (f * (1 - f * scale[j] * c));
      });
      return Math.sqrt(information);
    };
    const weight = (s: number) => {
      const f = s * s;
      let product = 2 * s * density(f) * f;
      for (let j = 1; j < stars; j++) product *= 1 - f * scale[j] * question.completeness[j];
      return product;
    };
    const low = prior.law === 'log-uniform' ? Math.sqrt(1e-3) : 0;
    const whole = integrate(weight, low, Math.sqrt(top), 400);
    const limit = upperLimit(posterior, 0.9);
    const share = integrate(weight, low, Math.sqrt(limit), 400) / whole;
    expect(Math.abs(share - 0.9)).toBeLessThan(1e-7);
    expect(posterior.cumulative(limit)).toBeCloseTo(0.9, 9);
    const around =
      (posterior.cumulative(limit * 1.001) - posterior.cumulative(limit * 0.999)) / 0.002;
    expect(Math.abs(around / (limit * posterior.density(limit)) - 1)).toBeLessThan(1e-4);
  });

  it('keep the evidence that the fraction itself has', () => {
    const uniform = (max: number): RatePrior => ({ law: 'uniform', max });
    const posterior = ratePosterior(
      buildQuestion({ prior: uniform(1), rateScale: scale, detectedStars: [0, 1] }),
    );
    const top = 1 / largest;
    const { completeness } = buildQuestion();
    const likelihood = (f: number) => {
      let product = f * f;
      for (let j = 2; j < stars; j++) product *= 1 - f * scale[j] * completeness[j];
      return product / top;
    };
    const evidence = Math.log(integrate(likelihood, 0, top, 200));
    expect(Math.abs(posterior.logEvidence - evidence)).toBeLessThan(1e-9);
  });

  it('are refused where they do not fit', () => {
    const ask = (rateScale: Float64Array, prior?: RatePrior) => () =>
      ratePosterior(buildQuestion({ rateScale, ...(prior && { prior }) }));
    expect(ask(new Float64Array(3).fill(1))).toThrow(/one value a star, got 3 for 40/);
    expect(ask(new Float64Array(stars))).toThrow(/positive number, got 0/);
    expect(ask(scale, { law: 'log-uniform', min: 0.9, max: 1 })).toThrow(/begins at 0.9/);
    expect(ask(scale, { law: 'tabulated', value: [0.8, 1], density: [1, 1] })).toThrow(
      /nothing below/,
    );
  });
});
