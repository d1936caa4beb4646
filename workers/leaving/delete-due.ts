import type { Transaction } from 'sequelize';
import { queueMessage } from '@/lib/mail/outbox';
import { select } from '@/lib/queue/statement';
import { inTransaction } from '@/models';

interface Due {
  id: string;
  name: string;
  askedBy: string | null;
  askedByName: string;
  askedAt: Date;
  dueAt: Date;
}

/**
 * Deletes one collaboration whose time has come, in one transaction: everything of it goes with its
 * row. What remains says that it was, and what became of its public addresses.
 *
 * @returns its id, or null where none is due
 */
export function deleteDue(): Promise<string | null> {
  return inTransaction(async (transaction) => {
    const [due] = await select<Due>(
      `select c.id, c.name, d.asked_by as "askedBy", d.asked_by_name as "askedByName",
         d.asked_at as "askedAt", d.due_at as "dueAt"
       from departure d join collaboration c on c.id = d.collaboration_id
       where d.due_at <= now() order by d.due_at limit 1 for update of d, c skip locked`,
      [],
      transaction,
    );
    if (!due) return null;
    await leaveTraces(due, transaction);
    await tellMembers(due, transaction);
    await select(
      `select queue.remove_job(id::text) from job
       where collaboration_id = $1 and status in ('waiting', 'running')`,
      [due.id],
      transaction,
    );
    await select('delete from collaboration where id = $1 returning id', [due.id], transaction);
    return due.id;
  });
}

async function leaveTraces(due: Due, transaction: Transaction): Promise<void> {
  await select(
    `insert into deleted_collaboration (id, asked_at, asked_by) values ($1, $2, $3) returning id`,
    [due.id, due.askedAt, due.askedBy],
    transaction,
  );
  await select(
    `insert into release_tombstone (code, number, title, doi, published_at)
     select r.code, r.number, r.title, d.doi, r.published_at
     from release r left join deposit d on d.release_id = r.id and d.published_at is not null
     where r.collaboration_id = $1 and r.published_at is not null returning code`,
    [due.id],
    transaction,
  );
}

async function tellMembers(due: Due, transaction: Transaction): Promise<void> {
  const members = await select<{ personId: string }>(
    'select person_id as "personId" from member where collaboration_id = $1 order by 1',
    [due.id],
    transaction,
  );
  const { name: collaboration, askedByName: who, dueAt } = due;
  for (const to of members) {
    // Of no collaboration: it would go with it before it was sent.
    await queueMessage(
      transaction,
      'departure',
      to,
      { collaboration, who, path: '/welcome', what: 'deleted', dueAt },
      { about: `deleted:${due.id}` },
    );
  }
}

/** Archives whose days are over. */
export async function dropExpiredExports(): Promise<number> {
  const gone = await select(
    'delete from collaboration_export where expires_at <= now() returning id',
  );
  return gone.length;
}
