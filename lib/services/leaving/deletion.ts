import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { AccessError, Conflict, InputError } from '@/lib/errors';
import { queueMessage } from '@/lib/mail/outbox';
import { type LeavingView, WAITING_DAYS } from '@/lib/schemas/leaving';
import { CollaborationRow, DepartureRow, inTransaction, MemberRow } from '@/models';
import { recordAudit } from '../audit';
import { getLeaving } from './exports';

/** A stolen token reads and writes; it does not take everything away. */
function demandOwner(actor: Actor): void {
  demand(actor, 'manage-collaboration');
  if (actor.via === 'session') return;
  throw new AccessError('A token cannot do this: sign in with your password.');
}

async function tellMembers(
  actor: Actor,
  { name, slug }: CollaborationRow,
  what: 'asked' | 'cancelled',
  dueAt: Date,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId } = actor;
  const members = await MemberRow.findAll({
    where: { collaborationId },
    order: [['id', 'ASC']],
    transaction,
  });
  const data = { collaboration: name, who: actor.personName, path: `/${slug}`, what, dueAt };
  const options = { collaborationId, about: `departure:${collaborationId}` };
  for (const { personId } of members) {
    if (personId === actor.personId) continue;
    await queueMessage(transaction, 'departure', { personId }, data, options);
  }
}

/**
 * Has the collaboration deleted with everything in it once the waiting time is over. Until then
 * nothing changes, and any owner can take it back.
 *
 * @throws InputError for another name than the collaboration's
 */
export async function askForDeletion(actor: Actor, input: { name: string }): Promise<LeavingView> {
  demandOwner(actor);
  const { collaborationId, personId: askedBy, personName: askedByName } = actor;
  await inTransaction(async (transaction) => {
    const row = await CollaborationRow.findByPk(collaborationId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    if (input.name.trim() !== row.name) {
      throw new InputError({
        code: 'name-differs',
        item: 'name',
        message: 'this is not the name of the collaboration',
      });
    }
    if (await DepartureRow.findByPk(collaborationId, { transaction })) {
      throw new Conflict('Its deletion has been asked for already');
    }
    const askedAt = new Date();
    const dueAt = new Date(askedAt.getTime() + WAITING_DAYS * 86_400_000);
    const departure = { collaborationId, askedBy, askedByName, askedAt, dueAt };
    await DepartureRow.create(departure, { transaction });
    const item = { kind: 'collaboration', id: collaborationId };
    const summary = `asked for the collaboration to be deleted in ${WAITING_DAYS} days`;
    await recordAudit(actor, 'delete-collaboration', item, summary, transaction, {
      dueAt: dueAt.toISOString(),
    });
    await tellMembers(actor, row, 'asked', dueAt, transaction);
  });
  return getLeaving(actor);
}

/** Takes the deletion back. @throws Conflict where none was asked for */
export async function cancelDeletion(actor: Actor): Promise<LeavingView> {
  demandOwner(actor);
  const { collaborationId } = actor;
  await inTransaction(async (transaction) => {
    const row = await CollaborationRow.findByPk(collaborationId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    const departure = await DepartureRow.findByPk(collaborationId, { transaction });
    if (!departure) throw new Conflict('Nobody has asked for its deletion');
    await departure.destroy({ transaction });
    const item = { kind: 'collaboration', id: collaborationId };
    const summary = 'took the deletion of the collaboration back';
    await recordAudit(actor, 'delete-collaboration', item, summary, transaction);
    await tellMembers(actor, row, 'cancelled', departure.dueAt, transaction);
  });
  return getLeaving(actor);
}
