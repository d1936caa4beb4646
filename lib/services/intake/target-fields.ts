import { foldName, type TargetRecord } from '@/lib/formats';
import type { StarRow, TargetRow } from '@/models';
import type { FoundStar } from './known-stars';

/** Columns of the target table that a file states; everything else goes into `attributes`. */
export function fieldsOf(record: TargetRecord, before?: TargetRow) {
  const { line, otherNames, ...rest } = record;
  return {
    name: record.name,
    foldedName: foldName(record.name),
    otherNames,
    gaiaDr3Id: record.gaiaDr3Id,
    raDeg: record.raDeg,
    decDeg: record.decDeg,
    distancePc: record.distancePc,
    distanceErrorPc: record.distanceErrorPc,
    parallaxMas: record.parallaxMas,
    parallaxErrorMas: record.parallaxErrorMas,
    ageMyr: record.ageMyr,
    ageLowerMyr: record.ageLowerMyr,
    ageUpperMyr: record.ageUpperMyr,
    ageMinMyr: record.ageMinMyr,
    ageMaxMyr: record.ageMaxMyr,
    hostMassMsun: record.hostMassMsun,
    spectralType: record.spectralType,
    movingGroup: record.movingGroup,
    magnitudes: record.magnitudes,
    attributes: {
      refEpoch: rest.refEpoch,
      pmRaMasYr: rest.pmRaMasYr,
      pmDecMasYr: rest.pmDecMasYr,
      hostMassErrorMsun: rest.hostMassErrorMsun,
      membershipProbability: rest.membershipProbability,
      multiplicity: rest.multiplicity,
      binarySemiMajorAxisAu: rest.binarySemiMajorAxisAu,
      binaryEccentricity: rest.binaryEccentricity,
      binaryMassRatio: rest.binaryMassRatio,
      debrisDisk: rest.debrisDisk,
      ...markOf(record, before),
      notes: rest.notes,
      reference: rest.reference,
    },
  };
}

export type TargetFields = ReturnType<typeof fieldsOf>;

/** A file that says nothing of it leaves a person's mark as it is. */
function markOf({ selectedForCompanion }: TargetRecord, before?: TargetRow) {
  const mark = selectedForCompanion ?? before?.attributes.selectedForCompanion;
  return typeof mark === 'boolean' ? { selectedForCompanion: mark } : {};
}

/** What storing a file does with one of its targets. */
export interface TargetStep {
  record: TargetRecord;
  target: TargetRow | undefined;
  star: StarRow | undefined;
  /** How a star that was known from elsewhere was found. */
  found: FoundStar | undefined;
  isUnchanged: boolean;
}
