import { describe, expect, it } from 'vitest';
import { builtInMagnitude, type CoolingTable } from '@/lib/sensitivity';
import { axisFromSeparation, massFromPhotometry } from '@/lib/sensitivity/vetting';

describe('axisFromSeparation', () => {
  it('has the closed form of circular orbits', () => {
    // ρ at p is √(1 − (1 − p)²); a at p is s over ρ at 1 − p.
    const { median, lower, upper } = axisFromSeparation(50, { law: 'circular' });
    expect(median).toBeCloseTo(50 / Math.sqrt(0.75), 10);
    expect(lower).toBeCloseTo(50 / Math.sqrt(1 - 0.16 ** 2), 10);
    expect(upper).toBeCloseTo(50 / Math.sqrt(1 - 0.84 ** 2), 10);
  });

  it('lets eccentric orbits be smaller than what is seen', () => {
    const { lower } = axisFromSeparation(50, { law: 'beta', alpha: 0.867, beta: 3.03 });
    expect(lower).toBeLessThan(50);
    expect(() => axisFromSeparation(0, { law: 'circular' })).toThrow('projectedSeparationAu');
  });
});

describe('massFromPhotometry', () => {
  const age = { medianMyr: 30, lowerMyr: 25, upperMyr: 36 };
  const builtIn = { kind: 'built-in' } as const;

  it('gives back the mass that a magnitude was made from', () => {
    const absoluteMag = builtInMagnitude(9, 30, 'H');
    const found = massFromPhotometry(builtIn, { band: 'H', absoluteMag, errorMag: 0.1, age });
    expect(found.solutionsMjup).toHaveLength(1);
    expect(found.solutionsMjup[0]).toBeCloseTo(9, 4);
    const { interval } = found;
    expect(interval?.median).toBeCloseTo(9, 0);
    expect(interval?.lower).toBeLessThan(9);
    expect(interval?.upper).toBeGreaterThan(9);
    expect(found.touchesEdge).toBe(false);
  });

  it('grows its interval with each error', () => {
    const absoluteMag = builtInMagnitude(9, 30, 'H');
    const widthOf = (errorMag: number, law: typeof age | { medianMyr: number }) => {
      const { interval } = massFromPhotometry(builtIn, {
        band: 'H',
        absoluteMag,
        errorMag,
        age: law,
      });
      if (!interval) throw new Error('no interval');
      return Math.log(interval.upper / interval.lower);
    };
    const alone = widthOf(0.1, { medianMyr: 30 });
    // Linear in ln m over ±σ: 2 × 0.994 σ over the slope, 0.994 the normal quantile at 84 %.
    const step = 1e-3;
    const slope =
      (builtInMagnitude(9 * Math.exp(step), 30, 'H') - builtInMagnitude(9, 30, 'H')) / step;
    expect(alone / ((2 * 0.9945 * 0.1) / -slope)).toBeCloseTo(1, 1);
    expect(widthOf(0.3, { medianMyr: 30 })).toBeGreaterThan(2 * alone);
    expect(widthOf(0.1, age)).toBeGreaterThan(alone);
    expect(widthOf(0, { medianMyr: 30 })).toBe(widthOf(0.05, { medianMyr: 30 }));
  });

  const table: CoolingTable = {
    name: 'with a bump',
    massMjup: Float64Array.of(5, 10, 14, 20),
    ageMyr: Float64Array.of(10, 100),
    // Brighter at 10 than at 14: deuterium burns first in the lighter one.
    magnitudes: { H: Float64Array.of(16, 18, 13, 15, 14, 16, 12, 14) },
  };

  it('lists every mass where brightness does not rise with mass', () => {
    const found = massFromPhotometry(
      { kind: 'table', table },
      { band: 'H', absoluteMag: 13.5, errorMag: 0.05, age: { medianMyr: 10 } },
    );
    const between = (a: number, b: number, share: number) => a * (b / a) ** share;
    const expected = [between(5, 10, 2.5 / 3), between(10, 14, 0.5), between(14, 20, 0.25)];
    expect(found.solutionsMjup).toHaveLength(3);
    found.solutionsMjup.forEach((mass, i) => {
      expect(mass).toBeCloseTo(expected[i], 2);
    });
    expect(found.interval?.lower).toBeLessThan(found.solutionsMjup[1]);
    expect(found.interval?.upper).toBeGreaterThan(found.solutionsMjup[1]);
  });

  it.each([
    [11, 'brighter'],
    [17, 'fainter'],
  ] as const)('says that magnitude %d is %s than every mass', (absoluteMag, outside) => {
    const found = massFromPhotometry(
      { kind: 'table', table },
      { band: 'H', absoluteMag, errorMag: 0.1, age: { medianMyr: 10 } },
    );
    expect(found).toEqual({ solutionsMjup: [], interval: null, outside, touchesEdge: false });
  });

  it('says when the interval ends where the relation ends', () => {
    const found = massFromPhotometry(
      { kind: 'table', table },
      { band: 'H', absoluteMag: 12.05, errorMag: 0.2, age: { medianMyr: 10 } },
    );
    expect(found.touchesEdge).toBe(true);
  });

  it('refuses ages that leave the relation, and unknown bands', () => {
    const photometry = { band: 'H', absoluteMag: 13, errorMag: 0.1 };
    expect(() =>
      massFromPhotometry({ kind: 'table', table }, { ...photometry, age: { medianMyr: 200 } }),
    ).toThrow('between 10 and 100 Myr for with a bump');
    expect(() => massFromPhotometry(builtIn, { ...photometry, band: 'Z', age })).toThrow('band');
  });
});
