import { absoluteMagnitude } from '@/lib/quantities/magnitudes';
import type { AxisEstimate, MassEstimate } from '@/lib/schemas/candidates';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import type { AgeLaw } from '@/lib/sensitivity';
import { axisFromSeparation, massFromPhotometry } from '@/lib/sensitivity/vetting';
import type { CompanionObservationRow, TargetRow } from '@/models';
import { readCooling } from './cooling';
import type { FoundCandidate } from './find';

/** An estimate, or why there is none. */
type Estimated<T> = { estimate: T; missing: null } | { estimate: null; missing: string };
const none = (missing: string) => ({ estimate: null, missing }) as const;

function distanceOf(target: TargetRow): { distancePc: number; relativeError: number } | null {
  const { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas } = target;
  if (distancePc !== null) {
    return { distancePc, relativeError: (distanceErrorPc ?? 0) / distancePc };
  }
  if (parallaxMas === null) return null;
  return { distancePc: 1000 / parallaxMas, relativeError: (parallaxErrorMas ?? 0) / parallaxMas };
}

function ageOf(target: TargetRow): AgeLaw | null {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = target;
  const bounds =
    ageMinMyr === null || ageMaxMyr === null ? null : { minMyr: ageMinMyr, maxMyr: ageMaxMyr };
  if (ageMyr === null && bounds === null) return null;
  return {
    medianMyr: ageMyr ?? Math.sqrt((ageMinMyr as number) * (ageMaxMyr as number)),
    ...(ageLowerMyr !== null && { lowerMyr: ageLowerMyr }),
    ...(ageUpperMyr !== null && { upperMyr: ageUpperMyr }),
    ...bounds,
  };
}

/** Mass of the newest measured contrast, through the cooling relation of the survey's maps. */
export async function estimateMass(
  { target, survey }: FoundCandidate,
  observations: CompanionObservationRow[],
): Promise<Estimated<MassEstimate>> {
  const [newest] = [...observations]
    .reverse()
    .filter(({ contrastMag, band }) => contrastMag !== null && band !== null);
  if (!newest) return none('No epoch has a contrast with its band');
  const { band, contrastMag, contrastErrorMag } = newest as CompanionObservationRow & {
    band: string;
    contrastMag: number;
  };
  const host = target.magnitudes[band];
  if (!host) return none(`The list of targets has no magnitude of ${target.name} in ${band}`);
  const distance = distanceOf(target);
  const age = ageOf(target);
  if (!distance) return none(`${target.name} has no distance`);
  if (!age) return none(`${target.name} has no age`);
  const cooling = await readCooling(
    survey.collaborationId,
    mapSettingsSchema.parse(survey.mapSettings),
  );
  if (!cooling) return none('The cooling table of the survey is not there');
  const absoluteMag = absoluteMagnitude(host.valueMag + contrastMag, distance.distancePc);
  const modulusError = (5 / Math.LN10) * distance.relativeError;
  const errorMag = Math.hypot(contrastErrorMag ?? 0, host.errorMag ?? 0, modulusError);
  try {
    const found = massFromPhotometry(cooling.relation, { band, absoluteMag, errorMag, age });
    const { observedOn } = newest;
    const inputs = { observedOn, band, absoluteMag, errorMag, ageMyr: age.medianMyr };
    return { estimate: { ...inputs, cooling: cooling.name, ...found }, missing: null };
  } catch (reason) {
    // An age or a band that the relation does not cover: told, never extrapolated.
    if (reason instanceof RangeError) return none(reason.message);
    throw reason;
  }
}

/** Semi-major axis from the newest separation, under the eccentricity law of the survey's maps. */
export function estimateAxis(
  { target, survey }: FoundCandidate,
  observations: CompanionObservationRow[],
): Estimated<AxisEstimate> {
  const newest = observations[observations.length - 1];
  if (!newest) return none('There is no epoch yet');
  const distance = distanceOf(target);
  if (!distance) return none(`${target.name} has no distance`);
  const projectedSeparationAu = newest.separationArcsec * distance.distancePc;
  const { eccentricity } = mapSettingsSchema.parse(survey.mapSettings);
  const { observedOn } = newest;
  return {
    estimate: {
      observedOn,
      projectedSeparationAu,
      ...axisFromSeparation(projectedSeparationAu, eccentricity),
    },
    missing: null,
  };
}
