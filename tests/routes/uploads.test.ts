import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as listCompanions } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/companions/route';
import { GET as listTargets } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/targets/route';
import { POST as createSurvey } from '@/app/api/v1/collaborations/[collaboration]/surveys/route';
import { GET as fileOfUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/file/route';
import { PATCH as changeUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/route';
import { POST as storeUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/store/route';
import { POST as sendUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import { closeReaders } from '@/lib/services/reading';
import { gzippedZeros } from '../lib/formats/zip-of';
import { withDatabase } from '../support/database';
import {
  addMember,
  bearer,
  call,
  createCollaborationWith,
  createPerson,
  tokenOf,
  webAddress,
} from '../support/people';

const database = withDatabase();
const bad = path.resolve(import.meta.dirname, '../fixtures/bad');
const samples = path.resolve(import.meta.dirname, '../fixtures/samples');

interface Row {
  id: string;
  case: string;
  kind: string;
  format: string;
  file: string;
  expect: 'accept' | 'warn' | 'reject';
  http: string;
  code: string;
  where: string;
}
const rows: Row[] = parse(readFileSync(path.join(bad, 'index.csv')), { columns: true });

let slug = '';
let studentToken = '';
let surveys = 0;
let coolingId = '';

/** Uploads are counted per person; several owners share the many that this file sends. */
const owners: string[] = [];
const headers = () => bearer(owners[surveys % owners.length]);
const inTeam = (params: Record<string, string> = {}) => ({ collaboration: slug, ...params });

async function newSurvey(body: Record<string, unknown> = {}): Promise<string> {
  const response = await call(createSurvey, {
    method: 'POST',
    params: inTeam(),
    headers: headers(),
    body: { name: `Survey ${++surveys}`, band: 'H', ...body },
  });
  expect(response.status).toBe(201);
  return (await response.json()).slug;
}

interface Sending {
  kind: string;
  survey?: string;
  name?: string;
  bytes: Uint8Array | string;
  settings?: unknown;
  headers?: Record<string, string>;
}

function send({
  kind,
  survey,
  name = 'file.csv',
  bytes,
  settings,
  headers: extra,
}: Sending): Promise<Response> {
  const query = new URLSearchParams({ kind, name });
  if (survey !== undefined) query.set('survey', survey);
  if (settings !== undefined) query.set('settings', JSON.stringify(settings));
  const request = new Request(new URL(`/?${query}`, webAddress()), {
    method: 'POST',
    headers: { 'content-type': 'application/octet-stream', ...headers(), ...extra },
    body: bytes as BodyInit,
  });
  return sendUpload(request, { params: Promise.resolve(inTeam()) });
}

async function store(response: Response): Promise<void> {
  expect(response.status).toBe(201);
  const { id } = await response.json();
  const stored = await call(storeUpload, {
    method: 'POST',
    params: inTeam({ upload: id }),
    headers: headers(),
  });
  expect(await stored.json()).toMatchObject({ id, state: 'stored' });
}

/** The version of every row of every table: any insert, change or removal shows in it. */
async function snapshot(): Promise<unknown> {
  const tables = [
    'upload',
    'upload_part',
    'star',
    'target',
    'contrast_curve',
    'completeness_map',
    'companion',
    'cooling_table',
    'job',
    'audit_entry',
  ];
  const versions = tables.map(
    (table) => `select '${table}' as table, count(*) as rows,
      md5(string_agg(ctid::text || ':' || xmin::text, '|' order by ctid)) as digest from ${table}`,
  );
  return database.query(versions.join(' union all '));
}

const target = 'name,distance,distance_error,age,age_error,mag_H\nRB 0001,40,0.4,30,3,6\n';
/** A cooling table with the bands that the bad curve files name. */
const cooling = `age,mass,mag_J,mag_H,mag_K\n${[1, 5, 20].flatMap((mass) => [10, 100].map((age) => `${age},${mass},${20 - mass / 5},${19 - mass / 5},${18 - mass / 5}\n`)).join('')}`;
const map =
  'target,mass,semi_major_axis,completeness\nRB 0001,1,5,0\nRB 0001,1,300,0.3\nRB 0001,20,5,0.4\nRB 0001,20,300,0.9\n';

beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner', 'student']);
  slug = collaboration.slug;
  owners.push(await tokenOf(people.owner, collaboration));
  for (let i = 0; i < 3; i++) {
    const person = await createPerson();
    await addMember(collaboration, person, ['owner']);
    owners.push(await tokenOf(person, collaboration));
  }
  studentToken = await tokenOf(people.student, collaboration);
  await store(
    await send({ kind: 'cooling-tables', bytes: cooling, settings: { title: 'Three bands' } }),
  );
  const [table] = await database.query<{ id: string }>('select id from cooling_table');
  coolingId = table.id;
});
afterAll(closeReaders);

const isSent = ({ id, file }: Row) => file !== '' || id === '144';
const bomb = () => Buffer.from(gzippedZeros(3 * 2 ** 30));

describe('an upload', () => {
  it.each(rows.filter(isSent).map((row) => [`${row.id} ${row.case}`, row] as const))(
    '%s gets its code at its place, and a refused one leaves the database unchanged',
    async (_, row) => {
      const survey = await newSurvey({
        mapSettings: { cooling: { kind: 'table', coolingTableId: coolingId } },
      });
      if (row.kind !== 'targets' && row.kind !== 'cooling-tables') {
        await store(await send({ kind: 'targets', survey, bytes: target }));
      }
      if (row.id === '180' || row.id === '181') {
        await store(await send({ kind: 'completeness-maps', survey, bytes: map }));
      }
      const before = await snapshot();
      const isNameless =
        /wide/.test(row.case) || (row.kind === 'completeness-maps' && row.format !== 'csv');
      const response = await send({
        kind: row.kind,
        survey: row.kind === 'cooling-tables' ? undefined : survey,
        name: row.file || row.case,
        bytes: row.file ? readFileSync(path.join(bad, row.file)) : bomb(),
        settings: isNameless ? { defaultTarget: 'RB 0001' } : undefined,
      });
      const body = await response.json();
      if (row.expect === 'reject') {
        expect([response.status, body.errors?.[0]?.code]).toEqual([Number(row.http), row.code]);
        const line = /lines? (\d+)/.exec(row.where)?.[1];
        if (line !== undefined) expect(body.errors[0].line).toBe(Number(line));
        const column = /column "(.+)"/.exec(row.where)?.[1];
        if (column !== undefined) expect(body.errors[0].column).toBe(column);
        expect(await snapshot()).toEqual(before);
      } else {
        expect([response.status, body.state]).toEqual([201, 'read']);
        const codes = body.report.notes.map((note: { code: string }) => note.code);
        // A table of targets that is read as such has nothing to suggest.
        if (row.expect === 'warn' && row.id !== '119') expect(codes).toContain(row.code);
      }
    },
  );

  it('keeps the original bytes beside their SHA-256, beyond the 10 MB that a proxy lets through', async () => {
    const survey = await newSurvey();
    const notes = `name,distance,age,notes\n${Array.from({ length: 200 }, (_, i) => `RB ${i},20,100,${'n'.repeat(60_000)}\n`).join('')}`;
    const sha256 = createHash('sha256').update(notes).digest();
    const response = await send({
      kind: 'targets',
      survey,
      bytes: notes,
      headers: { 'repr-digest': `sha-256=:${sha256.toString('base64')}:` },
    });
    const upload = await response.json();
    expect([response.status, upload.byteLength, upload.sha256]).toEqual([
      201,
      notes.length,
      sha256.toString('hex'),
    ]);
    const file = await call(fileOfUpload, {
      params: inTeam({ upload: upload.id }),
      headers: headers(),
    });
    expect(
      createHash('sha256')
        .update(Buffer.from(await file.arrayBuffer()))
        .digest('hex'),
    ).toBe(upload.sha256);
  });

  it('with another SHA-256 than stated, or fewer bytes than announced, is refused without a trace', async () => {
    const survey = await newSurvey();
    const before = await snapshot();
    const other = createHash('sha256').update('other').digest('base64');
    const wrong = await send({
      kind: 'targets',
      survey,
      bytes: target,
      headers: { 'repr-digest': `sha-256=:${other}:` },
    });
    expect([wrong.status, (await wrong.json()).errors[0].code]).toEqual([422, 'checksum']);
    const short = await send({
      kind: 'targets',
      survey,
      bytes: target,
      headers: { 'content-length': '20000000' },
    });
    expect([short.status, (await short.json()).errors[0].code]).toEqual([400, 'truncated']);
    expect(await snapshot()).toEqual(before);
  });

  it('is a lead’s or an owner’s to send: a student is refused before a byte is read', async () => {
    const survey = await newSurvey();
    const response = await send({
      kind: 'targets',
      survey,
      bytes: target,
      headers: bearer(studentToken),
    });
    expect([response.status, (await response.json()).code]).toEqual([403, 'not-allowed']);
  });
});

describe('storing', () => {
  it('the twelve sample stars brings targets, curves and companions in, once each', async () => {
    await store(
      await send({
        kind: 'cooling-tables',
        name: 'grid.csv',
        bytes: readFileSync(path.join(samples, 'cooling-table.csv')),
        settings: { title: 'Grid' },
      }),
    );
    const [{ id: coolingTableId }] = await database.query<{ id: string }>(
      "select id from cooling_table where name = 'Grid'",
    );
    const survey = await newSurvey({
      band: 'K',
      mapSettings: { cooling: { kind: 'table', coolingTableId } },
    });
    for (const [kind, file] of [
      ['targets', 'targets.csv'],
      ['contrast-curves', 'contrast.csv'],
      ['companions', 'companions.csv'],
    ]) {
      await store(
        await send({ kind, survey, name: file, bytes: readFileSync(path.join(samples, file)) }),
      );
    }
    const listed = await call(listTargets, { params: inTeam({ survey }), headers: headers() });
    const { targets, total } = await listed.json();
    expect(total).toBe(12);
    expect(
      targets.every(
        (one: { curves: unknown[]; mapState: string }) =>
          one.curves.length === 1 && one.mapState === 'waiting',
      ),
    ).toBe(true);
    const found = await (
      await call(listCompanions, { params: inTeam({ survey }), headers: headers() })
    ).json();
    expect(found.companions.map((one: { status: string }) => one.status).sort()).toEqual([
      'background',
      'candidate',
      'confirmed',
      'confirmed',
    ]);

    const again = await (
      await send({
        kind: 'targets',
        survey,
        bytes: readFileSync(path.join(samples, 'targets.csv')),
      })
    ).json();
    expect(new Set(again.report.items.map((item: { outcome: string }) => item.outcome))).toEqual(
      new Set(['unchanged']),
    );
  });

  it('matches a star of another survey by its Gaia number, so that it counts once', async () => {
    const first = await newSurvey();
    const second = await newSurvey();
    const star = (name: string) =>
      `name,gaia_dr3_id,distance,age\n${name},6151712717763150000,40,30\n`;
    await store(await send({ kind: 'targets', survey: first, bytes: star('Alpha') }));
    const read = await send({ kind: 'targets', survey: second, bytes: star('Beta') });
    const preview = await read.clone().json();
    expect(preview.report.items).toEqual([
      { name: 'Beta', outcome: 'known-star', summary: '40 pc, 30 Myr' },
    ]);
    await store(read);
    const owned = await database.query(
      "select distinct star_id from target where gaia_dr3_id = '6151712717763150000'",
    );
    expect(owned).toHaveLength(1);
  });

  it('can leave a target of the file out, and says so', async () => {
    const survey = await newSurvey();
    const bytes = 'name,distance,age\nOne,40,30\nTwo,40,30\n';
    const upload = await (await send({ kind: 'targets', survey, bytes })).json();
    const changed = await call(changeUpload, {
      method: 'PATCH',
      params: inTeam({ upload: upload.id }),
      headers: headers(),
      body: { leaveOut: ['Two'] },
    });
    expect(
      (await changed.json()).report.items.map((item: { outcome: string }) => item.outcome),
    ).toEqual(['new', 'left-out']);
    await call(storeUpload, {
      method: 'POST',
      params: inTeam({ upload: upload.id }),
      headers: headers(),
    });
    const listed = await (
      await call(listTargets, { params: inTeam({ survey }), headers: headers() })
    ).json();
    expect(listed.targets.map((one: { name: string }) => one.name)).toEqual(['One']);
  });
});
