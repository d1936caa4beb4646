import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { queueMessage } from '@/lib/mail/outbox';
import { database, type ReleaseRow } from '@/models';

async function aboutRelease(actor: Actor, row: ReleaseRow, transaction: Transaction) {
  const [place] = await database().query<{ name: string }>(
    'select name from collaboration where id = $1',
    { bind: [actor.collaborationId], type: QueryTypes.SELECT, transaction },
  );
  const item = `R-${row.number}`;
  const data = { collaboration: place.name, who: actor.personName, item };
  return { data, options: { collaborationId: actor.collaborationId, about: `release:${row.id}` } };
}

/** Tells who made the release that somebody has signed it. */
export async function tellOfSignature(
  actor: Actor,
  row: ReleaseRow,
  transaction: Transaction,
): Promise<void> {
  if (!row.createdBy || row.createdBy === actor.personId) return;
  const { data, options } = await aboutRelease(actor, row, transaction);
  const path = `/${actor.collaboration}/releases/R-${row.number}`;
  const to = { personId: row.createdBy };
  const given = { ...data, path, what: 'agree' as const };
  await queueMessage(transaction, 'sign-off-given', to, given, options);
}

/** Asks those whose signature a release still needs, apart from who asks. */
export async function askForSignatures(
  actor: Actor,
  row: ReleaseRow,
  transaction: Transaction,
): Promise<void> {
  const roles = [
    ...(row.signedOffAt ? [] : ['statistician']),
    ...(row.agreedAt ? [] : ['author', 'owner']),
  ];
  const people = await database().query<{ id: string }>(
    `select m.person_id as id from member m
     where m.collaboration_id = $1 and m.roles && $2::text[] and m.person_id <> $3
     order by 1`,
    {
      bind: [actor.collaborationId, roles, actor.personId],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  const { data, options } = await aboutRelease(actor, row, transaction);
  const path = `/${actor.collaboration}/releases/R-${row.number}`;
  for (const { id: personId } of people) {
    const asked = { ...data, path, what: 'agree' as const };
    await queueMessage(transaction, 'sign-off-asked', { personId }, asked, options);
  }
}

/** Tells every member that a release became public, or was taken back. */
export async function tellMembers(
  actor: Actor,
  row: ReleaseRow,
  kind: 'release-published' | 'release-withdrawn',
  transaction: Transaction,
): Promise<void> {
  const members = await database().query<{ id: string }>(
    'select person_id as id from member where collaboration_id = $1 and person_id <> $2 order by 1',
    {
      bind: [actor.collaborationId, actor.personId],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  const { data, options } = await aboutRelease(actor, row, transaction);
  const path = `/r/${row.code}`;
  for (const to of members.map(({ id: personId }) => ({ personId }))) {
    if (kind === 'release-published') {
      await queueMessage(transaction, kind, to, { ...data, path }, options);
    } else {
      const reason = row.withdrawnReason ?? '';
      await queueMessage(transaction, kind, to, { ...data, path, reason }, options);
    }
  }
}
