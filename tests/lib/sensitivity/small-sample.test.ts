import { describe, expect, test } from 'vitest';
import { contrastAt } from '@/lib/sensitivity';
import { computeCompletenessMap } from '@/lib/sensitivity/completeness';
import { simulateCompleteness } from '@/lib/sensitivity/simulate';
import { correctForSmallSamples, smallSampleThreshold } from '@/lib/sensitivity/small-sample';
import { buildCurve, buildSettings, buildStar } from './build-star';

/** 0.06 arcsec: three elements at 0.0286 arcsec. */
const FWHM = 0.06;

describe('threshold for few resolution elements', () => {
  test('is that of Mawet et al. 2014 with the quantiles of SciPy 1.17.1', () => {
    // t.isf(norm.sf(5), N - 2) * sqrt(1 + 1/(N - 1)) for N elements; 6, 13 and 19 are at 1, 2 and
    // 3 λ/D, rounded as in the paper.
    for (const [elements, wanted] of [
      [4, 1525.025199188128],
      [6, 62.27425113022766],
      [7, 34.39869070781741],
      [13, 10.675977472763305],
      [19, 7.9493487416823525],
      [63, 5.630607292016426],
      [1000, 5.035268658881668],
    ]) {
      expect(Math.abs(smallSampleThreshold(elements, 5) / wanted - 1)).toBeLessThan(1e-9);
    }
  });

  test('exceeds n and falls towards it', () => {
    let before = Infinity;
    for (let elements = 3; elements < 5000; elements *= 1.3) {
      const threshold = smallSampleThreshold(elements, 3);
      expect(threshold).toBeGreaterThan(3);
      expect(threshold).toBeLessThan(before);
      before = threshold;
    }
    expect(() => smallSampleThreshold(2.9, 5)).toThrow(RangeError);
  });
});

describe('curve raised for few resolution elements', () => {
  const curve = buildCurve({
    separationArcsec: Float64Array.of(0.02, 0.05, 0.1, 0.3, 1, 4.5),
    contrastMag: Float64Array.of(4, 6, 8, 10.6, 13.6, 14.6),
    coverage: Float64Array.of(1, 1, 0.9, 0.9, 0.8, 0.5),
  });
  const corrected = correctForSmallSamples(curve, FWHM);

  test('is the given one less the formula everywhere, to 0.003 mag', () => {
    const from = corrected.separationArcsec[0];
    for (let share = 0; share <= 1; share += 0.001) {
      const separation = Math.min(4.5, from * (4.5 / from) ** share);
      const given = contrastAt(curve, separation);
      const raised = contrastAt(corrected, separation);
      if (!given || !raised) continue;
      const elements = (2 * Math.PI * separation) / FWHM;
      const formula = 2.5 * Math.log10(smallSampleThreshold(elements, 5) / 5);
      expect(Math.abs(given.contrastMag - formula - raised.contrastMag)).toBeLessThan(3e-3);
      expect(raised.coverage).toBeCloseTo(given.coverage, 6);
    }
    expect(corrected.separationArcsec.length).toBeLessThan(120);
  });

  test('begins where it is as faint as the star, beyond three elements', () => {
    expect(corrected.contrastMag[0]).toBeCloseTo(0, 9);
    expect(corrected.separationArcsec[0]).toBeGreaterThan((3 * FWHM) / (2 * Math.PI));
    expect(corrected.separationArcsec[0]).toBeLessThan(FWHM);
    expect(corrected.separationArcsec.at(-1)).toBeCloseTo(4.5, 12);
  });

  test('a curve that lies inside three elements finds nothing', () => {
    const near = correctForSmallSamples(curve, 20);
    expect([...(near.coverage as Float64Array)].every((share) => share === 0)).toBe(true);
    const star = buildStar({ curves: [curve] });
    const settings = buildSettings({ smallSample: { fwhmArcsec: 20 } });
    const grid = {
      massMjup: Float64Array.of(5, 40),
      semiMajorAxisAu: Float64Array.of(10, 100),
    };
    const { map } = computeCompletenessMap(star, { kind: 'built-in' }, grid, settings);
    expect(Math.max(...map.completeness)).toBe(0);
  });

  test('a map under it agrees with simulation and lies below the plain one', () => {
    const star = buildStar({ curves: [curve] });
    const grid = {
      massMjup: Float64Array.of(4, 12),
      semiMajorAxisAu: Float64Array.of(4, 8),
    };
    const settings = buildSettings({ smallSample: { fwhmArcsec: FWHM }, ageNodesPerSide: 30 });
    const plain = computeCompletenessMap(star, { kind: 'built-in' }, grid, buildSettings());
    const raised = computeCompletenessMap(star, { kind: 'built-in' }, grid, settings);
    for (const [i, mass] of grid.massMjup.entries()) {
      for (const [j, axis] of grid.semiMajorAxisAu.entries()) {
        const got = raised.map.completeness[2 * i + j];
        expect(got).toBeLessThan(plain.map.completeness[2 * i + j]);
        const drawn = simulateCompleteness(
          star,
          { kind: 'built-in' },
          mass,
          axis,
          settings,
          20_000,
          'few elements',
        );
        const error = Math.max(drawn.standardError, 1 / 20_000);
        expect(Math.abs(got - drawn.completeness)).toBeLessThan(4 * error);
      }
    }
  });

  test('refuses a size that is not positive', () => {
    expect(() => correctForSmallSamples(curve, 0)).toThrow(RangeError);
  });
});
