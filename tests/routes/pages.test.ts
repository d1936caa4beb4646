import { beforeAll, describe, expect, it } from 'vitest';
import { GET as listAudit } from '@/app/api/v1/collaborations/[collaboration]/audit/route';
import { GET as listCandidates } from '@/app/api/v1/collaborations/[collaboration]/candidates/route';
import { GET as listStars } from '@/app/api/v1/collaborations/[collaboration]/stars/route';
import { GET as listTargets } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/targets/route';
import { GET as listUploads } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import type { Actor } from '@/lib/access/actor';
import { recordAudit } from '@/lib/services/audit';
import { inTransaction, type SurveyRow, TargetRow, UploadRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildCompanion, buildSurvey, buildTarget } from '../support/sample';

withDatabase();
let actor: Actor;
let survey: SurveyRow;
let headers: Record<string, string>;
let serial = 0;

async function addTarget(name: string, raDeg: number | null = null) {
  const target = await buildTarget(survey, { name, raDeg, decDeg: raDeg && 5, curves: [] });
  await buildCompanion(target, { status: 'candidate' });
}
const addUpload = () =>
  UploadRow.create({
    collaborationId: actor.collaborationId,
    surveyId: survey.id,
    kind: 'targets',
    fileName: `file ${++serial}.csv`,
    byteLength: 0,
    sha256: 'ab'.repeat(32),
    state: 'read',
  });
const addEntry = () =>
  inTransaction((t) =>
    recordAudit(actor, 'change-survey', { kind: 'survey', id: survey.id }, `${++serial}`, t),
  );

/** Each list, its rows, and something that comes to stand before what was read. */
const lists: [string, RouteHandler, string, () => Promise<unknown>][] = [
  ['stars', listStars, 'stars', () => addTarget(`A ${++serial}`)],
  ['targets', listTargets, 'targets', () => addTarget(`B ${++serial}`, 0.001 * ++serial)],
  ['candidates', listCandidates, 'candidates', () => addTarget(`0 ${++serial}`)],
  ['uploads', listUploads, 'uploads', addUpload],
  ['the log', listAudit, 'entries', addEntry],
];

beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  actor = await actorOf(people.owner, collaboration);
  headers = bearer(await tokenOf(people.owner, collaboration));
  survey = await buildSurvey(collaboration.id);
  for (const [name, raDeg] of [
    ['K', 300],
    ['L', 20],
    ['M', 20],
    ['N', null],
    ['O', null],
  ] as const) {
    await addTarget(name, raDeg);
    await addUpload();
    await addEntry();
  }
});

async function readPage(handler: RouteHandler, rows: string, path: string) {
  const params = { collaboration: actor.collaboration, survey: survey.slug };
  const response = await call(handler, { headers, params, path });
  const answer = await response.json();
  const link = response.headers.get('link') ?? '';
  const next = /^<([^>]+)>; rel="next"$/.exec(link)?.[1];
  const ids = ((answer[rows] ?? []) as { id: string }[]).map(({ id }) => id);
  return { status: response.status, code: answer.code, ids, next };
}

describe.each(lists)('%s, read page by page', (_, handler, rows, addBefore) => {
  it('hold each row once, whatever comes to stand before it meanwhile', async () => {
    const whole = await readPage(handler, rows, '/');
    expect(whole.ids.length).toBeGreaterThan(4);
    const read: string[] = [];
    let next: string | undefined = '/?limit=2';
    while (next !== undefined && read.length < 100) {
      const page: Awaited<ReturnType<typeof readPage>> = await readPage(handler, rows, next);
      expect(page.status).toBe(200);
      read.push(...page.ids);
      next = page.next;
      await addBefore();
    }
    expect(read).toEqual(whole.ids);
  });
});

describe('a cursor', () => {
  it('of a row that is gone, or of another collaboration, says so', async () => {
    const { next = '' } = await readPage(listTargets, 'targets', '/?limit=1');
    const [{ id }] = await TargetRow.findAll({ order: [['raDeg', 'ASC']], limit: 1 });
    await TargetRow.destroy({ where: { id } });
    const gone = await readPage(listTargets, 'targets', next);
    expect([gone.status, gone.code]).toEqual([400, 'cursor-gone']);
    const other = await createCollaborationWith(['owner']);
    const theirs = await buildTarget(await buildSurvey(other.collaboration.id));
    const cursor = Buffer.from(`after row ${theirs.id}`).toString('base64url');
    const foreign = await readPage(listTargets, 'targets', `/?cursor=${cursor}`);
    expect([foreign.status, foreign.code]).toEqual([400, 'cursor-gone']);
  });
});
