import { mapIndices } from './axis-shape';
import { type AxisConvention, type MassConvention, toLogIndex } from './conventions';
import type { Population } from './population';

/** Digits kept of a converted index: the convention it was given in must not show in a digest. */
const INDEX_DIGITS = 12;

/** In which conventions the indices of a definition are stated. */
export interface StatedConventions {
  mass: MassConvention;
  semiMajorAxis: AxisConvention;
}

/**
 * A definition with all its indices per natural logarithm, as it is stored.
 *
 * Densities of tabulated laws are per d ln x in every convention, and the index of the host
 * scaling is a plain exponent: both stay.
 *
 * @param stated a definition whose indices follow `conventions`
 * @example toStoredPopulation(population, { mass: 'linear', semiMajorAxis: 'period' })
 */
export function toStoredPopulation<P extends Population>(
  stated: P,
  conventions: StatedConventions,
): P {
  const convert = (convention: AxisConvention) => (index: number) =>
    convention === 'log' || convention === 'log10'
      ? index
      : Number(toLogIndex(index, convention).toPrecision(INDEX_DIGITS));
  const ofMass = convert(conventions.mass);
  const ofAxis = convert(conventions.semiMajorAxis);
  return convertIndices(stated, ofMass, ofAxis) as P;
}

function convertIndices(
  population: Population,
  ofMass: (index: number) => number,
  ofAxis: (index: number) => number,
): Population {
  switch (population.form) {
    case 'power-law':
      return {
        ...population,
        massIndex: ofMass(population.massIndex),
        semiMajorAxisIndex: ofAxis(population.semiMajorAxisIndex),
      };
    case 'shaped':
      return {
        ...population,
        mass: mapIndices(population.mass, ofMass),
        semiMajorAxis: mapIndices(population.semiMajorAxis, ofAxis),
      };
    case 'mass-ratio':
      return {
        ...population,
        massRatioIndex: ofMass(population.massRatioIndex),
        semiMajorAxis: mapIndices(population.semiMajorAxis, ofAxis),
      };
    case 'systems':
      return population;
  }
}
