import { describe, expect, test } from 'vitest';
import { viewPopulation } from '@/lib/inference';
import {
  bayesFactorWords,
  type EvidenceSettings,
  populationEvidence,
} from '@/lib/inference/evidence';
import { comparePopulations } from '@/lib/inference/population-comparison';
import { populationDensity } from '@/lib/population';
import { buildMaps, buildPowerLaw, GRID } from './build-maps';

const { maps } = buildMaps(25);
const steep = buildPowerLaw({ massIndex: -1.5 });
const flat = buildPowerLaw({ massIndex: 0 });
const near = buildPowerLaw({ semiMajorAxisMaxAu: 60 });
const views = {
  steep: viewPopulation(maps, GRID, steep),
  flat: viewPopulation(maps, GRID, flat),
  near: viewPopulation(maps, GRID, near),
};
const heavy = { star: 2, name: 'b', massMjup: 30, semiMajorAxisAu: 100 };
const settings: EvidenceSettings = {
  likelihood: 'mean-number',
  prior: { law: 'uniform', max: 1 },
  detections: [],
};

describe('populationEvidence', () => {
  test('without detections it is the closed form (1 - exp(-x S))/(x S)', () => {
    const { exposure } = views.flat;
    const { logEvidence, logShapes } = populationEvidence(views.flat, settings);
    expect(logEvidence).toBeCloseTo(Math.log(-Math.expm1(-exposure) / exposure), 10);
    expect(logShapes).toBe(0);
  });

  test('a detection multiplies the density of the population where it was found', () => {
    const { logShapes } = populationEvidence(views.steep, { ...settings, detections: [heavy] });
    expect(logShapes).toBeCloseTo(Math.log(populationDensity(steep, 30, 100)), 12);
  });

  test('the rate of the detected star over the one asked for is part of the evidence', () => {
    const masses = Float64Array.from({ length: 25 }, (_, star) => 0.5 + 0.05 * star);
    const scaled = buildPowerLaw({ hostScaling: { index: 1.5, referenceMsun: 1 } });
    const view = viewPopulation(maps, GRID, scaled, masses);
    const plain = viewPopulation(maps, GRID, buildPowerLaw());
    const asked = { ...settings, detections: [heavy] };
    const own = Math.log(masses[2] ** 1.5);
    const difference =
      populationEvidence(view, asked).logShapes - populationEvidence(plain, asked).logShapes;
    expect(difference).toBeCloseTo(own, 12);
  });

  test('a prior without an end is refused: its evidence would be arbitrary', () => {
    const improper = { ...settings, prior: { law: 'jeffreys' } } as const;
    expect(() => populationEvidence(views.flat, improper)).toThrow('would be arbitrary');
  });

  test('a table of systems has no density for a detection, and says so', () => {
    const view = viewPopulation(maps, GRID, {
      form: 'systems',
      weight: [0.5, 0.5],
      companionSystem: [0],
      massMjup: [10],
      semiMajorAxisAu: [50],
    });
    const fraction = { ...settings, likelihood: 'host-fraction' } as const;
    expect(populationEvidence(view, fraction).logEvidence).toBeLessThan(0);
    const found = populationEvidence(view, { ...fraction, detections: [heavy] });
    expect(found.logEvidence).toBeNull();
    expect(found.fault).toContain('no density');
  });
});

describe('comparePopulations', () => {
  const populations = [
    { name: 'steep', view: views.steep },
    { name: 'flat', view: views.flat },
    { name: 'near', view: views.near },
  ];

  test('a heavy companion favours the law that has more of them', () => {
    const { rows, priorRange } = comparePopulations(populations.slice(0, 2), {
      ...settings,
      detections: [heavy],
    });
    expect(rows[0].logBayesFactor).toBe(0);
    expect(rows[1].logBayesFactor).toBeGreaterThan(0);
    expect(rows[1].logBayesFactor).toBeCloseTo(
      (rows[1].logEvidence ?? 0) - (rows[0].logEvidence ?? 0),
      12,
    );
    expect(priorRange).toEqual([0, 1]);
  });

  test('a detection outside the ranges of one population leaves it no evidence, with the reason', () => {
    const { rows } = comparePopulations(populations, { ...settings, detections: [heavy] });
    expect(rows[2].logEvidence).toBe(Number.NEGATIVE_INFINITY);
    expect(rows[2].logBayesFactor).toBe(Number.NEGATIVE_INFINITY);
    expect(rows[2].fault).toBe('b lies outside the ranges of this population');
    expect(rows[2].detections).toBe(0);
    const turned = comparePopulations([populations[2], populations[2], populations[0]], {
      ...settings,
      detections: [heavy],
    });
    expect(turned.rows[1].logBayesFactor).toBeNull();
    expect(turned.rows[2].logBayesFactor).toBe(Number.POSITIVE_INFINITY);
  });

  test('what lies in no ranges is set aside, and a star counts once for the host fraction', () => {
    const far = { ...heavy, name: 'far', semiMajorAxisAu: 900 };
    const second = { ...heavy, name: 'c', massMjup: 12 };
    const { explained, setAside } = comparePopulations(populations, {
      ...settings,
      likelihood: 'host-fraction',
      detections: [far, heavy, second],
    });
    expect(explained.map(({ name }) => name)).toEqual(['b']);
    expect(setAside.map(({ name }) => name)).toEqual(['far', 'c']);
  });

  test('no population is refused', () => {
    expect(() => comparePopulations([], settings)).toThrow('no population to weigh');
  });
});

// Kass & Raftery 1995, section 3.2: 2 ln B of 0 to 2, 2 to 6, 6 to 10, above 10.
test.each([
  [0, 'not worth more than a bare mention'],
  [0.99, 'not worth more than a bare mention'],
  [-1.01, 'positive'],
  [3.5, 'strong'],
  [5.01, 'very strong'],
  [Number.POSITIVE_INFINITY, 'very strong'],
])('ln B of %s is called %s', (logBayesFactor, words) => {
  expect(bayesFactorWords(logBayesFactor)).toEqual({ words, source: 'Kass & Raftery 1995' });
});
