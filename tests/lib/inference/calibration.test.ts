import { describe, expect, it } from 'vitest';
import { ratePosterior, upperLimit } from '@/lib/inference';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { gammaQ } from '@/lib/numerics/special';
import { buildCompleteness } from './build-question';

const DRAWS = 400;
const SEEDS = ['calibration 1', 'calibration 2', 'calibration 3'];

/** Largest distance between the ranks' distribution and the uniform one. */
function distanceFromUniform(ranks: number[]): number {
  const sorted = ranks.slice().sort((a, b) => a - b);
  return Math.max(
    ...sorted.map((rank, i) =>
      Math.max(Math.abs(rank - i / sorted.length), Math.abs((i + 1) / sorted.length - rank)),
    ),
  );
}

/** 1.95 / sqrt(n) is exceeded once in a thousand (Kolmogorov-Smirnov). */
const bound = 1.95 / Math.sqrt(DRAWS);

describe('truths drawn from the prior have uniform ranks in their posteriors', () => {
  it.each(SEEDS)('host fraction, uniform prior, %s', (seed) => {
    const completeness = buildCompleteness(60, seed, 0.05, 0.9);
    const random = createRandom(deriveSeed(seed, 'fraction'));
    const ranks = Array.from({ length: DRAWS }, () => {
      const truth = random.uniform();
      const detectedStars: number[] = [];
      completeness.forEach((c, star) => {
        if (random.uniform() < truth * c) detectedStars.push(star);
      });
      return ratePosterior({
        likelihood: 'host-fraction',
        completeness,
        detectedStars,
        prior: { law: 'uniform', max: 1 },
      }).cumulative(truth);
    });
    expect(distanceFromUniform(ranks)).toBeLessThan(bound);
  });

  it.each(SEEDS)('mean number, gamma prior, %s', (seed) => {
    const random = createRandom(deriveSeed(seed, 'number'));
    const exposure = 9;
    const ranks = Array.from({ length: DRAWS }, () => {
      // Gamma of shape 2 and rate 4, as the sum of two exponentials.
      const truth = -Math.log(random.uniform() * random.uniform()) / 4;
      let k = 0;
      for (let time = -Math.log(random.uniform()); time < truth * exposure; k++) {
        time -= Math.log(random.uniform());
      }
      return ratePosterior({
        likelihood: 'mean-number',
        completeness: Float64Array.of(exposure),
        detectedStars: new Array<number>(k).fill(0),
        prior: { law: 'gamma', shape: 2, rate: 4 },
      }).cumulative(truth);
    });
    expect(distanceFromUniform(ranks)).toBeLessThan(bound);
  });

  it('a posterior that counts a detection too many fails the same test', () => {
    const random = createRandom('too many');
    const ranks = Array.from({ length: DRAWS }, () => {
      const truth = -Math.log(random.uniform() * random.uniform()) / 4;
      let k = 1;
      for (let time = -Math.log(random.uniform()); time < truth * 9; k++) {
        time -= Math.log(random.uniform());
      }
      return ratePosterior({
        likelihood: 'mean-number',
        completeness: Float64Array.of(9),
        detectedStars: new Array<number>(k).fill(0),
        prior: { law: 'gamma', shape: 2, rate: 4 },
      }).cumulative(truth);
    });
    expect(distanceFromUniform(ranks)).toBeGreaterThan(bound);
  });
});

describe('coverage of the upper limit under a flat prior', () => {
  it('is at least the level at every rate (mean number, exact sum over counts)', () => {
    const exposure = 25;
    const limits = Array.from({ length: 60 }, (_, k) =>
      upperLimit(
        ratePosterior({
          likelihood: 'mean-number',
          completeness: Float64Array.of(exposure),
          detectedStars: new Array<number>(k).fill(0),
          prior: { law: 'gamma', shape: 1, rate: 0 },
        }),
        0.95,
      ),
    );
    for (let rate = 0.02; rate < 0.8; rate += 0.013) {
      const firstCovering = limits.findIndex((limit) => limit >= rate);
      const below = firstCovering === 0 ? 0 : gammaQ(firstCovering, rate * exposure);
      expect(1 - below).toBeGreaterThanOrEqual(0.95 - 1e-12);
    }
  });
});
