import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  describeIndexConvention,
  formatAsymmetric,
  formatInterval,
  formatLimit,
  formatPer100,
  formatPercent,
  formatPlain,
  formatRange,
  formatSignificant,
  rateUnit,
} from '@/lib/quantities/display';

describe('formatSignificant(value, digits)', () => {
  test.each([
    [0.05764, 2, '0.058'],
    [9.96, 2, '10'],
    [0.0996, 2, '0.10'],
    [123.4, 2, '120'],
    [5, 3, '5.00'],
    [0, 2, '0'],
    [-1.31, 3, '\u22121.31'],
    [1.5e-7, 2, '1.5e\u22127'],
    [2.34e8, 2, '2.3e8'],
  ])('writes %s with %i digits as %s', (value, digits, text) => {
    expect(formatSignificant(value, digits)).toBe(text);
  });

  test('keeps the value within half a unit of its last digit', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-3, max: 9e5, noNaN: true }),
        fc.integer({ min: 1, max: 8 }),
        (x, n) => {
          const error = Math.abs(Number(formatSignificant(x, n)) - x);
          expect(error).toBeLessThanOrEqual(0.5000001 * 10 ** (Math.floor(Math.log10(x)) - n + 1));
        },
      ),
    );
  });

  test('refuses what is not a number, and digits outside 1 to 17', () => {
    expect(() => formatSignificant(Number.NaN, 2)).toThrow('value must be finite, got NaN');
    expect(() => formatSignificant(1, 0)).toThrow('digits must be an integer between 1 and 17');
  });
});

describe('rates', () => {
  test('a limit is <, two digits rounded to nearest, thin space, unit', () => {
    expect(formatLimit(0.0576, 'host_fraction')).toBe('<5.8\u2009%');
    expect(formatLimit(0.0576, 'companions_per_star')).toBe('<5.8 per 100 stars');
    expect(formatLimit(0.0974, 'host_fraction')).toBe('<9.7\u2009%');
    expect(formatLimit(1, 'host_fraction')).toBe('<100\u2009%');
  });

  test('percentages and planets per 100 stars', () => {
    expect(formatPercent(0.95)).toBe('95\u2009%');
    expect(formatPercent(0.997, 3)).toBe('99.7\u2009%');
    expect(formatPer100(1.234)).toBe('120 per 100 stars');
    expect(rateUnit('host_fraction')).toBe('% of stars');
  });

  test('an interval names its unit once', () => {
    expect(formatInterval(0.013, 0.043, 'host_fraction')).toBe('1.3\u20134.3\u2009%');
    expect(formatInterval(0.013, 0.043, 'companions_per_star')).toBe('1.3\u20134.3 per 100 stars');
  });
});

describe('ranges and errors', () => {
  test('a range has its unit after a thin space', () => {
    expect(formatRange(5, 13, 'Mjup')).toBe('5\u201313\u2009Mjup');
    expect(formatRange(0.5, 80, '')).toBe('0.5\u201380');
    expect(formatPlain(10)).toBe('10');
    expect(formatPlain(0.25)).toBe('0.25');
  });

  test('symmetric errors are ±, others are written above and below', () => {
    expect(formatAsymmetric(24, 3, 3, 'Myr')).toBe('24 ± 3\u2009Myr');
    expect(formatAsymmetric(3.1, 1.4, 2.2, 'Mjup')).toBe('3.1 +2.2 \u22121.4\u2009Mjup');
    expect(formatAsymmetric(33, 0, 0, 'pc')).toBe('33\u2009pc');
    expect(() => formatAsymmetric(1, -1, 1)).toThrow('lower must be >= 0, got -1');
  });
});

test('describeIndexConvention names what the index belongs to', () => {
  expect(describeIndexConvention('mass', 'linear')).toBe('dN/dM ∝ M^α');
  expect(describeIndexConvention('semi-major axis', 'log')).toBe('dN/d ln a ∝ a^β');
});
