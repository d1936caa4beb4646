import { UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import type { AddObservation, CandidateDetail } from '@/lib/schemas/candidates';
import { idSchema } from '@/lib/schemas/common';
import { CompanionObservationRow, inTransaction } from '@/models';
import { recordAudit } from '../audit';
import { refuseShared } from '../sharing/shared-surveys';
import { isLead } from '../surveys';
import { getCandidate } from './detail';
import { findCandidate } from './find';

/** Most epochs of one candidate; their covariance matrix grows with the square. */
const MOST_OBSERVATIONS = 100;

/** Adds one epoch to a candidate. */
export async function addObservation(
  actor: Actor,
  id: string,
  input: AddObservation,
): Promise<CandidateDetail> {
  const { row, target, survey } = await findCandidate(actor, id);
  demand(actor, 'vet', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  try {
    await inTransaction(async (transaction) => {
      await row.reload({ transaction, lock: transaction.LOCK.UPDATE });
      const there = await CompanionObservationRow.count({
        where: { companionId: row.id },
        transaction,
      });
      if (there >= MOST_OBSERVATIONS) {
        throw new Conflict(`A candidate has at most ${MOST_OBSERVATIONS} epochs`);
      }
      const { collaborationId } = row;
      await CompanionObservationRow.create(
        { ...input, collaborationId, companionId: row.id, createdBy: actor.personId },
        { transaction },
      );
      const summary = `added the epoch ${input.observedOn} of ${target.name} ${row.name}`;
      await recordAudit(actor, 'vet', { kind: 'candidate', id }, summary, transaction);
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      const band = input.band === null ? 'without a band' : `in ${input.band}`;
      throw new Conflict(
        `There is an epoch of ${input.observedOn} ${band} already: delete it first`,
      );
    }
    throw error;
  }
  return getCandidate(actor, id);
}

/** Takes one epoch away; the log keeps what it said. */
export async function removeObservation(
  actor: Actor,
  id: string,
  observationId: string,
): Promise<void> {
  const { row, target, survey } = await findCandidate(actor, id);
  const observation = idSchema.safeParse(observationId).success
    ? await CompanionObservationRow.findOne({ where: { id: observationId, companionId: row.id } })
    : null;
  if (!observation) throw new NotFound('epoch');
  demand(actor, 'vet', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  await inTransaction(async (transaction) => {
    await observation.destroy({ transaction });
    const { observedOn, separationArcsec, positionAngleDeg } = observation;
    const summary = `deleted the epoch ${observedOn} of ${target.name} ${row.name}`;
    const details = { observedOn, separationArcsec, positionAngleDeg };
    await recordAudit(actor, 'vet', { kind: 'candidate', id }, summary, transaction, details);
  });
}
