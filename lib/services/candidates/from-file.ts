import type { Transaction } from 'sequelize';
import type { CompanionRecord, EpochRecord } from '@/lib/formats';
import { CompanionObservationRow, type CompanionRow, CompanionVerdictRow } from '@/models';
import { statedOf } from './describe';

const FROM_FILE = 'As the file of companions states it';

const MJD_OF_1970 = 40_587;
const DAY_MS = 86_400_000;

/** The calendar day of an epoch as files write it, a date or a Modified Julian Date; null outside 1950 to 2049. */
export function dayOf(epoch: string): string | null {
  const isMjd = /^\d{5}(\.\d*)?$/.test(epoch);
  const day = isMjd
    ? new Date((Number(epoch) - MJD_OF_1970) * DAY_MS).toISOString().slice(0, 10)
    : epoch.slice(0, 10);
  return day >= '1950-01-01' && day < '2050-01-01' ? day : null;
}

/** The row's epoch, where it has one: a later file replaces what an earlier one said of that day. */
async function keepObservation(
  row: CompanionRow,
  record: EpochRecord,
  uploadId: string,
  transaction: Transaction,
): Promise<void> {
  const { epoch, separationArcsec, positionAngleDeg, band } = record;
  const observedOn = epoch === null ? null : dayOf(epoch);
  if (observedOn === null || separationArcsec === null || positionAngleDeg === null) return;
  const place = { companionId: row.id, observedOn, band };
  const there = await CompanionObservationRow.findOne({ where: place, transaction });
  const { separationErrorArcsec, positionAngleErrorDeg, contrastMag, contrastErrorMag } = record;
  const fields = {
    ...place,
    collaborationId: row.collaborationId,
    uploadId,
    separationArcsec,
    // An error of 0 is none: nothing is measured without.
    separationErrorArcsec: separationErrorArcsec || null,
    positionAngleDeg: ((positionAngleDeg % 360) + 360) % 360,
    positionAngleErrorDeg: positionAngleErrorDeg || null,
    contrastMag,
    contrastErrorMag,
    source: record.reference,
    createdBy: null,
  };
  if (there) await there.update(fields, { transaction });
  else await CompanionObservationRow.create(fields, { transaction });
}

/** What a file states becomes part of the history: one more verdict where it says something new. */
async function keepVerdict(
  row: CompanionRow,
  uploadId: string,
  personId: string,
  transaction: Transaction,
): Promise<void> {
  const where = { companionId: row.id };
  const verdicts = await CompanionVerdictRow.findAll({
    where,
    order: [['number', 'DESC']],
    transaction,
  });
  const last = verdicts.find(({ isProposal }) => !isProposal);
  if (last && JSON.stringify(statedOf(last)) === JSON.stringify(statedOf(row))) return;
  const { status, probability, massMjup, massErrorLowerMjup, massErrorUpperMjup } = row;
  const { semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu } = row;
  await CompanionVerdictRow.create(
    {
      ...where,
      collaborationId: row.collaborationId,
      number: (verdicts[0]?.number ?? 0) + 1,
      ...{ status, probability, massMjup, massErrorLowerMjup, massErrorUpperMjup },
      massFrom: massMjup === null ? null : 'file',
      ...{ semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu },
      semiMajorAxisFrom: semiMajorAxisAu === null ? null : 'file',
      reason: FROM_FILE,
      uploadId,
      createdBy: personId,
    },
    { transaction },
  );
}

/** Keeps epoch and history of a companion that a file has just brought in or changed. */
export async function keepFromFile(
  row: CompanionRow,
  record: CompanionRecord,
  from: { uploadId: string; personId: string },
  transaction: Transaction,
): Promise<void> {
  for (const epoch of [record, ...(record.furtherEpochs ?? [])]) {
    await keepObservation(row, epoch, from.uploadId, transaction);
  }
  await keepVerdict(row, from.uploadId, from.personId, transaction);
}
