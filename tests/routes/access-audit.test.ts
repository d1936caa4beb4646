import { expect, it } from 'vitest';
import { GET as listAudit } from '@/app/api/v1/collaborations/[collaboration]/audit/route';
import { recordAudit } from '@/lib/services/audit';
import { inTransaction } from '@/models';
import { withDatabase } from '../support/database';
import {
  actorOf,
  bearer,
  call,
  createCollaborationWith,
  type TestPerson,
  tokenOf,
} from '../support/people';

const { query } = withDatabase();

async function teamWithEntries(count: number) {
  const team = await createCollaborationWith(['owner']);
  const actor = await actorOf(team.people.owner as TestPerson, team.collaboration);
  for (let i = 1; i <= count; i++) {
    const item = { kind: 'survey', id: `survey-${i}` };
    await inTransaction((t) => recordAudit(actor, 'create-survey', item, `made survey ${i}`, t));
  }
  const headers = bearer(await tokenOf(team.people.owner, team.collaboration));
  const read = async (search = '') =>
    (
      await call(listAudit, {
        path: `/${search}`,
        params: { collaboration: team.collaboration.slug },
        headers,
      })
    ).json();
  return { ...team, actor, read };
}

it('the log lists who did what, newest first, page by page', async () => {
  const { read, people } = await teamWithEntries(3);
  const page = await read('?limit=2');
  expect(page.total).toBe(3);
  expect(page.entries).toMatchObject([
    { who: people.owner.name, summary: 'made survey 3', itemId: 'survey-3' },
    { who: people.owner.name, summary: 'made survey 2', itemId: 'survey-2' },
  ]);
  const rest = await read('?limit=2&offset=2');
  expect(rest.entries.map(({ itemId }: { itemId: string }) => itemId)).toEqual(['survey-1']);
});

it('the log is filtered by item and action', async () => {
  const { read } = await teamWithEntries(3);
  expect((await read('?item=survey-2')).entries).toHaveLength(1);
  expect((await read('?action=delete-survey')).entries).toEqual([]);
});

it('the log of another collaboration is not in it', async () => {
  const mine = await teamWithEntries(1);
  await teamWithEntries(2);
  expect((await mine.read()).total).toBe(1);
});

it('an entry goes away with what it tells of when the transaction fails', async () => {
  const { actor, read } = await teamWithEntries(0);
  const failing = inTransaction(async (transaction) => {
    await recordAudit(actor, 'create-survey', { kind: 'survey', id: 'x' }, 'made', transaction);
    throw new Error('something later failed');
  });
  await expect(failing).rejects.toThrow('something later failed');
  expect((await read()).total).toBe(0);
});

it('the database refuses to change or delete an entry', async () => {
  const { collaboration } = await teamWithEntries(1);
  const where = `collaboration_id = '${collaboration.id}'`;
  const refusal = /rows of audit_entry are not changed/;
  await expect(query(`update audit_entry set summary = 'x' where ${where}`)).rejects.toThrow(
    refusal,
  );
  await expect(query(`update audit_entry set person_id = null where ${where}`)).rejects.toThrow(
    refusal,
  );
  await expect(query(`delete from audit_entry where ${where}`)).rejects.toThrow(refusal);
});

it('entries outlive the person, and go with their collaboration', async () => {
  const { collaboration, people, read } = await teamWithEntries(1);
  const before = await read();
  expect(before.total).toBe(1);
  await query('delete from person where id = $1', [people.owner.id]);
  const rows = await query('select person_id from audit_entry where collaboration_id = $1', [
    collaboration.id,
  ]);
  expect(rows).toEqual([{ person_id: null }]);
  await query('delete from collaboration where id = $1', [collaboration.id]);
  expect(
    await query('select 1 from audit_entry where collaboration_id = $1', [collaboration.id]),
  ).toEqual([]);
});
