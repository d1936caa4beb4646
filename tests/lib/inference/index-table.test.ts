import { describe, expect, test } from 'vitest';
import { indexNodes, interpolationRows } from '@/lib/inference/index-nodes';
import { completenessAtIndices, indexTable } from '@/lib/inference/index-table';
import { meanCompletenessOfStack, populationWeights } from '@/lib/population';
import { buildMaps, buildPowerLaw, GRID } from './build-maps';

const STARS = 30;
const { maps } = buildMaps(STARS);
const box = buildPowerLaw();
const indices = {
  massIndex: { min: -2, max: 1 },
  semiMajorAxisIndex: { min: -2, max: 1 },
};

function direct(massIndex: number, semiMajorAxisIndex: number): Float64Array {
  const population = buildPowerLaw({ massIndex, semiMajorAxisIndex });
  return meanCompletenessOfStack(maps, populationWeights(GRID, population));
}

function largestError(nodes: number): number {
  const table = indexTable(maps, GRID, box, indices, nodes);
  let worst = 0;
  for (const alpha of [-2, -1.37, 0, 0.61, 1]) {
    for (const beta of [-2, -0.88, 0.3, 1]) {
      const exact = direct(alpha, beta);
      completenessAtIndices(table, alpha, beta).forEach((value, star) => {
        worst = Math.max(worst, Math.abs(value - exact[star]));
      });
    }
  }
  return worst;
}

describe('indexTable', () => {
  test('holds the mean completeness of every star at its nodes, and their sums', () => {
    const table = indexTable(maps, GRID, box, indices);
    const { massIndex, semiMajorAxisIndex, completeness } = table;
    expect(completeness?.length).toBe(12 * 12 * STARS);
    for (const [i, j] of [
      [0, 0],
      [3, 11],
      [7, 2],
    ]) {
      const exact = direct(massIndex.at[i], semiMajorAxisIndex.at[j]);
      const node = i * 12 + j;
      exact.forEach((value, star) => {
        expect(completeness?.[node * STARS + star]).toBeCloseTo(value, 13);
      });
      expect(table.exposure[node]).toBeCloseTo(
        exact.reduce((a, b) => a + b),
        11,
      );
    }
  });

  test('a summed map gives the same exposures, and no stars', () => {
    const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
    const summed = new Float64Array(size);
    maps.forEach((value, at) => {
      summed[at % size] += value;
    });
    const whole = indexTable(maps, GRID, box, indices, 5);
    const fromSum = indexTable({ summed, stars: STARS }, GRID, box, indices, 5);
    whole.exposure.forEach((value, node) => {
      expect(fromSum.exposure[node]).toBeCloseTo(value, 10);
    });
    expect(fromSum.completeness).toBeNull();
    expect(() => completenessAtIndices(fromSum, 0, 0)).toThrow('holds no stars');
  });

  test('interpolates to any pair of indices, corners included: 3e-4 with 12 nodes', () => {
    expect(largestError(12)).toBeLessThan(3e-4);
    expect(largestError(16)).toBeLessThan(2e-5);
  });

  test('a box that exceeds the maps leaves its share outside at every node', () => {
    const wide = buildPowerLaw({ semiMajorAxisMaxAu: 4000 });
    const table = indexTable(maps, GRID, wide, indices, 4);
    const { massIndex, semiMajorAxisIndex, shareOutsideMap } = table;
    const population = { ...wide, massIndex: massIndex.at[1] };
    const own = populationWeights(GRID, {
      ...population,
      semiMajorAxisIndex: semiMajorAxisIndex.at[2],
    });
    expect(shareOutsideMap[1 * 4 + 2]).toBeCloseTo(own.shareOutsideMap, 12);
  });

  test('an index outside its range is refused', () => {
    const table = indexTable(maps, GRID, box, indices, 4);
    expect(() => completenessAtIndices(table, 1.2, 0)).toThrow(
      'holds indices from -2 to 1, not 1.2',
    );
    expect(() => indexNodes({ min: 1, max: 1 }, 4)).toThrow('must increase');
  });
});

test('interpolationRows carry a polynomial of their degree exactly, ends included', () => {
  const nodes = indexNodes({ min: -1, max: 3 }, 6);
  const polynomial = (x: number) => 1 + x * (2 - x * (0.5 + x * (0.1 - 0.03 * x * x)));
  const places = Float64Array.of(-1, -0.2, nodes.at[2], 1.9, 3);
  const rows = interpolationRows(nodes, places);
  places.forEach((x, at) => {
    let sum = 0;
    for (let i = 0; i < 6; i++) sum += rows[at * 6 + i] * polynomial(nodes.at[i]);
    expect(sum).toBeCloseTo(polynomial(x), 12);
  });
});
