import type { ContrastCurve, SensitivitySettings, StarInputs } from '@/lib/sensitivity';

/** A curve like those of a deep H-band survey; parts may be replaced. */
export function buildCurve(overrides: Partial<ContrastCurve> = {}): ContrastCurve {
  return {
    separationArcsec: Float64Array.of(0.15, 0.3, 0.5, 1, 2, 4.5),
    contrastMag: Float64Array.of(8, 10.6, 12.1, 13.6, 14.4, 14.6),
    nSigma: 5,
    band: 'H',
    ...overrides,
  };
}

/** A young nearby star with errors of age and distance; parts may be replaced. */
export function buildStar(overrides: Partial<StarInputs> = {}): StarInputs {
  return {
    name: 'Star 01',
    hostMag: 6.4,
    age: { medianMyr: 24, lowerMyr: 19, upperMyr: 31 },
    distance: { distancePc: 33, errorPc: 1.2 },
    curves: [buildCurve()],
    ...overrides,
  };
}

export function buildSettings(overrides: Partial<SensitivitySettings> = {}): SensitivitySettings {
  return {
    eccentricity: { law: 'beta', alpha: 0.867, beta: 3.03 },
    threshold: 'smooth',
    massOutsideTable: 'undetectable',
    ageOutsideTable: 'refuse',
    ...overrides,
  };
}
