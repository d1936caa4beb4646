import { describe, expect, test } from 'vitest';
import { detectionShape, logDetectionShapes } from '@/lib/inference/detection-shape';
import type { CompanionMeasurement, MeasuredDetection } from '@/lib/inference/measured-places';
import { measuredPlaces } from '@/lib/inference/measured-places';
import { normalCumulative } from '@/lib/numerics/normal';
import { powerLawIntegral } from '@/lib/numerics/special';
import type { PowerLawPopulation } from '@/lib/population';
import { separationQuantile } from '@/lib/sensitivity';

const BOX = { massMinMjup: 3, massMaxMjup: 40, semiMajorAxisMinAu: 10, semiMajorAxisMaxAu: 200 };

function powerLaw(massIndex: number, semiMajorAxisIndex: number, box = BOX): PowerLawPopulation {
  return { form: 'power-law', ...box, massIndex, semiMajorAxisIndex };
}

function found(
  massMjup: number,
  semiMajorAxisAu: number,
  measurement?: CompanionMeasurement,
): MeasuredDetection {
  const detection = { star: 0, name: 'b', massMjup, semiMajorAxisAu };
  return measurement === undefined ? detection : { ...detection, measurement };
}

const density = ({ massIndex, semiMajorAxisIndex }: PowerLawPopulation, m: number, a: number) =>
  (m ** massIndex * a ** semiMajorAxisIndex) /
  (powerLawIntegral(massIndex, 3, 40) * powerLawIntegral(semiMajorAxisIndex, 10, 200));

describe('detectionShape', () => {
  const population = powerLaw(-0.31, 0.39);

  test('without errors it is the density where the companion lies', () => {
    expect(detectionShape(population, found(9, 45))).toBeCloseTo(density(population, 9, 45), 14);
  });

  test('errors that differ on the two sides follow the two halves of the law', () => {
    const mass = { value: 9, lower: 8, upper: 12 };
    const measurement = { kind: 'values', mass, semiMajorAxis: { value: 45 } } as const;
    const half = (sigma: number, sign: number) =>
      Math.exp(0.5 * (0.31 * sigma) ** 2) * normalCumulative(sign * -0.31 * sigma);
    const mean = half(Math.log(12 / 9), 1) + half(Math.log(9 / 8), -1);
    const expected = density(population, 9, 45) * mean;
    const actual = detectionShape(population, found(9, 45, measurement));
    expect(Math.abs(actual / expected - 1)).toBeLessThan(1e-4);
  });

  test('a place outside the ranges counts as nothing', () => {
    expect(detectionShape(population, found(2, 45))).toBe(0);
    const wide = { kind: 'values', mass: { value: 4, upper: 8 }, semiMajorAxis: { value: 45 } };
    const { weight } = (
      measuredPlaces(found(4, 45, wide as CompanionMeasurement), BOX) as {
        mass: { weight: Float64Array };
      }
    ).mass;
    expect(weight.reduce((sum, one) => sum + one, 0)).toBeLessThan(0.99);
  });

  test('samples are weighed by the prior that they were drawn under', () => {
    const samples = { massMjup: Float64Array.of(6, 12), semiMajorAxisAu: Float64Array.of(30, 60) };
    const mean = 0.5 * (density(population, 6, 30) + density(population, 12, 60));
    const logFlat = { kind: 'samples', ...samples, interimPrior: 'log-flat' } as const;
    expect(detectionShape(population, found(9, 45, logFlat))).toBeCloseTo(mean, 14);
    const flat = { kind: 'samples', ...samples, interimPrior: 'flat' } as const;
    const scale = Math.sqrt(6 * 30 * 12 * 60);
    const weighed =
      0.5 *
      scale *
      (density(population, 6, 30) / (6 * 30) + density(population, 12, 60) / (12 * 60));
    expect(detectionShape(population, found(9, 45, flat))).toBeCloseTo(weighed, 14);
    const given = {
      kind: 'samples',
      ...samples,
      interimPrior: Float64Array.of(2, 4),
    } as const;
    const own = 0.5 * (density(population, 6, 30) / 2 + density(population, 12, 60) / 4);
    expect(detectionShape(population, found(9, 45, given))).toBeCloseTo(own, 14);
  });

  test('ends out of order and samples without a partner are refused', () => {
    const bad = { kind: 'values', mass: { value: 9, lower: 10 }, semiMajorAxis: { value: 45 } };
    expect(() => detectionShape(population, found(9, 45, bad as CompanionMeasurement))).toThrow(
      'mass: 9 must lie between its ends, 10 and undefined',
    );
    const lone: CompanionMeasurement = {
      kind: 'samples',
      massMjup: Float64Array.of(9),
      semiMajorAxisAu: new Float64Array(0),
      interimPrior: 'flat',
    };
    expect(() => detectionShape(population, found(9, 45, lone))).toThrow(
      'samples need as many masses as semi-major axes, got 1 and 0',
    );
  });
});

describe('a projected separation alone', () => {
  const eccentricities = [{ law: 'circular' }, { law: 'uniform', max: 0.9 }] as const;

  test.each(eccentricities)('leaves a probability of 1 over all axes: $law', (eccentricity) => {
    const measurement: CompanionMeasurement = {
      kind: 'separation',
      mass: { value: 9 },
      projectedSeparationAu: 50,
      eccentricity,
    };
    const everywhere = { ...BOX, semiMajorAxisMinAu: 0.1, semiMajorAxisMaxAu: 1e6 };
    const places = measuredPlaces(found(9, 50, measurement), everywhere);
    if (places.form !== 'product') throw new Error('a separation has places on each axis');
    const total = places.semiMajorAxis.weight.reduce((sum, one) => sum + one, 0);
    expect(Math.abs(total - 1)).toBeLessThan(1e-6);
  });

  test('averages the density over the semi-major axes that orbits seen there may have', () => {
    const measurement: CompanionMeasurement = {
      kind: 'separation',
      mass: { value: 9 },
      projectedSeparationAu: 50,
      eccentricity: { law: 'circular' },
      logBinWidth: 0.01,
    };
    // With ln a flat the semi-major axis is s/rho: a mean over quantiles of rho, cut at the box.
    const n = 20_000;
    let sum = 0;
    for (let i = 0; i < n; i++) {
      const a = 50 / separationQuantile((i + 0.5) / n, { law: 'circular' });
      if (a <= 200) sum += density(powerLaw(-0.3, 0.4), 9, a) / n;
    }
    const actual = detectionShape(powerLaw(-0.3, 0.4), found(9, 50, measurement));
    expect(Math.abs(actual / sum - 1)).toBeLessThan(2e-5);
  });
});

describe('logDetectionShapes', () => {
  const massIndices = Float64Array.of(-2, 0, 1.4);
  const axisIndices = Float64Array.of(-1, 0.5);
  const samples = {
    massMjup: Float64Array.of(5, 9, 11, 60),
    semiMajorAxisAu: Float64Array.of(20, 45, 120, 45),
  };
  const measurements: [string, CompanionMeasurement][] = [
    [
      'values',
      { kind: 'values', mass: { value: 9, upper: 13 }, semiMajorAxis: { value: 45, lower: 30 } },
    ],
    ['samples', { kind: 'samples', ...samples, interimPrior: 'flat' }],
    [
      'separation',
      {
        kind: 'separation',
        mass: { value: 9, lower: 7, upper: 10 },
        projectedSeparationAu: 40,
        eccentricity: { law: 'fixed', eccentricity: 0.3 },
      },
    ],
  ];

  test.each(measurements)('is ln of detectionShape at every pair of indices: %s', (_, how) => {
    const detection = found(9, 45, how);
    const logs = logDetectionShapes(BOX, detection, massIndices, axisIndices);
    const direct = Array.from(massIndices).flatMap((alpha) =>
      Array.from(axisIndices, (beta) => Math.log(detectionShape(powerLaw(alpha, beta), detection))),
    );
    expect(logs.length).toBe(6);
    direct.forEach((value, at) => {
      expect(logs[at]).toBeCloseTo(value, 11);
    });
  });

  test('is minus infinity where nothing of the measurement lies in the ranges', () => {
    const logs = logDetectionShapes(BOX, found(2, 45), massIndices, axisIndices);
    expect(Array.from(logs)).toEqual(new Array(6).fill(Number.NEGATIVE_INFINITY));
  });
});
