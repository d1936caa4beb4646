import type { AgeLaw, DistanceLaw, StarInputs } from '@/lib/sensitivity';
import type { TargetRow } from './index';
import { MissingInput } from './missing-input';
import { candidatesOf, membershipOf, type OwnCurve, stellarCompanionOf } from './star-facts';

export { MissingInput } from './missing-input';
export type { OwnCurve } from './star-facts';

function ageOf(target: TargetRow): AgeLaw {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = target;
  const hasBounds = ageMinMyr !== null && ageMaxMyr !== null;
  if (ageMyr === null && !hasBounds) throw new MissingInput('No age: a contrast curve needs one');
  return {
    // Uniform in log age between the bounds: their geometric mean is the median.
    medianMyr: ageMyr ?? Math.sqrt((ageMinMyr as number) * (ageMaxMyr as number)),
    ...(ageLowerMyr !== null && { lowerMyr: ageLowerMyr }),
    ...(ageUpperMyr !== null && { upperMyr: ageUpperMyr }),
    ...(ageMinMyr !== null && { minMyr: ageMinMyr }),
    ...(ageMaxMyr !== null && { maxMyr: ageMaxMyr }),
  };
}

function distanceOf(target: TargetRow): DistanceLaw {
  if (target.distancePc !== null) {
    return { distancePc: target.distancePc, errorPc: target.distanceErrorPc ?? 0 };
  }
  if (target.parallaxMas !== null) {
    return { parallaxMas: target.parallaxMas, errorMas: target.parallaxErrorMas ?? 0 };
  }
  throw new MissingInput('No distance or parallax: a contrast curve needs one');
}

function hostMagOf(target: TargetRow, band: string): number {
  const magnitude = target.magnitudes[band];
  if (!magnitude) {
    throw new MissingInput(`No magnitude of the star in ${band}, the band of its contrast curve`);
  }
  return magnitude.valueMag;
}

/**
 * What the engine needs of one star. Age, distance and stellar companion are those of the first
 * entry, candidates those of all; the curves are sorted by digest, so that the same inputs give the
 * same bytes in whatever order they came in.
 *
 * @param target first entry
 * @param ownCurves curves of all entries, each with its target, whose candidates are loaded
 * @throws MissingInput naming what is not there
 */
export function buildStarInputs(target: TargetRow, ownCurves: OwnCurve[]): StarInputs {
  const sorted = [...ownCurves].sort((a, b) => (a.curve.digest < b.curve.digest ? -1 : 1));
  const hostMags = sorted.map(({ target: owner, curve }) => hostMagOf(owner, curve.band));
  const owners = [...new Set(ownCurves.map((own) => own.target))];
  const candidates = candidatesOf(
    owners,
    sorted.map(({ curve }) => curve.band),
  );
  const membershipProbability = membershipOf(target);
  const stellarCompanion = stellarCompanionOf(target);
  return {
    name: target.name,
    hostMag: hostMags[0],
    hostMags,
    ...(target.hostMassMsun !== null && { hostMassMsun: target.hostMassMsun }),
    age: ageOf(target),
    distance: distanceOf(target),
    ...(membershipProbability !== undefined && { membershipProbability }),
    ...(stellarCompanion && { stellarCompanion }),
    ...(candidates.length > 0 && { candidates }),
    curves: sorted.map(({ curve }) => ({
      separationArcsec: Float64Array.from(curve.separationArcsec),
      contrastMag: Float64Array.from(curve.contrastMag),
      nSigma: curve.nSigma,
      band: curve.band,
      ...(curve.coverage && { coverage: Float64Array.from(curve.coverage) }),
    })),
  };
}
