import { QueryTypes, type Transaction, UniqueConstraintError } from 'sequelize';
import { dropLinks } from '@/lib/access/account-links';
import type { Actor, KnownPerson } from '@/lib/access/actor';
import { checkPassword, hashPassword, isPassword } from '@/lib/access/passwords';
import { demand, may } from '@/lib/access/permissions';
import { secondFactorOf } from '@/lib/access/second-factor';
import { endSessions } from '@/lib/access/sessions';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import type { ChangePassword } from '@/lib/schemas/account';
import { idSchema, type Role } from '@/lib/schemas/common';
import {
  type Me,
  type MemberView,
  memberSchema,
  meSchema,
  type SignUp,
} from '@/lib/schemas/people';
import { AccessTokenRow, database, inTransaction, MemberRow, PersonRow } from '@/models';
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
  const collaborations = await database().query(
    `select c.slug, c.name, m.roles
       from member m join collaboration c on c.id = m.collaboration_id
      where m.person_id = $1 and ($2::uuid is null or c.id = $2::uuid)
      order by c.name, c.slug`,
    { bind: [person.personId, person.tokenCollaborationId ?? null], type: QueryTypes.SELECT },
  );
  return meSchema.parse({
    person: { id: person.personId, name: person.personName, email: person.email },
    collaborations,
  });
}

export async function updateMe(person: KnownPerson, input: { name: string }): Promise<Me> {
  await inTransaction(async (transaction) => {
    await PersonRow.update({ name: input.name }, { where: { id: person.personId }, transaction });
    const item = { kind: 'person', id: person.personId };
    await recordAudit(person, 'change-name', item, 'changed their name', transaction);
  });
  return getMe({ ...person, personName: input.name });
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
  });
}

interface MemberFields {
  id: string;
  personId: string;
  name: string;
  email: string;
  roles: Role[];
  leads: string[];
  joinedAt: Date;
}

const memberFields = `
  select m.id, p.id as "personId", p.name, p.email, m.roles, m.created_at as "joinedAt",
         coalesce((select array_agg(s.name order by s.position, s.name) from survey s
                    where s.lead_id = p.id and s.collaboration_id = m.collaboration_id
                      and s.archived_at is null), '{}') as leads
    from member m join person p on p.id = m.person_id
   where m.collaboration_id = $1`;

async function readMembers(actor: Actor, transaction: Transaction): Promise<MemberView[]> {
  const rows = await database().query<MemberFields>(`${memberFields} order by p.name, p.email`, {
    bind: [actor.collaborationId],
    type: QueryTypes.SELECT,
    transaction,
  });
  const owners = rows.filter((row) => row.roles.includes('owner')).length;
  const mayChange = may(actor, 'change-roles');
  return rows.map((row) => {
    const isLastOwner = owners === 1 && row.roles.includes('owner');
    const isSelf = row.personId === actor.personId;
    return memberSchema.parse({
      id: row.id,
      person: { id: row.personId, name: row.name, email: row.email },
      roles: row.roles,
      leads: row.leads,
      joinedAt: row.joinedAt.toISOString(),
      can: { changeRoles: mayChange, remove: (mayChange || isSelf) && !isLastOwner },
    });
  });
}

export async function listMembers(actor: Actor): Promise<{ members: MemberView[] }> {
  demand(actor, 'read');
  return { members: await inTransaction((transaction) => readMembers(actor, transaction)) };
}

/** The member and all owners, locked: two owners cannot step down at the same moment. */
async function lockMember(
  actor: Actor,
  memberId: string,
  transaction: Transaction,
): Promise<{ member: MemberRow; isLastOwner: boolean }> {
  if (!idSchema.safeParse(memberId).success) throw new NotFound('member');
  const members = await MemberRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [['id', 'ASC']],
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const member = members.find((row) => row.id === memberId);
  if (!member) throw new NotFound('member');
  const owners = members.filter((row) => row.roles.includes('owner'));
  return { member, isLastOwner: owners.length === 1 && owners[0].id === memberId };
}

const LAST_OWNER = 'A collaboration keeps at least one owner: make somebody else an owner first';

export async function changeRoles(
  actor: Actor,
  memberId: string,
  input: { roles: Role[] },
): Promise<MemberView> {
  return inTransaction(async (transaction) => {
    const { member, isLastOwner } = await lockMember(actor, memberId, transaction);
    demand(actor, 'change-roles');
    const roles = [...new Set(input.roles)];
    if (isLastOwner && !roles.includes('owner')) throw new Conflict(LAST_OWNER, 'last-owner');
    const before = member.roles;
    member.roles = roles;
    await member.save({ transaction });
    const item = { kind: 'member', id: memberId };
    const summary = `changed roles to ${roles.join(', ')}`;
    const details = { before, after: roles, personId: member.personId };
    await recordAudit(actor, 'change-roles', item, summary, transaction, details);
    // What the actor may do next follows from the roles that they have now.
    const seen = member.personId === actor.personId ? { ...actor, roles } : actor;
    const members = await readMembers(seen, transaction);
    return members.find((view) => view.id === memberId) as MemberView;
  });
}

/**
 * Takes a person out of the collaboration: an owner anybody, everybody themselves. Their sessions
 * end and their tokens here are revoked; what they made stays.
 */
export async function removeMember(actor: Actor, memberId: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const { member, isLastOwner } = await lockMember(actor, memberId, transaction);
    const isSelf = member.personId === actor.personId;
    if (!isSelf) demand(actor, 'change-roles');
    if (isLastOwner) throw new Conflict(LAST_OWNER, 'last-owner');
    await member.destroy({ transaction });
    const { collaborationId } = actor;
    await AccessTokenRow.update(
      { revokedAt: new Date() },
      { where: { collaborationId, personId: member.personId, revokedAt: null }, transaction },
    );
    await endSessions(member.personId, transaction, isSelf ? (actor.sessionId ?? null) : null);
    const item = { kind: 'member', id: memberId };
    const summary = isSelf ? 'left the collaboration' : 'removed a member';
    const details = { before: member.roles, personId: member.personId };
    await recordAudit(actor, 'remove-member', item, summary, transaction, details);
  });
}
