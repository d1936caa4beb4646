import { describe, expect, it } from 'vitest';
import { integrateDensity } from '@/lib/inference/integrated-density';
import { fromOne, fromZero, type LogDensity, logarithmic } from '@/lib/inference/stretches';
import { normalCumulative } from '@/lib/numerics/normal';
import { regularisedBeta } from '@/lib/numerics/special';

describe('integrateDensity', () => {
  it('finds a peak far narrower than its first panel', () => {
    const sigma = 1e-6;
    const peak: LogDensity = ({ x }) => -0.5 * ((x - 0.3141592) / sigma) ** 2;
    const density = integrateDensity([fromZero(1, 1, peak)]);
    expect(Math.exp(density.logMass) / (sigma * Math.sqrt(2 * Math.PI))).toBeCloseTo(1, 9);
    expect((density.quantile(0.84) - 0.3141592) / sigma).toBeCloseTo(0.994457883209753, 6);
    expect(density.standardDeviation / sigma).toBeCloseTo(1, 9);
    expect(density.cumulative(0.3141592 + sigma)).toBeCloseTo(normalCumulative(1), 9);
  });

  it('gives a stretch counted from its upper end in increasing x', () => {
    const beta: LogDensity = ({ logX, logComplement }) => 0.7 * logX - 0.6 * logComplement;
    const density = integrateDensity([fromZero(0.5, 1.7, beta), fromOne(0.5, 0.4, beta)]);
    let before = 0;
    for (const x of [0.1, 0.3, 0.5, 0.6, 0.9, 0.99, 0.999999]) {
      const below = density.cumulative(x);
      expect(below).toBeGreaterThan(before);
      expect(below).toBeCloseTo(regularisedBeta(x, 1.7, 0.4), 10);
      expect(density.quantile(below)).toBeCloseTo(x, 9);
      before = below;
    }
  });

  it('takes the ends of the support exactly', () => {
    const density = integrateDensity([logarithmic(0.01, 2, () => 0)]);
    expect(density.quantile(0)).toBe(0.01);
    expect(density.quantile(1)).toBe(2);
    expect(density.cumulative(0.005)).toBe(0);
    expect(density.cumulative(3)).toBe(1);
    expect(() => density.quantile(1.5)).toThrow(RangeError);
  });

  it('refuses what is not a density', () => {
    const nothing = [fromZero(1, 1, () => Number.NEGATIVE_INFINITY)];
    expect(() => integrateDensity(nothing)).toThrow(/vanishes everywhere/);
    const endless = [fromZero(1, 1, () => Number.POSITIVE_INFINITY)];
    expect(() => integrateDensity(endless)).toThrow(/infinite inside|not a number/);
    const noNumber = [fromZero(1, 1, () => Number.NaN)];
    expect(() => integrateDensity(noNumber)).toThrow(/not a number/);
    const rough: LogDensity = ({ x }) => Math.sin(1e9 * x);
    expect(() => integrateDensity([fromZero(1, 1, rough)])).toThrow(/not resolved/);
  });
});
