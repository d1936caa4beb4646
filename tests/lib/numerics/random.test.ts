import { describe, expect, test } from 'vitest';
import { createRandom, deriveSeed } from '@/lib/numerics/random';

const FIRST_NUMBERS = [0.004099595398632971, 0.9090831398756303, 0.9952316949833682];

const take = (seed: string, n: number) => {
  const { uniform } = createRandom(seed);
  return Array.from({ length: n }, uniform);
};

describe('createRandom(seed)', () => {
  test('the same seed gives the same stream, another seed another', () => {
    expect(take('survey', 50)).toEqual(take('survey', 50));
    expect(take('survey', 5)).not.toEqual(take('surveys', 5));
    expect(take('', 5)).not.toEqual(take('0', 5));
  });

  test('its first numbers are fixed: a change would move every stored simulation', () => {
    expect(take('rarebound', 3)).toEqual(FIRST_NUMBERS);
  });

  test('uniform numbers fill (0, 1) evenly', () => {
    const n = 50_000;
    const counts = new Array(20).fill(0);
    const values = take('even', n);
    for (const u of values) counts[Math.floor(20 * u)]++;
    expect(values.filter((u) => !(u > 0 && u < 1))).toEqual([]);
    const chiSquare = counts.reduce((sum, c) => sum + (c - n / 20) ** 2 / (n / 20), 0);
    // 19 degrees of freedom: 43.8 is exceeded once in 1000 seeds.
    expect(chiSquare).toBeLessThan(43.8);
  });

  test('normal numbers have mean 0, variance 1 and no correlation with the next', () => {
    const { normal } = createRandom('normal');
    const n = 40_000;
    const z = Array.from({ length: n }, normal);
    const mean = z.reduce((a, b) => a + b, 0) / n;
    const square = z.reduce((a, b) => a + b * b, 0) / n;
    const lag = z.slice(1).reduce((a, b, i) => a + b * z[i], 0) / n;
    expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(n));
    expect(Math.abs(square - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    expect(Math.abs(lag)).toBeLessThan(4 / Math.sqrt(n));
  });
});

test('deriveSeed(seed, part) differs for every part, and seeds do not run together', () => {
  expect(deriveSeed('a', 1)).not.toBe(deriveSeed('a', 2));
  expect(deriveSeed('a/1', 2)).not.toBe(deriveSeed('a', '1/2'));
});
