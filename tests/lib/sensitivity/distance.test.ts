import { expect, test } from 'vitest';
import { normalCumulative } from '@/lib/numerics/normal';
import { distanceNodes } from '@/lib/sensitivity';
import { smoothDistanceNodes } from '@/lib/sensitivity/distance';

test('three nodes keep mean and variance of a distance', () => {
  const { values, weights } = distanceNodes({ distancePc: 33, errorPc: 1.2 });
  const mean = values.reduce((sum, d, i) => sum + weights[i] * d, 0);
  const variance = values.reduce((sum, d, i) => sum + weights[i] * (d - 33) ** 2, 0);
  expect(values).toHaveLength(3);
  expect(mean).toBeCloseTo(33, 12);
  expect(Math.sqrt(variance)).toBeCloseTo(1.2, 12);
});

test('a parallax is moved before it is inverted', () => {
  const { values } = distanceNodes({ parallaxMas: 50, errorMas: 1 });
  expect(values[1]).toBe(20);
  expect(values[0]).toBeCloseTo(1000 / (50 - Math.sqrt(3)), 10);
  expect(values[2]).toBeCloseTo(1000 / (50 + Math.sqrt(3)), 10);
});

test('no error, one node', () => {
  expect(distanceNodes({ distancePc: 10, errorPc: 0 }).values).toEqual(Float64Array.of(10));
});

test('refuses what is not positive, and an error that takes a node to 0', () => {
  expect(() => distanceNodes({ distancePc: 0, errorPc: 1 })).toThrow(
    'distancePc must be finite and > 0, got 0',
  );
  expect(() => distanceNodes({ parallaxMas: 5, errorMas: -1 })).toThrow('must be finite and >= 0');
  expect(() => distanceNodes({ parallaxMas: 5, errorMas: 3 })).toThrow(
    'parallaxMas must stay > 0 at every node',
  );
});

test('fewer nodes do where a smooth threshold hides the error, and cost what is told of them', () => {
  const chance = (n: number, mag: number) => normalCumulative(n * (1 - 10 ** (0.4 * mag)));
  const seen = (errorPc: number, n: number, count: number, mag: number) => {
    const { values, weights } = distanceNodes({ distancePc: 40, errorPc }, count);
    return values.reduce(
      (sum, d, i) => sum + weights[i] * chance(n, mag + 5 * Math.log10(d / 40)),
      0,
    );
  };
  const counts = [];
  for (const [errorPc, n] of [
    [0.06, 5],
    [0.4, 5],
    [0.08, 25],
    [1.2, 5],
  ]) {
    const count = smoothDistanceNodes({ distancePc: 40, errorPc }, n);
    counts.push(count);
    const worst = count === 1 ? 4e-5 : 1e-5;
    for (let mag = -1; count < 3 && mag <= 1; mag += 0.01) {
      const wanted = seen(errorPc, n, 9, mag);
      expect(Math.abs(seen(errorPc, n, count, mag) - wanted)).toBeLessThan(worst);
    }
  }
  expect(counts).toEqual([1, 2, 2, 3]);
});
