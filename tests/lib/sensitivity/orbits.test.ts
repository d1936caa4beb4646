import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  ECCENTRICITY_PRESETS,
  type EccentricityLaw,
  eccentricAnomaly,
  requireEccentricityLaw,
  separationCumulative,
  separationMoments,
  separationQuantile,
  trueAnomaly,
} from '@/lib/sensitivity';
import { eccentricityQuantile } from '@/lib/sensitivity/eccentricity';
import { exactRows, newRow, tabulatedRows } from '@/lib/sensitivity/separation-rows';

const eccentricities = fc.double({ min: 0, max: 0.999999, noNaN: true });

describe('eccentricAnomaly(M, e)', () => {
  test('solves E - e sin E = M for every e and M', () => {
    fc.assert(
      fc.property(fc.double({ min: -50, max: 50, noNaN: true }), eccentricities, (mean, e) => {
        const anomaly = eccentricAnomaly(mean, e);
        expect(Math.abs(anomaly - e * Math.sin(anomaly) - mean)).toBeLessThan(2e-12);
      }),
      { numRuns: 500 },
    );
  });

  test('keeps the turns, is odd, and never falls', () => {
    expect(eccentricAnomaly(0.3 + 20 * Math.PI, 0.7)).toBeCloseTo(
      eccentricAnomaly(0.3, 0.7) + 20 * Math.PI,
      11,
    );
    expect(eccentricAnomaly(-0.3, 0.7)).toBe(-eccentricAnomaly(0.3, 0.7));
    expect(eccentricAnomaly(1e-9, 0.999999999)).toBeGreaterThan(0);
  });

  test('refuses e outside [0, 1)', () => {
    expect(() => eccentricAnomaly(1, 1)).toThrow('eccentricity must be >= 0 and < 1, got 1');
    expect(() => eccentricAnomaly(Infinity, 0)).toThrow('meanAnomaly must be finite');
    expect(() => trueAnomaly(1, -0.1)).toThrow(RangeError);
  });
});

const laws: [string, EccentricityLaw][] = [
  ['fixed', { law: 'fixed', eccentricity: 0.6 }],
  ['beta with an edge at 0', { law: 'beta', alpha: 0.5, beta: 2 }],
  ['narrow beta', { law: 'beta', alpha: 300, beta: 900 }],
  ['wide Rayleigh', { law: 'rayleigh', sigma: 2 }],
  ...ECCENTRICITY_PRESETS.map(({ name, law }): [string, EccentricityLaw] => [name, law]),
];

describe('separationCumulative(x, law)', () => {
  test.each(laws)('%s: starts at 0, ends at 1, never falls', (_, law) => {
    const places = Array.from({ length: 81 }, (__, i) => i / 40);
    const values = places.map((x) => separationCumulative(x, law));
    expect(values[0]).toBe(0);
    expect(values[80]).toBe(1);
    values.slice(1).forEach((value, i) => {
      expect(value).toBeGreaterThanOrEqual(values[i] - 1e-6);
    });
  });

  test.each(laws)('%s: its mean is the closed form (π/4)(1 + <e²>/2)', (_, law) => {
    // Midpoint rule on ∫ (1 - F) dx: the singular density is never touched.
    const n = 1500;
    let mean = 0;
    for (let i = 0; i < n; i++)
      mean += (1 - separationCumulative((2 * (i + 0.5)) / n, law)) * (2 / n);
    expect(mean).toBeCloseTo(separationMoments(law).mean, 3);
  });

  test('quantile and distribution function are each other’s inverse', () => {
    for (const [, law] of laws) {
      for (const p of [0.05, 0.5, 0.99]) {
        expect(separationCumulative(separationQuantile(p, law), law)).toBeCloseTo(p, 6);
      }
    }
    expect(separationQuantile(0, { law: 'circular' })).toBe(0);
    expect(() => separationQuantile(2, { law: 'circular' })).toThrow('p must be between 0 and 1');
  });
});

describe('eccentricity laws', () => {
  test.each([
    [{ law: 'fixed', eccentricity: 1 }, 'eccentricity must be >= 0 and < 1, got 1'],
    [{ law: 'uniform', max: 1 }, 'max must be above 0 and below 1, got 1'],
    [{ law: 'beta', alpha: 0, beta: 1 }, 'alpha must be finite and > 0, got 0'],
    [{ law: 'beta', alpha: 1, beta: -1 }, 'beta must be finite and > 0, got -1'],
    [{ law: 'rayleigh', sigma: 0 }, 'sigma must be finite and > 0, got 0'],
  ] as [EccentricityLaw, string][])('refuses %j', (law, message) => {
    expect(() => requireEccentricityLaw(law)).toThrow(message);
    expect(() => separationCumulative(0.5, law)).toThrow(message);
  });

  test.each(laws)('%s: drawn eccentricities have the law’s mean square', (_, law) => {
    const quantile = eccentricityQuantile(law);
    const n = 20_000;
    let squares = 0;
    for (let i = 0; i < n; i++) squares += quantile((i + 0.5) / n) ** 2 / n;
    const { meanSquare } = separationMoments(law);
    expect((2 / 3) * (1 + 1.5 * squares)).toBeCloseTo(meanSquare, 4);
  });
});

describe('rows of F and its antiderivatives', () => {
  const logAxis = Float64Array.of(3, 10, 40, 200, 3000).map(Math.log);

  test.each(laws)('%s: the table follows the distribution function', (_, law) => {
    const row = newRow(5);
    for (const separation of [4, 11, 37.3, 250]) {
      exactRows(law, logAxis)(Math.log(separation), row);
      row.cumulative.forEach((value, j) => {
        const exact = separationCumulative(separation / Math.exp(logAxis[j]), law);
        expect(Math.abs(value - exact)).toBeLessThan(2e-5);
      });
    }
  });

  test('each antiderivative has the one before as slope, below and beyond the table too', () => {
    for (const law of [laws[0][1], { law: 'circular' } as const]) {
      const fill = tabulatedRows(law, logAxis);
      const [below, above, middle] = [newRow(5), newRow(5), newRow(5)];
      for (const y of [-3, Math.log(20), Math.log(45), 12]) {
        fill(y - 1e-4, below);
        fill(y + 1e-4, above);
        fill(y, middle);
        for (let j = 0; j < 5; j++) {
          const first = (above.first[j] - below.first[j]) / 2e-4;
          const second = (above.second[j] - below.second[j]) / 2e-4;
          expect(first).toBeCloseTo(middle.cumulative[j], 3);
          expect(second).toBeCloseTo(middle.first[j], 6);
        }
      }
    }
  });

  test('the exact rows of circular orbits agree with the table away from ρ = 1', () => {
    const [exact, table] = [newRow(5), newRow(5)];
    exactRows({ law: 'circular' }, logAxis)(Math.log(23), exact);
    tabulatedRows({ law: 'circular' }, logAxis)(Math.log(23), table);
    for (let j = 0; j < 5; j++) {
      expect(exact.cumulative[j]).toBeCloseTo(table.cumulative[j], 5);
      expect(exact.first[j]).toBeCloseTo(table.first[j], 5);
    }
  });
});
