import { describe, expect, it } from 'vitest';
import { highestDensityInterval, type RatePrior, ratePosterior } from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

describe('ratePosterior', () => {
  it('survives extreme data', () => {
    const many = ratePosterior(
      buildQuestion({
        completeness: new Float64Array(300).fill(0.999999),
        detectedStars: Array.from({ length: 300 }, (_, star) => star),
      }),
    );
    expect(many.quantile(0.05)).toBeGreaterThan(0.98);
    const pressed = ratePosterior({
      likelihood: 'mean-number',
      completeness: Float64Array.of(0.01),
      detectedStars: new Array<number>(100).fill(0),
      prior: { law: 'uniform', max: 1 },
    });
    // F^100 on [0, 1]: the exposure hardly matters.
    expect(relative(pressed.quantile(0.5), 0.5 ** (1 / 101))).toBeLessThan(1e-4);
    const deep = ratePosterior({
      likelihood: 'mean-number',
      completeness: Float64Array.of(1e5),
      detectedStars: [],
      prior: { law: 'log-uniform', min: 0.2, max: 1 },
    });
    expect(relative(deep.quantile(0.5) - 0.2, Math.LN2 / 1e5)).toBeLessThan(1e-3);
  });

  it.each<RatePrior>([
    { law: 'jeffreys' },
    { law: 'uniform', max: 1 },
    { law: 'beta', a: 0.3, b: 0.4 },
  ])('passes smoothly to stars that would certainly show a companion: %o', (prior) => {
    for (const detectedStars of [[], [0], [0, 1]]) {
      const median = (shortfall: number) => {
        const completeness = Float64Array.of(1 - shortfall, 1 - shortfall / 2);
        return ratePosterior(buildQuestion({ completeness, detectedStars, prior })).median;
      };
      for (const shortfall of [1e-16, 1e-13, 1e-10, 1e-7, 1e-4]) {
        // The square-root end moves the median by about the root of the shortfall.
        expect(Math.abs(median(shortfall) - median(0))).toBeLessThan(
          3 * Math.sqrt(shortfall) + 1e-9,
        );
      }
    }
  });

  it('keeps a wide range of decades under a log-uniform prior', () => {
    const posterior = ratePosterior(
      buildQuestion({
        completeness: Float64Array.of(1e-3),
        prior: { law: 'log-uniform', min: 1e-12, max: 1 },
      }),
    );
    // Almost no data: uniform in the logarithm, so that the median is the middle of it.
    expect(relative(posterior.median, 1e-6)).toBeLessThan(2e-3);
    expect(posterior.constrained).toBe(true);
  });
});

describe('highestDensityInterval', () => {
  it('prefers the peak to a narrow infinite end', () => {
    const posterior = ratePosterior(
      buildQuestion({
        completeness: buildCompleteness(50, 'peak', 0.2, 0.9),
        detectedStars: [0, 1, 2],
        prior: { law: 'beta', a: 1, b: 0.5 },
      }),
    );
    expect(posterior.density(1)).toBe(Number.POSITIVE_INFINITY);
    const [low, high] = highestDensityInterval(posterior, 0.68);
    expect(low).toBeGreaterThan(0);
    expect(high).toBeLessThan(0.5);
    expect(posterior.density(low) / posterior.density(high)).toBeCloseTo(1, 6);
  });
});
