import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normalCumulative } from '@/lib/numerics/normal';
import { studentQuantileUpper } from '@/lib/numerics/student';

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

describe('studentQuantileUpper', () => {
  it('gives the printed percentage points', () => {
    // Abramowitz & Stegun 1964, table 26.10, from memory: upper-tail probability, freedom, t.
    for (const [p, freedom, t] of [
      [0.025, 1, 12.706],
      [0.025, 5, 2.571],
      [0.025, 10, 2.228],
      [0.025, 30, 2.042],
      [0.05, 5, 2.015],
      [0.0005, 1, 636.619],
      [0.0005, 10, 4.587],
    ]) {
      expect(Math.abs(studentQuantileUpper(p, freedom) - t)).toBeLessThan(6e-4);
    }
  });

  it('follows SciPy far into the tail and for freedom that is not whole', () => {
    // scipy.stats.t.isf of SciPy 1.17.1.
    for (const [p, freedom, t] of [
      [0.4, 1.5, 0.30074539256979543],
      [0.3, 4.283, 0.5655841054820121],
      [0.1, 7, 1.4149239276505083],
      [1e-3, 2.5, 13.822193110865964],
      [2.866515718791933e-7, 4, 56.84835349294546],
      [2.866515718791933e-7, 4.283185307179586, 46.800693748917524],
      [2.866515718791933e-7, 523, 5.062818683253453],
      [1e-9, 1, 318309886.1837907],
      [1e-9, 3000, 6.016336132370438],
      [1.279812543885835e-12, 11, 32.75724683228558],
    ]) {
      expect(relative(studentQuantileUpper(p, freedom), t)).toBeLessThan(1e-10);
    }
  });

  it('is Cauchy for one degree of freedom and normal for very many', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 0.45, noNaN: true }), (p) => {
        expect(relative(studentQuantileUpper(p, 1), 1 / Math.tan(Math.PI * p))).toBeLessThan(1e-9);
        const far = studentQuantileUpper(p, 2e5);
        expect(relative(normalCumulative(-far), p)).toBeLessThan(1e-3);
      }),
    );
  });

  it('mirrors at the median and refuses what lies outside', () => {
    expect(studentQuantileUpper(0.5, 3)).toBe(0);
    expect(studentQuantileUpper(0.975, 3)).toBeCloseTo(-studentQuantileUpper(0.025, 3), 10);
    expect(() => studentQuantileUpper(0, 3)).toThrow(RangeError);
    expect(() => studentQuantileUpper(0.1, 0)).toThrow(RangeError);
  });
});
