import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { describeLimit, describePopulation, viewPopulation } from '@/lib/inference';
import { logSpacedAxis } from '@/lib/numerics/grid';
import {
  checkPopulation,
  drawCompanions,
  drawSystems,
  isInside,
  type MassRatioPopulation,
  type Population,
  populationBox,
  populationWarnings,
  populationWeights,
  requireHostMasses,
  type ShapedPopulation,
  type SystemsPopulation,
  sampleBox,
  sampleCompleteness,
  toStoredPopulation,
} from '@/lib/population';

const grid = { massMjup: logSpacedAxis(0.5, 80, 12), semiMajorAxisAu: logSpacedAxis(1, 1000, 14) };
const size = 12 * 14;
const axisRange = { semiMajorAxisMinAu: 5, semiMajorAxisMaxAu: 400 };

const shaped: ShapedPopulation = {
  form: 'shaped',
  massMinMjup: 1,
  massMaxMjup: 40,
  ...axisRange,
  mass: { shape: 'broken-power-law', breakAt: 10, innerIndex: -0.3, outerIndex: -2 },
  semiMajorAxis: { shape: 'log-normal', median: 40, sigmaDex: 0.5 },
};
const ratio: MassRatioPopulation = {
  form: 'mass-ratio',
  massRatioMin: 0.002,
  massRatioMax: 0.03,
  massRatioIndex: -0.7,
  ...axisRange,
  semiMajorAxis: { shape: 'power-law', index: 0.2 },
};
const systems: SystemsPopulation = {
  form: 'systems',
  weight: [3, 1, 2],
  companionSystem: [1, 1, 2],
  massMjup: [2, 5, 20],
  semiMajorAxisAu: [10, 40, 2000],
};
const sum = (values: Float64Array) => values.reduce((a, b) => a + b, 0);
const uneven = (stars: number) =>
  Float64Array.from({ length: stars * size }, (_, i) => ((i * 37) % 101) / 101);

describe('populationWeights of shaped laws', () => {
  it('add to the share inside the map, and a map of ones gives that share', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 200, noNaN: true }),
        fc.double({ min: 0.15, max: 2, noNaN: true }),
        fc.double({ min: 500, max: 5000, noNaN: true }),
        (median, sigmaDex, semiMajorAxisMaxAu) => {
          const population: Population = {
            ...shaped,
            semiMajorAxisMaxAu,
            semiMajorAxis: { shape: 'log-normal', median, sigmaDex },
          };
          const weights = populationWeights(grid, population);
          const inside = sum(weights.mass) * sum(weights.semiMajorAxis);
          expect(inside).toBeCloseTo(1 - weights.shareOutsideMap, 8);
          const ones = sampleCompleteness(new Float64Array(size).fill(1), grid, population);
          expect(ones.perStar[0]).toBeCloseTo(1 - weights.shareOutsideMap, 8);
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe('a population in the mass ratio', () => {
  const hosts = Float64Array.of(0.4, 1, 1, 2.5);
  const maps = uneven(4);

  it('gives each star what a box in mass of its own gives it', () => {
    const { perStar } = sampleCompleteness(maps, grid, ratio, hosts);
    hosts.forEach((host, star) => {
      const alone: Population = {
        form: 'shaped',
        ...populationBox(ratio, host),
        mass: { shape: 'power-law', index: ratio.massRatioIndex },
        semiMajorAxis: ratio.semiMajorAxis,
      };
      const own = maps.slice(star * size, (star + 1) * size);
      expect(perStar[star]).toBeCloseTo(sampleCompleteness(own, grid, alone).perStar[0], 13);
    });
  });

  it('names the stars without a mass', () => {
    const unknown = Float64Array.of(0.4, Number.NaN, 1, 2.5);
    expect(() => sampleCompleteness(maps, grid, ratio, unknown)).toThrow(/star 2$/);
    expect(() => requireHostMasses(ratio, unknown, 4, ['A', 'B', 'C', 'D'])).toThrow(/for B$/);
    expect(() => requireHostMasses(shaped, undefined, 4)).not.toThrow();
  });

  it('has a box that follows the host', () => {
    expect(isInside(ratio, 3, 20, 1)).toBe(true);
    expect(isInside(ratio, 3, 20, 2.5)).toBe(false);
    expect(() => isInside(ratio, 3, 20)).toThrow(/needs the mass/);
    const box = sampleBox(ratio, hosts);
    expect(box?.massMinMjup).toBe(populationBox(ratio, 0.4).massMinMjup);
    expect(box?.massMaxMjup).toBe(populationBox(ratio, 2.5).massMaxMjup);
  });

  it('draws companions inside the box of each host', () => {
    const many = Float64Array.from({ length: 200 }, (_, i) => 0.3 + (i % 5) * 0.4);
    const drawn = drawCompanions(ratio, 200, 'ratio', many);
    many.forEach((host, i) => {
      expect(isInside(ratio, drawn.massMjup[i], drawn.semiMajorAxisAu[i], host)).toBe(true);
    });
    expect(() => drawCompanions(ratio, 3, 'ratio')).toThrow(/needs the mass/);
  });
});

describe('tabulated systems', () => {
  it('count companions outside the map as unseen and report their share', () => {
    const ones = new Float64Array(size).fill(1);
    const seen = sampleCompleteness(ones, grid, systems);
    // Weight 1 of 6 is seen whole, weight 2 lies at 2000 au, weight 3 is empty.
    expect(seen.perStar[0]).toBeCloseTo(1 / 6, 14);
    expect(seen.numberSeenPerStar?.[0]).toBeCloseTo(2 / 6, 14);
    expect(seen.shareOutsideMap).toBeCloseTo(0.5, 14);
  });

  it('are drawn whole, by their weights', () => {
    const stars = 6000;
    const drawn = drawSystems(systems, stars, 'systems');
    const far = drawn.semiMajorAxisAu.filter((a) => a === 2000).length / stars;
    expect(Math.abs(far - 1 / 3)).toBeLessThan(4 * Math.sqrt(2 / 9 / stars));
    const ofTwo = drawn.star.filter((star, k) => star === drawn.star[k - 1]).length / stars;
    expect(Math.abs(ofTwo - 1 / 6)).toBeLessThan(4 * Math.sqrt(5 / 36 / stars));
  });

  it.each([
    [{ weight: [] }, /empty/],
    [{ weight: [1, -1, 1] }, /weight of system 2/],
    [{ weight: [1, 0, 0] }, /nothing to look for/],
    [{ companionSystem: [1, 1, 7] }, /system 7/],
    [{ massMjup: [1, 2] }, /3 companions/],
    [{ semiMajorAxisAu: [1, 0, 2] }, /companion 2/],
  ])('refuse %o', (change, message) => {
    expect(() => checkPopulation({ ...systems, ...change })).toThrow(message);
  });
});

describe('viewPopulation with a rate that scales with the host', () => {
  it('sums the exposure with each star at its own rate', () => {
    const scaled: Population = { ...shaped, hostScaling: { index: 1, referenceMsun: 0.5 } };
    const hosts = Float64Array.of(0.5, 1, 2);
    const view = viewPopulation(uneven(3), grid, scaled, hosts);
    expect(view.rateScale).toEqual(Float64Array.of(1, 2, 4));
    const [a, b, c] = view.completenessPerStar as Float64Array;
    expect(view.exposure).toBeCloseTo(a + 2 * b + 4 * c, 13);
    expect(() => viewPopulation(uneven(3), grid, scaled)).toThrow(/star 1, star 2, star 3/);
  });
});

describe('words and warnings', () => {
  it('say each law, and a break that lies outside its range', () => {
    const words = describePopulation(shaped);
    expect(words).toContain('below 10 MJ');
    expect(words).toContain('log-normal around 40 AU, σ 0.5 dex');
    expect(describePopulation(ratio)).toContain("of the star's mass");
    expect(describePopulation(systems)).toMatch(/^3 tabulated systems with 3 companions of /);
    expect(populationWarnings(shaped)).toEqual([]);
    const moved = { ...shaped, massMaxMjup: 9 };
    expect(populationWarnings(moved)).toEqual([expect.stringContaining('single power law')]);
  });

  it('state the host mass that a rate is quoted for and where its prior is cut', () => {
    const { sentence, conditions } = describeLimit({
      quantity: 'host_fraction',
      limit: 0.12,
      credibleLevel: 0.95,
      population: { ...shaped, hostScaling: { index: 1, referenceMsun: 1 } },
      prior: { law: 'uniform', max: 1 },
      detections: 0,
      stars: 20,
      exposure: 9,
      combinationRule: 'one survey',
      cooling: 'a table',
      eccentricity: 'circular orbits',
      threshold: 'hard',
      shareOutside: 0,
      constrained: true,
      setByPrior: false,
      cutAt: 0.5556,
    });
    expect(sentence).toContain('of stars of 1 solar mass host at least one planet of');
    expect(conditions.find((one) => one.startsWith('Largest rate: '))).toContain('0.556');
  });
});

describe('toStoredPopulation', () => {
  it('turns every index into the stored convention and leaves densities alone', () => {
    const stored = toStoredPopulation(
      {
        ...shaped,
        mass: { shape: 'broken-power-law', breakAt: 10, innerIndex: -1.3, outerIndex: -3 },
        semiMajorAxis: { shape: 'power-law', index: 0.26 },
      },
      { mass: 'linear', semiMajorAxis: 'period' },
    );
    expect(stored.mass).toMatchObject({ innerIndex: -0.3, outerIndex: -2 });
    expect(stored.semiMajorAxis).toMatchObject({ index: 0.39 });
    expect(toStoredPopulation(systems, { mass: 'linear', semiMajorAxis: 'linear' })).toBe(systems);
  });

  it.each([
    [{ semiMajorAxis: { shape: 'log-normal', median: 40, sigmaDex: 0 } }, /width/],
    [{ semiMajorAxis: { shape: 'tabulated', at: [0.1, 0.2], perLog: [1, 1] } }, /nothing between/],
    [{ hostScaling: { index: 1, referenceMsun: 0 } }, /reference mass/],
  ] as [Partial<ShapedPopulation>, RegExp][])(
    'leaves checks to checkPopulation: %o',
    (change, message) => {
      expect(() => checkPopulation({ ...shaped, ...change })).toThrow(message);
    },
  );
});
