import { julianYearOf } from '@/lib/quantities/earth-position';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { type HostMotion, type MeasuredOffset, testMotion } from '@/lib/sensitivity/vetting';
import type { CompanionObservationRow, TargetRow } from '@/models';

const numberIn = (attributes: Record<string, unknown>, name: string): number | null => {
  const value = attributes[name];
  return typeof value === 'number' ? value : null;
};

/** Parallax with its error; from the distance where none is listed. */
function parallaxOf(target: TargetRow): { parallaxMas: number; parallaxErrorMas: number } | null {
  const { parallaxMas, parallaxErrorMas, distancePc, distanceErrorPc } = target;
  if (parallaxMas !== null) return { parallaxMas, parallaxErrorMas: parallaxErrorMas ?? 0 };
  if (distancePc === null) return null;
  const parallax = 1000 / distancePc;
  return {
    parallaxMas: parallax,
    parallaxErrorMas: (parallax * (distanceErrorPc ?? 0)) / distancePc,
  };
}

/** What moves the star, or what is missing for it, in words. */
export function motionOf(
  target: TargetRow,
): { motion: HostMotion; motionMissing: null } | { motion: null; motionMissing: string } {
  const { raDeg, decDeg, attributes } = target;
  const pmRaMasYr = numberIn(attributes, 'pmRaMasYr');
  const pmDecMasYr = numberIn(attributes, 'pmDecMasYr');
  const parallax = parallaxOf(target);
  const missing = [
    raDeg === null || decDeg === null ? 'position' : '',
    pmRaMasYr === null || pmDecMasYr === null ? 'proper motion' : '',
    parallax === null ? 'parallax or distance' : '',
  ].filter((word) => word !== '');
  if (missing.length > 0) {
    const motionMissing = `The list of targets has no ${missing.join(' and no ')} of ${target.name}, so nobody can say where a source behind it would appear`;
    return { motion: null, motionMissing };
  }
  const motion = { raDeg, decDeg, pmRaMasYr, pmDecMasYr, ...parallax } as HostMotion;
  return { motion, motionMissing: null };
}

function measuredOf(row: CompanionObservationRow): MeasuredOffset | null {
  const { separationErrorArcsec, positionAngleErrorDeg } = row;
  if (separationErrorArcsec === null || positionAngleErrorDeg === null) return null;
  return {
    julianYear: julianYearOf(row.observedOn),
    separationArcsec: row.separationArcsec,
    separationErrorArcsec,
    positionAngleDeg: row.positionAngleDeg,
    positionAngleErrorDeg,
  };
}

/** Both hypotheses against the epochs that have errors; null where they are of fewer than two days. */
export function testHypotheses(
  motion: HostMotion | null,
  rows: CompanionObservationRow[],
): CandidateDetail['hypotheses'] {
  const tested = rows.flatMap((row) => {
    const measured = measuredOf(row);
    return measured ? [{ id: row.id, measured }] : [];
  });
  const days = new Set(tested.map(({ measured }) => measured.julianYear));
  if (!motion || days.size < 2) return null;
  const measured = tested.map((one) => one.measured);
  const fitOf = (hypothesis: 'common-proper-motion' | 'background') => {
    const { predicted, ...fit } = testMotion(motion, measured, hypothesis);
    return fit;
  };
  return {
    observationIds: tested.map(({ id }) => id),
    commonProperMotion: fitOf('common-proper-motion'),
    background: fitOf('background'),
  };
}
