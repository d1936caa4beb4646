import { JUPITER_MASSES_PER_SUN } from '@/lib/quantities/constants';
import { hostScalingOf, needsHostMass, type Population } from './population';

const NAMED = 5;

const isMass = (massMsun: number | undefined): massMsun is number =>
  massMsun !== undefined && massMsun > 0 && Number.isFinite(massMsun);

/**
 * Companion mass of a mass ratio.
 *
 * @param massRatio q [1]
 * @param hostMassMsun M_j [M_Sun], > 0
 * @returns m = q M_j [M_Jup]
 * @throws RangeError for a host mass that is not positive
 * @example massOfRatioMjup(0.002, 0.6) // 1.25707861759257
 */
export function massOfRatioMjup(massRatio: number, hostMassMsun: number | undefined): number {
  if (!isMass(hostMassMsun)) {
    throw new RangeError(
      `a population in the mass ratio needs the mass of each host star [M_Sun], got ${hostMassMsun}`,
    );
  }
  return massRatio * hostMassMsun * JUPITER_MASSES_PER_SUN;
}

/**
 * Places of the stars whose mass is missing though the population needs it.
 *
 * @param hostMassMsun shape [star] [M_Sun]; NaN where unknown; undefined: none is known
 * @param stars number of stars
 * @returns indices, in order; none for a population that needs no masses
 */
export function starsWithoutMass(
  population: Population,
  hostMassMsun: Float64Array | undefined,
  stars: number,
): number[] {
  if (!needsHostMass(population)) return [];
  return Array.from({ length: stars }, (_, star) => star).filter(
    (star) => !isMass(hostMassMsun?.[star]),
  );
}

/**
 * Refuses a sample with stars of unknown mass where the population needs them.
 *
 * @param hostMassMsun shape [star] [M_Sun]; NaN where unknown
 * @param stars number of stars
 * @param names of the stars, for the message; without them their places, from 1
 * @throws RangeError that names the stars
 */
export function requireHostMasses(
  population: Population,
  hostMassMsun: Float64Array | undefined,
  stars: number,
  names?: readonly string[],
): void {
  const missing = starsWithoutMass(population, hostMassMsun, stars);
  if (missing.length === 0) return;
  const named = missing.slice(0, NAMED).map((star) => names?.[star] ?? `star ${star + 1}`);
  const rest = missing.length - named.length;
  const asks =
    population.form === 'mass-ratio'
      ? 'a population in the mass ratio'
      : 'a rate that scales with the host mass';
  throw new RangeError(
    `${asks} needs the mass of every star; missing for ${named.join(', ')}` +
      (rest > 0 ? ` and ${rest} more` : ''),
  );
}

/**
 * Each star's rate over the rate that is asked for: s_j = (M_j/M0)^index.
 *
 * @param hostMassMsun shape [star] [M_Sun], > 0
 * @returns shape [star] [1], or null where the rate is the same for all stars
 * @throws RangeError for a star of unknown mass
 */
export function rateScales(
  population: Population,
  hostMassMsun: Float64Array | undefined,
  stars: number,
): Float64Array | null {
  const scaling = hostScalingOf(population);
  if (scaling === null) return null;
  requireHostMasses(population, hostMassMsun, stars);
  return (hostMassMsun as Float64Array).map(
    (mass) => (mass / scaling.referenceMsun) ** scaling.index,
  );
}

/**
 * Largest host fraction at the reference mass that leaves no star's own fraction above 1.
 *
 * @param rateScale s_j, shape [star], > 0
 * @returns min 1/s_j, at most 1
 */
export function largestReferenceFraction(rateScale: Float64Array): number {
  return rateScale.reduce((least, scale) => Math.min(least, 1 / scale), 1);
}
