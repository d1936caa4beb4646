import { createRandom } from '@/lib/numerics/random';
import { checkPopulation } from './checks';
import { populationLaws } from './forms';
import { requireHostMasses } from './host-mass';
import type { BoundedLaw } from './law';
import type { LawPopulation, Population, SystemsPopulation } from './population';

/** Companions in columns, shape [companion]. */
export interface DrawnCompanions {
  /** [M_Jup]. */
  massMjup: Float64Array;
  /** [au]. */
  semiMajorAxisAu: Float64Array;
}

/** Whole systems drawn for a number of stars. */
export interface DrawnSystems extends DrawnCompanions {
  /** Index of the star that each companion belongs to, in order, shape [companion]. */
  star: Int32Array;
}

function requireCount(n: number, of: string): void {
  if (!Number.isInteger(n) || n < 0) {
    throw new RangeError(`the number of ${of} must be a whole number, got ${n}`);
  }
}

const drawFrom = ({ law, min, max }: BoundedLaw, uniform: number) =>
  Math.min(max, Math.max(min, law.quantile(uniform, min, max)));

function drawFromLaws(
  population: LawPopulation,
  n: number,
  seed: string,
  hostMassMsun?: Float64Array,
): DrawnCompanions {
  const differs = population.form === 'mass-ratio';
  if (differs) requireHostMasses(population, hostMassMsun, n);
  const random = createRandom(seed);
  const massMjup = new Float64Array(n);
  const semiMajorAxisAu = new Float64Array(n);
  let laws = differs ? null : populationLaws(population);
  for (let i = 0; i < n; i++) {
    if (differs && (laws === null || hostMassMsun?.[i] !== hostMassMsun?.[i - 1])) {
      laws = populationLaws(population, hostMassMsun?.[i]);
    }
    if (laws === null) break;
    massMjup[i] = drawFrom(laws.mass, random.uniform());
    semiMajorAxisAu[i] = drawFrom(laws.semiMajorAxis, random.uniform());
  }
  return { massMjup, semiMajorAxisAu };
}

/** Index drawn with probability proportional to its weight, from the running sums of the weights. */
function drawIndex(upTo: Float64Array, uniform: number): number {
  const wanted = uniform * upTo[upTo.length - 1];
  let low = 0;
  let high = upTo.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (upTo[middle] > wanted) high = middle;
    else low = middle + 1;
  }
  return low;
}

function runningSums(weights: ArrayLike<number>): Float64Array {
  const upTo = new Float64Array(weights.length);
  let sum = 0;
  for (let i = 0; i < upTo.length; i++) {
    sum += weights[i];
    upTo[i] = sum;
  }
  return upTo;
}

/**
 * Companions drawn at random from a population, each by itself.
 *
 * Inverse distribution functions, so that one uniform number gives one value. Of tabulated systems
 * single companions are drawn, by their systems' weight; `drawSystems` draws whole ones.
 *
 * @param n number of companions, integer >= 0
 * @param seed any text: the same seed gives the same companions
 * @param hostMassMsun of each companion's star, shape [n] [M_Sun]: needed for the mass ratio alone
 * @returns massMjup [M_Jup] and semiMajorAxisAu [au], both shape [n], inside the box
 * @throws RangeError for a population that cannot be used, an n that is not a whole number, and a
 *   missing host mass
 */
export function drawCompanions(
  population: Population,
  n: number,
  seed: string,
  hostMassMsun?: Float64Array,
): DrawnCompanions {
  requireCount(n, 'companions');
  checkPopulation(population);
  if (population.form !== 'systems') return drawFromLaws(population, n, seed, hostMassMsun);
  const { weight, companionSystem } = population;
  const upTo = runningSums(companionSystem.map((system) => weight[system]));
  const random = createRandom(seed);
  const drawn = Int32Array.from({ length: n }, () => drawIndex(upTo, random.uniform()));
  return {
    massMjup: Float64Array.from(drawn, (k) => population.massMjup[k]),
    semiMajorAxisAu: Float64Array.from(drawn, (k) => population.semiMajorAxisAu[k]),
  };
}

/**
 * One whole system for each of n stars, drawn by weight.
 *
 * @param n number of stars, integer >= 0
 * @param seed any text: the same seed gives the same systems
 * @returns all companions, star after star; a star that drew an empty system has none
 * @throws RangeError for systems that cannot be used and an n that is not a whole number
 */
export function drawSystems(population: SystemsPopulation, n: number, seed: string): DrawnSystems {
  requireCount(n, 'stars');
  checkPopulation(population);
  const { weight, companionSystem, massMjup, semiMajorAxisAu } = population;
  const members: number[][] = weight.map(() => []);
  companionSystem.forEach((system, k) => {
    members[system].push(k);
  });
  const upTo = runningSums(weight);
  const random = createRandom(seed);
  const star: number[] = [];
  const companion: number[] = [];
  for (let i = 0; i < n; i++) {
    for (const k of members[drawIndex(upTo, random.uniform())]) {
      star.push(i);
      companion.push(k);
    }
  }
  return {
    star: Int32Array.from(star),
    massMjup: Float64Array.from(companion, (k) => massMjup[k]),
    semiMajorAxisAu: Float64Array.from(companion, (k) => semiMajorAxisAu[k]),
  };
}
