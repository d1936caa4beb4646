import { normalCumulative } from '@/lib/numerics/normal';
import { ageQuantile } from './age';
import { distanceAt } from './distance';
import type { AgeLaw, ContrastCurve, StarInputs } from './types';

/** One assumption about a star moved by one step, for a table of systematics. */
export type StarChange =
  | { kind: 'ages'; sigma: number }
  | { kind: 'distances'; sigma: -1 | 1 }
  | { kind: 'n-sigma'; step: -1 | 1 };

/**
 * A star under a changed assumption; the spread of what is changed stays.
 *
 * - ages: median and bounds times (t∓/t0)^|sigma|, t∓ the law's quoted 16 % or 84 % point, or to the
 *   law's own quantile at sigma where none is quoted; each law of a mixture by its own ratio. An age
 *   without spread stays.
 * - distances: nearer or farther by its error; a parallax larger or smaller by its own.
 * - n-sigma: every curve for the threshold n ± 1 of the same noise, hence brighter or fainter by
 *   2.5 log10((n ± 1)/n), not brighter than the star.
 *
 * @param star see StarInputs, not modified
 * @param change see StarChange
 * @returns a new star that shares what did not change
 * @throws RangeError where the change leaves a distance, parallax or n that is not > 0
 */
export function varyStar(star: StarInputs, change: StarChange): StarInputs {
  switch (change.kind) {
    case 'ages':
      return { ...star, age: shiftedAge(star.age, change.sigma) };
    case 'distances':
      return { ...star, distance: shiftedDistance(star.distance, change.sigma) };
    case 'n-sigma':
      return {
        ...star,
        curves: star.curves.map((curve) => atThreshold(curve, change.step, star.name)),
      };
  }
}

function shiftedAge(age: StarInputs['age'], sigma: number): StarInputs['age'] {
  if (!('mixture' in age)) return shiftedLaw(age, sigma);
  return { mixture: age.mixture.map((part) => ({ ...part, age: shiftedLaw(part.age, sigma) })) };
}

function shiftedLaw(law: AgeLaw, sigma: number): AgeLaw {
  const quoted = sigma < 0 ? law.lowerMyr : law.upperMyr;
  const ratio =
    quoted === undefined
      ? ageQuantile(law)(normalCumulative(sigma)) / law.medianMyr
      : (quoted / law.medianMyr) ** Math.abs(sigma);
  const moved = Object.entries(law).map(([name, value]) => [
    name,
    value === undefined ? undefined : value * ratio,
  ]);
  return Object.fromEntries(moved) as unknown as AgeLaw;
}

function shiftedDistance(law: StarInputs['distance'], sigma: -1 | 1): StarInputs['distance'] {
  if ('distancePc' in law) return { ...law, distancePc: distanceAt(law)(sigma) };
  // Farther is a smaller parallax.
  distanceAt(law)(-sigma);
  return { ...law, parallaxMas: law.parallaxMas - sigma * law.errorMas };
}

function atThreshold(curve: ContrastCurve, step: -1 | 1, name: string): ContrastCurve {
  const nSigma = curve.nSigma + step;
  if (!(nSigma > 0)) {
    throw new RangeError(`nSigma of ${name} must stay > 0, got ${curve.nSigma} and a step ${step}`);
  }
  const brighter = 2.5 * Math.log10(nSigma / curve.nSigma);
  return {
    ...curve,
    nSigma,
    contrastMag: curve.contrastMag.map((limit) => Math.max(0, limit - brighter)),
  };
}
