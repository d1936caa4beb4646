import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';

vi.stubEnv('RAREBOUND_BEHIND_PROXY', 'yes');

const settings = await import('@/app/api/v1/collaborations/[collaboration]/settings/route');
const { GET: activity } = await import(
  '@/app/api/v1/collaborations/[collaboration]/activity/route'
);
const { GET: log } = await import('@/app/api/v1/collaborations/[collaboration]/audit/route');
const { GET: exportLog } = await import(
  '@/app/api/v1/collaborations/[collaboration]/audit/export/route'
);
const { POST: writeNote } = await import('@/app/api/v1/collaborations/[collaboration]/notes/route');
const { POST: invite } = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/route'
);
const { recordAudit } = await import('@/lib/services/audit');
const { needsTwoPeople, newRecipeDefaults } = await import('@/lib/services/settings');
const { inTransaction } = await import('@/models');
const { withDatabase } = await import('../support/database');
const support = await import('../support/people');
const { actorOf, bearer, call, createCollaborationWith, tokenOf } = support;

type Role = import('@/lib/schemas/common').Role;
type Entry = import('@/lib/schemas/activity').ActivityEntry;

const { query } = withDatabase();
const members = ['owner', 'author', 'student'] as const;
let team: Awaited<ReturnType<typeof createCollaborationWith<(typeof members)[number]>>>;
let slug: string;

beforeAll(async () => {
  team = await createCollaborationWith(members);
  slug = team.collaboration.slug;
});
beforeEach(() => query('delete from rate_limit'));

type Member = (typeof members)[number];
async function ask(handler: typeof log, role: Member, given: Parameters<typeof call>[1] = {}) {
  const headers = {
    ...bearer(await tokenOf(team.people[role], team.collaboration)),
    'x-forwarded-for': '198.51.100.7, 203.0.113.9',
  };
  return call(handler, { params: { collaboration: slug }, ...given, headers });
}
const change = (body: unknown, role: Member = 'owner') =>
  ask(settings.PATCH, role, { method: 'PATCH', body });

describe('PATCH …/settings', () => {
  it('is an owner’s; everybody reads', async () => {
    for (const role of ['author', 'student'] as const) {
      expect((await change({ name: 'Mine' }, role)).status).toBe(403);
      expect((await ask(settings.GET, role)).status).toBe(200);
    }
  });

  it('changes what is given, and the log holds it before and after with the proxy’s address', async () => {
    const response = await change({ credibleLevel: 0.9, timeZone: 'Europe/Vienna' });
    expect(await response.json()).toMatchObject({
      credibleLevel: 0.9,
      timeZone: 'Europe/Vienna',
      combination: 'default',
    });
    const page = await (await ask(log, 'owner', { path: '/?action=change-settings' })).json();
    expect(page.entries).toHaveLength(1);
    expect(page.entries[0]).toMatchObject({
      who: team.people.owner.name,
      address: '203.0.113.9',
      summary: 'changed the default credible level, the time zone',
      details: {
        before: { credibleLevel: 0.95, timeZone: 'UTC' },
        after: { credibleLevel: 0.9, timeZone: 'Europe/Vienna' },
      },
    });
    expect(await newRecipeDefaults(team.collaboration.id)).toMatchObject({ credibleLevel: 0.9 });
    await change({ credibleLevel: 0.9 });
    const after = await (await ask(log, 'owner', { path: '/?action=change-settings' })).json();
    expect(after.total).toBe(1);
  });

  it.each([
    { timeZone: 'Mars/Olympus' },
    { credibleLevel: 95 },
    { slug: 'No Spaces' },
    { leadAnalysis: 'A-0' },
  ])('refuses %j', async (body) => {
    expect((await change(body)).status).toBe(422);
  });

  it('takes no address that is taken or reserved, and no analysis of others', async () => {
    const other = await createCollaborationWith(['owner']);
    for (const taken of [other.collaboration.slug, 'settings', 'log']) {
      expect((await change({ slug: taken })).status).toBe(409);
    }
    expect((await change({ leadAnalysis: 'A-7' })).status).toBe(404);
    expect((await change({ slug: `${slug}-2` })).status).toBe(200);
    slug = `${slug}-2`;
  });

  it('asks two people by itself once there are two, unless an owner decides', async () => {
    const { id } = team.collaboration;
    expect(await needsTwoPeople(id)).toBe(true);
    await change({ needsTwoPeople: false });
    expect(await needsTwoPeople(id)).toBe(false);
    await change({ needsTwoPeople: null });
    expect(await needsTwoPeople(id)).toBe(true);
    const alone = await createCollaborationWith(['owner', 'student']);
    expect(await needsTwoPeople(alone.collaboration.id)).toBe(false);
  });

  it('an archived collaboration is read only until an owner opens it again', async () => {
    const body = { email: 'a@b.example', roles: ['student'] };
    expect((await change({ isArchived: true })).status).toBe(200);
    const refused = await ask(invite, 'owner', { method: 'POST', body });
    expect(await refused.json()).toMatchObject({ status: 409, code: 'archived' });
    const on = { kind: 'analysis', key: 'A-1' };
    const note = await ask(writeNote, 'student', { method: 'POST', body: { on, body: 'x' } });
    expect(note.status).toBe(409);
    expect((await ask(activity, 'student')).status).toBe(200);
    expect((await change({ isArchived: false })).status).toBe(200);
    const open = await ask(invite, 'owner', { method: 'POST', body });
    expect((await open.json()).code).not.toBe('archived');
  });
});

describe('the log as a file', () => {
  it('holds what the filters leave, quoted, guarded against formulas, and notes that it went out', async () => {
    const actor = await actorOf(team.people.owner, { slug });
    const item = { kind: 'survey', id: 'export-me' };
    const details = { before: '=1+1', after: 'a, "b"\nc' };
    await inTransaction((t) => recordAudit(actor, 'change-survey', item, '=cmd()', t, details));
    const csv = await ask(exportLog, 'owner', { path: '/?item=export-me&format=csv' });
    expect(csv.headers.get('content-disposition')).toBe(`attachment; filename="${slug}-log.csv"`);
    const text = await csv.text();
    expect(text.split('\n')[0]).toBe(
      'at,who,action,summary,item_kind,item_id,item,before,after,address,via',
    );
    expect(text).toContain(`'=cmd(),survey,export-me,,'=1+1,"a, ""b""\nc"`);
    const json = await (
      await ask(exportLog, 'owner', { path: '/?item=export-me&format=json' })
    ).json();
    expect(json.entries).toMatchObject([{ summary: '=cmd()', details }]);
    const noted = await (await ask(log, 'owner', { path: '/?action=export' })).json();
    expect(noted.total).toBe(2);
    expect((await ask(exportLog, 'author')).status).toBe(403);
  });

  it('filters by person and time', async () => {
    const { id } = team.people.author;
    const none = await (await ask(log, 'owner', { path: `/?person=${id}` })).json();
    expect(none.total).toBe(0);
    const from = new Date(Date.now() + 60_000).toISOString();
    const later = await (await ask(log, 'owner', { path: `/?from=${from}` })).json();
    expect(later.total).toBe(0);
    const before = await (await ask(log, 'owner', { path: `/?to=${from}` })).json();
    expect(before.total).toBeGreaterThan(0);
  });

  it('the database refuses to empty it', async () => {
    await expect(query('truncate audit_entry')).rejects.toThrow(
      /rows of audit_entry are not changed/,
    );
  });
});

describe('GET …/activity', () => {
  const read = async (
    role: Member,
    search = '',
  ): Promise<{ entries: Entry[]; next: string | null }> =>
    (await ask(activity, role, { path: `/${search}` })).json();

  it('tells a student nothing of invitations and settings, and goes on where it stopped', async () => {
    const add = async (role: Member, action: string, summary: string) => {
      const actor = await actorOf(team.people[role], { slug });
      const item = { kind: 'survey', id: 'a' };
      await inTransaction((t) => recordAudit(actor, action, item, summary, t));
    };
    for (let i = 1; i <= 5; i++) await add('author', 'import', `stored file ${i}`);
    await add('owner', 'invite', 'invited somebody as student');
    const words = async (role: Member, search = '') =>
      (await read(role, search)).entries.map(({ what }) => what);
    expect(await words('owner')).toContain('invited somebody as student');
    expect(await words('author')).toContain('invited somebody as student');
    for (const what of await words('student')) expect(what).not.toMatch(/invited|settings|level/);
    const first = await read('student', '?limit=3&kind=surveys');
    const second = await read('student', `?limit=3&kind=surveys&cursor=${first.next}`);
    expect([...first.entries, ...second.entries].map(({ what }) => what).slice(0, 5)).toEqual(
      [5, 4, 3, 2, 1].map((n) => `stored file ${n}`),
    );
    expect(await words('student', `?person=${team.people.owner.id}&kind=surveys`)).not.toContain(
      'stored file 1',
    );
    expect((await ask(activity, 'student', { path: '/?cursor=bm8' })).status).toBe(400);
    const outsider = await createCollaborationWith(['owner'] satisfies Role[]);
    const headers = bearer(await tokenOf(outsider.people.owner, outsider.collaboration));
    const foreign = await call(activity, { params: { collaboration: slug }, headers });
    expect(foreign.status).toBe(404);
  });

  it('keeps for a person what names them', async () => {
    await query(
      `insert into survey (collaboration_id, slug, name, band, map_settings)
       values ($1, 'halyard', 'HALYARD', 'H', '{}')`,
      [team.collaboration.id],
    );
    const { student } = team.people;
    const body = {
      on: { kind: 'survey', key: 'halyard' },
      body: `@${student.name} look`,
      mentions: [student.id],
    };
    expect((await ask(writeNote, 'author', { method: 'POST', body })).status).toBe(201);
    const mine = await read('student', '?for=me');
    expect(mine.entries).toMatchObject([
      {
        kind: 'notes',
        what: 'wrote a note on HALYARD',
        excerpt: body.body,
        item: { label: 'HALYARD', path: '/surveys/halyard' },
      },
    ]);
    expect((await read('author', '?for=me')).entries).toEqual([]);
  });
});
