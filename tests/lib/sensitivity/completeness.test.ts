import fc from 'fast-check';
import { describe, expect, test, vi } from 'vitest';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { distanceModulus } from '@/lib/quantities/magnitudes';
import {
  computeCompletenessMap,
  contrastAt,
  DEFAULT_GRID,
  detectionProbability,
  type EccentricityLaw,
  type MapGrid,
  type StarInputs,
  separationCumulative,
} from '@/lib/sensitivity';
import { ageNodes } from '@/lib/sensitivity/age';
import { builtInMagnitude } from '@/lib/sensitivity/built-in-law';
import { distanceNodes } from '@/lib/sensitivity/distance';
import { buildCurve, buildSettings, buildStar } from './build-star';

// Sums of thousands of bins: minutes are not expected, but a shared machine may be slow.
vi.setConfig({ testTimeout: 60_000 });

const grid: MapGrid = {
  massMjup: logSpacedAxis(1, 60, 12),
  semiMajorAxisAu: logSpacedAxis(3, 600, 14),
};
const builtIn = { kind: 'built-in' } as const;
const completenessOf = (star: StarInputs, settings = buildSettings(), on = grid) =>
  computeCompletenessMap(star, builtIn, on, settings).map.completeness;

/** Section 5.3 as it stands: midpoint bins in ln θ, the distribution function looked up per bin. */
function midpointSum(
  star: StarInputs,
  massMjup: number,
  axisAu: number,
  law: EccentricityLaw,
  threshold: 'hard' | 'smooth',
  binsPerDecade: number,
): number {
  const ages = ageNodes(star.age, threshold);
  const distances = distanceNodes(star.distance);
  const points = star.curves.flatMap((curve) => [...curve.separationArcsec]);
  const [first, last] = [Math.min(...points), Math.max(...points)];
  const bins = Math.ceil(Math.log10(last / first) * binsPerDecade);
  const even = Array.from({ length: bins + 1 }, (_, b) => first * (last / first) ** (b / bins));
  const edges = [...new Set([...even, ...points])].sort((x, y) => x - y);
  let total = 0;
  distances.values.forEach((distancePc, l) => {
    const apparent = Array.from(
      ages.values,
      (age) => builtInMagnitude(massMjup, age, 'H') + distanceModulus(distancePc) - star.hostMag,
    );
    let below = separationCumulative((edges[0] * distancePc) / axisAu, law);
    for (let b = 0; b + 1 < edges.length; b++) {
      const above = separationCumulative((edges[b + 1] * distancePc) / axisAu, law);
      const middle = Math.sqrt(edges[b] * edges[b + 1]);
      const seen = star.curves.map((curve) => ({ curve, at: contrastAt(curve, middle) }));
      ages.weights.forEach((weight, k) => {
        let missed = 1;
        for (const { curve, at } of seen) {
          if (at === null) continue;
          const p = detectionProbability(at.contrastMag, apparent[k], curve.nSigma, threshold);
          missed *= 1 - at.coverage * p;
        }
        total += distances.weights[l] * weight * (1 - missed) * (above - below);
      });
      below = above;
    }
  });
  return total;
}

describe('computeCompletenessMap(star, cooling, grid, settings) against the sum over bins', () => {
  const cells = [
    [4, 40],
    [8, 15],
    [10, 100],
    [20, 300],
  ];
  const covered = buildCurve({ coverage: Float64Array.of(1, 1, 0.9, 0.9, 0.8, 0.3) });
  const shallow = buildCurve({
    separationArcsec: Float64Array.of(0.2, 0.8, 3),
    contrastMag: Float64Array.of(9.5, 12.9, 13.2),
    coverage: Float64Array.of(0.6, 1, 1),
    nSigma: 4,
  });
  const flat = buildCurve({
    separationArcsec: Float64Array.of(0.15, 0.4, 1.5, 3),
    contrastMag: Float64Array.of(9, 12.6, 12.6, 11.8),
  });
  const stars: [string, StarInputs][] = [
    ['one curve', buildStar()],
    ['a coverage that varies', buildStar({ curves: [covered] })],
    ['a flat stretch', buildStar({ curves: [flat] })],
    ['two curves of one position', buildStar({ curves: [covered, shallow] })],
    ['a large distance error', buildStar({ distance: { parallaxMas: 30, errorMas: 3 } })],
  ];
  const laws: EccentricityLaw[] = [
    { law: 'circular' },
    { law: 'fixed', eccentricity: 0.4 },
    { law: 'rayleigh', sigma: 0.3 },
  ];
  for (const threshold of ['smooth', 'hard'] as const) {
    test.each(stars)(`${threshold} threshold, %s`, (_, star) => {
      laws.forEach((law, i) => {
        // The sum takes the rule's own age nodes, so the map is asked for the same.
        const ageNodesPerSide = threshold === 'hard' ? 10 : 5;
        const settings = buildSettings({ eccentricity: law, threshold, ageNodesPerSide });
        const [massMjup, axisAu] = cells[i];
        const [value] = completenessOf(star, settings, {
          massMjup: Float64Array.of(massMjup),
          semiMajorAxisAu: Float64Array.of(axisAu),
        });
        const bins = law.law === 'circular' ? 3000 : law.law === 'fixed' ? 1000 : 150;
        const expected = midpointSum(star, massMjup, axisAu, law, threshold, bins);
        expect(Math.abs(value - expected)).toBeLessThan(law.law === 'rayleigh' ? 2e-3 : 4e-4);
      });
    });
  }
});

describe('what must hold for every curve', () => {
  const curves = fc
    .array(
      fc.tuple(fc.double({ min: 0.02, max: 0.6, noNaN: true }), fc.integer({ min: 0, max: 8 })),
      {
        minLength: 2,
        maxLength: 9,
      },
    )
    .map((steps) => {
      const places = [Math.log(0.1)];
      for (const [step] of steps) places.push(places[places.length - 1] + step);
      const separation = places.slice(1).map(Math.exp);
      // Whole steps of a magnitude, so that flat stretches and repeated levels are common.
      const contrast = steps.map(([, level]) => 9 + level * 0.75);
      return buildCurve({
        separationArcsec: Float64Array.from(separation),
        contrastMag: Float64Array.from(contrast),
      });
    });
  const thresholds = fc.constantFrom('hard' as const, 'smooth' as const);
  const settingsOf = (threshold: 'hard' | 'smooth') =>
    buildSettings({ threshold, eccentricity: { law: 'fixed', eccentricity: 0.3 } });

  test('completeness lies between 0 and 1', () => {
    fc.assert(
      fc.property(curves, thresholds, (curve, threshold) => {
        const values = completenessOf(buildStar({ curves: [curve] }), settingsOf(threshold));
        expect(values.every((c) => c >= 0 && c <= 1)).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  test('a deeper curve never finds less', () => {
    fc.assert(
      fc.property(
        curves,
        thresholds,
        fc.double({ min: 0.01, max: 3, noNaN: true }),
        (curve, threshold, deeper) => {
          const settings = settingsOf(threshold);
          const shallow = completenessOf(buildStar({ curves: [curve] }), settings);
          const contrastMag = curve.contrastMag.map((mag) => mag + deeper);
          const deep = completenessOf(buildStar({ curves: [{ ...curve, contrastMag }] }), settings);
          expect(shallow.every((c, i) => deep[i] >= c - 1e-3)).toBe(true);
        },
      ),
      { numRuns: 40 },
    );
  });

  test('level rows and the direct integral agree, which share no step of the smooth threshold', () => {
    fc.assert(
      fc.property(curves, (curve) => {
        const settings = { ...settingsOf('smooth'), ageNodesPerSide: 5 };
        const byLevels = completenessOf(buildStar({ curves: [curve] }), settings);
        // A second curve without coverage changes nothing but the path of the computation.
        const blind = { ...curve, coverage: new Float64Array(curve.contrastMag.length) };
        const direct = completenessOf(buildStar({ curves: [curve, blind] }), settings);
        expect(byLevels.every((c, i) => Math.abs(c - direct[i]) < 1e-3)).toBe(true);
      }),
      { numRuns: 40 },
    );
  });
});

describe('scaling', () => {
  const settings = buildSettings();
  const star = buildStar({ distance: { distancePc: 30, errorPc: 0 } });

  test('twice the distance with half the separations, 1.5 mag of modulus made up, is the same', () => {
    const shift = distanceModulus(60) - distanceModulus(30);
    const curve = buildCurve();
    const far = buildStar({
      distance: { distancePc: 60, errorPc: 0 },
      hostMag: star.hostMag + shift,
      curves: [{ ...curve, separationArcsec: curve.separationArcsec.map((x) => x / 2) }],
    });
    const near = completenessOf(star, settings);
    completenessOf(far, settings).forEach((c, i) => {
      expect(Math.abs(c - near[i])).toBeLessThan(1e-6);
    });
  });

  test('a brighter star with as much less contrast is the same', () => {
    const curve = buildCurve();
    const shifted = buildStar({
      ...star,
      hostMag: star.hostMag - 1,
      curves: [{ ...curve, contrastMag: curve.contrastMag.map((mag) => mag + 1) }],
    });
    const base = completenessOf(star, settings);
    completenessOf(shifted, settings).forEach((c, i) => {
      expect(Math.abs(c - base[i])).toBeLessThan(1e-9);
    });
  });

  test('coverage of one half halves the map', () => {
    const half = buildCurve({ coverage: new Float64Array(6).fill(0.5) });
    const base = completenessOf(star, settings);
    completenessOf({ ...star, curves: [half] }, settings).forEach((c, i) => {
      expect(c).toBeCloseTo(0.5 * base[i], 9);
    });
  });

  test('the same inputs give the same bits, whatever was computed between', () => {
    const first = completenessOf(star, settings);
    completenessOf(buildStar({ hostMag: 3 }), buildSettings({ threshold: 'hard' }));
    expect(completenessOf(star, settings)).toEqual(first);
  });

  test('a cell does not depend on the other cells of the grid', () => {
    const whole = completenessOf(star, settings);
    const [cell] = completenessOf(star, settings, {
      massMjup: grid.massMjup.slice(7, 8),
      semiMajorAxisAu: grid.semiMajorAxisAu.slice(5, 6),
    });
    // One column alone has no step in ln a, so its rows are looked up one by one.
    expect(Math.abs(cell - whole[7 * 14 + 5])).toBeLessThan(1e-6);
    const [, ...rows] = completenessOf(star, settings, {
      ...grid,
      massMjup: grid.massMjup.slice(6),
    });
    expect(rows.slice(13, 27)).toEqual(Array.from(whole.slice(7 * 14, 8 * 14)));
  });
});

describe('edges', () => {
  test('for no signal the smooth threshold leaves Φ(-n) of what is covered, the hard one nothing', () => {
    const faint = buildStar({ age: { medianMyr: 9000 }, hostMag: -10 });
    const on = { massMjup: Float64Array.of(0.6), semiMajorAxisAu: Float64Array.of(40) };
    const [smooth] = completenessOf(faint, buildSettings(), on);
    expect(smooth).toBeGreaterThan(2e-7);
    expect(smooth).toBeLessThan(2.9e-7);
    expect(completenessOf(faint, buildSettings({ threshold: 'hard' }), on)[0]).toBe(0);
  });

  test('the report names the nodes outside the built-in law’s validity', () => {
    const { report } = computeCompletenessMap(
      buildStar(),
      builtIn,
      DEFAULT_GRID(),
      buildSettings(),
    );
    expect(report.massNodesOutside).toBe(0);
    const masses = DEFAULT_GRID().massMjup;
    expect(report.lawNodesOutsideValidity).toBe(report.flaggedMassNodes.length);
    expect(report.flaggedMassNodes).toContain(0);
    expect(report.flaggedMassNodes.filter((i) => masses[i] < 5)).toHaveLength(
      masses.filter((m) => m < 5).length,
    );
  });

  test('the answer owns its axes', () => {
    const { map } = computeCompletenessMap(buildStar(), builtIn, grid, buildSettings());
    expect(map.massMjup).not.toBe(grid.massMjup);
    expect(map.massMjup).toEqual(grid.massMjup);
  });

  test.each([
    [{ curves: [] }, 'Star 01 must have a curve, got none'],
    [{ hostMag: Number.NaN }, 'hostMag of Star 01 must be finite, got NaN'],
    [{ hostMags: [1, 2] }, 'one value per curve, got 2 for 1'],
    [{ curves: [buildCurve(), buildCurve({ band: 'J' })] }, 'must be given for curves in H and J'],
    [{ curves: [buildCurve({ band: 'K' })] }, 'band must be one of J, H, Ks, Lp, Mp, got K'],
    [{ curves: [buildCurve({ nSigma: 0 })] }, 'nSigma of Star 01 must be finite and > 0, got 0'],
    [{ age: { medianMyr: 0.5 } }, 'age node of Star 01 must be between 1 and 10000 Myr'],
    [{ distance: { distancePc: 10, errorPc: 9 } }, 'distancePc must stay > 0 at every node'],
  ] as [Partial<StarInputs>, string][])('refuses %j', (part, message) => {
    expect(() => completenessOf(buildStar(part))).toThrow(message);
    expect(() => completenessOf(buildStar(part))).toThrow(RangeError);
  });

  test('refuses masses outside the built-in law and grids out of order', () => {
    const on = (massMjup: number[], axis: number[]) =>
      completenessOf(buildStar(), buildSettings(), {
        massMjup: Float64Array.from(massMjup),
        semiMajorAxisAu: Float64Array.from(axis),
      });
    expect(() => on([100], [10])).toThrow('massMjup must be between 0.5 and 80');
    expect(() => on([5], [10, 9])).toThrow('semiMajorAxisAu[1] must be > 10, got 9');
  });
});
