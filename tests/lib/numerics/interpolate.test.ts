import { expect, test } from 'vitest';
import { bracket, interpolateLinear } from '@/lib/numerics/interpolate';

test('interpolateLinear(x, xs, ys) is straight between points and flat outside', () => {
  const xs = [1, 2, 4];
  const ys = [10, 20, 0];
  expect([0, 1, 1.5, 2, 3, 4, 9].map((x) => interpolateLinear(x, xs, ys))).toEqual([
    10, 10, 15, 20, 10, 0, 0,
  ]);
});

test('bracket(axis, x) gives the interval and the share, and null outside', () => {
  const axis = Float64Array.of(1, 2, 4);
  expect(bracket(axis, 3)).toEqual({ index: 1, share: 0.5 });
  expect(bracket(axis, 4)).toEqual({ index: 1, share: 1 });
  expect(bracket(axis, 1)).toEqual({ index: 0, share: 0 });
  expect(bracket(axis, 4.1)).toBeNull();
  expect(bracket(axis, Number.NaN)).toBeNull();
});
