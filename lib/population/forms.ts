import { type AxisShape, axisLaw } from './axis-shape';
import { populationBox } from './box';
import { checkPopulation } from './checks';
import type { BoundedLaw } from './law';
import type { LawPopulation, Population } from './population';

/** The two axes of a population: its density is the product of the two laws. */
export interface PopulationLaws {
  mass: BoundedLaw;
  semiMajorAxis: BoundedLaw;
}

/** Shapes along the two axes; a power law in the mass ratio is the same one in mass. */
export function axisShapes(population: LawPopulation): {
  mass: AxisShape;
  semiMajorAxis: AxisShape;
} {
  switch (population.form) {
    case 'power-law':
      return {
        mass: { shape: 'power-law', index: population.massIndex },
        semiMajorAxis: { shape: 'power-law', index: population.semiMajorAxisIndex },
      };
    case 'mass-ratio':
      return {
        mass: { shape: 'power-law', index: population.massRatioIndex },
        semiMajorAxis: population.semiMajorAxis,
      };
    case 'shaped':
      return { mass: population.mass, semiMajorAxis: population.semiMajorAxis };
  }
}

/**
 * Laws and cutoffs of a population's two axes.
 *
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @throws RangeError for a population that cannot be used (see `checkPopulation`), for tabulated
 *   systems, which have no laws, and for the mass ratio without a host mass
 */
export function populationLaws(population: Population, hostMassMsun?: number): PopulationLaws {
  checkPopulation(population);
  if (population.form === 'systems') {
    throw new RangeError('tabulated systems have no laws along the axes: each system counts whole');
  }
  const shapes = axisShapes(population);
  const box = populationBox(population, hostMassMsun);
  return {
    mass: { law: axisLaw(shapes.mass), min: box.massMinMjup, max: box.massMaxMjup },
    semiMajorAxis: {
      law: axisLaw(shapes.semiMajorAxis),
      min: box.semiMajorAxisMinAu,
      max: box.semiMajorAxisMaxAu,
    },
  };
}

/**
 * Density of a population per d ln m d ln a, normalised over its box.
 *
 * @param massMjup scalar [M_Jup], > 0
 * @param semiMajorAxisAu scalar [au], > 0
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @returns >= 0; 0 outside the box
 * @throws RangeError as `populationLaws`
 */
export function populationDensity(
  population: Population,
  massMjup: number,
  semiMajorAxisAu: number,
  hostMassMsun?: number,
): number {
  const { mass, semiMajorAxis } = populationLaws(population, hostMassMsun);
  const along = ({ law, min, max }: BoundedLaw, x: number) =>
    x >= min && x <= max ? law.shape(x) / law.integral(min, max) : 0;
  return along(mass, massMjup) * along(semiMajorAxis, semiMajorAxisAu);
}
