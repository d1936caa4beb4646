import { UniqueConstraintError } from 'sequelize';
import type { Actor, KnownPerson } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { type CollaborationView, collaborationSchema } from '@/lib/schemas/account';
import type { Role } from '@/lib/schemas/common';
import { CollaborationRow, database, inTransaction, MemberRow } from '@/models';
import { recordAudit } from './audit';
import { getMe } from './people';

/** Words that addresses of the product begin with. */
const RESERVED = new Set([
  ...[
    'about',
    'admin',
    'api',
    'api-guide',
    'collaborations',
    'fonts',
    'health',
    'help',
    'join',
    'mailbox',
    'me',
  ],
  ...[
    'new',
    'password',
    'people',
    'public',
    'r',
    'release',
    'releases',
    'reset',
    'settings',
    'sign-in',
  ],
  ...['log', 'mail', 'activity', 'sign-out', 'sign-up', 'start', 'static', 'tokens', 'welcome'],
]);

export const isReserved = (slug: string) => RESERVED.has(slug);

/** One sentence for a reserved word and for a taken one: it does not say who has it. */
export const NOT_FREE = 'This address is not free: choose another';

function toView(row: CollaborationRow, roles: Role[]): CollaborationView {
  const actor = { roles };
  return collaborationSchema.parse({
    slug: row.slug,
    name: row.name,
    createdAt: row.createdAt.toISOString(),
    can: {
      manage: may(actor, 'manage-collaboration'),
      invite: may(actor, 'invite'),
      readAudit: may(actor, 'read-audit'),
    },
  });
}

/** The collaborations of the person: no others are ever listed. */
export async function listCollaborations(person: KnownPerson) {
  const { collaborations } = await getMe(person);
  return { collaborations };
}

/** A new collaboration, whose owner is the person who makes it. */
export async function createCollaboration(
  person: KnownPerson,
  input: { name: string; slug: string },
): Promise<CollaborationView> {
  if (RESERVED.has(input.slug)) throw new Conflict(NOT_FREE, 'address-taken');
  try {
    return await inTransaction(async (transaction) => {
      const row = await CollaborationRow.create(
        { name: input.name, slug: input.slug },
        { transaction },
      );
      const collaborationId = row.id;
      const roles: Role[] = ['owner'];
      await MemberRow.create(
        { collaborationId, personId: person.personId, roles },
        { transaction },
      );
      const item = { kind: 'collaboration', id: collaborationId };
      const actor = { ...person, collaborationId };
      await recordAudit(
        actor,
        'create-collaboration',
        item,
        'began the collaboration',
        transaction,
      );
      await row.reload({ transaction });
      return toView(row, roles);
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new Conflict(NOT_FREE, 'address-taken');
    throw error;
  }
}

export async function getCollaboration(actor: Actor): Promise<CollaborationView> {
  demand(actor, 'read');
  database();
  const row = await CollaborationRow.findByPk(actor.collaborationId);
  if (!row) throw new NotFound('collaboration');
  return toView(row, actor.roles);
}

export async function updateCollaboration(
  actor: Actor,
  input: { name: string },
): Promise<CollaborationView> {
  demand(actor, 'manage-collaboration');
  return inTransaction(async (transaction) => {
    const row = await CollaborationRow.findByPk(actor.collaborationId, { transaction });
    if (!row) throw new NotFound('collaboration');
    const details = { before: row.name, after: input.name };
    row.name = input.name;
    await row.save({ transaction });
    const item = { kind: 'collaboration', id: row.id };
    await recordAudit(actor, 'rename', item, 'renamed the collaboration', transaction, details);
    return toView(row, actor.roles);
  });
}
