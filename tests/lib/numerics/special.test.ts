import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  betaQuantile,
  exponentialIntegral,
  gammaP,
  gammaQ,
  gammaQuantile,
  gammaQuantileUpper,
  logBeta,
  logGamma,
  powerLawIntegral,
  regularisedBeta,
} from '@/lib/numerics/special';

const shape = fc.double({ min: 0.05, max: 150, noNaN: true });
const probability = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true });
const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

describe('logGamma', () => {
  it('gives factorials and the root of pi', () => {
    let factorial = 1;
    for (let n = 1; n <= 20; n++) {
      expect(Math.abs(logGamma(n + 1) - Math.log(factorial * n))).toBeLessThan(1e-13);
      factorial *= n;
    }
    expect(logGamma(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI), 14);
    expect(logBeta(2, 3)).toBeCloseTo(Math.log(1 / 12), 14);
  });

  it('obeys its recurrence', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e4, noNaN: true }), (x) => {
        const step = logGamma(x + 1) - logGamma(x) - Math.log(x);
        expect(Math.abs(step)).toBeLessThan(1e-14 * (10 + Math.abs(logGamma(x + 1))));
      }),
    );
  });

  it('refuses zero and below', () => {
    expect(() => logGamma(0)).toThrow(RangeError);
    expect(() => logGamma(-1.5)).toThrow(RangeError);
  });
});

describe('incomplete gamma', () => {
  it('is the sum of a Poisson count for whole shapes', () => {
    for (const mean of [0.01, 1, 3.5, 12, 60]) {
      let below = 0;
      let term = Math.exp(-mean);
      for (let k = 0; k < 40; k++) {
        below += term;
        term *= mean / (k + 1);
        expect(relative(gammaQ(k + 1, mean), below)).toBeLessThan(1e-12);
      }
    }
  });

  it('has tails that add to one', () => {
    fc.assert(
      fc.property(shape, fc.double({ min: 0, max: 400, noNaN: true }), (a, x) => {
        expect(gammaP(a, x) + gammaQ(a, x)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('is inverted by its quantiles on both sides', () => {
    fc.assert(
      fc.property(shape, probability, (a, p) => {
        expect(relative(gammaP(a, gammaQuantile(p, a)), p)).toBeLessThan(1e-10);
        expect(relative(gammaQ(a, gammaQuantileUpper(p, a)), p)).toBeLessThan(1e-10);
      }),
    );
  });

  it('keeps its digits deep in both tails', () => {
    for (const a of [0.5, 1, 3.5, 50]) {
      expect(relative(gammaP(a, gammaQuantile(1e-12, a)), 1e-12)).toBeLessThan(1e-10);
      expect(relative(gammaQ(a, gammaQuantileUpper(1e-12, a)), 1e-12)).toBeLessThan(1e-10);
    }
  });

  it('takes the edges exactly', () => {
    expect(gammaP(2, 0)).toBe(0);
    expect(gammaQ(2, Number.POSITIVE_INFINITY)).toBe(0);
    expect(gammaQuantile(0, 2)).toBe(0);
    expect(gammaQuantile(1, 2)).toBe(Number.POSITIVE_INFINITY);
  });

  it('refuses what has no value', () => {
    expect(() => gammaP(0, 1)).toThrow(RangeError);
    expect(() => gammaP(1, -1)).toThrow(RangeError);
    expect(() => gammaQuantile(1.1, 1)).toThrow(RangeError);
    expect(() => gammaQuantile(0.5, 1, 0)).toThrow(RangeError);
    expect(() => gammaQuantileUpper(Number.NaN, 1)).toThrow(RangeError);
  });
});

describe('incomplete beta', () => {
  it('is inverted by its quantile', () => {
    fc.assert(
      fc.property(shape, shape, probability, (a, b, p) => {
        const x = betaQuantile(p, a, b);
        expect(x).toBeGreaterThanOrEqual(0);
        expect(x).toBeLessThanOrEqual(1);
        // A quantile that rounds to the upper edge has no digits of 1 - x left.
        if (x < 1 - 1e-6) expect(relative(regularisedBeta(x, a, b), p)).toBeLessThan(1e-8);
      }),
    );
  });

  it('is mirrored when its shapes change places', () => {
    fc.assert(
      fc.property(shape, shape, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (a, b, x) => {
        expect(regularisedBeta(x, a, b) + regularisedBeta(1 - x, b, a)).toBeCloseTo(1, 10);
      }),
    );
  });

  it('refuses what has no value', () => {
    expect(() => regularisedBeta(1.2, 1, 1)).toThrow(RangeError);
    expect(() => betaQuantile(0.5, 0, 1)).toThrow(RangeError);
    expect(() => betaQuantile(-0.1, 1, 1)).toThrow(RangeError);
  });
});

describe('exponentialIntegral', () => {
  it('agrees with Abramowitz & Stegun 1964, table 5.1', () => {
    expect(relative(exponentialIntegral(0.5), 0.5597735947761608)).toBeLessThan(1e-14);
    expect(relative(exponentialIntegral(1), 0.2193839343955203)).toBeLessThan(1e-14);
    expect(relative(exponentialIntegral(2), 0.04890051070806112)).toBeLessThan(1e-13);
  });

  it('joins its two expansions at 1 and falls', () => {
    const below = exponentialIntegral(1);
    const above = exponentialIntegral(1 + 1e-12);
    expect(above).toBeLessThan(below);
    expect(relative(above, below)).toBeLessThan(1e-11);
    expect(() => exponentialIntegral(0)).toThrow(RangeError);
  });
});

describe('powerLawIntegral', () => {
  it('passes smoothly through index 0', () => {
    const logarithm = Math.log(20);
    expect(powerLawIntegral(0, 1, 20)).toBe(logarithm);
    for (const index of [1e-15, 1e-11, 1e-8]) {
      const difference = powerLawIntegral(index, 1, 20) / logarithm - 1;
      expect(relative(difference + 1, 1 + (index * logarithm) / 2)).toBeLessThan(1e-14);
    }
  });

  it('adds over adjoining ranges', () => {
    fc.assert(
      fc.property(fc.double({ min: -5, max: 5, noNaN: true }), (index) => {
        const whole = powerLawIntegral(index, 0.3, 50);
        const parts = powerLawIntegral(index, 0.3, 4) + powerLawIntegral(index, 4, 50);
        expect(relative(parts, whole)).toBeLessThan(1e-12);
      }),
    );
  });

  it('refuses ends that are not positive and in order', () => {
    expect(() => powerLawIntegral(1, 0, 2)).toThrow(RangeError);
    expect(() => powerLawIntegral(1, 3, 2)).toThrow(RangeError);
  });
});
