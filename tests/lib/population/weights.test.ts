import { readFileSync } from 'node:fs';
import path from 'node:path';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { logSpacedAxis } from '@/lib/numerics/grid';
import {
  meanCompleteness,
  meanCompletenessOfStack,
  type PowerLawPopulation,
  populationWeights,
} from '@/lib/population';

const grid = {
  massMjup: logSpacedAxis(0.5, 80, 20),
  semiMajorAxisAu: logSpacedAxis(1, 1000, 24),
};

function buildPopulation(overrides: Partial<PowerLawPopulation> = {}): PowerLawPopulation {
  return {
    form: 'power-law',
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 20,
    semiMajorAxisMaxAu: 300,
    massIndex: -0.3,
    semiMajorAxisIndex: 0.4,
    ...overrides,
  };
}

const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0);
const index = fc.double({ min: -3, max: 3, noNaN: true });

describe('populationWeights', () => {
  it('add to one inside the map, whatever the indices and edges', () => {
    fc.assert(
      fc.property(
        index,
        index,
        fc.double({ min: 0.6, max: 9, noNaN: true }),
        fc.double({ min: 10, max: 79, noNaN: true }),
        (massIndex, semiMajorAxisIndex, massMinMjup, massMaxMjup) => {
          const population = buildPopulation({
            massIndex,
            semiMajorAxisIndex,
            massMinMjup,
            massMaxMjup,
          });
          const weights = populationWeights(grid, population);
          expect(sum(weights.mass)).toBeCloseTo(1, 12);
          expect(sum(weights.semiMajorAxis)).toBeCloseTo(1, 12);
          expect(weights.shareOutsideMap).toBe(0);
        },
      ),
    );
  });

  it('integrate a map linear in ln m and ln a exactly', () => {
    const population = buildPopulation({ massIndex: 0, semiMajorAxisIndex: 0 });
    const weights = populationWeights(grid, population);
    const map = new Float64Array(20 * 24);
    for (let i = 0; i < 20; i++) {
      for (let j = 0; j < 24; j++) {
        map[i * 24 + j] = Math.log(grid.massMjup[i]) + 2 * Math.log(grid.semiMajorAxisAu[j]);
      }
    }
    const centre = 0.5 * Math.log(2 * 30) + 2 * 0.5 * Math.log(20 * 300);
    expect(meanCompleteness(map, weights)).toBeCloseTo(centre, 12);
  });

  it('count nothing outside the map and report the share there', () => {
    const population = buildPopulation({
      massIndex: 0,
      semiMajorAxisIndex: 0,
      semiMajorAxisMinAu: 100,
      semiMajorAxisMaxAu: 10_000,
    });
    const weights = populationWeights(grid, population);
    expect(weights.shareOutsideMap).toBeCloseTo(0.5, 12);
    expect(sum(weights.semiMajorAxis)).toBeCloseTo(0.5, 12);
  });

  it('refuse a population entirely outside the map', () => {
    const outside = buildPopulation({ massMinMjup: 90, massMaxMjup: 100 });
    expect(() => populationWeights(grid, outside)).toThrow(/entirely outside/);
  });

  it('move smoothly with a box edge that passes a node', () => {
    const map = Float64Array.from({ length: 20 * 24 }, (_, i) => ((i * 37) % 100) / 100);
    const at = (massMinMjup: number) =>
      meanCompleteness(map, populationWeights(grid, buildPopulation({ massMinMjup })));
    const node = grid.massMjup[8];
    expect(Math.abs(at(node * (1 + 1e-9)) - at(node * (1 - 1e-9)))).toBeLessThan(1e-8);
  });

  it.each([
    ['mean completeness under power-law A', -0.31, 0.39],
    ['mean completeness under power-law at index 0', 0, 0],
  ])('agree with an adaptive double integral: %s', (name, massIndex, semiMajorAxisIndex) => {
    const file = path.resolve(import.meta.dirname, '../../reference/checks/combination.json');
    const { checks } = JSON.parse(readFileSync(file, 'utf8')) as {
      checks: {
        name: string;
        inputs: { map: { masses_mjup: number[]; axes_au: number[]; values: number[][] } };
        expected: number;
      }[];
    };
    const check = checks.find((one) => one.name === name);
    if (check === undefined) throw new Error(`no check called ${name}`);
    const { map } = check.inputs;
    const weights = populationWeights(
      {
        massMjup: Float64Array.from(map.masses_mjup),
        semiMajorAxisAu: Float64Array.from(map.axes_au),
      },
      buildPopulation({
        massIndex,
        semiMajorAxisIndex,
        massMinMjup: 3,
        massMaxMjup: 40,
        semiMajorAxisMinAu: 10,
        semiMajorAxisMaxAu: 200,
      }),
    );
    const got = meanCompleteness(Float64Array.from(map.values.flat()), weights);
    expect(Math.abs(got / check.expected - 1)).toBeLessThan(1e-7);
  });
});

describe('meanCompletenessOfStack', () => {
  const weights = populationWeights(grid, buildPopulation());

  it('gives each map what meanCompleteness gives it', () => {
    const size = 20 * 24;
    const stack = Float64Array.from({ length: 3 * size }, (_, i) => ((i * 31) % 997) / 997);
    const means = meanCompletenessOfStack(stack, weights);
    expect(means).toHaveLength(3);
    for (let star = 0; star < 3; star++) {
      const map = stack.slice(star * size, (star + 1) * size);
      expect(means[star]).toBeCloseTo(meanCompleteness(map, weights), 13);
    }
  });

  it('reads stored 16-bit maps, full scale as 1', () => {
    const stack = new Uint16Array(20 * 24).fill(65_535);
    expect(meanCompletenessOfStack(stack, weights)[0]).toBeCloseTo(1, 12);
  });

  it('refuses a stack that is not a whole number of maps', () => {
    expect(() => meanCompletenessOfStack(new Float64Array(481), weights)).toThrow(/multiple/);
    expect(() => meanCompleteness(new Float64Array(481), weights)).toThrow(/481/);
  });
});
