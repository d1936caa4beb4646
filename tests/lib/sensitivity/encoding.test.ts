import fc from 'fast-check';
import { expect, test } from 'vitest';
import { decodeMap, encodeMap } from '@/lib/sensitivity';

test('decodeMap(encodeMap(C)) is C to half a step, and 0 and 1 exactly', () => {
  fc.assert(
    fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true })), (values) => {
      const back = decodeMap(encodeMap(Float64Array.from(values)));
      expect(values.every((c, i) => Math.abs(back[i] - c) <= 7.7e-6)).toBe(true);
    }),
  );
  expect(Array.from(decodeMap(encodeMap(Float64Array.of(0, 1))))).toEqual([0, 1]);
});

test('encodeMap(decodeMap(v)) is v for every stored value', () => {
  const all = Uint16Array.from({ length: 65_536 }, (_, i) => i);
  expect(encodeMap(decodeMap(all))).toEqual(all);
});

test('encodeMap refuses what is no completeness', () => {
  expect(() => encodeMap(Float64Array.of(0, 1.01))).toThrow(
    'completeness[1] must be between 0 and 1, got 1.01',
  );
  expect(() => encodeMap(Float64Array.of(Number.NaN))).toThrow(RangeError);
});
