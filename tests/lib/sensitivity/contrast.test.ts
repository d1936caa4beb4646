import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkContrastCurve, contrastAt, detectionProbability } from '@/lib/sensitivity';
import { thresholdTable } from '@/lib/sensitivity/threshold-table';
import { buildCurve } from './build-star';

describe('contrastAt(curve, θ)', () => {
  test('is linear in ln θ between points and null beyond the ends', () => {
    const curve = buildCurve({ coverage: Float64Array.of(1, 1, 1, 0.8, 0.8, 0.2) });
    expect(contrastAt(curve, 0.15)?.contrastMag).toBeCloseTo(8, 12);
    expect(contrastAt(curve, Math.sqrt(0.5))?.contrastMag).toBeCloseTo((12.1 + 13.6) / 2, 12);
    expect(contrastAt(curve, 3)?.coverage).toBeCloseTo(0.5, 12);
    expect(contrastAt(curve, 0.149)).toBeNull();
    expect(contrastAt(curve, 4.51)).toBeNull();
  });
});

describe('detectionProbability(limit, Δm, n, rule)', () => {
  test('equality detects under the hard rule and is even odds under the smooth one', () => {
    expect(detectionProbability(13, 13, 5, 'hard')).toBe(1);
    expect(detectionProbability(13, 13.0001, 5, 'hard')).toBe(0);
    expect(detectionProbability(13, 13, 5, 'smooth')).toBeCloseTo(0.5, 15);
    expect(detectionProbability(13, Infinity, 5, 'smooth') / 2.866515718791939e-7).toBeCloseTo(
      1,
      12,
    );
  });

  test('the table of the smooth rule follows it', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.5, max: 30, noNaN: true }),
        fc.double({ min: -16, max: 5, noNaN: true }),
        (nSigma, x) => {
          const table = thresholdTable(nSigma);
          const exact = detectionProbability(x, 0, nSigma, 'smooth');
          expect(Math.abs(table.probability(x) - exact)).toBeLessThan(1e-4);
        },
      ),
    );
  });
});

describe('checkContrastCurve(curve, name)', () => {
  test.each([
    [{ separationArcsec: Float64Array.of(1) }, 'at least 2 values, got 1'],
    [
      { separationArcsec: Float64Array.of(0.15, 0.3, 0.3, 1, 2, 4.5) },
      'separationArcsec of a curve[2] must be > 0.3, got 0.3',
    ],
    [{ contrastMag: Float64Array.of(1, 2) }, 'contrastMag of a curve must have 6 values, got 2'],
    [
      { contrastMag: Float64Array.of(8, -1, 9, 9, 9, 9) },
      'contrastMag[1] of a curve must be finite and >= 0, got -1',
    ],
    [
      { coverage: Float64Array.of(1, 1, 1, 1, 1, 1.1) },
      'coverage[5] of a curve must be between 0 and 1, got 1.1',
    ],
    [{ coverage: Float64Array.of(1) }, 'coverage of a curve must have 6 values, got 1'],
    [{ nSigma: -5 }, 'nSigma of a curve must be finite and > 0, got -5'],
  ])('refuses %#', (part, message) => {
    expect(() => checkContrastCurve(buildCurve(part), 'a curve')).toThrow(message);
  });
});
