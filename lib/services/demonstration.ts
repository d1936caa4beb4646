import { QueryTypes } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { database, inTransaction, MemberRow } from '@/models';
import { recordAudit } from './audit';

/** The collaboration of invented data, where this installation has one. */
async function findDemonstration(): Promise<{ id: string; slug: string } | undefined> {
  const [found] = await database().query<{ id: string; slug: string }>(
    `select id, slug from collaboration
     where settings->>'isDemonstrationReady' = 'true' order by created_at limit 1`,
    { type: QueryTypes.SELECT },
  );
  return found;
}

/** Address of the demonstration; null where there is none, or where it is the reader's own page. */
export async function demonstrationBeside(collaboration: string): Promise<string | null> {
  const found = await findDemonstration();
  return found === undefined || found.slug === collaboration ? null : found.slug;
}

/** Lets a person look around the demonstration as a student; a second time changes nothing. */
export async function enterDemonstration(person: KnownPerson): Promise<{ collaboration: string }> {
  const found = await findDemonstration();
  if (!found) throw new NotFound('demonstration');
  const member = { collaborationId: found.id, personId: person.personId };
  await inTransaction(async (transaction) => {
    const [row, isNew] = await MemberRow.findOrCreate({
      where: member,
      defaults: { ...member, roles: ['student'] },
      transaction,
    });
    if (!isNew) return;
    const item = { kind: 'member', id: row.id };
    const actor = { ...person, collaborationId: found.id };
    await recordAudit(actor, 'join', item, 'came to look around', transaction);
  });
  return { collaboration: found.slug };
}
