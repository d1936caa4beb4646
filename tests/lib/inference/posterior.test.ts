import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Likelihood, type RatePrior, ratePosterior, upperLimit } from '@/lib/inference';
import { integrate } from '@/lib/numerics/quadrature';
import {
  betaQuantile,
  exponentialIntegral,
  gammaP,
  gammaQuantile,
  regularisedBeta,
} from '@/lib/numerics/special';
import { buildCompleteness, buildQuestion } from './build-question';

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

const commonPriors: fc.Arbitrary<RatePrior> = fc.oneof(
  fc.double({ min: 0.05, max: 1, noNaN: true }).map((max) => ({ law: 'uniform' as const, max })),
  fc
    .double({ min: 1e-6, max: 0.01, noNaN: true })
    .map((min) => ({ law: 'log-uniform' as const, min, max: 1 })),
  fc.constant({ law: 'jeffreys' as const, max: 1 }),
);
const fractionPriors: fc.Arbitrary<RatePrior> = fc.oneof(
  commonPriors,
  fc
    .tuple(
      fc.double({ min: 0.3, max: 5, noNaN: true }),
      fc.double({ min: 0.5, max: 5, noNaN: true }),
    )
    .map(([a, b]) => ({ law: 'beta' as const, a, b })),
);
const numberPriors: fc.Arbitrary<RatePrior> = fc.oneof(
  commonPriors,
  fc
    .tuple(
      fc.double({ min: 0.1, max: 5, noNaN: true }),
      fc.double({ min: 0, max: 50, noNaN: true }),
    )
    .map(([shape, rate]) => ({ law: 'gamma' as const, shape, rate })),
  fc.constant({ law: 'jeffreys' as const }),
);
const questions = fc.constantFrom<Likelihood>('mean-number', 'host-fraction').chain((likelihood) =>
  fc.record({
    likelihood: fc.constant(likelihood),
    completeness: fc
      .array(fc.double({ min: 0.01, max: 1, noNaN: true }), { minLength: 1, maxLength: 120 })
      .map((values) => Float64Array.from(values)),
    detectedStars: fc.subarray([0, 0, 0, 0]),
    prior: likelihood === 'mean-number' ? numberPriors : fractionPriors,
  }),
);

describe('ratePosterior, always', () => {
  it('integrates to one, and its distribution function is the integral of its density', () => {
    fc.assert(
      fc.property(questions, (question) => {
        const posterior = ratePosterior(question);
        const from = posterior.quantile(0.05);
        const to = posterior.quantile(0.97);
        // In the odds, where edges and decades are smooth; the tails are checked by the quantiles.
        const isFraction = question.likelihood === 'host-fraction';
        const coordinate = (x: number) => Math.log(isFraction ? x / (1 - x) : x);
        const inside = integrate(
          (u) => {
            const x = isFraction ? 1 / (1 + Math.exp(-u)) : Math.exp(u);
            return posterior.density(x) * x * (isFraction ? 1 - x : 1);
          },
          coordinate(from),
          coordinate(to),
          60,
        );
        expect(inside).toBeCloseTo(0.92, 8);
        expect(posterior.cumulative(posterior.support[0])).toBe(0);
        expect(posterior.cumulative(1e9)).toBe(1);
      }),
      { numRuns: 60 },
    );
  });

  it('has quantiles that invert the distribution function', () => {
    fc.assert(
      fc.property(questions, fc.double({ min: 1e-4, max: 0.999, noNaN: true }), (question, p) => {
        const posterior = ratePosterior(question);
        expect(posterior.cumulative(posterior.quantile(p))).toBeCloseTo(p, 9);
      }),
      { numRuns: 100 },
    );
  });

  it('gives limits that rise with the level and lie in the support', () => {
    fc.assert(
      fc.property(questions, (question) => {
        const posterior = ratePosterior(question);
        let before = posterior.support[0];
        for (const level of [0.1, 0.5, 0.68, 0.9, 0.95, 0.99, 0.999]) {
          const limit = upperLimit(posterior, level);
          expect(limit).toBeGreaterThan(before);
          expect(limit).toBeLessThanOrEqual(posterior.support[1]);
          before = limit;
        }
        expect(posterior.mean).toBeGreaterThan(posterior.quantile(1e-6));
        expect(posterior.mean).toBeLessThan(posterior.quantile(1 - 1e-9));
      }),
      { numRuns: 60 },
    );
  });

  it('gives tighter limits with more completeness and looser ones with more detections', () => {
    fc.assert(
      fc.property(
        fc.constantFrom<Likelihood>('mean-number', 'host-fraction'),
        commonPriors,
        fc.double({ min: 0.1, max: 0.95, noNaN: true }),
        (likelihood, prior, share) => {
          const completeness = buildCompleteness(30, 'more', 0.1, 0.9);
          const limit = (scale: number, detectedStars: number[]) =>
            upperLimit(
              ratePosterior({
                likelihood,
                prior,
                detectedStars,
                completeness: completeness.map((c) => c * scale),
              }),
              0.95,
            );
          // The Jeffreys prior of f depends on completeness, so that only fixed priors are ordered.
          if (prior.law !== 'jeffreys' || likelihood === 'mean-number') {
            expect(limit(1, [])).toBeLessThan(limit(share, []));
            expect(limit(1, [4])).toBeLessThan(limit(share, [4]));
          }
          expect(limit(1, [])).toBeLessThan(limit(1, [4]));
          expect(limit(1, [4])).toBeLessThan(limit(1, [4, 9]));
        },
      ),
      { numRuns: 60 },
    );
  });

  it('does not depend on the order of the stars beyond rounding', () => {
    const completeness = buildCompleteness(200, 'order');
    const limit = (values: Float64Array) =>
      upperLimit(ratePosterior(buildQuestion({ completeness: values })), 0.95);
    expect(relative(limit(completeness.slice().reverse()), limit(completeness))).toBeLessThan(
      1e-12,
    );
  });
});

describe('ratePosterior against closed forms', () => {
  const exposures = [0.4, 3, 25, 180, 5000];

  it('mean number, uniform prior: a gamma distribution cut at the maximum', () => {
    for (const exposure of exposures) {
      for (const k of [0, 1, 2, 7]) {
        const posterior = ratePosterior({
          likelihood: 'mean-number',
          completeness: Float64Array.of(exposure),
          detectedStars: new Array<number>(k).fill(0),
          prior: { law: 'uniform', max: 1 },
        });
        for (const p of [1e-6, 0.025, 0.5, 0.95, 0.999]) {
          const wanted = gammaQuantile(p * gammaP(k + 1, exposure), k + 1, exposure);
          expect(relative(posterior.quantile(p), wanted)).toBeLessThan(1e-9);
        }
      }
    }
  });

  it('mean number, log-uniform prior, nothing found: exponential integrals', () => {
    for (const [exposure, min] of [
      [25, 1e-3],
      [25, 1e-6],
      [0.4, 1e-4],
      [400, 1e-5],
    ]) {
      const posterior = ratePosterior({
        likelihood: 'mean-number',
        completeness: Float64Array.of(exposure),
        detectedStars: [],
        prior: { law: 'log-uniform', min, max: 1 },
      });
      const tail = (x: number) => exponentialIntegral(x * exposure);
      for (const x of [2 * min, 0.01, 0.05, 0.3]) {
        const wanted = (tail(min) - tail(x)) / (tail(min) - tail(1));
        expect(posterior.cumulative(x)).toBeCloseTo(wanted, 11);
      }
    }
  });

  it('mean number, gamma prior: a gamma distribution, small shapes included', () => {
    for (const shape of [0.05, 0.3, 0.5, 1, 1.7, 12]) {
      const posterior = ratePosterior({
        likelihood: 'mean-number',
        completeness: Float64Array.of(8),
        detectedStars: [],
        prior: { law: 'gamma', shape, rate: 2 },
      });
      for (const p of [0.01, 0.5, 0.95, 0.999]) {
        const wanted = gammaQuantile(p, shape, 10);
        expect(relative(posterior.quantile(p), wanted)).toBeLessThan(1e-8);
      }
      expect(relative(posterior.mean, shape / 10)).toBeLessThan(1e-10);
      expect(relative(posterior.standardDeviation, Math.sqrt(shape) / 10)).toBeLessThan(1e-9);
      const logEvidence = shape * Math.log(2 / 10);
      expect(posterior.logEvidence).toBeCloseTo(logEvidence, 10);
    }
  });

  it('host fraction, every star fully seen: a beta distribution, odd shapes included', () => {
    for (const [a, b] of [
      [1, 1],
      [0.5, 0.5],
      [0.3, 0.7],
      [2, 20],
      [0.9, 1.3],
    ]) {
      for (const k of [0, 1, 6]) {
        const n = 6;
        const posterior = ratePosterior({
          likelihood: 'host-fraction',
          completeness: new Float64Array(n).fill(1),
          detectedStars: Array.from({ length: k }, (_, star) => star),
          prior: { law: 'beta', a, b },
        });
        for (const p of [0.05, 0.5, 0.9]) {
          const wanted = betaQuantile(p, a + k, b + n - k);
          expect(relative(posterior.quantile(p), wanted)).toBeLessThan(1e-8);
        }
        const at = 0.4;
        const below = regularisedBeta(at, a + k, b + n - k);
        expect(posterior.cumulative(at)).toBeCloseTo(below, 10);
      }
    }
  });

  it('host fraction, Jeffreys prior, every star fully seen: Beta(1/2, 1/2) before the data', () => {
    for (const k of [0, 2, 5]) {
      const posterior = ratePosterior({
        likelihood: 'host-fraction',
        completeness: new Float64Array(5).fill(1),
        detectedStars: Array.from({ length: k }, (_, star) => star),
        prior: { law: 'jeffreys' },
      });
      const wanted = betaQuantile(0.9, 0.5 + k, 5.5 - k);
      expect(relative(posterior.quantile(0.9), wanted)).toBeLessThan(1e-9);
      const prior = 1 / (Math.PI * Math.sqrt(0.3 * 0.7));
      expect(relative(posterior.priorDensity(0.3), prior)).toBeLessThan(1e-10);
    }
  });

  it('host fraction of very many dim stars tends to the mean number', () => {
    const completeness = new Float64Array(20_000).fill(0.001);
    const limit = (likelihood: Likelihood) =>
      upperLimit(ratePosterior(buildQuestion({ likelihood, completeness })), 0.95);
    expect(relative(limit('host-fraction'), limit('mean-number'))).toBeLessThan(2e-4);
  });
});

describe('ratePosterior at the edges', () => {
  it('returns the prior and says so where nothing could be seen', () => {
    for (const likelihood of ['mean-number', 'host-fraction'] as const) {
      const posterior = ratePosterior(
        buildQuestion({ likelihood, completeness: new Float64Array(5) }),
      );
      expect(posterior.constrained).toBe(false);
      expect(posterior.quantile(0.95)).toBeCloseTo(0.95, 12);
      expect(posterior.density(0.3)).toBeCloseTo(posterior.priorDensity(0.3), 12);
    }
    const jeffreys = ratePosterior(
      buildQuestion({ completeness: new Float64Array(5), prior: { law: 'jeffreys' } }),
    );
    expect(jeffreys.constrained).toBe(false);
    expect(jeffreys.quantile(0.5)).toBeCloseTo(0.25, 10);
  });

  it('refuses an unbounded prior where nothing could be seen', () => {
    expect(() =>
      ratePosterior(
        buildQuestion({
          likelihood: 'mean-number',
          completeness: new Float64Array(5),
          prior: { law: 'jeffreys' },
        }),
      ),
    ).toThrow(/give the prior a maximum/);
  });

  it('counts a star once for the host fraction and every companion for the mean number', () => {
    const detectedStars = [3, 3, 7];
    expect(ratePosterior(buildQuestion({ detectedStars })).detections).toBe(2);
    const number = buildQuestion({ detectedStars, likelihood: 'mean-number' });
    expect(ratePosterior(number).detections).toBe(3);
  });

  it.each<[string, Parameters<typeof buildQuestion>[0], RegExp]>([
    [
      'a detection where nothing can be seen',
      { completeness: Float64Array.of(0.5, 0), detectedStars: [1] },
      /nothing can be seen/,
    ],
    [
      'detections without exposure',
      { likelihood: 'mean-number', completeness: new Float64Array(3), detectedStars: [0] },
      /exposure 0/,
    ],
    ['a star that is not there', { detectedStars: [40] }, /40 stars/],
    ['an index that is not whole', { detectedStars: [0.5] }, /indices/],
    ['a completeness above one', { completeness: Float64Array.of(1.1) }, /0\.\.1/],
    [
      'a completeness that is not a number',
      { completeness: Float64Array.of(Number.NaN) },
      /completeness/,
    ],
  ])('refuses %s', (_, overrides, message) => {
    expect(() => ratePosterior(buildQuestion(overrides))).toThrow(RangeError);
    expect(() => ratePosterior(buildQuestion(overrides))).toThrow(message);
  });
});
