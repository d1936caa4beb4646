import type { CompanionRecord } from '../kinds';
import type { WrittenCell } from './written-table';

export type WrittenCompanion = Omit<CompanionRecord, 'line'>;

/** Errors of a value: one column where both are the same, else two. */
function errorsOf(name: string, lower: number | null, upper: number | null) {
  return Object.is(lower, upper)
    ? { [`${name}_error`]: lower }
    : { [`${name}_error_lower`]: lower, [`${name}_error_upper`]: upper };
}

/** A companion as a row of the table that reads back to the same record. */
export function companionRow(companion: WrittenCompanion): Record<string, WrittenCell> {
  return {
    target: companion.target,
    companion: companion.companion,
    status: companion.status,
    mass: companion.massMjup,
    ...errorsOf('mass', companion.massErrorLowerMjup, companion.massErrorUpperMjup),
    semi_major_axis: companion.semiMajorAxisAu,
    ...errorsOf(
      'semi_major_axis',
      companion.semiMajorAxisErrorLowerAu,
      companion.semiMajorAxisErrorUpperAu,
    ),
    projected_separation: companion.projectedSeparationAu,
    separation: companion.separationArcsec,
    separation_error: companion.separationErrorArcsec,
    position_angle: companion.positionAngleDeg,
    position_angle_error: companion.positionAngleErrorDeg,
    contrast: companion.contrastMag,
    contrast_error: companion.contrastErrorMag,
    band: companion.band,
    epoch: companion.epoch,
    eccentricity: companion.eccentricity,
    common_proper_motion: companion.commonProperMotion,
    probability: companion.probability,
    reference: companion.reference,
  };
}
