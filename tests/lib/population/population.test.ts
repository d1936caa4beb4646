import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  axisIndexFromPeriodIndex,
  checkPopulation,
  drawCompanions,
  fromLogIndex,
  isInside,
  type Population,
  populationDensity,
  powerLaw,
  toLogIndex,
} from '@/lib/population';

const population: Population = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -0.3,
  semiMajorAxisIndex: 0.4,
};

describe('index conventions', () => {
  it('turn the linear index into the stored one and back', () => {
    expect(toLogIndex(-1.31, 'linear')).toBeCloseTo(-0.31, 15);
    expect(fromLogIndex(-0.31, 'linear')).toBeCloseTo(-1.31, 15);
    expect(toLogIndex(0.7, 'log')).toBe(0.7);
    expect(axisIndexFromPeriodIndex(0.26)).toBeCloseTo(0.39, 15);
  });
});

describe('isInside', () => {
  it('includes both edges of both ranges', () => {
    expect(isInside(population, 2, 20)).toBe(true);
    expect(isInside(population, 30, 300)).toBe(true);
    expect(isInside(population, 1.999, 50)).toBe(false);
    expect(isInside(population, 10, 300.1)).toBe(false);
  });
});

describe('checkPopulation', () => {
  it.each([
    [{ massMinMjup: 0 }, /planet mass: the lower end/],
    [{ massMaxMjup: 2 }, /planet mass: the upper end/],
    [{ semiMajorAxisMaxAu: 10 }, /semi-major axis: the upper end/],
    [{ semiMajorAxisMinAu: Number.NaN }, /semi-major axis: the lower end/],
    [{ massIndex: Number.POSITIVE_INFINITY }, /massIndex/],
    [{ semiMajorAxisIndex: Number.NaN }, /semiMajorAxisIndex/],
  ])('refuses %o', (change, message) => {
    expect(() => checkPopulation({ ...population, ...change })).toThrow(RangeError);
    expect(() => checkPopulation({ ...population, ...change })).toThrow(message);
  });
});

describe('powerLaw', () => {
  it('has quantiles that its integral inverts', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -4, max: 4, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (index, p) => {
          const law = powerLaw(index);
          const x = law.quantile(p, 0.5, 80);
          const inside = Math.min(80, Math.max(0.5, x));
          expect(law.integral(0.5, inside) / law.integral(0.5, 80)).toBeCloseTo(p, 9);
        },
      ),
    );
  });
});

describe('populationDensity', () => {
  it('integrates to one over the box', () => {
    let total = 0;
    const n = 200;
    const stepMass = Math.log(15) / n;
    const stepAxis = Math.log(15) / n;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const mass = 2 * Math.exp((i + 0.5) * stepMass);
        const axis = 20 * Math.exp((j + 0.5) * stepAxis);
        total += populationDensity(population, mass, axis) * stepMass * stepAxis;
      }
    }
    expect(total).toBeCloseTo(1, 4);
    expect(populationDensity(population, 1, 50)).toBe(0);
  });
});

describe('drawCompanions', () => {
  it('gives the same companions for the same seed, inside the box', () => {
    const one = drawCompanions(population, 500, 'a');
    expect(drawCompanions(population, 500, 'a')).toEqual(one);
    expect(drawCompanions(population, 500, 'b').massMjup).not.toEqual(one.massMjup);
    for (let i = 0; i < 500; i++) {
      expect(isInside(population, one.massMjup[i], one.semiMajorAxisAu[i])).toBe(true);
    }
  });

  it('follows the law: its distribution function is uniform in the draws', () => {
    const n = 4000;
    const { massMjup } = drawCompanions(population, n, 'law');
    const law = powerLaw(population.massIndex);
    const ranks = massMjup.map((m) => law.integral(2, m) / law.integral(2, 30)).sort();
    let distance = 0;
    for (let i = 0; i < n; i++) {
      distance = Math.max(distance, Math.abs(ranks[i] - (i + 0.5) / n));
    }
    // Kolmogorov-Smirnov: 1.95 / sqrt(n) is exceeded once in a thousand seeds.
    expect(distance).toBeLessThan(1.95 / Math.sqrt(n));
  });

  it('refuses a number that is not whole', () => {
    expect(() => drawCompanions(population, 1.5, 'a')).toThrow(RangeError);
  });
});
