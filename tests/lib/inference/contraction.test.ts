import { describe, expect, test } from 'vitest';
import {
  completenessWhileMoving,
  contractStack,
  contractStillAxis,
} from '@/lib/inference/contraction';
import { meanCompletenessOfStack, populationWeights } from '@/lib/population';
import { encodeMap } from '@/lib/sensitivity';
import { buildMaps, buildPowerLaw, GRID } from './build-maps';

const { maps } = buildMaps(7);
const populations = [-1.2, -0.3, 0, 0.8, 1.9].map((index) =>
  buildPowerLaw({ massIndex: index, semiMajorAxisIndex: -index / 2 }),
);
const weights = populations.map((population) => populationWeights(GRID, population));

/** Largest difference of two arrays of one length. */
function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  expect(a.length).toBe(b.length);
  return Array.from(a).reduce((most, value, i) => Math.max(most, Math.abs(value - b[i])), 0);
}

describe('contractStack', () => {
  test('gives the mean completeness of every star for each pair of weights', () => {
    const mass = weights.map((one) => one.mass);
    const axis = weights.slice(0, 3).map((one) => one.semiMajorAxis);
    const means = contractStack(maps, GRID, mass, axis);
    for (let i = 0; i < 5; i++) {
      for (let j = 0; j < 3; j++) {
        const pair = { mass: mass[i], semiMajorAxis: axis[j], shareOutsideMap: 0 };
        const direct = meanCompletenessOfStack(maps, pair);
        const start = (i * 3 + j) * 7;
        expect(largestDifference(means.subarray(start, start + 7), direct)).toBeLessThan(1e-14);
      }
    }
  });

  test('reads maps as they are stored', () => {
    const stored = encodeMap(maps);
    const mass = [weights[0].mass];
    const axis = [weights[1].semiMajorAxis];
    const direct = meanCompletenessOfStack(stored, {
      mass: mass[0],
      semiMajorAxis: axis[0],
      shareOutsideMap: 0,
    });
    expect(largestDifference(contractStack(stored, GRID, mass, axis), direct)).toBeLessThan(1e-14);
  });

  test('refuses maps and weights that do not fit the grid', () => {
    const { mass, semiMajorAxis } = weights[0];
    expect(() => contractStack(maps.subarray(1), GRID, [mass], [semiMajorAxis])).toThrow(
      'not a multiple of',
    );
    expect(() => contractStack(maps, GRID, [semiMajorAxis], [semiMajorAxis])).toThrow(
      'weights along the mass need',
    );
    expect(() => contractStack(maps, GRID, [], [semiMajorAxis])).toThrow(
      'there are no weights along the mass',
    );
  });
});

describe('while one axis moves', () => {
  test.each(['mass', 'semiMajorAxis'] as const)('the contracted maps are exact: %s', (moving) => {
    const still = moving === 'mass' ? weights[0].semiMajorAxis : weights[0].mass;
    for (const stack of [maps, encodeMap(maps)]) {
      const contracted = contractStillAxis(stack, GRID, moving, still);
      for (const one of weights) {
        const direct = meanCompletenessOfStack(stack, {
          mass: moving === 'mass' ? one.mass : still,
          semiMajorAxis: moving === 'mass' ? still : one.semiMajorAxis,
          shareOutsideMap: 0,
        });
        const actual = completenessWhileMoving(
          contracted,
          moving === 'mass' ? one.mass : one.semiMajorAxis,
        );
        expect(largestDifference(actual, direct)).toBeLessThan(1e-13);
      }
    }
  });

  test('weights of the other axis are refused', () => {
    const contracted = contractStillAxis(maps, GRID, 'mass', weights[0].semiMajorAxis);
    expect(() => completenessWhileMoving(contracted, weights[0].semiMajorAxis)).toThrow(
      'weights along the moving axis (mass) need',
    );
  });
});
