import { describe, expect, test } from 'vitest';
import {
  intervalIndex,
  linearAxis,
  logSpacedAxis,
  requirePositiveAxis,
  unionAxis,
} from '@/lib/numerics/grid';

describe('logSpacedAxis(min, max, n)', () => {
  test('has exact ends, equal ratios and no step back', () => {
    const axis = logSpacedAxis(0.5, 80, 56);
    expect(axis).toHaveLength(56);
    expect(axis[0]).toBe(0.5);
    expect(axis[55]).toBe(80);
    for (let i = 1; i < 56; i++) expect(axis[i] / axis[i - 1]).toBeCloseTo(160 ** (1 / 55), 12);
    expect(Array.from(logSpacedAxis(1, 100, 3))[1]).toBeCloseTo(10, 12);
  });

  test('refuses a start that is not positive, an end that is not beyond it, too few values', () => {
    expect(() => logSpacedAxis(0, 1, 3)).toThrow('min must be > 0, got 0');
    expect(() => logSpacedAxis(2, 2, 3)).toThrow('max must be finite and > min 2, got 2');
    expect(() => logSpacedAxis(1, 2, 1)).toThrow('n must be an integer >= 2, got 1');
  });
});

test('linearAxis(min, max, n) has equal steps', () => {
  expect(Array.from(linearAxis(-1, 1, 5))).toEqual([-1, -0.5, 0, 0.5, 1]);
});

test('requirePositiveAxis names the index and what was found', () => {
  expect(() => requirePositiveAxis(Float64Array.of(1, 1), 'mass')).toThrow(
    'mass[1] must be > 1, got 1',
  );
  expect(() => requirePositiveAxis(Float64Array.of(-1, 1), 'mass')).toThrow(
    'mass[0] must be finite and > 0, got -1',
  );
  expect(() => requirePositiveAxis(Float64Array.of(1), 'mass')).toThrow('at least 2 values');
});

test('intervalIndex(axis, x) stays inside the axis', () => {
  const axis = [1, 2, 4];
  expect([0, 1, 1.9, 2, 3, 4, 9].map((x) => intervalIndex(axis, x))).toEqual([0, 0, 0, 1, 1, 1, 1]);
});

test('unionAxis keeps each value once, in order', () => {
  expect(Array.from(unionAxis([Float64Array.of(1, 3), Float64Array.of(2, 3, 10)]))).toEqual([
    1, 2, 3, 10,
  ]);
});
