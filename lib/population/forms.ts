import type { BoundedLaw } from './law';
import { checkPopulation, type Population } from './population';
import { powerLaw } from './power-law';

/** The two axes of a population: its density is the product of the two laws. */
export interface PopulationLaws {
  mass: BoundedLaw;
  semiMajorAxis: BoundedLaw;
}

const forms: { [Form in Population['form']]: (population: Population) => PopulationLaws } = {
  'power-law': (population) => ({
    mass: {
      law: powerLaw(population.massIndex),
      min: population.massMinMjup,
      max: population.massMaxMjup,
    },
    semiMajorAxis: {
      law: powerLaw(population.semiMajorAxisIndex),
      min: population.semiMajorAxisMinAu,
      max: population.semiMajorAxisMaxAu,
    },
  }),
};

/**
 * Laws and cutoffs of a population's two axes.
 *
 * @throws RangeError for ranges or indices that cannot be used (see `checkPopulation`)
 */
export function populationLaws(population: Population): PopulationLaws {
  checkPopulation(population);
  return forms[population.form](population);
}

/**
 * Density of a population per d ln m d ln a, normalised over its box.
 *
 * @param massMjup scalar [M_Jup], > 0
 * @param semiMajorAxisAu scalar [au], > 0
 * @returns >= 0; 0 outside the box
 * @throws RangeError for a population that cannot be used
 */
export function populationDensity(
  population: Population,
  massMjup: number,
  semiMajorAxisAu: number,
): number {
  const { mass, semiMajorAxis } = populationLaws(population);
  const along = ({ law, min, max }: BoundedLaw, x: number) =>
    x >= min && x <= max ? law.shape(x) / law.integral(min, max) : 0;
  return along(mass, massMjup) * along(semiMajorAxis, semiMajorAxisAu);
}
