import { InputError } from '@/lib/errors';
import { needsHostMass, type Population, starsWithoutMass } from '@/lib/population';
import { listFirst } from '@/lib/queue/preconditions';
import type { SampleStar } from './run-sample';

/**
 * Masses of the sample's stars for a population that depends on them.
 *
 * @returns shape [star] [M_Sun], or undefined where the population asks for none
 * @throws InputError that names the stars of unknown mass
 */
export function hostMassesFor(
  population: Population,
  stars: readonly SampleStar[],
): Float64Array | undefined {
  if (!needsHostMass(population)) return undefined;
  const masses = Float64Array.from(stars, ({ hostMassMsun }) => hostMassMsun ?? Number.NaN);
  const missing = starsWithoutMass(population, masses, stars.length);
  if (missing.length === 0) return masses;
  const count = missing.length === 1 ? '1 star has' : `${missing.length} stars have`;
  throw new InputError({
    code: 'no-host-mass',
    message:
      `${count} no mass, which this population needs: ` +
      `${listFirst(missing.map((star) => stars[star].name))}. ` +
      'Give the mass of the host with its target, or leave these targets out with a reason',
  });
}
