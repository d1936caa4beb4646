import { describe, expect, test, vi } from 'vitest';
import { logSpacedAxis } from '@/lib/numerics/grid';
import {
  type AgeOfStar,
  ageQuantile,
  type CoolingRelation,
  computeCompletenessMap,
  type MapGrid,
  simulateCompleteness,
  warmUpMaps,
} from '@/lib/sensitivity';
import {
  type AgeSide,
  ageSides,
  NORMAL_STEPS_PER_SIGMA,
  normalTable,
  writeSide,
} from '@/lib/sensitivity/age-sides';
import { plainKernels } from '@/lib/sensitivity/kernels/plain';
import { HINTS, SIDE } from '@/lib/sensitivity/kernels/steps/age-spread';
import { buildCurve, buildSettings, buildStar } from './build-star';

// A shared machine may be slow: minutes are not expected.
vi.setConfig({ testTimeout: 120_000 });

const builtIn = { kind: 'built-in' } as const;
const grid: MapGrid = {
  massMjup: logSpacedAxis(2, 60, 6),
  semiMajorAxisAu: logSpacedAxis(6, 500, 7),
};
const wide = { medianMyr: 120, lowerMyr: 55, upperMyr: 270, minMyr: 5, maxMyr: 5000 };
const group = { medianMyr: 24, lowerMyr: 21, upperMyr: 27 };
const field = { medianMyr: 1000, minMyr: 200, maxMyr: 5000 };
const mixture: AgeOfStar = {
  mixture: [
    { probability: 0.7, age: group },
    { probability: 0.3, age: field },
  ],
};
const flat = buildCurve({
  separationArcsec: Float64Array.of(0.15, 0.4, 1.5, 3),
  contrastMag: Float64Array.of(9, 12.6, 12.6, 11.8),
});
const covered = buildCurve({ coverage: Float64Array.of(1, 1, 0.9, 0.9, 0.8, 0.3) });

const stars = [
  ['a wide age', buildStar({ age: wide })],
  ['a mixture of ages', buildStar({ age: mixture })],
  ['a flat curve', buildStar({ age: wide, curves: [flat] })],
  ['a coverage that varies', buildStar({ age: group, curves: [covered] })],
  ['an age without error', buildStar({ age: { medianMyr: 24 }, curves: [flat] })],
] as const;

describe('maps with exact ages agree with simulation', () => {
  const DRAWS = 8000;
  // 42 cells by ten maps: 4.2 standard errors are passed by chance once in a hundred runs of seeds.
  const MOST_ERRORS = 4.2;
  for (const threshold of ['smooth', 'hard'] as const) {
    test.each(stars)(`${threshold} threshold, %s, in every cell`, (name, star) => {
      const settings = buildSettings({ threshold });
      const { completeness } = computeCompletenessMap(star, builtIn, grid, settings).map;
      const columns = grid.semiMajorAxisAu.length;
      completeness.forEach((value, cell) => {
        const drawn = simulateCompleteness(
          star,
          builtIn,
          grid.massMjup[Math.floor(cell / columns)],
          grid.semiMajorAxisAu[cell % columns],
          settings,
          DRAWS,
          `${name} ${threshold} ${cell}`,
        );
        const error = Math.sqrt((value * (1 - value)) / DRAWS) + 1 / DRAWS;
        expect(Math.abs(drawn.completeness - value)).toBeLessThan(MOST_ERRORS * error);
      });
    });
  }
});

describe('maps with exact ages agree with many age nodes', () => {
  const map = (star: (typeof stars)[number][1], settings: Parameters<typeof buildSettings>[0]) =>
    computeCompletenessMap(star, builtIn, grid, buildSettings(settings)).map.completeness;
  for (const threshold of ['smooth', 'hard'] as const) {
    test.each(stars)(`${threshold} threshold, %s`, (_, star) => {
      const exact = map(star, { threshold });
      const nodes = map(star, { threshold, ageNodesPerSide: 80 });
      exact.forEach((value, cell) => {
        // Under the hard rule a flat stretch appears node by node, each with up to 1 % of the age.
        expect(Math.abs(value - nodes[cell])).toBeLessThan(threshold === 'hard' ? 5e-3 : 1e-3);
      });
    });
  }
});

describe('a cooling table', () => {
  const ageMyr = Float64Array.of(5, 20, 60, 200, 900);
  const massMjup = Float64Array.of(2, 5, 15, 60);
  /** One mass brightens for a while, as burning deuterium makes it. */
  const H = Float64Array.of(
    ...[16, 17.5, 19, 21, 24],
    ...[13.5, 15, 14.4, 17, 20],
    ...[10.5, 12, 13.4, 15.5, 17.8],
    ...[7.5, 8.2, 9.5, 11, 13],
  );
  const table = (magnitudes: Float64Array): CoolingRelation => ({
    kind: 'table',
    table: { name: 'test', massMjup, ageMyr, magnitudes: { H: magnitudes } },
  });
  const missing = H.slice();
  missing[4] = Number.NaN;
  missing[19] = Number.NaN;
  const star = buildStar({ age: { ...wide, maxMyr: 800 } });
  const masses = { ...grid, massMjup: Float64Array.of(2.5, 4, 9, 25, 59, 70) };
  for (const massOutsideTable of ['undetectable', 'edge'] as const) {
    test.each([
      ['that is not monotone in age', H],
      ['with missing entries', missing],
    ])(`%s, masses outside ${massOutsideTable}, as with many nodes`, (_, magnitudes) => {
      for (const threshold of ['smooth', 'hard'] as const) {
        const settings = buildSettings({ threshold, massOutsideTable });
        const exact = computeCompletenessMap(star, table(magnitudes), masses, settings);
        const nodes = computeCompletenessMap(star, table(magnitudes), masses, {
          ...settings,
          ageNodesPerSide: 80,
        });
        exact.map.completeness.forEach((value, cell) => {
          expect(Math.abs(value - nodes.map.completeness[cell])).toBeLessThan(3e-3);
        });
        expect(exact.map.completeness.some((value) => value > 0.1)).toBe(true);
      }
    });
  }

  test('ages outside are refused by the same nodes as ever, or take the nearest age', () => {
    const old = buildStar({ age: { medianMyr: 800, lowerMyr: 500, upperMyr: 1300 } });
    const run = (ageOutsideTable: 'refuse' | 'edge') =>
      computeCompletenessMap(old, table(H), masses, buildSettings({ ageOutsideTable }));
    expect(() => run('refuse')).toThrow('age node of Star 01 must be between 5 and 900 Myr');
    expect(run('edge').report.ageNodesClamped).toBeGreaterThan(0);
  });
});

/** P(age < e^x) of a side as the kernels tell it, and its integral. */
function momentsAt(side: AgeSide, x: number): { chance: number; area: number } {
  const table = normalTable();
  const memory = plainKernels.reserve(SIDE + table.length + HINTS);
  writeSide(side, memory.subarray(0, SIDE));
  memory.set(table, SIDE);
  plainKernels.setSides(0, 1, SIDE, 1 / NORMAL_STEPS_PER_SIGMA, SIDE + table.length);
  return { chance: plainKernels.chanceBefore(0, x), area: plainKernels.areaHere() };
}

describe('ageSides(age)', () => {
  test.each([
    ['percentiles', wide],
    ['percentiles of one side', { medianMyr: 24, lowerMyr: 24, upperMyr: 31 }],
    ['hard bounds alone', field],
    ['percentiles cut by bounds', { ...group, minMyr: 22, maxMyr: 40 }],
  ])('has the chances of the quantile function: %s', (_, law) => {
    const { sides, points } = ageSides(law);
    const quantile = ageQuantile(law);
    const single = points.weights.reduce((a, b) => a + b, 0);
    const whole = sides.reduce((sum, { weight }) => sum + weight, single);
    expect(whole).toBeCloseTo(1, 14);
    for (const p of [0.02, 0.2, 0.45, 0.55, 0.8, 0.98]) {
      const x = Math.log(quantile(p));
      let below = points.values.every((age) => age < quantile(p)) ? single : 0;
      for (const side of sides) below += momentsAt(side, x).chance;
      const isAtom = points.values.includes(quantile(p));
      if (!isAtom) expect(Math.abs(below - p)).toBeLessThan(4e-6);
    }
  });

  test('the area has the chance as its slope', () => {
    for (const side of [...ageSides(wide).sides, ...ageSides(field).sides]) {
      const middle = 0.3 * side.from + 0.7 * side.to;
      const step = 1e-4;
      const [before, here, after] = [middle - step, middle, middle + step].map((x) =>
        momentsAt(side, x),
      );
      expect((after.area - before.area) / (2 * step)).toBeCloseTo(here.chance, 6);
    }
  });
});

test('warming up leaves no trace in the numbers', () => {
  const [, star] = stars[0];
  const map = () => computeCompletenessMap(star, builtIn, grid, buildSettings()).map.completeness;
  const before = map();
  expect(warmUpMaps()).toBeGreaterThan(0);
  expect(map()).toEqual(before);
});
