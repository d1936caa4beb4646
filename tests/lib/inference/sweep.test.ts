import { describe, expect, test } from 'vitest';
import { answerQuestion, type Likelihood } from '@/lib/inference';
import type { PairQuestion } from '@/lib/inference/population-pairs';
import { sweepIndices, sweepLimits, withParameter } from '@/lib/inference/sweep';
import { tailLimits } from '@/lib/inference/tail-limits';
import type { Population } from '@/lib/population';
import { buildMaps, buildPowerLaw, GRID } from './build-maps';

const STARS = 25;
const { maps } = buildMaps(STARS);
const detections = [
  { star: 4, name: 'b', massMjup: 12, semiMajorAxisAu: 40 },
  { star: 4, name: 'c', massMjup: 25, semiMajorAxisAu: 150 },
  { star: 9, name: 'd', massMjup: 6, semiMajorAxisAu: 90 },
];

function question(overrides: Partial<PairQuestion> = {}): PairQuestion {
  return {
    maps,
    grid: GRID,
    population: buildPowerLaw(),
    likelihood: 'mean-number',
    prior: { law: 'uniform', max: 1 },
    detections,
    level: 0.95,
    ...overrides,
  };
}

/** The whole chain anew for one population. */
function direct(population: Population, asked: PairQuestion) {
  const { maps: all, grid, likelihood, prior, level, hostMassMsun } = asked;
  const shared = { maps: all, grid, population, likelihood, prior, level };
  const masses = hostMassMsun ? { hostMassMsun } : {};
  const found = answerQuestion({ ...shared, ...masses, detections: asked.detections });
  const none = answerQuestion({ ...shared, ...masses, detections: [] });
  return {
    limit: found.limit,
    none: none.limit,
    exposure: found.exposure,
    detections: found.counted.length,
    setByPrior: found.setByPrior,
    shareOutsideMap: found.shareOutsideMap,
  };
}

const likelihoods: Likelihood[] = ['mean-number', 'host-fraction'];

describe('sweepLimits', () => {
  test.each([
    ['semi-major-axis-max', [30, 60, 100, 400, 3000]],
    ['semi-major-axis-min', [5, 50, 120]],
    ['mass-min', [2, 8, 20]],
    ['mass-max', [10, 30, 60]],
    ['mass-index', [-1.5, 0, 0.7]],
    ['semi-major-axis-index', [-1, 0.4]],
  ] as const)('agrees with the whole chain at every value: %s', (over, values) => {
    for (const likelihood of likelihoods) {
      const asked = question({ likelihood });
      const sweep = sweepLimits(asked, over, Float64Array.from(values));
      values.forEach((value, at) => {
        const own = direct(withParameter(asked.population, over, value), asked);
        expect(sweep.limit[at]).toBeCloseTo(own.limit, 9);
        expect(sweep.limitWithoutDetections[at]).toBeCloseTo(own.none, 9);
        expect(sweep.exposure[at]).toBeCloseTo(own.exposure, 9);
        expect(sweep.detections[at]).toBe(own.detections);
        expect(sweep.isSetByPrior[at]).toBe(Number(own.setByPrior));
        expect(sweep.shareOutsideMap[at]).toBeCloseTo(own.shareOutsideMap, 9);
      });
    }
  });

  test('follows shaped populations, mass ratios and rates that scale with the host', () => {
    const hostMassMsun = Float64Array.from({ length: STARS }, (_, star) => 0.4 + 0.06 * star);
    const { massIndex, semiMajorAxisIndex, form, ...box } = buildPowerLaw();
    expect(form).toBe('power-law');
    const shaped: Population = {
      form: 'shaped',
      ...box,
      mass: { shape: 'power-law', index: massIndex },
      semiMajorAxis: { shape: 'log-normal', median: 50, sigmaDex: 0.5 },
      hostScaling: { index: 0.8, referenceMsun: 1 },
    };
    const ratio: Population = {
      form: 'mass-ratio',
      massRatioMin: 0.002,
      massRatioMax: 0.05,
      massRatioIndex: -0.5,
      semiMajorAxisMinAu: 5,
      semiMajorAxisMaxAu: 400,
      semiMajorAxis: { shape: 'power-law', index: semiMajorAxisIndex },
    };
    for (const population of [shaped, ratio]) {
      const asked = question({ population, hostMassMsun });
      const sweep = sweepLimits(asked, 'semi-major-axis-max', Float64Array.of(60, 250));
      [60, 250].forEach((value, at) => {
        const own = direct({ ...population, semiMajorAxisMaxAu: value }, asked);
        expect(sweep.limit[at]).toBeCloseTo(own.limit, 9);
        expect(sweep.detections[at]).toBe(own.detections);
      });
    }
    const asked = question({ population: shaped, hostMassMsun });
    expect(() => sweepLimits(asked, 'semi-major-axis-index', Float64Array.of(0))).toThrow(
      'follows a law of the kind log-normal',
    );
    expect(() =>
      sweepLimits(question({ population: ratio }), 'mass-max', Float64Array.of(9)),
    ).toThrow('needs ranges in mass that all stars share');
  });

  test('a value that leaves no range is refused', () => {
    expect(() => sweepLimits(question(), 'semi-major-axis-max', Float64Array.of(4))).toThrow(
      'the upper end must exceed the lower one',
    );
  });

  test('a box beyond the maps has no exposure and the limit of the prior', () => {
    const population = buildPowerLaw({ semiMajorAxisMinAu: 2000, semiMajorAxisMaxAu: 4000 });
    const sweep = sweepLimits(
      question({ population, detections: [] }),
      'semi-major-axis-max',
      Float64Array.of(3000),
    );
    expect(sweep.exposure[0]).toBe(0);
    expect(sweep.limit[0]).toBe(0.95);
    expect(sweep.isSetByPrior[0]).toBe(1);
    expect(sweep.shareOutsideMap[0]).toBe(1);
  });
});

test('sweepIndices agrees with the whole chain over the plane', () => {
  const asked = question({ likelihood: 'host-fraction' });
  const plane = sweepIndices(asked, Float64Array.of(-1.2, 0.3), Float64Array.of(-0.5, 0, 0.9));
  [-1.2, 0.3].forEach((massIndex, i) => {
    [-0.5, 0, 0.9].forEach((semiMajorAxisIndex, j) => {
      const own = direct(buildPowerLaw({ massIndex, semiMajorAxisIndex }), asked);
      expect(plane.limit[i * 3 + j]).toBeCloseTo(own.limit, 9);
    });
  });
});

describe('tailLimits', () => {
  test('cut the population at each corner, normalise it anew and count what lies beyond', () => {
    for (const likelihood of likelihoods) {
      const asked = question({ likelihood });
      const tails = tailLimits(asked, Float64Array.of(2, 10, 30), Float64Array.of(5, 80));
      [2, 10, 30].forEach((massMinMjup, i) => {
        [5, 80].forEach((semiMajorAxisMinAu, j) => {
          const own = direct(buildPowerLaw({ massMinMjup, semiMajorAxisMinAu }), asked);
          expect(tails.limit[i * 2 + j]).toBeCloseTo(own.limit, 9);
          expect(tails.detections[i * 2 + j]).toBe(own.detections);
        });
      });
    }
  });

  test('stand at the nodes of the grid inside the ranges unless corners are given', () => {
    const { massMjup, semiMajorAxisAu, limit } = tailLimits(question());
    expect(massMjup[0]).toBeGreaterThanOrEqual(2);
    expect(massMjup[massMjup.length - 1]).toBeLessThan(60);
    expect(limit.length).toBe(massMjup.length * semiMajorAxisAu.length);
    expect(limit.every((one) => one > 0)).toBe(true);
  });

  test('where nothing of a tail can be seen there is no limit', () => {
    const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
    const blind = maps.map((c, at) => ((at % size) % GRID.semiMajorAxisAu.length > 20 ? 0 : c));
    const asked = question({ maps: blind, detections: [] });
    const { limit } = tailLimits(asked, Float64Array.of(2), Float64Array.of(20, 200));
    expect(limit[0]).toBeGreaterThan(0);
    expect(limit[1]).toBeNaN();
  });

  test('corners outside the ranges and tables of systems are refused', () => {
    expect(() => tailLimits(question(), Float64Array.of(1))).toThrow(
      'a corner at 1 M_Jup lies outside 2 to 60',
    );
    const population: Population = {
      form: 'systems',
      weight: [1],
      companionSystem: [0],
      massMjup: [10],
      semiMajorAxisAu: [50],
    };
    expect(() => tailLimits(question({ population }))).toThrow('a table of systems does not have');
  });
});
