import { expect, test } from 'vitest';
import { periodDays, semiMajorAxisAuOfPeriod } from '@/lib/quantities/periods';

test('periodDays(a, M) and semiMajorAxisAuOfPeriod(P, M) are each other’s inverse', () => {
  for (const [axis, mass] of [
    [0.03, 1],
    [5.2, 0.5],
    [400, 2.1],
  ]) {
    expect(semiMajorAxisAuOfPeriod(periodDays(axis, mass), mass)).toBeCloseTo(axis, 10);
  }
});

test('the published range 2 to 2000 d is 0.031066 to 3.10662 au at one solar mass', () => {
  expect(semiMajorAxisAuOfPeriod(2, 1)).toBeCloseTo(0.031066, 6);
  expect(semiMajorAxisAuOfPeriod(2000, 1)).toBeCloseTo(3.10662, 5);
});

test('an axis or a mass that is not > 0 is refused by name', () => {
  expect(() => periodDays(0, 1)).toThrow('semiMajorAxisAu must be finite and > 0, got 0');
  expect(() => periodDays(1, -1)).toThrow('hostMassMsun must be finite and > 0, got -1');
  expect(() => semiMajorAxisAuOfPeriod(Number.NaN, 1)).toThrow('days must be finite and > 0');
});
