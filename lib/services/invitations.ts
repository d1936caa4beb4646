import { createHash, randomBytes } from 'node:crypto';
import { QueryTypes, type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor, KnownPerson } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { AccessError, Conflict, InputError, LabError, NotFound, NotSignedIn } from '@/lib/errors';
import { queueMessage, withdrawMessages } from '@/lib/mail/outbox';
import { isMailSetUp } from '@/lib/mail/transport';
import { type Join, type Joined, joinedSchema } from '@/lib/schemas/account';
import { idSchema, type Role } from '@/lib/schemas/common';
import {
  type InvitationOffer,
  type InvitationView,
  invitationOfferSchema,
  invitationSchema,
} from '@/lib/schemas/people';
import { database, InvitationRow, inTransaction, MemberRow, PersonRow } from '@/models';
import { recordAudit } from './audit';
import { createPerson } from './people';

const VALID_DAYS = 14;
const CODE_BYTES = 32;

const newCode = () => randomBytes(CODE_BYTES).toString('base64url');
const hashCode = (code: string) => createHash('sha256').update(code).digest('hex');
const newExpiry = () => new Date(Date.now() + VALID_DAYS * 86_400_000);

/** Authors invite students; every other role is an owner's to give. */
function demandInvite(actor: Actor, roles: readonly Role[]): void {
  demand(actor, 'invite');
  if (roles.some((role) => role !== 'student')) demand(actor, 'invite-any-role');
}

interface Listed {
  id: string;
  email: string;
  roles: Role[];
  invitedBy: string | null;
  createdAt: Date;
  expiresAt: Date;
  acceptedAt: Date | null;
  revokedAt: Date | null;
  mail: InvitationView['mail'];
}

function stateOf(row: Listed): InvitationView['state'] {
  if (row.acceptedAt) return 'accepted';
  if (row.revokedAt) return 'revoked';
  return row.expiresAt.getTime() <= Date.now() ? 'expired' : 'pending';
}

const toView = (row: Listed): InvitationView =>
  invitationSchema.parse({
    id: row.id,
    email: row.email,
    roles: row.roles,
    invitedBy: row.invitedBy,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    state: stateOf(row),
    mail: row.mail,
  });

async function readInvitations(
  actor: Actor,
  id: string | null,
  transaction?: Transaction,
): Promise<InvitationView[]> {
  const rows = await database().query<Listed>(
    `select i.id, i.email, i.roles, p.name as "invitedBy", i.created_at as "createdAt",
            i.expires_at as "expiresAt", i.accepted_at as "acceptedAt", i.revoked_at as "revokedAt",
            (select case when o.state = 'sending' then 'waiting' else o.state end
               from outbox_message o
              where o.about = 'invitation:' || i.id and o.state <> 'withdrawn'
              order by o.created_at desc limit 1) as mail
       from invitation i left join person p on p.id = i.invited_by
      where i.collaboration_id = $1 and ($2::uuid is null or i.id = $2::uuid)
      order by i.created_at desc limit 500`,
    { bind: [actor.collaborationId, id], type: QueryTypes.SELECT, transaction },
  );
  return rows.map(toView);
}

export async function listInvitations(actor: Actor): Promise<{ invitations: InvitationView[] }> {
  demand(actor, 'invite');
  return { invitations: await readInvitations(actor, null) };
}

const aboutInvitation = (id: string) => `invitation:${id}`;

/** The message goes out if the row is stored, and not otherwise; it takes the place of an earlier one. */
async function queueInvitation(
  actor: Actor,
  row: InvitationRow,
  code: string,
  transaction: Transaction,
): Promise<void> {
  const [{ name: collaboration }] = await database().query<{ name: string }>(
    'select name from collaboration where id = $1',
    { bind: [actor.collaborationId], type: QueryTypes.SELECT, transaction },
  );
  const about = aboutInvitation(row.id);
  await withdrawMessages(transaction, about);
  await queueMessage(
    transaction,
    'invitation',
    { email: row.email },
    {
      collaboration,
      code,
      roles: row.roles as Role[],
      invitedBy: actor.personName,
      expiresAt: row.expiresAt,
    },
    { collaborationId: actor.collaborationId, about, uselessAfter: row.expiresAt },
  );
}

function demandMail(): void {
  if (!isMailSetUp()) {
    throw new LabError('mail', 503, 'No mail server is set up, so nobody can be invited');
  }
}

export async function createInvitation(
  actor: Actor,
  input: { email: string; roles: Role[] },
): Promise<InvitationView> {
  const roles = [...new Set(input.roles)];
  demandInvite(actor, roles);
  demandMail();
  const code = newCode();
  const row = await inTransaction(async (transaction) => {
    // One invitation at a time per address, also when two people press the button at once.
    await database().query('select id from collaboration where id = $1 for update', {
      bind: [actor.collaborationId],
      transaction,
    });
    const known = await database().query<{ what: 'member' | 'invitation' }>(
      `select 'member' as what from member m join person p on p.id = m.person_id
        where m.collaboration_id = $1 and p.email = $2
       union all
       select 'invitation' from invitation
        where collaboration_id = $1 and email = $2 and accepted_at is null
          and revoked_at is null and expires_at > now()`,
      { bind: [actor.collaborationId, input.email], type: QueryTypes.SELECT, transaction },
    );
    if (known.some(({ what }) => what === 'member')) {
      throw new Conflict('This person is a member already: change their roles', 'already-member');
    }
    if (known.length > 0) {
      throw new Conflict('This address is invited already: send it again', 'already-invited');
    }
    const created = await InvitationRow.create(
      {
        collaborationId: actor.collaborationId,
        email: input.email,
        roles,
        codeHash: hashCode(code),
        invitedBy: actor.personId,
        expiresAt: newExpiry(),
      },
      { transaction },
    );
    const item = { kind: 'invitation', id: created.id };
    const summary = `invited somebody as ${roles.join(', ')}`;
    await recordAudit(actor, 'invite', item, summary, transaction, { roles });
    await queueInvitation(actor, created, code, transaction);
    return created;
  });
  return (await readInvitations(actor, row.id))[0];
}

async function lockOpen(actor: Actor, id: string, transaction: Transaction) {
  if (!idSchema.safeParse(id).success) throw new NotFound('invitation');
  const row = await InvitationRow.findOne({
    where: { id, collaborationId: actor.collaborationId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!row) throw new NotFound('invitation');
  demandInvite(actor, row.roles as Role[]);
  if (row.acceptedAt) throw new Conflict('This invitation was accepted', 'invitation-accepted');
  if (row.revokedAt) throw new Conflict('This invitation was revoked', 'invitation-revoked');
  return row;
}

/** A new message with a new code; the code of the old message stops working. */
export async function resendInvitation(actor: Actor, id: string): Promise<InvitationView> {
  const code = newCode();
  await inTransaction(async (transaction) => {
    const found = await lockOpen(actor, id, transaction);
    demandMail();
    await found.update({ codeHash: hashCode(code), expiresAt: newExpiry() }, { transaction });
    const item = { kind: 'invitation', id };
    await recordAudit(actor, 'resend-invitation', item, 'sent an invitation again', transaction);
    await queueInvitation(actor, found, code, transaction);
  });
  return (await readInvitations(actor, id))[0];
}

export async function revokeInvitation(actor: Actor, id: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const row = await lockOpen(actor, id, transaction);
    await row.update({ revokedAt: new Date() }, { transaction });
    await withdrawMessages(transaction, aboutInvitation(id));
    const item = { kind: 'invitation', id };
    await recordAudit(actor, 'revoke-invitation', item, 'revoked an invitation', transaction);
  });
}

interface Offer {
  id: string;
  collaborationId: string;
  collaboration: string;
  slug: string;
  email: string;
  roles: Role[];
  invitedBy: string | null;
  hasAccount: boolean;
}

async function findOffer(code: string, transaction?: Transaction): Promise<Offer> {
  const lock = transaction ? 'for update of i' : '';
  const rows = await database().query<Offer>(
    `select i.id, i.collaboration_id as "collaborationId", c.name as collaboration, c.slug,
            i.email, i.roles, p.name as "invitedBy",
            exists(select 1 from person q where q.email = i.email) as "hasAccount"
       from invitation i
       join collaboration c on c.id = i.collaboration_id
       left join person p on p.id = i.invited_by
      where i.code_hash = $1 and i.accepted_at is null and i.revoked_at is null
        and i.expires_at > now() ${lock}`,
    { bind: [hashCode(code)], type: QueryTypes.SELECT, transaction },
  );
  const offer = rows[0];
  if (!offer) throw new NotFound('invitation, or it was used, revoked or has expired');
  return offer;
}

/** What the holder of a code is offered, before joining. */
export async function getOffer(code: string): Promise<InvitationOffer> {
  const { id: _, collaborationId: __, ...offer } = await findOffer(code);
  return invitationOfferSchema.parse(offer);
}

/** The person who joins: the one signed in, or a new account for the invited address. */
async function whoJoins(
  offer: Offer,
  person: KnownPerson | null,
  input: Join,
  transaction: Transaction,
  address: string | undefined,
): Promise<{ id: string; isNew: boolean }> {
  if (person) {
    if (person.email !== offer.email) {
      throw new AccessError('This invitation was sent to another address. Sign in with that one.');
    }
    return { id: person.personId, isNew: false };
  }
  if (await PersonRow.count({ where: { email: offer.email }, transaction })) {
    throw new NotSignedIn('There is an account with the invited address: sign in, then join');
  }
  const { name, password } = input;
  if (name === undefined || password === undefined) {
    const missing = [
      ...(name === undefined ? ['name'] : []),
      ...(password === undefined ? ['password'] : []),
    ];
    throw new InputError(
      missing.map((item) => ({
        code: 'value-missing',
        item,
        found: 'nothing',
        expected: `a ${item} for the new account`,
      })),
    );
  }
  const account = { name, password, email: offer.email };
  const created = await createPerson(account, transaction, address);
  return { id: created.id, isNew: true };
}

/** Joins with the roles of the invitation, which is used up in the same transaction. */
export async function acceptInvitation(
  code: string,
  person: KnownPerson | null,
  input: Join,
  address?: string,
): Promise<Joined> {
  try {
    return await inTransaction(async (transaction) => {
      const offer = await findOffer(code, transaction);
      const joining = await whoJoins(offer, person, input, transaction, address);
      const { collaborationId, roles } = offer;
      await MemberRow.create({ collaborationId, personId: joining.id, roles }, { transaction });
      await InvitationRow.update(
        { acceptedAt: new Date() },
        { where: { id: offer.id }, transaction },
      );
      const actor = { personId: joining.id, collaborationId, via: 'session', address } as const;
      const item = { kind: 'invitation', id: offer.id };
      const summary = `joined as ${roles.join(', ')}`;
      await recordAudit(actor, 'join', item, summary, transaction, { roles });
      return joinedSchema.parse({
        slug: offer.slug,
        email: offer.email,
        isNewAccount: joining.isNew,
      });
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new Conflict('You are a member of this collaboration already', 'already-member');
    }
    throw error;
  }
}
