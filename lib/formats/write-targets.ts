import type { TargetRecord } from './kinds';
import { type CsvCell, type CsvColumn, writeCsv } from './write-csv';

export type WrittenTarget = Omit<TargetRecord, 'line'>;
type Value = (target: WrittenTarget) => CsvCell;

/** The stated errors of an age; where only its 16 % and 84 % points are kept, the distance to them. */
function ageErrors(target: WrittenTarget): { lower: number | null; upper: number | null } {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageErrorLowerMyr, ageErrorUpperMyr } = target;
  if (target.logAgeErrorDex !== null) return { lower: null, upper: null };
  if (ageErrorLowerMyr !== null) return { lower: ageErrorLowerMyr, upper: ageErrorUpperMyr };
  if (ageMyr === null || ageLowerMyr === null || ageUpperMyr === null)
    return { lower: null, upper: null };
  return { lower: ageMyr - ageLowerMyr, upper: ageUpperMyr - ageMyr };
}

function isSymmetric(target: WrittenTarget): boolean {
  const { lower, upper } = ageErrors(target);
  return Object.is(lower, upper);
}

const fixedColumns: readonly (readonly [string, Value])[] = [
  ['name', (t) => t.name],
  ['other_names', (t) => (t.otherNames.length === 0 ? null : t.otherNames.join('; '))],
  ['gaia_dr3_id', (t) => t.gaiaDr3Id],
  ['ra', (t) => t.raDeg],
  ['dec', (t) => t.decDeg],
  ['ref_epoch', (t) => t.refEpoch],
  ['pmra', (t) => t.pmRaMasYr],
  ['pmdec', (t) => t.pmDecMasYr],
  ['parallax', (t) => t.parallaxMas],
  ['parallax_error', (t) => t.parallaxErrorMas],
  ['distance', (t) => t.distancePc],
  ['distance_error', (t) => t.distanceErrorPc],
  ['age', (t) => t.ageMyr],
  ['age_error', (t) => (isSymmetric(t) ? ageErrors(t).lower : null)],
  ['age_error_lower', (t) => (isSymmetric(t) ? null : ageErrors(t).lower)],
  ['age_error_upper', (t) => (isSymmetric(t) ? null : ageErrors(t).upper)],
  ['log_age_error', (t) => t.logAgeErrorDex],
  ['age_min', (t) => t.ageMinMyr],
  ['age_max', (t) => t.ageMaxMyr],
  ['mass', (t) => t.hostMassMsun],
  ['mass_error', (t) => t.hostMassErrorMsun],
  ['spectral_type', (t) => t.spectralType],
  ['moving_group', (t) => t.movingGroup],
  ['membership_probability', (t) => t.membershipProbability],
  ['multiplicity', (t) => t.multiplicity],
  ['binary_semi_major_axis', (t) => t.binarySemiMajorAxisAu],
  ['binary_eccentricity', (t) => t.binaryEccentricity],
  ['binary_mass_ratio', (t) => t.binaryMassRatio],
  ['debris_disk', (t) => t.debrisDisk],
  ['selected_for_companion', (t) => t.selectedForCompanion],
];

const lastColumns: readonly (readonly [string, Value])[] = [
  ['notes', (t) => t.notes],
  ['reference', (t) => t.reference],
];

function magnitudeColumns(targets: readonly WrittenTarget[]): [string, Value][] {
  return bandsOfTargets(targets).flatMap((band): [string, Value][] => [
    [`mag_${band}`, (t) => t.magnitudes[band]?.valueMag ?? null],
    [`mag_${band}_error`, (t) => t.magnitudes[band]?.errorMag ?? null],
  ]);
}

/** A target as a row of the table that reads back to the same record, keyed by column. */
export function targetRow(target: WrittenTarget): Record<string, CsvCell> {
  const known = [...fixedColumns, ...magnitudeColumns([target]), ...lastColumns];
  return Object.fromEntries(known.map(([name, value]) => [name, value(target)]));
}

/** Bands in which any of these targets has a magnitude, in the order of first appearance. */
export const bandsOfTargets = (targets: readonly WrittenTarget[]): string[] => [
  ...new Set(targets.flatMap(({ magnitudes }) => Object.keys(magnitudes))),
];

/**
 * Writes targets as a table that reads back to the same records, in our units. Columns that no
 * target fills are left out.
 *
 * Where a record holds the 16 % and 84 % points of an age but not the stated errors, the errors
 * are their distances from the age, which may differ from them in the last bit.
 *
 * @param extra further columns, one value per target, such as whether and why it was used
 */
export function writeTargets(
  targets: readonly WrittenTarget[],
  extra: readonly CsvColumn[] = [],
): string {
  const known = [...fixedColumns, ...magnitudeColumns(targets), ...lastColumns];
  const columns = known
    .map(([name, value]) => ({ name, values: targets.map(value) }))
    .filter(({ name, values }) => name === 'name' || values.some((value) => value !== null));
  return writeCsv([...columns, ...extra]);
}
