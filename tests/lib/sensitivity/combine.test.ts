import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  type CompletenessMap,
  checkCompletenessMap,
  combinationBounds,
  combineDeepest,
  combineIndependent,
  regridCells,
  regridNodes,
} from '@/lib/sensitivity';

/** A map on some of a few nodes, so that several maps share some and not others. */
const axis = (nodes: number[]) =>
  fc
    .subarray(nodes, { minLength: 2 })
    .map((chosen) => Float64Array.from(chosen.sort((a, b) => a - b)));
const maps = fc
  .tuple(axis([1, 2, 5, 13, 40]), axis([3, 10, 33, 100, 300]))
  .chain(([massMjup, semiMajorAxisAu]) => {
    const n = massMjup.length * semiMajorAxisAu.length;
    return fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: n, maxLength: n }).map(
      (values): CompletenessMap => ({
        massMjup,
        semiMajorAxisAu,
        completeness: Float64Array.from(values),
      }),
    );
  });
const severalMaps = fc.array(maps, { minLength: 1, maxLength: 4 });
const TINY = 1e-12;

describe('combining maps of one star', () => {
  test('deepest is at least each map, independent at least deepest, both within the bounds', () => {
    fc.assert(
      fc.property(severalMaps, (several) => {
        const deepest = combineDeepest(several);
        const independent = combineIndependent(several);
        const { lower, upper } = combinationBounds(several);
        expect(lower).toEqual(deepest);
        deepest.completeness.forEach((c, i) => {
          expect(independent.completeness[i]).toBeGreaterThanOrEqual(c - TINY);
          expect(independent.completeness[i]).toBeLessThanOrEqual(upper.completeness[i] + TINY);
        });
        for (const map of several) {
          const same = regridNodes(map, deepest).map.completeness;
          expect(same.every((c, i) => c <= deepest.completeness[i])).toBe(true);
        }
      }),
    );
  });

  test('the order of the maps does not matter, and one map stays itself', () => {
    fc.assert(
      fc.property(severalMaps, (several) => {
        const reversed = [...several].reverse();
        expect(combineDeepest(reversed)).toEqual(combineDeepest(several));
        const [there, back] = [combineIndependent(several), combineIndependent(reversed)];
        there.completeness.forEach((c, i) => {
          expect(back.completeness[i]).toBeCloseTo(c, 12);
        });
        expect(combineDeepest([several[0]])).toEqual(several[0]);
      }),
    );
  });

  test('no map is refused', () => {
    expect(() => combineDeepest([])).toThrow('maps must hold at least one map, got none');
  });
});

describe('regridding', () => {
  test('nodes onto themselves change nothing; values stay within those of the old map', () => {
    fc.assert(
      fc.property(maps, maps, (map, other) => {
        const same = regridNodes(map, map);
        expect(same.shareOutside).toBe(0);
        expect(same.map).toEqual(map);
        const most = Math.max(...map.completeness);
        const elsewhere = regridNodes(map, other).map.completeness;
        expect(elsewhere.every((c) => c >= 0 && c <= most + TINY)).toBe(true);
      }),
    );
  });

  test('a share outside counts the new nodes beyond the old axes, where C is 0', () => {
    const map = {
      massMjup: Float64Array.of(1, 10),
      semiMajorAxisAu: Float64Array.of(1, 10),
      completeness: Float64Array.of(1, 1, 1, 1),
    };
    const wider = {
      massMjup: Float64Array.of(0.5, 3),
      semiMajorAxisAu: Float64Array.of(3, 30),
    };
    const { map: regridded, shareOutside } = regridNodes(map, wider);
    expect(shareOutside).toBe(0.75);
    expect(Array.from(regridded.completeness)).toEqual([0, 0, 1, 0]);
  });

  test('cells keep their values on finer cells and refuse a wrong number of values', () => {
    const map = {
      massEdgesMjup: Float64Array.of(1, 10),
      semiMajorAxisEdgesAu: Float64Array.of(1, 10, 100),
      completeness: Float64Array.of(0.2, 0.6),
    };
    const finer = regridCells(map, Float64Array.of(1, 3, 10), Float64Array.of(1, 4, 10, 100));
    expect(finer.shareOutside).toBeCloseTo(0, 14);
    const expected = [0.2, 0.2, 0.6, 0.2, 0.2, 0.6];
    finer.map.completeness.forEach((c, i) => {
      expect(c).toBeCloseTo(expected[i], 12);
    });
    expect(() =>
      regridCells(
        { ...map, completeness: Float64Array.of(1) },
        map.massEdgesMjup,
        map.semiMajorAxisEdgesAu,
      ),
    ).toThrow('completeness must have 2 values, got 1');
  });
});

describe('checkCompletenessMap(map)', () => {
  const map = (values: number[]): CompletenessMap => ({
    massMjup: Float64Array.of(1, 5),
    semiMajorAxisAu: Float64Array.of(10, 50),
    completeness: Float64Array.from(values),
  });

  test('brings rounding back to 0…1 and lists where C falls with mass', () => {
    const checked = checkCompletenessMap(map([-1e-10, 0.5, 1 + 1e-10, 0.4]));
    expect(Array.from(checked.map.completeness)).toEqual([0, 0.5, 1, 0.4]);
    expect(checked.falls).toHaveLength(1);
    expect(checked.falls[0]).toMatchObject({ semiMajorAxisAu: 50, lighterMjup: 1, heavierMjup: 5 });
    expect(checked.falls[0].fall).toBeCloseTo(0.1, 12);
  });

  test('refuses a value outside, NaN and a wrong shape, and says where', () => {
    expect(() => checkCompletenessMap(map([0, 0, 1.1, 0]))).toThrow(
      'completeness at 5 Mjup, 10 AU must be between 0 and 1, got 1.1',
    );
    expect(() => checkCompletenessMap(map([0, Number.NaN, 0, 0]))).toThrow('got NaN');
    expect(() => checkCompletenessMap(map([0]))).toThrow('completeness must have 4 values, got 1');
  });
});
