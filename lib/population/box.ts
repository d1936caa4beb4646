import { massOfRatioMjup } from './host-mass';
import type { Population, PopulationBox, SystemsPopulation, SystemsSummary } from './population';

const least = (values: number[]) => values.reduce((a, b) => Math.min(a, b), Infinity);
const most = (values: number[]) => values.reduce((a, b) => Math.max(a, b), 0);

function boxOfSystems({ massMjup, semiMajorAxisAu }: SystemsPopulation): PopulationBox {
  return {
    massMinMjup: least(massMjup),
    massMaxMjup: most(massMjup),
    semiMajorAxisMinAu: least(semiMajorAxisAu),
    semiMajorAxisMaxAu: most(semiMajorAxisAu),
  };
}

/** Counts and box of tabulated systems, for lists and words. */
export function summariseSystems(population: SystemsPopulation): SystemsSummary {
  return {
    form: 'systems',
    systems: population.weight.length,
    companions: population.companionSystem.length,
    ...boxOfSystems(population),
  };
}

/**
 * Ranges of the companions that a population is about.
 *
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @returns edges [M_Jup], [au]; of tabulated systems the smallest box that holds all companions
 * @throws RangeError for a population in the mass ratio without a host mass
 * @example populationBox({ form: 'mass-ratio', massRatioMin: 0.002, massRatioMax: 0.02, … }, 0.6)
 * // massMinMjup 1.25707861759257, massMaxMjup 12.5707861759257
 */
export function populationBox(population: Population, hostMassMsun?: number): PopulationBox {
  if (population.form === 'systems') return boxOfSystems(population);
  const { semiMajorAxisMinAu, semiMajorAxisMaxAu } = population;
  if (population.form === 'mass-ratio') {
    return {
      massMinMjup: massOfRatioMjup(population.massRatioMin, hostMassMsun),
      massMaxMjup: massOfRatioMjup(population.massRatioMax, hostMassMsun),
      semiMajorAxisMinAu,
      semiMajorAxisMaxAu,
    };
  }
  const { massMinMjup, massMaxMjup } = population;
  return { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu };
}

/**
 * Ranges that hold the companions of every star of a sample.
 *
 * @param hostMassMsun shape [star] [M_Sun]; stars of unknown mass are passed over
 * @returns edges, or null for a population in the mass ratio when no mass is known
 */
export function sampleBox(
  population: Population,
  hostMassMsun: Float64Array,
): PopulationBox | null {
  if (population.form !== 'mass-ratio') return populationBox(population);
  const known = hostMassMsun.filter((mass) => mass > 0);
  if (known.length === 0) return null;
  const lightest = known.reduce((a, b) => Math.min(a, b));
  const heaviest = known.reduce((a, b) => Math.max(a, b));
  return {
    ...populationBox(population, heaviest),
    massMinMjup: massOfRatioMjup(population.massRatioMin, lightest),
  };
}

/**
 * Whether a companion's best mass and semi-major axis lie in the box of a population.
 *
 * @param massMjup scalar [M_Jup]
 * @param semiMajorAxisAu scalar [au]
 * @param hostMassMsun of its star [M_Sun]: needed for the mass ratio alone
 * @returns true inside and on the edges: a companion exactly at a cutoff counts
 * @throws RangeError for a population in the mass ratio without a host mass
 */
export function isInside(
  population: Population,
  massMjup: number,
  semiMajorAxisAu: number,
  hostMassMsun?: number,
): boolean {
  const box = populationBox(population, hostMassMsun);
  return (
    massMjup >= box.massMinMjup &&
    massMjup <= box.massMaxMjup &&
    semiMajorAxisAu >= box.semiMajorAxisMinAu &&
    semiMajorAxisAu <= box.semiMajorAxisMaxAu
  );
}
