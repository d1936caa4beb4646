import {
  bandDefinitions,
  bandsOfTargets,
  type ColumnDefinition,
  companionDefinitions,
  companionRow,
  surveyDefinition,
  tableOfRows,
  targetDefinitions,
  targetEndDefinitions,
  targetRow,
  useDefinitions,
  type WrittenCell,
  type WrittenCompanion,
  type WrittenTable,
  type WrittenTarget,
} from '@/lib/formats';
import type { CompanionObservationRow, CompanionRow, TargetRow } from '@/models';

/** A stored target as a file states it; its age's errors are the distances to its 16 and 84 % points. */
export function writtenTarget(row: TargetRow): WrittenTarget {
  const more = row.attributes as Partial<WrittenTarget>;
  return {
    name: row.name,
    otherNames: row.otherNames,
    gaiaDr3Id: row.gaiaDr3Id,
    raDeg: row.raDeg,
    decDeg: row.decDeg,
    refEpoch: more.refEpoch ?? null,
    pmRaMasYr: more.pmRaMasYr ?? null,
    pmDecMasYr: more.pmDecMasYr ?? null,
    parallaxMas: row.parallaxMas,
    parallaxErrorMas: row.parallaxErrorMas,
    distancePc: row.distancePc,
    distanceErrorPc: row.distanceErrorPc,
    ageMyr: row.ageMyr,
    ageLowerMyr: row.ageLowerMyr,
    ageUpperMyr: row.ageUpperMyr,
    ageErrorLowerMyr: null,
    ageErrorUpperMyr: null,
    logAgeErrorDex: null,
    ageMinMyr: row.ageMinMyr,
    ageMaxMyr: row.ageMaxMyr,
    hostMassMsun: row.hostMassMsun,
    hostMassErrorMsun: more.hostMassErrorMsun ?? null,
    spectralType: row.spectralType,
    movingGroup: row.movingGroup,
    membershipProbability: more.membershipProbability ?? null,
    magnitudes: row.magnitudes,
    multiplicity: more.multiplicity ?? null,
    binarySemiMajorAxisAu: more.binarySemiMajorAxisAu ?? null,
    binaryEccentricity: more.binaryEccentricity ?? null,
    binaryMassRatio: more.binaryMassRatio ?? null,
    debrisDisk: more.debrisDisk ?? null,
    selectedForCompanion: more.selectedForCompanion ?? null,
    notes: more.notes ?? null,
    reference: more.reference ?? null,
  };
}

/** A stored companion as a file states it. */
export function writtenCompanion(row: CompanionRow, target: string): WrittenCompanion {
  const more = row.attributes as Partial<WrittenCompanion>;
  return {
    target,
    companion: row.name,
    status: row.status,
    massMjup: row.massMjup,
    massErrorLowerMjup: row.massErrorLowerMjup,
    massErrorUpperMjup: row.massErrorUpperMjup,
    semiMajorAxisAu: row.semiMajorAxisAu,
    semiMajorAxisErrorLowerAu: row.semiMajorAxisErrorLowerAu,
    semiMajorAxisErrorUpperAu: row.semiMajorAxisErrorUpperAu,
    projectedSeparationAu: more.projectedSeparationAu ?? null,
    separationArcsec: more.separationArcsec ?? null,
    separationErrorArcsec: more.separationErrorArcsec ?? null,
    positionAngleDeg: more.positionAngleDeg ?? null,
    positionAngleErrorDeg: more.positionAngleErrorDeg ?? null,
    contrastMag: more.contrastMag ?? null,
    contrastErrorMag: more.contrastErrorMag ?? null,
    band: more.band ?? null,
    epoch: more.epoch ?? null,
    eccentricity: more.eccentricity ?? null,
    commonProperMotion: more.commonProperMotion ?? null,
    probability: row.probability,
    reference: row.reference,
  };
}

/**
 * A companion on one row an epoch, as a file with several states it.
 *
 * @param observations of this companion, in the order of their days
 */
export function writtenEpochs(
  companion: WrittenCompanion,
  observations: readonly CompanionObservationRow[],
): WrittenCompanion[] {
  if (observations.length === 0) return [companion];
  const { epoch, band } = companion;
  const own = observations.find((one) => one.observedOn === epoch && one.band === band);
  const rest = observations.filter((one) => one !== own);
  const further = rest.map((one) => ({
    ...companion,
    separationArcsec: one.separationArcsec,
    separationErrorArcsec: one.separationErrorArcsec,
    positionAngleDeg: one.positionAngleDeg,
    positionAngleErrorDeg: one.positionAngleErrorDeg,
    contrastMag: one.contrastMag,
    contrastErrorMag: one.contrastErrorMag,
    band: one.band,
    epoch: one.observedOn,
    reference: one.source,
  }));
  // A row that measures nothing would stand beside its own epochs as a second companion.
  return epoch === null ? further : [companion, ...further];
}

type Extra = Readonly<Record<string, WrittenCell>>;
type Head = Omit<WrittenTable, 'columns'>;
const always = ['name', 'target', 'companion', 'status', 'survey', 'used', 'reason'];

/** Columns that come after those of a file: absent where no row has them. */
const laterColumns: readonly ColumnDefinition[] = [surveyDefinition, ...useDefinitions];

function definitionsOf(
  own: readonly ColumnDefinition[],
  extras: readonly Extra[],
): ColumnDefinition[] {
  const named = new Set(extras.flatMap((extra) => Object.keys(extra)));
  return [...own, ...laterColumns.filter(({ name }) => named.has(name))];
}

/** Targets as files bring them, then `survey`, `used` and `reason` where these are given. */
export function targetsTable(
  head: Head,
  targets: readonly WrittenTarget[],
  extras: readonly Extra[] = [],
): WrittenTable {
  const own = [
    ...targetDefinitions,
    ...bandsOfTargets(targets).flatMap(bandDefinitions),
    ...targetEndDefinitions,
  ];
  const rows = targets.map((target, i) => ({ ...targetRow(target), ...extras[i] }));
  return tableOfRows(head, definitionsOf(own, extras), rows, { dropEmpty: always });
}

/** Companions as files bring them, then `survey`, `used` and `reason` where these are given. */
export function companionsTable(
  head: Head,
  companions: readonly WrittenCompanion[],
  extras: readonly Extra[] = [],
): WrittenTable {
  const rows = companions.map((companion, i) => ({ ...companionRow(companion), ...extras[i] }));
  return tableOfRows(head, definitionsOf(companionDefinitions, extras), rows, {
    dropEmpty: always,
  });
}
