import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as listRuns } from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/runs/route';
import { DELETE as forgetMapping } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/column-mappings/[mapping]/route';
import { GET as listMappings } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/column-mappings/route';
import { GET as listTargets } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/targets/route';
import { POST as createSurvey } from '@/app/api/v1/collaborations/[collaboration]/surveys/route';
import { GET as dependentsOf } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/dependents/route';
import { POST as storeUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/store/route';
import { POST as withdrawUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/withdraw/route';
import {
  GET as listUploads,
  POST as sendUpload,
} from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import {
  columnMappingSchema,
  dependentsSchema,
  type UploadView,
  uploadSchema,
} from '@/lib/schemas/uploads';
import { closeReaders } from '@/lib/services/reading';
import { ContrastCurveRow, database, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, tokenOf, webAddress } from '../support/people';
import { runToEnd } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let headers: Record<string, string>;
let surveys = 0;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
  headers = bearer(await tokenOf(lab.people.owner, lab.collaboration));
});
afterAll(async () => {
  await closeReaders();
  await killWorkers();
});

const inTeam = (more: Record<string, string> = {}) => ({
  collaboration: lab.collaboration.slug,
  ...more,
});

async function newSurvey(): Promise<string> {
  const body = { name: `Intake ${++surveys}`, band: 'H' };
  const response = await call(createSurvey, { method: 'POST', params: inTeam(), headers, body });
  return (await response.json()).slug;
}

interface Sending {
  kind: string;
  survey: string;
  text: string;
  settings?: unknown;
}

function send({ kind, survey, text, settings }: Sending): Promise<Response> {
  const asked = new URLSearchParams({ kind, survey, name: 'file.csv' });
  if (settings !== undefined) asked.set('settings', JSON.stringify(settings));
  const request = new Request(new URL(`/?${asked}`, webAddress()), {
    method: 'POST',
    headers: { 'content-type': 'application/octet-stream', ...headers },
    body: text,
  });
  return sendUpload(request, { params: Promise.resolve(inTeam()) });
}

async function store(sending: Sending): Promise<UploadView> {
  const sent = await send(sending);
  const upload = await sent.json();
  expect([sent.status, upload.errors]).toEqual([201, undefined]);
  const params = inTeam({ upload: upload.id });
  const response = await call(storeUpload, { method: 'POST', params, headers });
  return uploadSchema.parse(await response.json());
}

const withdraw = (id: string, as = headers) =>
  call(withdrawUpload, { method: 'POST', params: inTeam({ upload: id }), headers: as });

async function dependents(id: string) {
  const response = await call(dependentsOf, { params: inTeam({ upload: id }), headers });
  return dependentsSchema.parse(await response.json());
}

async function targetsOf(survey: string) {
  const response = await call(listTargets, { params: inTeam({ survey }), headers });
  return (await response.json()).targets as {
    name: string;
    distancePc: number;
    leftOutReason: string | null;
  }[];
}

const targets = (distancePc: number, names = ['One', 'Two']) =>
  `name,distance,distance_error,age,age_error,mag_H\n${names.map((name) => `${name},${distancePc},1,30,3,6\n`).join('')}`;
const curve = (mag: number) =>
  `target,separation,contrast,band\n${[0.1, 0.5, 1, 2].map((at) => `One,${at},${mag},H\n`).join('')}`;

describe('sending a file again', () => {
  it('answers the upload that waits, and a new one once that is stored', async () => {
    const survey = await newSurvey();
    const sending = { kind: 'targets', survey, text: targets(40) };
    const first = await (await send(sending)).json();
    const again = await (await send({ ...sending, settings: { leaveOut: ['Two'] } })).json();
    expect(again.id).toBe(first.id);
    expect(again.report.items.map(({ outcome }: { outcome: string }) => outcome)).toEqual([
      'new',
      'left-out',
    ]);
    const stored = await store(sending);
    expect([stored.id, stored.version]).toEqual([first.id, 1]);
    const later = await (await send(sending)).json();
    expect(later.id).not.toBe(first.id);
    const [{ parts }] = await query<{ parts: number }>(
      'select count(*)::int as parts from upload_part where upload_id = $1',
      [first.id],
    );
    expect(parts).toBe(1);
  });

  it('two at once still make one upload', async () => {
    const survey = await newSurvey();
    const sending = { kind: 'targets', survey, text: targets(41) };
    const both = await Promise.all([send(sending), send(sending)]);
    const [a, b] = await Promise.all(both.map((response) => response.json()));
    expect(a.id).toBe(b.id);
  });
});

describe('a mapping of columns', () => {
  const text = 'star,d,age,mood\nOne,40,30,good\n';
  const columnMap = { star: 'name', d: 'distance', mood: '' };

  it('is applied to the next file with the same headings, says so, and can be forgotten', async () => {
    const survey = await newSurvey();
    const refused = await (await send({ kind: 'targets', survey, text })).json();
    expect(refused.refused.columns.map(({ heading }: { heading: string }) => heading)).toEqual([
      'star',
      'd',
      'age',
      'mood',
    ]);
    await store({ kind: 'targets', survey, text, settings: { columnMap } });
    const next = 'age,star,mood,d\n31,One,bad,42\n';
    const read = await (await send({ kind: 'targets', survey, text: next })).json();
    expect(read.settings.columnMap).toEqual(columnMap);
    expect(read.report.notes[0]).toMatchObject({ code: 'columns-as-before', level: 'information' });
    expect(read.report.preview.table.rows).toEqual([[31, 'One', 42]]);

    const params = inTeam({ survey });
    const listed = await (await call(listMappings, { params, headers })).json();
    const [mapping] = columnMappingSchema.array().parse(listed.mappings);
    expect(mapping).toMatchObject({ kind: 'targets', columnMap, id: read.report.remembered.id });
    const gone = await call(forgetMapping, {
      method: 'DELETE',
      params: { ...params, mapping: mapping.id },
      headers,
    });
    expect(gone.status).toBe(204);
    expect((await send({ kind: 'targets', survey, text: next })).status).toBe(422);
  });

  it('is not applied to other headings, to another survey, or over what a person maps', async () => {
    const survey = await newSurvey();
    await store({ kind: 'targets', survey, text, settings: { columnMap } });
    const other = 'star,d,age\nOne,40,30\n';
    expect((await send({ kind: 'targets', survey, text: other })).status).toBe(422);
    const elsewhere = await newSurvey();
    expect((await send({ kind: 'targets', survey: elsewhere, text })).status).toBe(422);
    const own = await send({ kind: 'targets', survey, text, settings: { columnMap: {} } });
    expect(own.status).toBe(422);
  });
});

describe('withdrawing a file', () => {
  it('of targets leaves out what it brought and puts back what it replaced; a later file takes them up again', async () => {
    const survey = await newSurvey();
    await store({ kind: 'targets', survey, text: targets(40, ['One']) });
    const second = await store({ kind: 'targets', survey, text: targets(50) });
    expect(second.version).toBe(2);
    expect(await dependents(second.id)).toMatchObject({
      targetsLeftOut: { count: 1, names: ['Two'] },
      goBack: { count: 1, names: ['One'] },
      runs: [],
    });
    const withdrawn = uploadSchema.parse(await (await withdraw(second.id)).json());
    expect([withdrawn.state, withdrawn.withdrawnBy]).toEqual(['withdrawn', lab.people.owner.name]);
    expect(await targetsOf(survey)).toMatchObject([
      { name: 'One', distancePc: 40, leftOutReason: null },
      { name: 'Two', leftOutReason: 'upload withdrawn' },
    ]);
    expect((await withdraw(second.id)).status).toBe(409);
    await store({ kind: 'targets', survey, text: targets(50) });
    expect(await targetsOf(survey)).toMatchObject([
      { name: 'One', distancePc: 50, leftOutReason: null },
      { name: 'Two', distancePc: 50, leftOutReason: null },
    ]);
  });

  it('between two others changes nothing now, and the last then goes back to the first', async () => {
    const survey = await newSurvey();
    const uploads: UploadView[] = [];
    for (const distance of [40, 50, 60]) {
      uploads.push(await store({ kind: 'targets', survey, text: targets(distance, ['One']) }));
    }
    expect(await dependents(uploads[1].id)).toMatchObject({ stay: { count: 1 } });
    await withdraw(uploads[1].id);
    expect(await targetsOf(survey)).toMatchObject([{ distancePc: 60 }]);
    await withdraw(uploads[2].id);
    expect(await targetsOf(survey)).toMatchObject([{ distancePc: 40, leftOutReason: null }]);
  });

  it('of curves brings the curve before back and asks for its map; without one the map ends', async () => {
    const survey = await newSurvey();
    await store({ kind: 'targets', survey, text: targets(40, ['One']) });
    const first = await store({ kind: 'contrast-curves', survey, text: curve(10) });
    const second = await store({ kind: 'contrast-curves', survey, text: curve(12) });
    const current = async () =>
      (await ContrastCurveRow.findAll({ where: { replacedAt: null } }))
        .filter(({ uploadId }) => uploadId === first.id || uploadId === second.id)
        .map(({ uploadId }) => uploadId);
    expect(await current()).toEqual([second.id]);
    await withdraw(second.id);
    expect(await current()).toEqual([first.id]);
    const target = await TargetRow.findOne({
      where: { name: 'One', uploadId: (await list(survey))[2] },
    });
    expect(['waiting', 'ready']).toContain(target?.mapState);
    await withdraw(first.id);
    expect(await current()).toEqual([]);
    expect(await target?.reload()).toMatchObject({ mapId: null, mapState: 'none' });
  });

  it('waits for a worker that holds the job of the maps, and lets it write the targets meanwhile', async () => {
    const survey = await newSurvey();
    await store({ kind: 'targets', survey, text: targets(40, ['One']) });
    await store({ kind: 'contrast-curves', survey, text: curve(10) });
    const second = await store({ kind: 'contrast-curves', survey, text: curve(12) });
    const ofSurvey = '(select id from survey where slug = $1)';
    const openJobs = `from job where survey_id = ${ofSurvey} and status in ('waiting', 'running')`;
    await expect
      .poll(() => query(`select 1 ${openJobs}`, [survey]), { timeout: 30_000 })
      .toEqual([]);
    // On no queue: open for whoever looks, and nobody takes it.
    await query(
      `update job set status = 'waiting', finished_at = null where survey_id = ${ofSurvey}
         and kind = 'compute-maps'
         and created_at = (select max(created_at) from job where survey_id = ${ofSurvey})`,
      [survey],
    );
    const worker = await database().transaction();
    const asWorker = { transaction: worker, bind: [survey] };
    await database().query(`select 1 from job where survey_id = ${ofSurvey} for update`, asWorker);
    const answer = withdraw(second.id);
    await expect.poll(() => query('select 1 from pg_locks where not granted')).not.toHaveLength(0);
    await database().query(
      `update target set map_fault = null where survey_id = ${ofSurvey}`,
      asWorker,
    );
    await worker.commit();
    expect((await answer).status).toBe(200);
  });

  it('of companions names the runs that used it; they stay and are marked as older', async () => {
    const { survey, key, owner } = lab;
    const text = 'target,companion,status,mass,semi_major_axis\nStar 5,b,confirmed,8,40\n';
    const upload = await store({ kind: 'companions', survey: survey.slug, text });
    const { run } = await runToEnd(owner, key);
    const found = await dependents(upload.id);
    expect(found.end).toEqual({ count: 1, names: ['Star 5 b'] });
    expect(found.runs).toMatchObject([{ run: run.number }]);
    const before = run.resultDigest;
    expect((await withdraw(upload.id)).status).toBe(200);
    expect((await run.reload()).resultDigest).toBe(before);
    const params = inTeam({ analysis: key });
    const { runs } = await (await call(listRuns, { params, headers })).json();
    const listed = runs.find(({ number }: { number: number }) => number === run.number);
    expect(listed).toMatchObject({ detections: 2, hasOlderInputs: true });
    const { run: next } = await runToEnd(owner, key);
    expect((next.result as { counted: unknown[] }).counted).toHaveLength(1);
  });

  it('is the lead’s and the owners’, and not for a file that is only read', async () => {
    const survey = await newSurvey();
    const upload = await store({ kind: 'targets', survey, text: targets(40) });
    const student = bearer(await tokenOf(lab.people.student, lab.collaboration));
    expect((await withdraw(upload.id, student)).status).toBe(403);
    const read = await (await send({ kind: 'targets', survey, text: targets(45) })).json();
    expect((await withdraw(read.id)).status).toBe(409);
  });
});

/** Ids of the survey's uploads, newest first. */
async function list(survey: string): Promise<string[]> {
  const request = new Request(new URL(`/?survey=${survey}`, webAddress()), { headers });
  const response = await listUploads(request, { params: Promise.resolve(inTeam()) });
  const { uploads } = await response.json();
  for (const { report } of uploads) expect(report.preview).toBeUndefined();
  return uploads.map(({ id }: { id: string }) => id);
}
