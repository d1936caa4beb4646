import fc from 'fast-check';
import { expect, test } from 'vitest';
import { compensatedSum, logSumExp } from '@/lib/numerics/sums';

test('compensatedSum keeps what plain addition loses', () => {
  expect(compensatedSum([1, 1e100, 1, -1e100])).toBe(2);
  expect(compensatedSum(new Float64Array(1000).fill(0.1))).toBe(100);
  expect(compensatedSum([])).toBe(0);
});

test('compensatedSum of integers is exact', () => {
  fc.assert(
    fc.property(fc.array(fc.integer({ min: -1e6, max: 1e6 })), (values) => {
      expect(compensatedSum(values)).toBe(values.reduce((a, b) => a + b, 0));
    }),
  );
});

test('logSumExp adds logarithms without overflow', () => {
  expect(logSumExp([Math.log(2), Math.log(3)])).toBeCloseTo(Math.log(5), 14);
  expect(logSumExp([1000, 1000])).toBeCloseTo(1000 + Math.LN2, 12);
  expect(logSumExp([-Infinity, 0])).toBe(0);
  expect(logSumExp([])).toBe(-Infinity);
});
