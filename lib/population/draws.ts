import { createRandom } from '@/lib/numerics/random';
import { populationLaws } from './forms';
import type { Population } from './population';

/**
 * Companions drawn at random from a population.
 *
 * Inverse distribution functions, so that one uniform number gives one value.
 *
 * @param n number of companions, integer >= 0
 * @param seed any text: the same seed gives the same companions
 * @returns massMjup [M_Jup] and semiMajorAxisAu [au], both shape [n], inside the box
 * @throws RangeError for a population that cannot be used, or n that is not a whole number
 */
export function drawCompanions(
  population: Population,
  n: number,
  seed: string,
): { massMjup: Float64Array; semiMajorAxisAu: Float64Array } {
  if (!Number.isInteger(n) || n < 0) {
    throw new RangeError(`the number of companions must be a whole number, got ${n}`);
  }
  const { mass, semiMajorAxis } = populationLaws(population);
  const random = createRandom(seed);
  const massMjup = new Float64Array(n);
  const semiMajorAxisAu = new Float64Array(n);
  const draw = ({ law, min, max }: typeof mass) =>
    Math.min(max, Math.max(min, law.quantile(random.uniform(), min, max)));
  for (let i = 0; i < n; i++) {
    massMjup[i] = draw(mass);
    semiMajorAxisAu[i] = draw(semiMajorAxis);
  }
  return { massMjup, semiMajorAxisAu };
}
