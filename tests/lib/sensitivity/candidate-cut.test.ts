import { describe, expect, test } from 'vitest';
import {
  builtInMagnitude,
  computeCompletenessMap,
  contrastAt,
  cutAtCandidates,
  detectionProbability,
  type SensitivitySettings,
  type UnvettedCandidate,
} from '@/lib/sensitivity';
import { buildCurve, buildSettings, buildStar } from './build-star';

const PC = 20;
const AGE = 30;
const MASS = 20;
const HOST = 6.4;
/** Δm of the companion beside its star. */
const COMPANION = builtInMagnitude(MASS, AGE, 'H') + 5 * Math.log10(PC) - 5 - HOST;

/** P(projected separation < x axes), circular orbits: statistics of section 4, closed form. */
const below = (x: number) => (x < 1 ? 1 - Math.sqrt(1 - x * x) : 1);

/** A flat curve from 0.1 to 5 arcsec, so that the map has a closed form. */
function completeness(
  limitMag: number,
  source: UnvettedCandidate | null,
  threshold: SensitivitySettings['threshold'],
  axisAu: number,
): number {
  const curve = buildCurve({
    separationArcsec: Float64Array.of(0.1, 0.7, 5),
    contrastMag: Float64Array.of(limitMag, limitMag, limitMag),
  });
  const star = buildStar({
    hostMag: HOST,
    age: { medianMyr: AGE },
    distance: { distancePc: PC, errorPc: 0 },
    curves: [curve],
    ...(source && { candidates: [source] }),
  });
  const grid = {
    massMjup: Float64Array.of(MASS, MASS + 1),
    semiMajorAxisAu: Float64Array.of(axisAu, 2 * axisAu),
  };
  const settings = buildSettings({
    threshold,
    eccentricity: { law: 'circular' },
    candidates: { halfWidthArcsec: 0.1 },
  });
  return computeCompletenessMap(star, { kind: 'built-in' }, grid, settings).map.completeness[0];
}

const between = (from: number, to: number, axisAu: number) =>
  below((to * PC) / axisAu) - below((from * PC) / axisAu);

describe('map of a star with an unvetted candidate', () => {
  const limit = COMPANION + 1;
  const chance = {
    hard: () => 1,
    smooth: (at: number) => detectionProbability(at, COMPANION, 5, 'smooth'),
  };

  for (const threshold of ['hard', 'smooth'] as const) {
    for (const axisAu of [9, 25, 60]) {
      test(`loses the annulus of one without a contrast: ${threshold}, ${axisAu} au`, () => {
        const got = completeness(limit, { separationArcsec: 1 }, threshold, axisAu);
        const seen = between(0.1, 5, axisAu) - between(0.9, 1.1, axisAu);
        expect(Math.abs(got - chance[threshold](limit) * seen)).toBeLessThan(1e-4);
      });

      test(`is limited to its brightness there: ${threshold}, ${axisAu} au`, () => {
        const faint = COMPANION - 0.5;
        const source = { separationArcsec: 1, contrastMag: faint };
        const got = completeness(limit, source, threshold, axisAu);
        const annulus = between(0.9, 1.1, axisAu);
        const inAnnulus = threshold === 'hard' ? 0 : chance.smooth(faint);
        const wanted =
          chance[threshold](limit) * (between(0.1, 5, axisAu) - annulus) + inAnnulus * annulus;
        expect(Math.abs(got - wanted)).toBeLessThan(1e-4);
      });
    }
  }

  test('nothing is cut unless the settings say so', () => {
    const star = buildStar({ candidates: [{ separationArcsec: 1 }] });
    const grid = { massMjup: Float64Array.of(5, 20), semiMajorAxisAu: Float64Array.of(20, 60) };
    const map = (one: typeof star) =>
      computeCompletenessMap(one, { kind: 'built-in' }, grid, buildSettings()).map.completeness;
    expect([...map(star)]).toEqual([...map(buildStar())]);
  });

  test('one fainter than the limit, or beyond the curve, changes nothing', () => {
    const plain = completeness(limit, null, 'hard', 25);
    const faint = { separationArcsec: 1, contrastMag: limit + 1 };
    expect(completeness(limit, faint, 'hard', 25)).toBeCloseTo(plain, 12);
    expect(completeness(limit, { separationArcsec: 7 }, 'hard', 25)).toBe(plain);
  });
});

describe('curve cut at a candidate', () => {
  const curve = buildCurve();

  test('is the fainter of curve and candidate inside and the curve outside', () => {
    const cut = cutAtCandidates(curve, [{ separationArcsec: 0.6, contrastMag: 12.3 }], 0.2);
    for (let separation = 0.15; separation <= 4.5; separation *= 1.003) {
      const given = contrastAt(curve, separation)?.contrastMag as number;
      const isInside = separation > 0.4 && separation < 0.8;
      const got = contrastAt(cut, separation)?.contrastMag;
      expect(got).toBeCloseTo(isInside ? Math.min(given, 12.3) : given, 6);
    }
  });

  test('a candidate at the inner edge moves the edge, one in another band hides its annulus', () => {
    const inner = cutAtCandidates(curve, [{ separationArcsec: 0.1 }], 0.1);
    expect(contrastAt(inner, 0.19)?.coverage).toBe(0);
    expect(contrastAt(inner, 0.21)?.coverage).toBeCloseTo(1, 6);
    const other = cutAtCandidates(curve, [{ separationArcsec: 1, contrastMag: 9, band: 'J' }], 0.1);
    expect(contrastAt(other, 1)?.coverage).toBe(0);
    expect(contrastAt(other, 1)?.contrastMag).toBeCloseTo(13.6, 9);
  });

  test('overlapping candidates are each cut', () => {
    const cut = cutAtCandidates(
      curve,
      [
        { separationArcsec: 1, contrastMag: 12 },
        { separationArcsec: 1.1, contrastMag: 11 },
      ],
      0.2,
    );
    expect(contrastAt(cut, 0.85)?.contrastMag).toBeCloseTo(12, 6);
    expect(contrastAt(cut, 1.25)?.contrastMag).toBeCloseTo(11, 6);
    expect(contrastAt(cut, 1.35)?.contrastMag).toBeGreaterThan(13.6);
  });

  test('refuses a separation, half-width or contrast outside its domain', () => {
    expect(() => cutAtCandidates(curve, [{ separationArcsec: 0 }], 0.1)).toThrow(
      /separationArcsec/,
    );
    expect(() => cutAtCandidates(curve, [{ separationArcsec: 1 }], 0)).toThrow(/halfWidthArcsec/);
    expect(() => cutAtCandidates(curve, [{ separationArcsec: 1, contrastMag: -1 }], 0.1)).toThrow(
      /contrastMag/,
    );
  });
});
