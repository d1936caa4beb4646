import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  DELETE as keep,
  POST as remove,
} from '@/app/api/v1/collaborations/[collaboration]/leaving/deletion/route';
import { GET as fetchExport } from '@/app/api/v1/collaborations/[collaboration]/leaving/exports/[export]/route';
import { POST as pack } from '@/app/api/v1/collaborations/[collaboration]/leaving/exports/route';
import { GET as look } from '@/app/api/v1/collaborations/[collaboration]/leaving/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import { claim } from '@/lib/queue/attempt';
import { enqueueDeposit } from '@/lib/queue/enqueue';
import { leavingSchema } from '@/lib/schemas/leaving';
import { findPublicRelease } from '@/lib/services/releases/public-page';
import { CollaborationExportRow, DepositRow, inTransaction, NoteRow, UploadRow } from '@/models';
import { deleteDue, dropExpiredExports } from '@/workers/leaving/delete-due';
import { perform } from '@/workers/perform';
import { performExportCollaboration } from '@/workers/tasks/export-collaboration';
import { withDatabase } from '../support/database';
import {
  bearer,
  call,
  createCollaborationWith,
  sessionCookieOf,
  type TestCollaboration,
  tokenOf,
  webAddress,
} from '../support/people';
import { publishRelease } from '../support/published-release';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildStars,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { unpackArchive } from '../support/unpack-archive';

const { query } = withDatabase();
const FILE = Buffer.from('name,distance\nStar 1,12\n');

/** A collaboration with something in most tables. */
async function fill(team: TestCollaboration, ownerId: string) {
  const survey = await buildSurvey(team.id, { leadId: ownerId });
  await buildStars(survey, 250);
  const target = await buildTarget(survey, { name: 'Star of the note' });
  await buildCompanion(target);
  const population = await buildPopulation(team.id);
  await buildAnalysis(team.id, recipeOf([survey], population), ownerId);
  const upload = await UploadRow.create({
    collaborationId: team.id,
    surveyId: survey.id,
    kind: 'targets',
    fileName: '../stars\\of "us".csv',
    byteLength: FILE.length,
    sha256: createHash('sha256').update(FILE).digest('hex'),
    state: 'stored',
    uploadedBy: ownerId,
  });
  await query('insert into upload_part (upload_id, part_number, bytes) values ($1, 0, $2)', [
    upload.id,
    FILE,
  ]);
  await NoteRow.create({
    collaborationId: team.id,
    surveyId: survey.id,
    body: 'Which ages?',
    createdBy: ownerId,
  } as never);
  const release = await publishRelease(team);
  const jobId = await inTransaction((transaction) =>
    enqueueDeposit(transaction, { collaborationId: team.id, requestedBy: ownerId }),
  );
  await DepositRow.create({
    collaborationId: team.id,
    releaseId: release.id,
    jobId,
    remoteId: 'a1',
    doi: '10.99999/a1',
    askedByName: 'R. Castellan',
    publishedAt: new Date(),
  });
  return { release, upload };
}

async function open(name: string) {
  const { collaboration, people } = await createCollaborationWith(['owner', 'author', 'student'], {
    name,
  });
  const owner = bearer(await tokenOf(people.owner, collaboration));
  const { cookie } = await sessionCookieOf(people.owner);
  const signedIn = { cookie, origin: webAddress() };
  return {
    collaboration,
    people,
    owner,
    signedIn,
    ...(await fill(collaboration, people.owner.id)),
  };
}

type Side = Awaited<ReturnType<typeof open>>;
let ours: Side;
let theirs: Side;
beforeAll(async () => {
  ours = await open('Heron');
  theirs = await open('Egret');
  await query(`update person set password_hash = 'hash ' || md5(id::text)`);
});

const ask = (
  side: Side,
  handler: RouteHandler,
  given: {
    by?: Record<string, string>;
    method?: string;
    params?: Record<string, string>;
    body?: unknown;
  } = {},
) =>
  call(handler, {
    method: given.method ?? 'GET',
    headers: given.by ?? side.owner,
    params: { collaboration: side.collaboration.slug, ...given.params },
    body: given.body,
  });
const standing = async (side: Side) => leavingSchema.parse(await (await ask(side, look)).json());

/** Every table whose rows name a collaboration, as the database has them. */
const tablesOf = async () =>
  (
    await query<{ name: string }>(
      `select c.table_name as name from information_schema.columns c
         join information_schema.tables t using (table_schema, table_name)
       where c.table_schema = 'public' and c.column_name = 'collaboration_id'
         and t.table_type = 'BASE TABLE' order by 1`,
    )
  ).map(({ name }) => name);
const countsOf = async (id: string) => {
  const counted = (await tablesOf()).map(
    (table) =>
      `select '${table}' as name, count(*)::int as count from "${table}" where collaboration_id = $1`,
  );
  const rows = await query<{ name: string; count: number }>(counted.join(' union all '), [id]);
  return Object.fromEntries(rows.map(({ name, count }) => [name, count]));
};

describe('taking a collaboration along', () => {
  const deliver = (jobId: string) =>
    perform(
      { jobId, workerId: 'w', shutdown: new AbortController().signal, pool: {} as never },
      performExportCollaboration,
    );
  let bytes: Buffer;
  let files: Map<string, Buffer>;

  it('is asked for by owners, one at a time, and fetched by owners of that collaboration alone', async () => {
    for (const role of ['author', 'student'] as const) {
      const by = bearer(await tokenOf(ours.people[role], ours.collaboration));
      expect((await ask(ours, pack, { by, method: 'POST' })).status).toBe(403);
      expect((await ask(ours, look, { by })).status).toBe(403);
    }
    expect((await ask(ours, pack, { method: 'POST' })).status).toBe(202);
    expect((await ask(ours, pack, { method: 'POST' })).status).toBe(409);
    const { jobId, id } = await CollaborationExportRow.findOne({
      where: { collaborationId: ours.collaboration.id },
      rejectOnEmpty: true,
    });
    const params = { export: id };
    expect((await ask(ours, fetchExport, { params })).status).toBe(404);
    // A worker that died half way has left parts of another archive.
    await claim(jobId, 'w');
    await query(`update job set lease_until = now() - interval '1 s' where id = $1`, [jobId]);
    await query(`insert into collaboration_export_part values ($1, $2, 0, 'torn')`, [
      id,
      ours.collaboration.id,
    ]);
    await deliver(jobId);
    const student = bearer(await tokenOf(ours.people.student, ours.collaboration));
    expect((await ask(ours, fetchExport, { params, by: student })).status).toBe(403);
    expect((await ask(theirs, fetchExport, { params })).status).toBe(404);
    const response = await ask(ours, fetchExport, { params });
    expect(response.status).toBe(200);
    bytes = Buffer.from(await response.arrayBuffer());
    const [listed] = (await standing(ours)).exports;
    expect(listed).toMatchObject({ status: 'done', byteLength: bytes.length });
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(listed.sha256);
    files = await unpackArchive(bytes);
  });

  it('holds every row of every table, each original file, and the files of releases', async () => {
    const contents = JSON.parse(String(files.get('contents.json')));
    expect(contents.schemaVersion).toMatch(/^\d{14}-/);
    const counts = await countsOf(ours.collaboration.id);
    for (const { name, rows } of contents.tables as { name: string; rows: number }[]) {
      const lines = String(files.get(`tables/${name}.jsonl`))
        .split('\n')
        .slice(0, -1);
      expect(lines.map((line) => typeof JSON.parse(line)).length, name).toBe(rows);
      if (name === 'collaboration') continue;
      // What has been written since it was packed: the log, and the job's own end.
      if (name === 'audit_entry') expect(rows).toBeGreaterThan(0);
      else if (name !== 'access_token') expect(rows, name).toBe(counts[name]);
    }
    expect(counts.target).toBe(251);
    expect(files.get(`uploads/${ours.upload.id}/.._stars_of "us".csv`)).toEqual(FILE);
    expect(files.get(`releases/R-${ours.release.number}/bundle.zip`)).toHaveLength(1_200_000);
    expect(String(files.get('README.txt'))).toContain(contents.schemaVersion);
  });

  it('holds no secret, and nothing of another collaboration', async () => {
    const all = [...files].map(([name, content]) => `${name}\n${content}`).join('\n');
    const secrets = await query<{ secret: string }>(
      `select token_hash as secret from access_token union all select code_hash from invitation
       union all select password_hash from person`,
    );
    expect(secrets.length).toBeGreaterThan(3);
    for (const { secret } of secrets) expect(all).not.toContain(secret);
    expect(all).not.toMatch(/password_hash|token_hash|code_hash|attempt_token|"sealed"/);
    expect(all).not.toContain(theirs.collaboration.id);
    expect(all).not.toContain(ours.people.owner.email);
  });

  it('leaves out no table by accident', async () => {
    const contents = JSON.parse(String(files.get('contents.json')));
    const held = (contents.tables as { name: string }[]).map(({ name }) => name);
    const absent = (await tablesOf()).filter((name) => !held.includes(name));
    const known = [
      'collaboration_export',
      'collaboration_export_part',
      'departure',
      'outbox_message',
    ];
    expect(absent.filter((name) => !name.startsWith('idempotency'))).toEqual(known);
  });

  it('is gone after its days', async () => {
    const [{ id }] = (await standing(ours)).exports;
    await query(
      `update collaboration_export set expires_at = now() - interval '1 s' where id = $1`,
      [id],
    );
    expect((await ask(ours, fetchExport, { params: { export: id } })).status).toBe(404);
    expect(await dropExpiredExports()).toBe(1);
    expect((await standing(ours)).exports).toEqual([]);
  });
});

describe('deleting a collaboration', () => {
  const remember = (side: Side, name: string, by = side.signedIn) =>
    ask(side, remove, { method: 'POST', body: { name }, by });
  const mailOf = (what: string) =>
    query<{ person_id: string }>(
      `select person_id from outbox_message where kind = 'departure' and about like $1`,
      [`${what}:${ours.collaboration.id}`],
    );

  it('is for owners who are signed in and type its name, and waits seven days', async () => {
    expect((await remember(ours, 'Heron', ours.owner as never)).status).toBe(403);
    expect((await remember(ours, 'Egret')).status).toBe(422);
    const { cookie } = await sessionCookieOf(ours.people.author);
    expect((await remember(ours, 'Heron', { cookie, origin: webAddress() })).status).toBe(403);
    const response = await remember(ours, 'Heron');
    expect(response.status).toBe(202);
    const { deletion, publishedReleases } = leavingSchema.parse(await response.json());
    expect(publishedReleases).toBe(1);
    const days = (Date.parse(deletion?.dueAt ?? '') - Date.parse(deletion?.askedAt ?? '')) / 864e5;
    expect(days).toBe(7);
    expect(await mailOf('departure')).toHaveLength(2);
    expect((await remember(ours, 'Heron')).status).toBe(409);
    expect(await deleteDue()).toBeNull();
  });

  it('can be taken back until then', async () => {
    const by = ours.signedIn;
    expect((await ask(ours, keep, { method: 'DELETE', by })).status).toBe(200);
    expect((await standing(ours)).deletion).toBeNull();
    expect((await ask(ours, keep, { method: 'DELETE', by })).status).toBe(409);
    expect(await mailOf('departure')).toHaveLength(4);
    expect(await deleteDue()).toBeNull();
  });

  it('then removes every row of it and touches no other', async () => {
    const { id } = ours.collaboration;
    const before = await countsOf(theirs.collaboration.id);
    const parts = await query('select 1 from upload_part');
    expect(Object.values(await countsOf(id)).filter((count) => count > 0).length).toBeGreaterThan(
      15,
    );
    await remember(ours, 'Heron');
    await query(
      `update departure set asked_at = asked_at - interval '7 d', due_at = due_at - interval '7 d'
       where collaboration_id = $1`,
      [id],
    );
    expect(await deleteDue()).toBe(id);
    expect(await deleteDue()).toBeNull();
    for (const [table, count] of Object.entries(await countsOf(id))) expect(count, table).toBe(0);
    expect(await query('select 1 from collaboration where id = $1', [id])).toEqual([]);
    expect(await query('select 1 from upload_part')).toHaveLength(parts.length - 1);
    expect(await countsOf(theirs.collaboration.id)).toEqual(before);
    expect((await ask(ours, look, { by: ours.signedIn })).status).toBe(404);
    expect(await query('select id, asked_by from deleted_collaboration')).toEqual([
      { id, asked_by: ours.people.owner.id },
    ]);
    expect(await mailOf('deleted')).toHaveLength(3);
  });

  it('leaves a tombstone at the address of a release, with title, dates and DOI alone', async () => {
    const page = await findPublicRelease(ours.release.code);
    expect(page).toMatchObject({ title: ours.release.title, authors: [], runs: [], files: [] });
    expect(page.withdrawn?.reason).toBe(
      'The collaboration that published it was deleted with everything in it. A copy is kept at https://doi.org/10.99999/a1.',
    );
    expect(JSON.stringify(page)).not.toMatch(/Heron|Castellan|Mira/);
    expect((await findPublicRelease(theirs.release.code)).withdrawn).toBeNull();
  });

  it('is remembered in rows that nobody changes', async () => {
    for (const table of ['deleted_collaboration', 'release_tombstone']) {
      await expect(query(`delete from ${table}`)).rejects.toThrow(/are not changed/);
    }
  });
});
