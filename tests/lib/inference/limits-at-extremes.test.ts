import { describe, expect, it } from 'vitest';
import { type Likelihood, type RatePrior, ratePosterior, upperLimit } from '@/lib/inference';
import { buildCompleteness } from './build-question';

const LEVELS = [0.5, 0.68, 0.9, 0.95, 0.99, 0.999, 0.9999];

const SAMPLES: [string, Float64Array][] = [
  ['one star', Float64Array.of(0.4)],
  ['one star that would certainly show a companion', Float64Array.of(1)],
  ['sixty stars', buildCompleteness(60, 'extremes', 0.05, 0.9)],
  [
    'sixty stars, the last of them blind',
    Float64Array.of(...buildCompleteness(59, 'blind', 0.1, 0.9), 0),
  ],
  ['ten thousand stars', buildCompleteness(10_000, 'many', 0.01, 0.9)],
];

const LAWS: [Likelihood, RatePrior][] = [
  ['host-fraction', { law: 'uniform', max: 1 }],
  ['host-fraction', { law: 'jeffreys' }],
  ['host-fraction', { law: 'log-uniform', min: 1e-4, max: 1 }],
  ['mean-number', { law: 'uniform', max: 2 }],
  ['mean-number', { law: 'jeffreys', max: 2 }],
  ['mean-number', { law: 'gamma', shape: 1, rate: 0 }],
];

describe.each(SAMPLES)('%s', (_, completeness) => {
  const seeing = [...completeness.keys()].filter((star) => completeness[star] > 0);

  it.each(LAWS)(
    '%s, %o: finite, rising limits, whether nothing or everything was found',
    (likelihood, prior) => {
      for (const detectedStars of [[], seeing.slice(0, 1), seeing]) {
        const posterior = ratePosterior({ likelihood, completeness, prior, detectedStars });
        const limits = LEVELS.map((level) => upperLimit(posterior, level));
        const highest = 'max' in prior && prior.max !== undefined ? prior.max : 1;
        limits.forEach((limit, i) => {
          expect(Number.isFinite(limit)).toBe(true);
          expect(limit).toBeGreaterThan(i === 0 ? 0 : limits[i - 1]);
          if (prior.law !== 'gamma') expect(limit).toBeLessThanOrEqual(highest);
        });
      }
    },
  );

  it('without a detection, flat prior on a mean number: −ln(1 − level) over the summed completeness', () => {
    const prior: RatePrior = { law: 'gamma', shape: 1, rate: 0 };
    const posterior = ratePosterior({
      likelihood: 'mean-number',
      completeness,
      prior,
      detectedStars: [],
    });
    const exposure = completeness.reduce((sum, c) => sum + c, 0);
    for (const level of LEVELS) {
      const exact = -Math.log1p(-level) / exposure;
      expect(Math.abs(upperLimit(posterior, level) / exact - 1)).toBeLessThan(1e-9);
    }
  });
});
