import { QueryTypes, type Transaction, UniqueConstraintError } from 'sequelize';
import { dropLinks } from '@/lib/access/account-links';
import type { KnownPerson } from '@/lib/access/actor';
import { checkPassword, hashPassword, isPassword } from '@/lib/access/passwords';
import { secondFactorOf } from '@/lib/access/second-factor';
import { endSessions } from '@/lib/access/sessions';
import { Conflict, InputError } from '@/lib/errors';
import type { ChangePassword } from '@/lib/schemas/account';
import { type Me, meSchema, type SignUp } from '@/lib/schemas/people';
import { database, inTransaction, PersonRow } from '@/models';
import { tellOfChange } from './account-notice';
import { recordAudit } from './audit';

/** Makes a person within the caller's transaction; the password's rules are checked here. */
export async function createPerson(
  input: SignUp,
  transaction: Transaction,
  address?: string,
): Promise<PersonRow> {
  checkPassword(input.password, input);
  const passwordHash = await hashPassword(input.password);
  try {
    const person = await PersonRow.create(
      { name: input.name, email: input.email, passwordHash },
      { transaction },
    );
    const item = { kind: 'person', id: person.id };
    const actor = { personId: person.id, via: 'session', address } as const;
    await recordAudit(actor, 'sign-up', item, 'signed up', transaction);
    return person;
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new Conflict('There is an account with this address: sign in', 'email-taken');
    }
    throw error;
  }
}

/** A new person, who may then create a collaboration. */
export async function signUp(input: SignUp, address?: string): Promise<Me> {
  const person = await inTransaction((transaction) => createPerson(input, transaction, address));
  return meSchema.parse({
    person: { id: person.id, name: person.name, email: person.email },
    collaborations: [],
  });
}

/** The person and where they are a member; through a token only the token's collaboration. */
export async function getMe(person: KnownPerson): Promise<Me> {
  // Read anew: who waited for another change of the same account knows the name from before it.
  const [me] = await database().query(
    `select json_build_object('id', p.id, 'name', p.name, 'email', p.email) as person,
       coalesce((
         select json_agg(json_build_object('slug', c.slug, 'name', c.name, 'roles', m.roles)
           order by c.name, c.slug)
         from member m join collaboration c on c.id = m.collaboration_id
         where m.person_id = p.id and m.suspended_at is null
           and ($2::uuid is null or c.id = $2::uuid)), '[]') as collaborations
     from person p where p.id = $1`,
    { bind: [person.personId, person.tokenCollaborationId ?? null], type: QueryTypes.SELECT },
  );
  return meSchema.parse(me);
}

export async function updateMe(person: KnownPerson, input: { name: string }): Promise<Me> {
  await inTransaction(async (transaction) => {
    await PersonRow.update({ name: input.name }, { where: { id: person.personId }, transaction });
    const item = { kind: 'person', id: person.personId };
    await recordAudit(person, 'change-name', item, 'changed their name', transaction);
  });
  return getMe(person);
}

/** A new password ends every other session of the person. */
export async function changePassword(person: KnownPerson, input: ChangePassword): Promise<void> {
  await inTransaction(async (transaction) => {
    const row = await PersonRow.findByPk(person.personId, { transaction, rejectOnEmpty: true });
    if (!(await isPassword(input.currentPassword, row.passwordHash))) {
      throw new InputError({
        code: 'password-wrong',
        item: 'currentPassword',
        message: 'this is not your password',
      });
    }
    const { isOn } = await secondFactorOf(row.id, transaction);
    checkPassword(input.newPassword, row, isOn);
    row.passwordHash = await hashPassword(input.newPassword);
    await row.save({ transaction });
    await endSessions(row.id, transaction, person.sessionId ?? null);
    await dropLinks(row.id, transaction);
    const item = { kind: 'person', id: row.id };
    await recordAudit(person, 'change-password', item, 'changed their password', transaction);
    await tellOfChange(row.id, 'password', transaction);
  });
}
