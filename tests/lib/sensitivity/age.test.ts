import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { normalCumulative } from '@/lib/numerics/normal';
import { type AgeLaw, ageNodes, ageQuantile } from '@/lib/sensitivity';

const mean = (law: AgeLaw, f: (age: number) => number, perSide?: number) => {
  const { values, weights } = ageNodes(law, 'smooth', perSide);
  return values.reduce((sum, age, i) => sum + weights[i] * f(age), 0);
};

describe('ageQuantile(law)', () => {
  test('has exactly the quoted median and percentiles', () => {
    const quantile = ageQuantile({ medianMyr: 24, lowerMyr: 19, upperMyr: 31 });
    expect(quantile(0.5)).toBeCloseTo(24, 12);
    expect(quantile(normalCumulative(-1))).toBeCloseTo(19, 10);
    expect(quantile(normalCumulative(1))).toBeCloseTo(31, 10);
  });

  test('hard bounds alone are uniform in log age on each side of the median', () => {
    const even = ageQuantile({ medianMyr: 20, minMyr: 10, maxMyr: 40 });
    for (const p of [0, 0.2, 0.5, 0.9, 1]) expect(even(p)).toBeCloseTo(10 * 4 ** p, 10);
    const skewed = ageQuantile({ medianMyr: 15, minMyr: 10, maxMyr: 40 });
    expect(skewed(0)).toBeCloseTo(10, 10);
    expect(skewed(0.5)).toBeCloseTo(15, 10);
    expect(skewed(1)).toBeCloseTo(40, 10);
  });

  test('hard bounds cut a law with percentiles', () => {
    const law = { medianMyr: 24, lowerMyr: 19, upperMyr: 31, minMyr: 15, maxMyr: 35 };
    const quantile = ageQuantile(law);
    expect(quantile(0)).toBeCloseTo(15, 8);
    expect(quantile(1)).toBeCloseTo(35, 8);
    const { values, weights } = ageNodes(law, 'smooth');
    expect(Math.min(...values)).toBeGreaterThan(15);
    expect(Math.max(...values)).toBeLessThan(35);
    expect(weights.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 14);
  });

  test('never falls', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 2, max: 5000, noNaN: true }),
        fc.double({ min: 0, max: 0.9, noNaN: true }),
        fc.double({ min: 0, max: 3, noNaN: true }),
        (median, down, up) => {
          const law = {
            medianMyr: median,
            lowerMyr: median * (1 - down),
            upperMyr: median * (1 + up),
          };
          const ages = [0.01, 0.16, 0.4, 0.5, 0.6, 0.9, 0.999].map(ageQuantile(law));
          ages.slice(1).forEach((age, i) => {
            expect(age).toBeGreaterThanOrEqual(ages[i] * (1 - 1e-12));
          });
        },
      ),
    );
  });
});

describe('ageNodes(law, threshold)', () => {
  test('5 nodes a side under the smooth threshold, 10 under the hard, 1 without an error', () => {
    const law = { medianMyr: 24, lowerMyr: 19, upperMyr: 31 };
    expect(ageNodes(law, 'smooth').values).toHaveLength(10);
    expect(ageNodes(law, 'hard').values).toHaveLength(20);
    expect(ageNodes({ medianMyr: 24 }, 'hard')).toEqual({
      values: Float64Array.of(24),
      weights: Float64Array.of(1),
    });
    expect(ageNodes({ medianMyr: 24, lowerMyr: 24, upperMyr: 24 }, 'smooth').values).toHaveLength(
      1,
    );
  });

  test('ages increase, weights are positive and sum to 1', () => {
    const { values, weights } = ageNodes({ medianMyr: 24, lowerMyr: 19, upperMyr: 31 }, 'hard');
    expect(Array.from(values)).toEqual(Array.from(values).sort((a, b) => a - b));
    expect(weights.every((w) => w > 0)).toBe(true);
    expect(weights.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 14);
  });

  test('an error on one side only moves ages on that side', () => {
    const { values } = ageNodes({ medianMyr: 24, lowerMyr: 24, upperMyr: 31 }, 'smooth');
    expect(values.filter((age) => age === 24)).toHaveLength(5);
    expect(values.filter((age) => age > 24)).toHaveLength(5);
  });

  test('mean of ln t matches the closed form (ln t+ - 2 ln t0 + ln t-)/√(2π)', () => {
    const law = { medianMyr: 24, lowerMyr: 19, upperMyr: 31 };
    const expected = Math.log(24) + Math.log((31 * 19) / 24 ** 2) / Math.sqrt(2 * Math.PI);
    expect(mean(law, Math.log, 80)).toBeCloseTo(expected, 5);
    expect(mean(law, Math.log)).toBeCloseTo(expected, 3);
  });

  test.each([
    [{ medianMyr: 0 }, 'medianMyr must be finite and > 0, got 0'],
    [{ medianMyr: 10, lowerMyr: -1, upperMyr: 20 }, 'lowerMyr must be finite and > 0, got -1'],
    [{ medianMyr: 10, lowerMyr: 12, upperMyr: 20 }, 'lowerMyr must be <= medianMyr 10, got 12'],
    [{ medianMyr: 10, lowerMyr: 5, upperMyr: 9 }, 'medianMyr must be <= upperMyr 9, got 10'],
    [{ medianMyr: 10, lowerMyr: 5 }, 'lowerMyr and upperMyr must be given together'],
    [{ medianMyr: 10, minMyr: 5 }, 'minMyr and maxMyr must be given together'],
    [{ medianMyr: 10, minMyr: 11, maxMyr: 12 }, 'minMyr must be <= medianMyr 10, got 11'],
  ] as [AgeLaw, string][])('refuses %j', (law, message) => {
    expect(() => ageNodes(law, 'smooth')).toThrow(message);
  });
});
