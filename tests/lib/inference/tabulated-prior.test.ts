import { describe, expect, it } from 'vitest';
import {
  densityAt,
  type Likelihood,
  type RatePrior,
  ratePosterior,
  tabulatePosterior,
  upperLimit,
} from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const later = (likelihood: Likelihood, prior: RatePrior, detectedStars: number[] = []) =>
  ratePosterior({
    likelihood,
    completeness: buildCompleteness(60, 'later'),
    detectedStars,
    prior,
  });

describe('a tabulated prior', () => {
  it('that is flat gives what a uniform one gives', () => {
    const flat: RatePrior = { law: 'tabulated', value: [0, 0.2, 0.7, 1], density: [3, 3, 3, 3] };
    for (const likelihood of ['host-fraction', 'mean-number'] as const) {
      const [tabulated, uniform] = [
        later(likelihood, flat, [4]),
        later(likelihood, { law: 'uniform', max: 1 }, [4]),
      ];
      for (const level of [0.05, 0.5, 0.95, 0.999]) {
        expect(Math.abs(tabulated.quantile(level) / uniform.quantile(level) - 1)).toBeLessThan(
          1e-9,
        );
      }
      expect(Math.abs(tabulated.logEvidence - uniform.logEvidence)).toBeLessThan(1e-10);
      expect(tabulated.priorDensity(0.3)).toBeCloseTo(1, 12);
    }
  });

  it('that is straight has the moments of its own line where nothing is seen', () => {
    const { mean, constrained, cumulative } = ratePosterior({
      likelihood: 'mean-number',
      completeness: Float64Array.of(0),
      detectedStars: [],
      prior: { law: 'tabulated', value: [1, 3], density: [0, 1] },
    });
    // Density (x - 1)/2 on 1 to 3: mean 1 + 2 · 2/3.
    expect(mean).toBeCloseTo(7 / 3, 12);
    expect(cumulative(2)).toBeCloseTo(0.25, 12);
    expect(constrained).toBe(false);
  });

  it.each<[Likelihood, RatePrior, number[]]>([
    ['host-fraction', { law: 'uniform', max: 1 }, []],
    ['host-fraction', { law: 'jeffreys' }, [2, 9]],
    ['host-fraction', { law: 'log-uniform', min: 1e-3, max: 1 }, [1]],
    ['mean-number', { law: 'gamma', shape: 1, rate: 0 }, []],
    ['mean-number', { law: 'jeffreys' }, [5]],
  ])(
    "hands an earlier survey's posterior on: %s, %o, detections %o",
    (likelihood, prior, detectedStars) => {
      const first = buildCompleteness(40, 'first');
      const second = buildCompleteness(60, 'later');
      const earlier = ratePosterior({ likelihood, completeness: first, detectedStars, prior });
      const table: RatePrior = { law: 'tabulated', ...tabulatePosterior(earlier) };
      const after = later(likelihood, table, [7]);
      const together = ratePosterior({
        likelihood,
        completeness: Float64Array.of(...first, ...second),
        detectedStars: [...detectedStars, 47],
        prior:
          prior.law === 'jeffreys' && likelihood === 'host-fraction'
            ? { law: 'uniform', max: 1 }
            : prior,
      });
      for (const level of [0.16, 0.5, 0.95]) {
        const [step, whole] = [after.quantile(level), together.quantile(level)];
        // The Jeffreys prior of a fraction depends on the stars: there the two differ in earnest.
        if (prior.law === 'jeffreys' && likelihood === 'host-fraction') {
          expect(step).toBeLessThan(whole);
        } else expect(Math.abs(step / whole - 1)).toBeLessThan(1e-4);
      }
      expect(table.value.length).toBeLessThanOrEqual(1000);
    },
  );

  it('may have empty pieces at its ends and within', () => {
    const prior: RatePrior = {
      law: 'tabulated',
      value: [0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.9],
      density: [0, 0, 1, 0, 0, 1, 0],
    };
    const posterior = ratePosterior(buildQuestion({ prior }));
    expect(posterior.support).toEqual([0.1, 0.9]);
    expect(posterior.cumulative(0.4)).toBeCloseTo(posterior.cumulative(0.3), 12);
    expect(upperLimit(posterior, 0.5)).toBeLessThan(0.3);
    expect(densityAt(prior, 0.15)).toBeCloseTo(0.5, 12);
    expect(densityAt(prior, 0.95)).toBe(0);
  });

  it.each<[number[], number[], RegExp]>([
    [[0, 1], [1], /one density for each value/],
    [[0], [1], /2 to 2000 points/],
    [[0, 0.5, 0.5], [1, 1, 1], /must increase, got 0.5 after 0.5/],
    [[-0.1, 0.5], [1, 1], /a rate must be a number >= 0, got -0.1/],
    [[0, 0.5], [1, -1], /a density must be a number >= 0, got -1/],
    [[0, 0.5], [0, 0], /zero everywhere/],
    [[0, 1.5], [1, 1], /cannot exceed 1, got 1.5/],
  ])('refuses %o with %o', (value, density, message) => {
    expect(() =>
      ratePosterior(buildQuestion({ prior: { law: 'tabulated', value, density } })),
    ).toThrow(message);
  });
});
