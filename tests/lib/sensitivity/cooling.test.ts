import { describe, expect, test } from 'vitest';
import {
  AgeOutsideTableError,
  builtInMagnitude,
  type CoolingTable,
  checkCoolingTable,
  computeCompletenessMap,
  isInsideLawValidity,
} from '@/lib/sensitivity';
import { builtInMagnitudes } from '@/lib/sensitivity/built-in-law';
import { coolNodes } from '@/lib/sensitivity/cooling';
import { buildSettings, buildStar } from './build-star';

function buildTable(overrides: Partial<CoolingTable> = {}): CoolingTable {
  return {
    name: 'invented table',
    massMjup: Float64Array.of(2, 5, 12, 30),
    ageMyr: Float64Array.of(10, 40, 160),
    magnitudes: {
      H: Float64Array.of(15.2, 17.9, 21.1, 12.4, 14.6, 17.6, 10.1, 11.9, 14.2, 8.3, 9.6, 11.4),
    },
    ...overrides,
  };
}

const undetectable = { massOutsideTable: 'undetectable', ageOutsideTable: 'refuse' } as const;
const masses = Float64Array.of(1, 2, 6, 30, 50);
const relation = (table: CoolingTable) => ({ kind: 'table', table }) as const;

describe('coolNodes with a table', () => {
  test('a mass outside is never detected, and is counted', () => {
    const { magnitudes, report } = coolNodes(
      relation(buildTable()),
      'H',
      masses,
      Float64Array.of(20, 80),
      undetectable,
      'Star 01',
    );
    expect(magnitudes[0]).toBe(Infinity);
    expect(magnitudes[9]).toBe(Infinity);
    expect(magnitudes[4]).toBeLessThan(Infinity);
    expect(report).toEqual({
      massNodesOutside: 2,
      ageNodesClamped: 0,
      lawNodesOutsideValidity: 0,
      flaggedMassNodes: [0, 4],
    });
  });

  test('the edge value is taken above the largest mass only', () => {
    const policy = { ...undetectable, massOutsideTable: 'edge' } as const;
    const ages = Float64Array.of(10);
    const { magnitudes, report } = coolNodes(
      relation(buildTable()),
      'H',
      masses,
      ages,
      policy,
      'Star 01',
    );
    expect(magnitudes[0]).toBe(Infinity);
    expect(magnitudes[4]).toBeCloseTo(8.3, 12);
    expect(report.massNodesOutside).toBe(2);
  });

  test('an age outside is refused with star, node and range, or clamped and counted', () => {
    const ages = Float64Array.of(5, 20, 400);
    const cool = (policy: Parameters<typeof coolNodes>[4]) =>
      coolNodes(relation(buildTable()), 'H', masses, ages, policy, 'Star 07');
    expect(() => cool(undetectable)).toThrow(AgeOutsideTableError);
    expect(() => cool(undetectable)).toThrow(
      'age node of Star 07 must be between 10 and 160 Myr for invented table, got 5',
    );
    const clamped = cool({ ...undetectable, ageOutsideTable: 'edge' });
    expect(clamped.report.ageNodesClamped).toBe(2);
    expect(clamped.magnitudes[3]).toBeCloseTo(15.2, 12);
    expect(clamped.magnitudes[5]).toBeCloseTo(21.1, 12);
  });

  test('a missing corner makes its neighbourhood undetectable, but not the other nodes', () => {
    const table = buildTable();
    table.magnitudes.H[0] = Number.NaN;
    const { magnitudes, report } = coolNodes(
      relation(table),
      'H',
      Float64Array.of(3, 5, 12),
      Float64Array.of(10),
      undetectable,
      'Star 01',
    );
    expect(Array.from(magnitudes)).toEqual([Infinity, 12.4, 10.1]);
    expect(report.flaggedMassNodes).toEqual([0]);
  });

  test('a map is 0 where the mass is outside, false positives included', () => {
    const grid = { massMjup: masses, semiMajorAxisAu: Float64Array.of(20, 60) };
    const { map, report } = computeCompletenessMap(
      buildStar(),
      relation(buildTable()),
      grid,
      buildSettings(),
    );
    expect(Array.from(map.completeness.subarray(0, 2))).toEqual([0, 0]);
    expect(Array.from(map.completeness.subarray(8))).toEqual([0, 0]);
    expect(map.completeness[6]).toBeGreaterThan(0.5);
    expect(report.flaggedMassNodes).toEqual([0, 4]);
  });

  test('a band that the table lacks is refused by name', () => {
    expect(() =>
      coolNodes(relation(buildTable()), 'J', masses, Float64Array.of(20), undetectable, 'x'),
    ).toThrow('band must be one of H for invented table, got J');
  });
});

describe('checkCoolingTable(table)', () => {
  test('lists where the heavier is the fainter', () => {
    const table = buildTable();
    table.magnitudes.H[4] = 12;
    table.magnitudes.H[7] = 12.5;
    expect(checkCoolingTable(buildTable())).toEqual([]);
    expect(checkCoolingTable(table)).toEqual([
      { band: 'H', ageMyr: 40, lighterMjup: 5, heavierMjup: 12 },
    ]);
  });

  test.each([
    [{ massMjup: Float64Array.of(2) }, 'massMjup of invented table must have at least 2 values'],
    [{ ageMyr: Float64Array.of(10, 10, 20) }, 'ageMyr of invented table[1] must be > 10, got 10'],
    [{ magnitudes: {} }, 'must have at least one band'],
    [{ magnitudes: { H: new Float64Array(3) } }, 'H of invented table must have 12 entries, got 3'],
    [
      { magnitudes: { H: new Float64Array(12).fill(Infinity) } },
      'H of invented table must be finite, got Infinity',
    ],
  ] as [Partial<CoolingTable>, string][])('refuses a broken table', (part, message) => {
    expect(() => checkCoolingTable(buildTable(part))).toThrow(message);
  });
});

describe('the built-in law', () => {
  test('many nodes at once give what one at a time gives', () => {
    const ages = Float64Array.of(1, 30, 4560, 10_000);
    const many = Float64Array.of(0.5, 3, 13, 80);
    const { magnitudes, outsideValidity } = builtInMagnitudes(many, ages, 'Ks');
    let cell = 0;
    for (const mass of many) {
      for (const age of ages) {
        expect(magnitudes[cell++]).toBeCloseTo(builtInMagnitude(mass, age, 'Ks'), 9);
      }
    }
    const expected = [...many.keys()].filter((i) =>
      ages.some((age) => !isInsideLawValidity(many[i], age)),
    );
    expect(outsideValidity).toEqual(expected);
  });

  test('papers’ spellings of L′ and M′ are read, other bands are refused', () => {
    expect(builtInMagnitude(5, 10, "L'")).toBe(builtInMagnitude(5, 10, 'Lp'));
    expect(() => builtInMagnitude(5, 10, 'K')).toThrow('band must be one of J, H, Ks, Lp, Mp');
  });

  test('is refused outside 0.5 to 80 Mjup and 1 to 10 000 Myr', () => {
    expect(() => builtInMagnitude(0.4, 10, 'H')).toThrow('massMjup must be between 0.5 and 80');
    expect(() => builtInMagnitude(5, 10_001, 'H')).toThrow('ageMyr must be between 1 and 10000');
  });

  test('Jupiter comes out at 36 K, far below what is measured: the known bias', () => {
    expect(isInsideLawValidity(1, 4560)).toBe(false);
  });
});
