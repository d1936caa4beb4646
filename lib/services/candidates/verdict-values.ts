import { InputError } from '@/lib/errors';
import type { GiveVerdict } from '@/lib/schemas/candidates';
import type { CompanionRow, CompanionVerdictRow } from '@/models';
import { observationsOf } from './detail';
import { estimateAxis, estimateMass } from './estimates';
import type { FoundCandidate } from './find';

/** Mass and axis as a verdict keeps them, each with how it came about. */
export type Values = Pick<
  CompanionVerdictRow,
  | 'massMjup'
  | 'massErrorLowerMjup'
  | 'massErrorUpperMjup'
  | 'massFrom'
  | 'semiMajorAxisAu'
  | 'semiMajorAxisErrorLowerAu'
  | 'semiMajorAxisErrorUpperAu'
  | 'semiMajorAxisFrom'
>;

type MassValues = Pick<
  Values,
  'massMjup' | 'massErrorLowerMjup' | 'massErrorUpperMjup' | 'massFrom'
>;
type AxisValues = Omit<Values, keyof MassValues>;

const noEstimate = (column: string, message: string) =>
  new InputError({ code: 'no-estimate', column, message });

/** A given mass, or one from photometry; null where the candidate keeps what it has. */
export async function newMass(
  found: FoundCandidate,
  { mass }: GiveVerdict,
): Promise<MassValues | null> {
  if (mass.from === 'kept') return null;
  if (mass.from === 'given') {
    return {
      massMjup: mass.value,
      massErrorLowerMjup: mass.errorLower,
      massErrorUpperMjup: mass.errorUpper,
      massFrom: 'given',
    };
  }
  const { estimate, missing } = await estimateMass(found, await observationsOf(found.row.id));
  if (missing !== null) throw noEstimate('mass', `No mass from photometry. ${missing}`);
  if (!estimate.interval) {
    const side = estimate.outside === null ? 'beside' : `${estimate.outside} than`;
    throw noEstimate(
      'mass',
      `No mass from photometry: absolute magnitude ${estimate.absoluteMag.toFixed(2)} in ${estimate.band} is ${side} every mass of ${estimate.cooling} at ${estimate.ageMyr} Myr`,
    );
  }
  const { median, lower, upper } = estimate.interval;
  return {
    massMjup: median,
    massErrorLowerMjup: median - lower,
    massErrorUpperMjup: upper - median,
    massFrom: 'photometry',
  };
}

/** The same for the semi-major axis. */
export async function newAxis(
  found: FoundCandidate,
  { semiMajorAxis }: GiveVerdict,
): Promise<AxisValues | null> {
  if (semiMajorAxis.from === 'kept') return null;
  if (semiMajorAxis.from === 'given') {
    return {
      semiMajorAxisAu: semiMajorAxis.value,
      semiMajorAxisErrorLowerAu: semiMajorAxis.errorLower,
      semiMajorAxisErrorUpperAu: semiMajorAxis.errorUpper,
      semiMajorAxisFrom: 'given',
    };
  }
  const { estimate, missing } = estimateAxis(found, await observationsOf(found.row.id));
  if (missing !== null) {
    throw noEstimate('semiMajorAxis', `No semi-major axis from the separation. ${missing}`);
  }
  const { median, lower, upper } = estimate;
  return {
    semiMajorAxisAu: median,
    semiMajorAxisErrorLowerAu: median - lower,
    semiMajorAxisErrorUpperAu: upper - median,
    semiMajorAxisFrom: 'separation',
  };
}

/** What the candidate has, with where the last decision took it from. */
export function keptValues(row: CompanionRow, last: CompanionVerdictRow | null): Values {
  const { massMjup, massErrorLowerMjup, massErrorUpperMjup } = row;
  const { semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu } = row;
  return {
    ...{ massMjup, massErrorLowerMjup, massErrorUpperMjup },
    massFrom: massMjup === null ? null : (last?.massFrom ?? 'file'),
    ...{ semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu },
    semiMajorAxisFrom: semiMajorAxisAu === null ? null : (last?.semiMajorAxisFrom ?? 'file'),
  };
}
