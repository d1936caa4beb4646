import { describe, expect, it } from 'vitest';
import { type Likelihood, limitAtLowerFloor, type RatePrior, ratePosterior } from '@/lib/inference';
import { integrate } from '@/lib/numerics/quadrature';
import { buildQuestion } from './build-question';

const either: Likelihood[] = ['mean-number', 'host-fraction'];

describe('priors', () => {
  it.each<[RatePrior, Likelihood[], RegExp]>([
    [{ law: 'uniform', max: 0 }, either, /max must be a positive number/],
    [{ law: 'uniform', max: Number.NaN }, either, /max must be a positive number/],
    [{ law: 'uniform', max: 1.5 }, ['host-fraction'], /cannot exceed 1/],
    [{ law: 'log-uniform', min: 0, max: 1 }, either, /needs a floor/],
    [{ law: 'log-uniform', min: -1, max: 1 }, either, /limit then follows the floor/],
    [{ law: 'log-uniform', min: Number.NaN, max: 1 }, either, /needs a floor/],
    [{ law: 'log-uniform', min: 1, max: 1 }, either, /below max/],
    [{ law: 'log-uniform', min: 0.1, max: 2 }, ['host-fraction'], /cannot exceed 1/],
    [{ law: 'jeffreys', max: -1 }, either, /max must be a positive number/],
    [{ law: 'jeffreys', max: 1.2 }, ['host-fraction'], /cannot exceed 1/],
    [{ law: 'gamma', shape: 0, rate: 1 }, ['mean-number'], /shape must be a positive/],
    [{ law: 'gamma', shape: 1, rate: -1 }, ['mean-number'], /rate must be >= 0/],
    [{ law: 'gamma', shape: 1, rate: 1 }, ['host-fraction'], /use a beta prior/],
    [{ law: 'beta', a: 0, b: 1 }, ['host-fraction'], /a must be a positive/],
    [{ law: 'beta', a: 1, b: Number.POSITIVE_INFINITY }, ['host-fraction'], /b must be a positive/],
    [{ law: 'beta', a: 1, b: 1 }, ['mean-number'], /use a gamma prior/],
  ])('%o is refused with its reason', (prior, likelihoods, message) => {
    for (const likelihood of likelihoods) {
      const ask = () => ratePosterior(buildQuestion({ likelihood, prior }));
      expect(ask).toThrow(RangeError);
      expect(ask).toThrow(message);
    }
  });

  it.each<[RatePrior, Likelihood, number]>([
    [{ law: 'uniform', max: 2 }, 'mean-number', 2],
    [{ law: 'log-uniform', min: 1e-3, max: 1 }, 'host-fraction', 1],
    [{ law: 'jeffreys', max: 2 }, 'mean-number', 2],
    [{ law: 'jeffreys', max: 0.7 }, 'host-fraction', 0.7],
    [{ law: 'gamma', shape: 1.5, rate: 3 }, 'mean-number', 20],
    [{ law: 'beta', a: 1.5, b: 4 }, 'host-fraction', 1],
  ])('%o has a density that integrates to one', (prior, likelihood, top) => {
    const posterior = ratePosterior(buildQuestion({ likelihood, prior }));
    const start = Math.sqrt(posterior.support[0]);
    const total = integrate(
      (s) => 2 * s * posterior.priorDensity(s * s),
      start,
      Math.sqrt(top),
      40,
    );
    expect(total).toBeCloseTo(1, 8);
    expect(posterior.priorDensity(-0.1)).toBe(0);
  });

  it('leave an improper density and its evidence without a number', () => {
    for (const prior of [
      { law: 'jeffreys' },
      { law: 'gamma', shape: 0.5, rate: 0 },
    ] satisfies RatePrior[]) {
      const posterior = ratePosterior(buildQuestion({ likelihood: 'mean-number', prior }));
      expect(posterior.priorDensity(0.1)).toBeNaN();
      expect(posterior.logEvidence).toBeNaN();
      expect(posterior.quantile(1)).toBe(Number.POSITIVE_INFINITY);
    }
  });
});

describe('limitAtLowerFloor', () => {
  it('shows how the limit follows the floor (exposure 25, 95 %)', () => {
    const question = buildQuestion({
      likelihood: 'mean-number',
      completeness: Float64Array.of(25),
      prior: { law: 'log-uniform', min: 1e-3, max: 1 },
    });
    expect(limitAtLowerFloor(question, 0.95)).toBeCloseTo(0.0350795157290303, 9);
  });

  it('is null for every other prior', () => {
    expect(limitAtLowerFloor(buildQuestion(), 0.95)).toBeNull();
  });
});
