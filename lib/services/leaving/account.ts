import { QueryTypes, type Transaction } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { isPassword } from '@/lib/access/passwords';
import { endSessions } from '@/lib/access/sessions';
import { Conflict, InputError } from '@/lib/errors';
import { database, inTransaction, PersonRow } from '@/models';
import { recordAudit } from '../audit';

/** What stands in place of the name on everything that the person made. */
export const FORMER_MEMBER = 'a former member';
/** Reserved: no mail is ever sent there. */
const NOWHERE = 'former.invalid';
/** No hash of any password. */
const NO_PASSWORD = 'no password';

/** Names of collaborations that would be left without an owner; their members stay locked. */
async function ownedAlone(personId: string, transaction: Transaction): Promise<string[]> {
  await database().query(
    `select o.id from member o join member m on m.collaboration_id = o.collaboration_id
     where m.person_id = $1 order by o.id for update of o`,
    { bind: [personId], type: QueryTypes.SELECT, transaction },
  );
  const rows = await database().query<{ name: string }>(
    `select c.name from member m join collaboration c on c.id = m.collaboration_id
     where m.person_id = $1 and 'owner' = any(m.roles) and not exists (
       select 1 from member o where o.collaboration_id = m.collaboration_id
         and o.person_id <> $1 and 'owner' = any(o.roles) and o.suspended_at is null)
     order by c.name`,
    { bind: [personId], type: QueryTypes.SELECT, transaction },
  );
  return rows.map(({ name }) => name);
}

/** Ways in, and what was only ever of use to the person. */
const removed = [
  'delete from access_token where person_id = $1',
  'delete from account_link where person_id = $1',
  'delete from second_factor where person_id = $1',
  'delete from mail_preference where person_id = $1',
  'delete from outbox_message where person_id = $1',
  'delete from idempotency_key where person_id = $1',
];

async function leaveEverywhere(person: KnownPerson, transaction: Transaction): Promise<void> {
  const members = await database().query<{ id: string; collaborationId: string; roles: string[] }>(
    `delete from member where person_id = $1
     returning id, collaboration_id as "collaborationId", roles`,
    { bind: [person.personId], type: QueryTypes.SELECT, transaction },
  );
  for (const { id, collaborationId, roles } of members) {
    const actor = { ...person, collaborationId };
    const item = { kind: 'member', id };
    await recordAudit(actor, 'remove-member', item, 'left the collaboration', transaction, {
      before: roles,
      personId: person.personId,
    });
  }
}

/**
 * Deletes the account: name, address, password, sessions and tokens go, and so do the memberships.
 * What the person made stays where it is, by "a former member". Signatures under frozen runs and
 * releases, and names that authors gave to a publication, are part of those and stay.
 *
 * @throws InputError for another password
 * @throws Conflict that names the collaborations which would be left without an owner
 */
export async function deleteAccount(
  person: KnownPerson,
  input: { password: string },
): Promise<void> {
  const { personId } = person;
  await inTransaction(async (transaction) => {
    const row = await PersonRow.findByPk(personId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    if (!(await isPassword(input.password, row.passwordHash))) {
      throw new InputError({
        code: 'password-wrong',
        item: 'password',
        message: 'this is not your password',
      });
    }
    const alone = await ownedAlone(personId, transaction);
    if (alone.length > 0) {
      throw new Conflict(
        `You are the only owner of ${alone.join(', ')}: make somebody else an owner there, or have it deleted, first`,
        'last-owner',
      );
    }
    const item = { kind: 'person', id: personId };
    await leaveEverywhere(person, transaction);
    for (const sql of removed) {
      await database().query(sql, { bind: [personId], transaction });
    }
    await endSessions(personId, transaction, null);
    const email = `${personId}@${NOWHERE}`;
    await database().query('update invitation set email = $2 where email = $1', {
      bind: [row.email, email],
      transaction,
    });
    await row.update(
      {
        email,
        name: FORMER_MEMBER,
        passwordHash: NO_PASSWORD,
        orcid: null,
        suspendedAt: new Date(),
      },
      { transaction },
    );
    await recordAudit(person, 'delete-account', item, 'deleted their account', transaction);
  });
}
