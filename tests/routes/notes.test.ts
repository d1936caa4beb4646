import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import * as note from '@/app/api/v1/collaborations/[collaboration]/notes/[note]/route';
import * as notes from '@/app/api/v1/collaborations/[collaboration]/notes/route';
import { POST as seen } from '@/app/api/v1/collaborations/[collaboration]/notes/seen/route';
import { type Role, roleSchema } from '@/lib/schemas/common';
import type { NoteItem, NoteList } from '@/lib/schemas/notes';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, createPerson, tokenOf } from '../support/people';

const { query } = withDatabase();
const roles = roleSchema.options;
const NAME = '<img src=x onerror=alert(1)> ليلى 🪐';

type Team = Awaited<ReturnType<typeof createCollaborationWith<Role>>>;
let team: Team;
let other: Team;
let tokens: Record<Role, string>;
const on: NoteItem = { kind: 'survey', key: 'halyard' };

async function addSurvey({ collaboration, people }: Team): Promise<string> {
  const [{ id }] = await query<{ id: string }>(
    `insert into survey (collaboration_id, slug, name, band, lead_id, map_settings)
     values ($1, 'halyard', 'HALYARD', 'H', $2, '{}') returning id`,
    [collaboration.id, people.collaborator.id],
  );
  await query(
    `insert into star (collaboration_id, name, folded_name) values ($1, 'RB 1', 'rb 1')`,
    [collaboration.id],
  );
  return id;
}

beforeAll(async () => {
  team = await createCollaborationWith(roles);
  other = await createCollaborationWith(roles);
  await addSurvey(team);
  await addSurvey(other);
  await query('update person set name = $2 where id = $1', [team.people.author.id, NAME]);
  tokens = {} as Record<Role, string>;
  for (const role of roles) tokens[role] = await tokenOf(team.people[role], team.collaboration);
});
beforeEach(async () => {
  await query('delete from rate_limit');
  await query('delete from note');
  await query('delete from outbox_message');
});

const inTeam = (params = {}) => ({ collaboration: team.collaboration.slug, ...params });
const send = (role: Role, body: Record<string, unknown>) =>
  call(notes.POST, {
    method: 'POST',
    params: inTeam(),
    headers: bearer(tokens[role]),
    body: { on, ...body },
  });
const read = async (role: Role, item = on): Promise<NoteList> => {
  const path = `/?${new URLSearchParams({ ...item })}`;
  return (await call(notes.GET, { path, params: inTeam(), headers: bearer(tokens[role]) })).json();
};
const change = (role: Role, id: string, body: unknown) =>
  call(note.PATCH, {
    method: 'PATCH',
    params: inTeam({ note: id }),
    headers: bearer(tokens[role]),
    body,
  });
const remove = (role: Role, id: string) =>
  call(note.DELETE, {
    method: 'DELETE',
    params: inTeam({ note: id }),
    headers: bearer(tokens[role]),
  });
const mail = (kind: string) =>
  query<{ person_id: string }>('select person_id from outbox_message where kind = $1', [kind]);
const idOfFirst = async () => (await read('owner')).notes[0].id;

describe('POST …/notes', () => {
  it.each(roles)('lets the %s write, and keeps every letter as text', async (role) => {
    const body = `${NAME}\n  <script>alert(1)</script> **x** ‏שלום`;
    const response = await send(role, { body });
    expect(response.status).toBe(201);
    expect((await response.json()).notes).toMatchObject([
      { body, author: { id: team.people[role].id }, replies: [], can: { change: true } },
    ]);
  });

  it.each([
    ['nothing', ''],
    ['blank lines', '   \n '],
    ['a direction control', 'a\u202eb'],
    ['a null', 'a\u0000b'],
    ['too much', 'x'.repeat(4001)],
  ])('refuses %s', async (_, body) => {
    const response = await send('owner', { body });
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0].item).toBe('body');
    expect(await query('select 1 from note')).toEqual([]);
  });

  it('names members only, and tells them at once', async () => {
    const { student, author } = team.people;
    const stranger = await createPerson();
    const refused = await send('owner', {
      body: `@${stranger.name} look`,
      mentions: [stranger.id],
    });
    expect(refused.status).toBe(422);
    expect((await refused.json()).errors[0]).toMatchObject({ code: 'not-a-member' });
    const foreign = await send('owner', {
      body: `@${other.people.owner.name}`,
      mentions: [other.people.owner.id],
    });
    expect(foreign.status).toBe(422);
    const unsaid = await send('owner', { body: 'look', mentions: [student.id] });
    expect((await unsaid.json()).errors[0]).toMatchObject({ code: 'not-in-the-text' });
    expect(await query('select 1 from note')).toEqual([]);

    const body = `@${NAME} and @${student.name}: look`;
    const said = await send('owner', { body, mentions: [student.id, author.id] });
    expect((await said.json()).notes[0].mentions.map(({ id }: { id: string }) => id)).toEqual(
      expect.arrayContaining([student.id, author.id]),
    );
    expect((await mail('mention')).map((row) => row.person_id).sort()).toEqual(
      [student.id, author.id].sort(),
    );
  });

  it('gathers mail for the lead and for who wrote in the thread, in one message each', async () => {
    const { collaborator, student, author } = team.people;
    await send('student', { body: 'first' });
    const replyTo = await idOfFirst();
    await send('author', { body: 'second', replyTo });
    await send('owner', { body: 'third', replyTo });
    const rows = await mail('notes');
    expect(rows.map((row) => row.person_id).sort()).toEqual(
      [collaborator.id, student.id, author.id].sort(),
    );
    expect(await mail('mention')).toEqual([]);
  });

  it('answers go below the note that began the thread', async () => {
    await send('student', { body: 'first' });
    const root = await idOfFirst();
    await send('author', { body: 'second', replyTo: root });
    const { notes: before } = await read('owner');
    await send('owner', { body: 'third', replyTo: before[0].replies[0].id });
    const { notes: threads } = await read('owner');
    expect(threads).toHaveLength(1);
    expect(threads[0].replies.map(({ body }) => body)).toEqual(['second', 'third']);
    const [{ id: star }] = await query<{ id: string }>(
      'select id from star where collaboration_id = $1',
      [team.collaboration.id],
    );
    const elsewhere = await send('owner', {
      on: { kind: 'star', key: star },
      body: 'x',
      replyTo: root,
    });
    expect(elsewhere.status).toBe(404);
  });
});

describe('things of another collaboration', () => {
  it('answer as what is not there, to read, to write and to change', async () => {
    const [{ id: star }] = await query<{ id: string }>(
      'select id from star where collaboration_id = $1',
      [other.collaboration.id],
    );
    const foreign = { kind: 'star', key: star };
    const absent = { kind: 'star', key: '00000000-0000-4000-8000-000000000000' };
    const bodies = new Set<string>();
    for (const item of [foreign, absent]) {
      const response = await send('owner', { on: item, body: 'x' });
      expect(response.status).toBe(404);
      bodies.add(JSON.stringify({ ...(await response.json()), instance: '', requestId: '' }));
    }
    const strip = (text: string) => text.replace(/[0-9a-f-]{36}/g, '');
    expect(new Set([...bodies].map(strip)).size).toBe(1);
    await send('owner', { body: 'mine' });
    const id = await idOfFirst();
    const theirs = bearer(await tokenOf(other.people.owner, other.collaboration));
    const there = { collaboration: other.collaboration.slug, note: id };
    for (const [handler, method, body] of [
      [note.PATCH, 'PATCH', { isResolved: true }],
      [note.DELETE, 'DELETE', undefined],
    ] as const) {
      const response = await call(handler, { method, params: there, headers: theirs, body });
      expect(response.status).toBe(404);
    }
  });

  it('the database itself keeps notes and things of two collaborations apart', async () => {
    const [{ id }] = await query<{ id: string }>(
      'select id from survey where collaboration_id = $1',
      [other.collaboration.id],
    );
    const insert = query(
      `insert into note (collaboration_id, survey_id, body) values ($1, $2, 'x')`,
      [team.collaboration.id, id],
    );
    await expect(insert).rejects.toThrow(/foreign key/);
    const nowhere = query(`insert into note (collaboration_id, body) values ($1, 'x')`, [
      team.collaboration.id,
    ]);
    await expect(nowhere).rejects.toThrow(/note_on_one_item/);
  });
});

describe('one’s own note', () => {
  it('can be changed and removed by nobody else; a mark stays', async () => {
    await send('student', { body: `first @${NAME}`, mentions: [team.people.author.id] });
    const id = await idOfFirst();
    for (const role of ['owner', 'author'] as const) {
      expect((await change(role, id, { body: 'mine now' })).status).toBe(403);
      expect((await remove(role, id)).status).toBe(403);
    }
    const changed = await (await change('student', id, { body: 'second' })).json();
    expect(changed.notes[0]).toMatchObject({ body: 'second', mentions: [] });
    expect(changed.notes[0].editedAt).not.toBeNull();
    const removed = await (await remove('student', id)).json();
    expect(removed.notes[0]).toMatchObject({ id, body: null, can: { change: false } });
    expect((await remove('student', id)).status).toBe(409);
    expect(await query(`select 1 from note where body <> ''`)).toEqual([]);
    const waiting = await query(
      `select 1 from outbox_message where kind = 'mention' and state = 'waiting'`,
    );
    expect(waiting).toEqual([]);
  });

  it('a thread is settled and opened again by anybody, and each step is one entry of the log', async () => {
    const entries = async () =>
      Number(
        (
          await query<{ count: string }>(
            'select count(*) from audit_entry where collaboration_id = $1',
            [team.collaboration.id],
          )
        )[0].count,
      );
    const steps: (() => Promise<Response>)[] = [
      () => send('student', { body: 'first' }),
      async () => change('author', await idOfFirst(), { isResolved: true }),
      async () => change('owner', await idOfFirst(), { isResolved: false }),
      async () => change('student', await idOfFirst(), { body: 'other words' }),
      async () => remove('student', await idOfFirst()),
    ];
    for (const step of steps) {
      const before = await entries();
      expect((await step()).status).toBeLessThan(300);
      expect((await entries()) - before).toBe(1);
    }
    const both = await change('owner', await idOfFirst(), { body: 'x', isResolved: true });
    expect(both.status).toBe(422);
  });
});

it('what others wrote since the visit before is new, and only that', async () => {
  await send('student', { body: 'before' });
  expect((await read('owner')).new).toBe(1);
  const answer = await call(seen, {
    method: 'POST',
    params: inTeam(),
    headers: bearer(tokens.owner),
    body: on,
  });
  expect(answer.status).toBe(204);
  expect((await read('owner')).new).toBe(0);
  await send('author', { body: 'after' });
  await send('owner', { body: 'my own' });
  const { notes: list, new: count } = await read('owner');
  expect(count).toBe(1);
  expect(list.map(({ isNew }) => isNew)).toEqual([false, true, false]);
});
