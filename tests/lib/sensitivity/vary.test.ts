import { describe, expect, test } from 'vitest';
import { ageNodes, ageUnder, distanceNodes, varyStar } from '@/lib/sensitivity';
import { buildCurve, buildSettings, buildStar } from './build-star';

describe('varyStar', () => {
  test('ages: median and bounds times the ratio of the quoted point', () => {
    const star = buildStar({ age: { medianMyr: 24, lowerMyr: 18, upperMyr: 36, maxMyr: 100 } });
    const young = varyStar(star, { kind: 'ages', sigma: -1 });
    expect(young.age).toEqual({ medianMyr: 18, lowerMyr: 13.5, upperMyr: 27, maxMyr: 75 });
    const old = varyStar(star, { kind: 'ages', sigma: 1 });
    expect(old.age).toEqual({ medianMyr: 36, lowerMyr: 27, upperMyr: 54, maxMyr: 150 });
    expect(star.age).toEqual({ medianMyr: 24, lowerMyr: 18, upperMyr: 36, maxMyr: 100 });
  });

  test('ages: an exact one stays, bounds alone move by the law’s own 84 % point', () => {
    const exact = buildStar({ age: { medianMyr: 24 } });
    expect(varyStar(exact, { kind: 'ages', sigma: 1 }).age).toEqual({ medianMyr: 24 });
    const bounds = buildStar({ age: { medianMyr: 20, minMyr: 10, maxMyr: 40 } });
    const old = varyStar(bounds, { kind: 'ages', sigma: 1 }).age;
    // Uniform in ln t on [10, 40]: t(0.8413447) = 10 · 4^0.8413447.
    const ratio = (10 * 4 ** 0.8413447460685429) / 20;
    expect('mixture' in old ? null : old.medianMyr / 20).toBeCloseTo(ratio, 9);
  });

  test('ages: any sigma is a power of the quoted ratio, each side by its own', () => {
    const star = buildStar({ age: { medianMyr: 24, lowerMyr: 18, upperMyr: 36 } });
    const at = (sigma: number) => varyStar(star, { kind: 'ages', sigma }).age;
    expect(at(2)).toEqual({ medianMyr: 54, lowerMyr: 40.5, upperMyr: 81 });
    expect(at(-2)).toMatchObject({ medianMyr: 13.5 });
    expect(at(0.5)).toMatchObject({ medianMyr: expect.closeTo(24 * Math.sqrt(1.5), 9) });
    expect(at(0)).toEqual(star.age);
  });

  test('ages: each law of a mixture moves by its own ratio', () => {
    const age = {
      mixture: [
        { probability: 0.7, age: { medianMyr: 20, lowerMyr: 10, upperMyr: 30 } },
        { probability: 0.3, age: { medianMyr: 1000 } },
      ],
    };
    const moved = varyStar(buildStar({ age }), { kind: 'ages', sigma: 1 }).age;
    expect(moved).toEqual({
      mixture: [
        { probability: 0.7, age: { medianMyr: 30, lowerMyr: 15, upperMyr: 45 } },
        { probability: 0.3, age: { medianMyr: 1000 } },
      ],
    });
  });

  test('distances: farther is a larger distance or a smaller parallax', () => {
    const star = buildStar({ distance: { distancePc: 33, errorPc: 1.2 } });
    expect(varyStar(star, { kind: 'distances', sigma: 1 }).distance).toEqual({
      distancePc: 34.2,
      errorPc: 1.2,
    });
    const other = buildStar({ distance: { parallaxMas: 30, errorMas: 2 } });
    const far = varyStar(other, { kind: 'distances', sigma: 1 }).distance;
    expect(far).toEqual({ parallaxMas: 28, errorMas: 2 });
    expect(distanceNodes(far).values[1]).toBeCloseTo(1000 / 28, 9);
    const wild = buildStar({ distance: { parallaxMas: 1, errorMas: 2 } });
    expect(() => varyStar(wild, { kind: 'distances', sigma: 1 })).toThrow(RangeError);
  });

  test('n-sigma: the same noise under another threshold', () => {
    const star = buildStar({
      curves: [buildCurve({ contrastMag: Float64Array.of(0.1, 10, 11, 12, 13, 14) })],
    });
    const [up] = varyStar(star, { kind: 'n-sigma', step: 1 }).curves;
    expect(up.nSigma).toBe(6);
    expect(up.contrastMag[1]).toBeCloseTo(10 - 2.5 * Math.log10(6 / 5), 12);
    expect(up.contrastMag[0]).toBe(0);
    const [down] = varyStar(star, { kind: 'n-sigma', step: -1 }).curves;
    expect(down.contrastMag[5]).toBeCloseTo(14 + 2.5 * Math.log10(5 / 4), 12);
    const lowest = buildStar({ curves: [buildCurve({ nSigma: 1 })] });
    expect(() => varyStar(lowest, { kind: 'n-sigma', step: -1 })).toThrow(/nSigma/);
  });
});

describe('a mixture of ages', () => {
  const age = {
    mixture: [
      { probability: 0.8, age: { medianMyr: 20, lowerMyr: 15, upperMyr: 26 } },
      { probability: 0.2, age: { medianMyr: 1000, minMyr: 200, maxMyr: 5000 } },
    ],
  };

  test('has the nodes of both laws, weighted', () => {
    const nodes = ageNodes(age, 'smooth');
    const [young, old] = age.mixture.map((part) => ageNodes(part.age, 'smooth'));
    expect([...nodes.values]).toEqual([...young.values, ...old.values]);
    nodes.weights.forEach((weight, k) => {
      const wanted = k < 10 ? 0.8 * young.weights[k] : 0.2 * old.weights[k - 10];
      expect(weight).toBeCloseTo(wanted, 15);
    });
  });

  test('refuses probabilities that do not sum to 1', () => {
    const [first] = age.mixture;
    expect(() => ageNodes({ mixture: [first] }, 'smooth')).toThrow(/sum to 1/);
    const wrong = {
      mixture: [
        { ...first, probability: 1.2 },
        { ...first, probability: -0.2 },
      ],
    };
    expect(() => ageNodes(wrong, 'smooth')).toThrow(/between 0 and 1/);
  });
});

describe('age under a field age', () => {
  const fieldAge = { minMyr: 200, maxMyr: 5000 };
  const under = (membershipProbability?: number, settings = buildSettings({ fieldAge })) =>
    ageUnder(buildStar({ membershipProbability }), settings);
  const own = buildStar().age;

  test('mixes the own age with the field by the probability of membership', () => {
    expect(under(0.7)).toEqual({
      mixture: [
        { probability: 0.7, age: own },
        { probability: expect.closeTo(0.3, 12), age: { medianMyr: 1000, ...fieldAge } },
      ],
    });
  });

  test('a certain or unstated member keeps its age, and so does every star without the setting', () => {
    expect(under(1)).toEqual(own);
    expect(under()).toEqual(own);
    expect(under(0.7, buildSettings())).toEqual(own);
  });

  test('refuses a probability or range outside its domain', () => {
    expect(() => under(1.1)).toThrow(/membershipProbability/);
    const wrong = buildSettings({ fieldAge: { minMyr: 10, maxMyr: 5 } });
    expect(() => under(0.5, wrong)).toThrow(/minMyr < maxMyr/);
  });
});
