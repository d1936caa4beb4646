import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  binomialLowerLimit,
  binomialUpperLimit,
  hostFractionUpperLimit,
  poissonBinomial,
  poissonLowerLimit,
  poissonUpperLimit,
  wilsonInterval,
} from '@/lib/inference';
import { buildCompleteness } from './build-question';

describe('poissonBinomial', () => {
  it('sums to one and has the sum of the probabilities as its mean', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 60 }),
        (probabilities) => {
          const counts = poissonBinomial(probabilities);
          const total = counts.reduce((sum, p) => sum + p, 0);
          const mean = counts.reduce((sum, p, n) => sum + n * p, 0);
          expect(total).toBeCloseTo(1, 12);
          expect(mean).toBeCloseTo(
            probabilities.reduce((sum, p) => sum + p, 0),
            10,
          );
        },
      ),
    );
  });

  it('gives the first counts alone when no more are wanted', () => {
    const all = poissonBinomial([0.2, 0.5, 0.9, 0.1]);
    expect(poissonBinomial([0.2, 0.5, 0.9, 0.1], 1)).toEqual(all.slice(0, 2));
  });
});

describe('confidence limits', () => {
  it('leave the stated probability of the counts seen or fewer', () => {
    const completeness = buildCompleteness(50, 'confidence', 0.1, 0.8);
    for (const k of [0, 1, 4]) {
      const limit = hostFractionUpperLimit(completeness, k, 0.95);
      const counts = poissonBinomial(completeness.map((c) => c * limit)).slice(0, k + 1);
      expect(counts.reduce((sum, p) => sum + p, 0)).toBeCloseTo(0.05, 10);
    }
  });

  it('for fully seen stars are those of plain counts', () => {
    const seen = new Float64Array(30).fill(1);
    for (const k of [0, 3, 29, 30]) {
      expect(hostFractionUpperLimit(seen, k, 0.9)).toBeCloseTo(binomialUpperLimit(k, 30, 0.9), 11);
    }
  });

  it('are one where even f = 1 is not excluded', () => {
    expect(hostFractionUpperLimit(Float64Array.of(0.2, 0.3), 0, 0.95)).toBe(1);
    expect(hostFractionUpperLimit(new Float64Array(4), 0, 0.95)).toBe(1);
    expect(poissonUpperLimit(0, 0, 0.95)).toBe(Number.POSITIVE_INFINITY);
  });

  it('surround the count and need one for a lower end', () => {
    expect(poissonLowerLimit(0, 10, 0.95)).toBe(0);
    expect(poissonLowerLimit(3, 10, 0.84)).toBeLessThan(0.3);
    expect(poissonUpperLimit(3, 10, 0.84)).toBeGreaterThan(0.3);
    expect(binomialLowerLimit(0, 10, 0.95)).toBe(0);
    expect(wilsonInterval(0, 10, 0.95)[0]).toBe(0);
  });

  it('refuse counts and levels that cannot be', () => {
    expect(() => poissonUpperLimit(0.5, 10, 0.95)).toThrow(RangeError);
    expect(() => poissonUpperLimit(1, 10, 95)).toThrow(/0\.95, not 95/);
    expect(() => binomialUpperLimit(11, 10, 0.95)).toThrow(/0 to 10/);
    expect(() => hostFractionUpperLimit(Float64Array.of(0.5), 2, 0.95)).toThrow(RangeError);
  });
});
