import { describe, expect, test } from 'vitest';
import { computeCompletenessMap, simulateCompleteness, unstableZone } from '@/lib/sensitivity';
import { buildSettings, buildStar } from './build-star';

const pair = (semiMajorAxisAu: number, eccentricity: number, massRatio: number) => ({
  semiMajorAxisAu,
  eccentricity,
  massRatio,
});

describe('zone that a stellar companion makes unstable', () => {
  test('gives the polynomials of Holman & Wiegert 1999', () => {
    // Equations 1 and 3 in exact fractions, for μ = 1/2, 1/4 and 1/5.
    const cases: [number, number, number, number][] = [
      [0, 1, 0.274, 2.3875],
      [0.5, 1, 0.11775, 3.603125],
      [0.4, 1 / 3, 0.19128, 3.615775],
      [0.2, 0.25, 0.289656, 2.988176],
    ];
    for (const [e, q, inner, outer] of cases) {
      const zone = unstableZone(pair(100, e, q));
      expect(zone[0]).toBeCloseTo(100 * inner, 9);
      expect(zone[1]).toBeCloseTo(100 * outer, 9);
    }
  });

  test('leaves α Centauri A its planets within some 3 au', () => {
    // a = 23.4 au, e = 0.52, masses 1.1 and 0.91: about 3 au (Wiegert & Holman 1997, AJ 113, 1445).
    const [inner] = unstableZone(pair(23.4, 0.52, 0.91 / 1.1));
    expect(inner).toBeGreaterThan(2.5);
    expect(inner).toBeLessThan(3.2);
  });

  test('has no orbit around one star where the pair is too eccentric, never a negative one', () => {
    expect(unstableZone(pair(50, 0.99, 1))[0]).toBeGreaterThanOrEqual(0);
    expect(() => unstableZone(pair(50, 1, 1))).toThrow(/eccentricity/);
    expect(() => unstableZone(pair(0, 0.1, 1))).toThrow(/semiMajorAxisAu/);
    expect(() => unstableZone(pair(50, 0.1, 1.2))).toThrow(/massRatio/);
  });
});

describe('map without the unstable zone', () => {
  const limits = unstableZone(pair(100, 0, 1));
  const grid = {
    massMjup: Float64Array.of(10, 30),
    // The limits themselves are kept.
    semiMajorAxisAu: Float64Array.of(10, limits[0], 30, 100, limits[1], 400),
  };
  const star = buildStar({ stellarCompanion: pair(100, 0, 1) });
  const builtIn = { kind: 'built-in' } as const;
  const kept = computeCompletenessMap(star, builtIn, grid, buildSettings());
  const settings = buildSettings({ unstableZone: 'remove' });
  const removed = computeCompletenessMap(star, builtIn, grid, settings);

  test('is 0 strictly between the limits and untouched elsewhere', () => {
    for (const m of [0, 6]) {
      const after = [...removed.map.completeness.slice(m, m + 6)];
      const before = [...kept.map.completeness.slice(m, m + 6)];
      expect(after).toEqual(before.map((value, j) => (j === 2 || j === 3 ? 0 : value)));
      expect(Math.min(...before)).toBeGreaterThan(0);
    }
    expect(removed.report.nodesRemovedByStellarCompanion).toBe(4);
    expect(kept.report.nodesRemovedByStellarCompanion).toBeUndefined();
  });

  test('simulation agrees that nothing is there', () => {
    const draw = (axis: number) =>
      simulateCompleteness(star, builtIn, 30, axis, settings, 500, 'zone').completeness;
    expect(draw(100)).toBe(0);
    expect(draw(limits[0])).toBeGreaterThan(0);
  });

  test('a star without a known companion keeps its map', () => {
    const alone = computeCompletenessMap(buildStar(), builtIn, grid, settings);
    expect([...alone.map.completeness]).toEqual([...kept.map.completeness]);
    expect(alone.report).toEqual(kept.report);
  });
});
