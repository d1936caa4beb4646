import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { findRoot } from '@/lib/numerics/roots';

describe('findRoot(f, a, b)', () => {
  test('known roots', () => {
    expect(findRoot((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(findRoot((x) => Math.cos(x) - x, 0, 1)).toBeCloseTo(0.7390851332151607, 15);
    expect(findRoot((x) => x, -1, 1)).toBe(0);
    expect(findRoot((x) => x - 1, 1, 3)).toBe(1);
  });

  test('ends at flat and steep crossings', () => {
    expect(Math.abs(findRoot((x) => x ** 9, -1, 2))).toBeLessThan(1e-15);
    expect(findRoot((x) => Math.sign(x - 0.3), 0, 1)).toBeCloseTo(0.3, 14);
    expect(findRoot((x) => Math.expm1(50 * (x - 1)), 0, 3)).toBeCloseTo(1, 14);
  });

  test('finds the root of any increasing cubic', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -10, max: 10, noNaN: true }),
        fc.double({ min: 0.01, max: 5, noNaN: true }),
        (root, slope) => {
          const f = (x: number) => (x - root) ** 3 + slope * (x - root);
          expect(findRoot(f, -11, 11)).toBeCloseTo(root, 12);
        },
      ),
    );
  });

  test('refuses equal signs and values that are no numbers', () => {
    expect(() => findRoot((x) => x * x + 1, -1, 1)).toThrow('f must change sign between -1 and 1');
    expect(() => findRoot((x) => (Math.abs(x) > 0.9 ? x : Number.NaN), -1, 1)).toThrow(RangeError);
  });

  test('refuses to return an unfinished answer', () => {
    expect(() => findRoot((x) => x - 0.1, 0, 1e6, { maxEvaluations: 3 })).toThrow(
      'no root within 3 evaluations',
    );
  });
});
