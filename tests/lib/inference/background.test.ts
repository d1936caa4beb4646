import { describe, expect, it } from 'vitest';
import {
  backgroundUpperLimit,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  upperLimit,
} from '@/lib/inference';
import { integrate } from '@/lib/numerics/quadrature';

const FLAT: RatePrior = { law: 'gamma', shape: 1, rate: 0 };

function ask(count: number, background: number, prior: RatePrior, exposure = 12) {
  return ratePosterior({
    likelihood: 'mean-number',
    completeness: Float64Array.of(exposure),
    detectedStars: new Array<number>(count).fill(0),
    prior,
    background,
  });
}

describe('a known background', () => {
  it.each([
    [0, 0.8],
    [2, 1.1],
    [4, 6],
    [30, 3],
    [9, 40],
  ])('gives the closed form under a flat prior: n = %d, b = %d', (count, background) => {
    for (const level of [0.68, 0.95, 0.997]) {
      const closed = backgroundUpperLimit(count, background, 12, level);
      expect(Math.abs(upperLimit(ask(count, background, FLAT), level) / closed - 1)).toBeLessThan(
        1e-8,
      );
    }
  });

  it.each<RatePrior>([
    { law: 'uniform', max: 2 },
    { law: 'log-uniform', min: 1e-3, max: 2 },
    { law: 'jeffreys', max: 2 },
    { law: 'gamma', shape: 2.5, rate: 3 },
  ])('holds under any prior, against plain quadrature: $law', (prior) => {
    const posterior = ask(3, 1.4, prior);
    const weight = (logF: number) => {
      const f = Math.exp(logF);
      return f * posterior.priorDensity(f) * (12 * f + 1.4) ** 3 * Math.exp(-12 * f);
    };
    const from = Math.log(prior.law === 'log-uniform' ? 1e-3 : 1e-14);
    const to = Math.log(prior.law === 'gamma' ? 8 : 2);
    const whole = integrate(weight, from, to, 200);
    const share = integrate(weight, from, Math.log(0.3), 200) / whole;
    expect(Math.abs(posterior.cumulative(0.3) - share)).toBeLessThan(1e-6);
  });

  it('lowers the limit, and none changes nothing', () => {
    const limits = [0, 0.5, 1, 2, 4].map((b) => upperLimit(ask(4, b, FLAT), 0.95));
    for (let i = 1; i < limits.length; i++) expect(limits[i]).toBeLessThan(limits[i - 1]);
    const without: RateQuestion = {
      likelihood: 'mean-number',
      completeness: Float64Array.of(12),
      detectedStars: [0, 0, 0, 0],
      prior: FLAT,
    };
    expect(limits[0]).toBe(upperLimit(ratePosterior(without), 0.95));
  });

  it('may explain every detection of stars that show nothing', () => {
    expect(ask(2, 1, { law: 'uniform', max: 1 }, 0).constrained).toBe(false);
    expect(() => ask(2, 0, { law: 'uniform', max: 1 }, 0)).toThrow(/exposure 0/);
  });

  it('is refused where it is negative or asked of a fraction', () => {
    expect(() => ask(2, -1, FLAT)).toThrow(/>= 0, got -1/);
    const fraction: RateQuestion = {
      likelihood: 'host-fraction',
      completeness: Float64Array.of(0.5),
      detectedStars: [],
      prior: { law: 'uniform', max: 1 },
      background: 1,
    };
    expect(() => ratePosterior(fraction)).toThrow(/belongs to the mean number/);
    expect(() => backgroundUpperLimit(1.5, 1, 1, 0.9)).toThrow(/whole number/);
    expect(() => backgroundUpperLimit(1, -1, 1, 0.9)).toThrow(/background must be/);
    expect(() => backgroundUpperLimit(1, 1, 1, 95)).toThrow(/between 0 and 1/);
  });
});
