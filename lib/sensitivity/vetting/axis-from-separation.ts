import { separationQuantile } from '../orbits';
import type { EccentricityLaw } from '../types';

/** A value with its central 68 % interval. */
export interface Estimate {
  median: number;
  /** At 16 and 84 %. */
  lower: number;
  upper: number;
}

const LOWER = 0.16;
const UPPER = 0.84;

/**
 * Semi-major axis of a companion of which one projected separation is known.
 *
 * With a flat in its logarithm, isotropic orientation and random time, ln a = ln s − ln ρ: quantile
 * p of a is s over quantile 1 − p of ρ, the projected separation in units of the semi-major axis.
 * The error of s, a few per cent, is not in the interval.
 *
 * @param projectedSeparationAu s, [au], > 0
 * @param law eccentricity law
 * @returns a, [au]
 * @throws RangeError for s not > 0 or parameters of the law outside their domain
 * @example axisFromSeparation(50, { law: 'circular' }).median // 57.735
 */
export function axisFromSeparation(projectedSeparationAu: number, law: EccentricityLaw): Estimate {
  if (!(projectedSeparationAu > 0 && Number.isFinite(projectedSeparationAu))) {
    throw new RangeError(
      `projectedSeparationAu must be finite and > 0, got ${projectedSeparationAu}`,
    );
  }
  const at = (p: number) => projectedSeparationAu / separationQuantile(1 - p, law);
  return { median: at(0.5), lower: at(LOWER), upper: at(UPPER) };
}
