import { describe, expect, test } from 'vitest';
import { type RatePrior, ratePosterior, upperLimit } from '@/lib/inference';
import { limitMap, sumMaps } from '@/lib/inference/limit-map';
import { fractionLimits, numberLimit } from '@/lib/inference/node-limits';
import { encodeMap } from '@/lib/sensitivity';
import { buildMaps, GRID } from './build-maps';
import { buildCompleteness } from './build-question';

const STARS = 30;
const { maps } = buildMaps(STARS);
const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;

const numberPriors: RatePrior[] = [
  { law: 'uniform', max: 2 },
  { law: 'log-uniform', min: 1e-3, max: 1 },
  { law: 'jeffreys' },
  { law: 'jeffreys', max: 3 },
  { law: 'gamma', shape: 1.7, rate: 4 },
  { law: 'tabulated', value: [0, 0.2, 1], density: [3, 1, 0] },
];

describe('numberLimit', () => {
  test.each(numberPriors)('is the limit of the posterior with no detection: $law', (prior) => {
    const limitAt = numberLimit(prior, 0.95);
    for (const exposure of [1e-4, 0.3, 5, 60, 2000]) {
      const posterior = ratePosterior({
        likelihood: 'mean-number',
        completeness: Float64Array.of(exposure),
        detectedStars: [],
        prior,
      });
      const relative = limitAt(exposure).limit / upperLimit(posterior, 0.95) - 1;
      expect(Math.abs(relative)).toBeLessThan(1e-10);
    }
  });

  test('where nothing can be seen it is the prior, and marked so', () => {
    expect(numberLimit({ law: 'uniform', max: 2 }, 0.95)(0)).toEqual({
      limit: 1.9,
      setByPrior: true,
    });
    expect(numberLimit({ law: 'jeffreys' }, 0.95)(0).limit).toBe(Number.POSITIVE_INFINITY);
    expect(numberLimit({ law: 'uniform', max: 2 }, 0.95)(25).setByPrior).toBe(false);
    expect(() => numberLimit({ law: 'uniform', max: 2 }, 95)).toThrow('0.95, not 95');
  });
});

describe('fractionLimits', () => {
  const completeness = new Float64Array(5 * 40);
  completeness.set(buildCompleteness(40, 'usual'), 0);
  completeness.fill(1, 40, 80);
  completeness.fill(1e-3, 80, 120);
  completeness.set([1, 0.9, 0.9], 120);

  test.each<RatePrior>([
    { law: 'uniform', max: 1 },
    { law: 'uniform', max: 0.3 },
    { law: 'log-uniform', min: 1e-3, max: 1 },
    { law: 'beta', a: 0.5, b: 0.5 },
  ])('are the limits of the posterior at each node: $law', (prior) => {
    const limits = fractionLimits(completeness, 40, prior, 0.95);
    limits.forEach(({ limit, setByPrior }, node) => {
      const own = completeness.subarray(node * 40, (node + 1) * 40);
      const posterior = ratePosterior({
        likelihood: 'host-fraction',
        completeness: own,
        detectedStars: [],
        prior,
      });
      expect(Math.abs(limit / upperLimit(posterior, 0.95) - 1)).toBeLessThan(1e-10);
      expect(setByPrior).toBe(node === 4 || limit > 0.9 * 0.95 * posterior.support[1]);
    });
  });

  test('a rate that scales with the host cuts the fraction as in the posterior', () => {
    const rateScale = Float64Array.from({ length: 40 }, (_, star) => 0.5 + star / 20);
    const prior = { law: 'uniform', max: 1 } as const;
    const own = completeness.subarray(0, 40);
    const [{ limit }] = fractionLimits(own, 40, prior, 0.9, rateScale);
    const posterior = ratePosterior({
      likelihood: 'host-fraction',
      completeness: own,
      detectedStars: [],
      prior,
      rateScale,
    });
    expect(Math.abs(limit / upperLimit(posterior, 0.9) - 1)).toBeLessThan(1e-9);
  });
});

describe('limitMap', () => {
  const shared = { maps, grid: GRID, level: 0.95 };

  test('at a node it is the limit for companions that are all there', () => {
    const number = limitMap({ ...shared, likelihood: 'mean-number', prior: numberPriors[0] });
    const prior = { law: 'uniform', max: 1 } as const;
    const fraction = limitMap({ ...shared, likelihood: 'host-fraction', prior });
    const node = 20 * GRID.semiMajorAxisAu.length + 15;
    const own = Float64Array.from({ length: STARS }, (_, star) => maps[star * size + node]);
    const summed = own.reduce((a, b) => a + b);
    expect(number.summed[node]).toBeCloseTo(summed, 12);
    expect(number.limit[node]).toBeCloseTo(
      -Math.log(1 - 0.95 * (1 - Math.exp(-2 * summed))) / summed,
      12,
    );
    const posterior = ratePosterior({
      likelihood: 'host-fraction',
      completeness: own,
      detectedStars: [],
      prior,
    });
    expect(fraction.limit[node]).toBeCloseTo(upperLimit(posterior, 0.95), 10);
  });

  test('marks the nodes that the prior sets, and gives round contours for the rest', () => {
    const { limit, isSetByPrior, contourLevels } = limitMap({
      ...shared,
      likelihood: 'mean-number',
      prior: { law: 'uniform', max: 1 },
    });
    isSetByPrior.forEach((mark, node) => {
      expect(mark === 1).toBe(limit[node] > 0.9 * 0.95);
    });
    expect(contourLevels).toEqual([0.2, 0.5]);
  });

  test('a summed map and maps as they are stored give the same', () => {
    const whole = limitMap({ ...shared, likelihood: 'mean-number', prior: numberPriors[0] });
    const summed = { summed: sumMaps(maps, GRID), stars: STARS };
    const fromSum = limitMap({
      ...shared,
      maps: summed,
      likelihood: 'mean-number',
      prior: numberPriors[0],
    });
    expect(fromSum.limit).toEqual(whole.limit);
    const stored = sumMaps(encodeMap(maps), GRID);
    stored.forEach((value, node) => {
      expect(Math.abs(value - summed.summed[node])).toBeLessThan(STARS * 7.7e-6);
    });
    expect(() =>
      limitMap({ ...shared, maps: summed, likelihood: 'host-fraction', prior: numberPriors[0] }),
    ).toThrow("the host fraction needs each star's map");
    expect(() => sumMaps(maps, GRID, Float64Array.of(1, 2))).toThrow('got 2 for 30 stars');
  });
});
