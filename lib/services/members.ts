import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { endSessions } from '@/lib/access/sessions';
import { Conflict, NotFound } from '@/lib/errors';
import { idSchema, type Role } from '@/lib/schemas/common';
import { type MemberView, memberSchema } from '@/lib/schemas/people';
import { AccessTokenRow, database, inTransaction, MemberRow } from '@/models';
import { recordAudit } from './audit';

interface MemberFields {
  id: string;
  personId: string;
  name: string;
  email: string;
  roles: Role[];
  leads: string[];
  joinedAt: Date;
  suspendedAt: Date | null;
}

const memberFields = `
  select m.id, p.id as "personId", p.name, p.email, m.roles, m.created_at as "joinedAt",
         m.suspended_at as "suspendedAt",
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
  const isActingOwner = (row: MemberFields) => row.roles.includes('owner') && !row.suspendedAt;
  const owners = rows.filter(isActingOwner).length;
  const mayChange = may(actor, 'change-roles');
  return rows.map((row) => {
    const isLastOwner = owners === 1 && isActingOwner(row);
    const isSelf = row.personId === actor.personId;
    return memberSchema.parse({
      id: row.id,
      person: { id: row.personId, name: row.name, email: row.email },
      roles: row.roles,
      leads: row.leads,
      joinedAt: row.joinedAt.toISOString(),
      suspendedAt: row.suspendedAt?.toISOString() ?? null,
      can: {
        changeRoles: mayChange,
        remove: (mayChange || isSelf) && !isLastOwner,
        suspend: mayChange && !isSelf,
      },
    });
  });
}

export async function listMembers(actor: Actor): Promise<{ members: MemberView[] }> {
  demand(actor, 'read');
  return { members: await inTransaction((transaction) => readMembers(actor, transaction)) };
}

export async function getMember(actor: Actor, memberId: string): Promise<MemberView> {
  const { members } = await listMembers(actor);
  const member = members.find(({ id }) => id === memberId);
  if (!member) throw new NotFound('member');
  return member;
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
  const owners = members.filter((row) => row.roles.includes('owner') && !row.suspendedAt);
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
 * Lets the access of a member rest, or opens it again. It ends with the next request, by session and by
 * token; roles, tokens and all that they made stay as they are.
 */
export async function suspendMember(
  actor: Actor,
  memberId: string,
  { isSuspended }: { isSuspended: boolean },
): Promise<MemberView> {
  return inTransaction(async (transaction) => {
    const { member, isLastOwner } = await lockMember(actor, memberId, transaction);
    demand(actor, 'change-roles');
    if (member.personId === actor.personId) {
      throw new Conflict(
        'Nobody suspends themselves: leave the collaboration instead',
        'own-access',
      );
    }
    // Two owners who suspend each other at the same moment: the second finds the last one.
    if (isSuspended && isLastOwner) throw new Conflict(LAST_OWNER, 'last-owner');
    if (isSuspended !== (member.suspendedAt !== null)) {
      await member.update({ suspendedAt: isSuspended ? new Date() : null }, { transaction });
      const action = isSuspended ? 'suspend-member' : 'resume-member';
      const summary = isSuspended ? 'suspended a member' : 'let a suspended member in again';
      const details = { personId: member.personId };
      const item = { kind: 'member', id: memberId };
      await recordAudit(actor, action, item, summary, transaction, details);
    }
    const members = await readMembers(actor, transaction);
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
