import { describe, expect, test, vi } from 'vitest';
import { computeCompletenessMap, simulateCompleteness } from '@/lib/sensitivity';
import { buildCurve, buildSettings, buildStar } from './build-star';

vi.setConfig({ testTimeout: 60_000 });

const builtIn = { kind: 'built-in' } as const;
const DRAWS = 20_000;

describe('simulateCompleteness agrees with the integral within 4 standard errors', () => {
  const covered = buildCurve({ coverage: Float64Array.of(1, 1, 1, 0.9, 0.7, 0.3) });
  const cases = [
    { name: 'smooth, Beta law', star: buildStar(), settings: buildSettings() },
    {
      name: 'hard, circular, exact age and distance',
      star: buildStar({ age: { medianMyr: 24 }, distance: { distancePc: 33, errorPc: 0 } }),
      settings: buildSettings({ threshold: 'hard', eccentricity: { law: 'circular' } }),
    },
    {
      name: 'two curves, Rayleigh law, parallax',
      star: buildStar({
        curves: [covered, buildCurve({ nSigma: 4 })],
        distance: { parallaxMas: 30, errorMas: 1 },
      }),
      settings: buildSettings({ eccentricity: { law: 'rayleigh', sigma: 0.3 } }),
    },
    {
      name: 'hard bounds of age, uniform eccentricities',
      star: buildStar({ age: { medianMyr: 30, minMyr: 15, maxMyr: 60 } }),
      settings: buildSettings({ eccentricity: { law: 'uniform', max: 0.95 } }),
    },
    {
      name: 'member of a young group or star of the field, with a candidate cut',
      star: buildStar({
        membershipProbability: 0.7,
        candidates: [{ separationArcsec: 0.8, contrastMag: 11 }, { separationArcsec: 2.5 }],
      }),
      settings: buildSettings({
        candidates: { halfWidthArcsec: 0.1 },
        fieldAge: { minMyr: 200, maxMyr: 5000 },
      }),
    },
  ];
  for (const { name, star, settings } of cases) {
    test(name, () => {
      for (const [massMjup, axisAu] of [
        [6, 25],
        [10, 90],
        [20, 250],
      ]) {
        const seed = `${name} ${massMjup}`;
        const drawn = simulateCompleteness(star, builtIn, massMjup, axisAu, settings, DRAWS, seed);
        const grid = {
          massMjup: Float64Array.of(massMjup),
          semiMajorAxisAu: Float64Array.of(axisAu),
        };
        const many = { ...settings, ageNodesPerSide: 60 };
        const [integral] = computeCompletenessMap(star, builtIn, grid, many).map.completeness;
        const floor = 1 / DRAWS;
        expect(Math.abs(drawn.completeness - integral)).toBeLessThan(
          4 * Math.max(drawn.standardError, floor),
        );
      }
    });
  }
});

test('the same seed gives the same answer, another seed another', () => {
  const run = (seed: string) =>
    simulateCompleteness(buildStar(), builtIn, 6, 25, buildSettings(), 2000, seed);
  expect(run('one')).toEqual(run('one'));
  expect(run('one').completeness).not.toBe(run('three').completeness);
});

test('refuses a number of draws below 1 and an axis that is not positive', () => {
  const run = (axis: number, draws: number) => () =>
    simulateCompleteness(buildStar(), builtIn, 6, axis, buildSettings(), draws, 's');
  expect(run(25, 0)).toThrow('draws must be an integer >= 1, got 0');
  expect(run(0, 10)).toThrow('semiMajorAxisAu must be finite and > 0, got 0');
});
