import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { normalCumulative, normalDensity, normalQuantile } from '@/lib/numerics/normal';

describe('normalCumulative(z)', () => {
  // SciPy 1.10.1, scipy.special.ndtr
  test.each([
    [-37, 5.725571222524576e-300],
    [-10, 7.619853024160525e-24],
    [-5, 2.866515718791939e-7],
    [-3, 0.0013498980316300933],
    [-1, 0.15865525393145707],
    [-0.3, 0.3820885778110474],
    [0, 0.5],
    [1, 0.8413447460685429],
    [2.5, 0.9937903346742238],
    [9, 1],
  ])('Φ(%d) = %d to 1e-13', (z, expected) => {
    expect(Math.abs(normalCumulative(z) / expected - 1)).toBeLessThan(1e-13);
  });

  test('is 0 and 1 at the infinities and adds up to 1', () => {
    expect(normalCumulative(-Infinity)).toBe(0);
    expect(normalCumulative(Infinity)).toBe(1);
    fc.assert(
      fc.property(fc.double({ min: -8, max: 8, noNaN: true }), (z) => {
        expect(normalCumulative(z) + normalCumulative(-z)).toBeCloseTo(1, 14);
      }),
    );
  });

  test('its slope is normalDensity', () => {
    for (const z of [-3, -0.6, 0.1, 2]) {
      const slope = (normalCumulative(z + 1e-5) - normalCumulative(z - 1e-5)) / 2e-5;
      expect(slope / normalDensity(z)).toBeCloseTo(1, 8);
    }
  });
});

describe('normalQuantile(p)', () => {
  test('known quantiles', () => {
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 14);
    expect(normalQuantile(1e-10)).toBeCloseTo(-6.361340902404056, 12);
    expect(normalQuantile(0.5)).toBe(0);
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
  });

  test('is the inverse of normalCumulative', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true }), (p) => {
        expect(normalCumulative(normalQuantile(p)) / p).toBeCloseTo(1, 12);
      }),
    );
  });

  test('refuses a probability outside 0 to 1', () => {
    expect(() => normalQuantile(1.1)).toThrow('p must be between 0 and 1, got 1.1');
  });
});
