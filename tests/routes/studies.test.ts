import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as cancelJob } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/cancel/route';
import { POST as retryJob } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/retry/route';
import { GET as getJob } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/route';
import {
  POST as askRun,
  GET as listOfRun,
} from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/studies/route';
import {
  GET as getStudy,
  DELETE as removeStudy,
} from '@/app/api/v1/collaborations/[collaboration]/studies/[study]/route';
import { GET as listStudies } from '@/app/api/v1/collaborations/[collaboration]/studies/route';
import { roleSchema } from '@/lib/schemas/common';
import { type StudySummary, studySchema, studySummarySchema } from '@/lib/schemas/studies';
import { RunRow, StudyRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildAnalysis, recipeOf } from '../support/sample';
import { runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker, type WorkerProcess } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let worker: WorkerProcess;
let headers: Record<string, string>;
let foreign: { headers: Record<string, string>; slug: string };

beforeAll(async () => {
  worker = await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
  headers = bearer(await tokenOf(lab.people.owner, lab.collaboration));
  const other = await createCollaborationWith(['owner']);
  foreign = {
    headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
    slug: other.collaboration.slug,
  };
});
afterAll(killWorkers);

const paramsOf = (more: Record<string, string> = {}) => ({
  collaboration: lab.collaboration.slug,
  ...more,
});
const tokenFor = async (role: keyof FinishedLab['people']) =>
  bearer(await tokenOf(lab.people[role], lab.collaboration));

function ask(body: unknown, given: { headers?: Record<string, string>; run?: string } = {}) {
  return call(askRun, {
    method: 'POST',
    headers: given.headers ?? headers,
    params: paramsOf({ run: given.run ?? lab.run.id }),
    body,
  });
}

async function askToEnd(body: unknown): Promise<StudySummary> {
  const response = await ask(body);
  expect(response.status).toBe(201);
  const summary = studySummarySchema.parse(await response.json());
  const { status, fault } = await untilEnded(summary.job.id);
  expect([status, fault]).toEqual(['done', null]);
  return summary;
}

describe('POST runs/{id}/studies', () => {
  it('makes a study whose result is read with all that it was made from', async () => {
    const summary = await askToEnd({ kind: 'influence' });
    expect(summary).toMatchObject({
      number: 1,
      settings: { kind: 'influence', groupBy: 'moving-group' },
      run: { id: lab.run.id, number: 1, analysisKey: lab.key },
      createdBy: lab.people.owner.name,
      headline: null,
    });
    expect(summary.job.kind).toBe('compute-study');
    expect(summary.job.subject).toBe(`${lab.key}, run 1: Which stars carry the limit`);
    const answer = await call(getStudy, { headers, params: paramsOf({ study: summary.id }) });
    expect(answer.status).toBe(200);
    const study = studySchema.parse(await answer.json());
    expect(study).toMatchObject({
      quantity: 'host_fraction',
      credibleLevel: 0.95,
      result: { kind: 'influence', limit: lab.run.result?.answer.limit },
      inputs: { runResultDigest: lab.run.resultDigest, seed: study.seed },
    });
    expect(study.headline).toContain('half of the sensitivity');
    expect(study.resultDigest).toMatch(/^[0-9a-f]{64}$/);
  });

  it('answers the same question with the study that is there', async () => {
    const first = await askToEnd({ kind: 'limit-map' });
    const again = studySummarySchema.parse(
      await (await ask({ kind: 'limit-map', tailCumulative: false })).json(),
    );
    expect(again.id).toBe(first.id);
    expect(again.headline).toContain('at best');
    const other = await askToEnd({ kind: 'limit-map', tailCumulative: true });
    expect(other.id).not.toBe(first.id);
    expect(other.number).toBe(first.number + 1);
  });

  it.each(roleSchema.options)('lets the %s ask as they may run an analysis', async (role) => {
    const own = await tokenFor(role);
    const mayAll = ['owner', 'statistician', 'author'].includes(role);
    const response = await ask({ kind: 'influence' }, { headers: own });
    expect(response.status).toBe(mayAll ? 201 : 403);
    if (mayAll) return;
    expect((await response.json()).detail).toContain('Copy the analysis and run the copy');
  });

  it('lets a student ask of a run of their own', async () => {
    const student = lab.people.student;
    const recipe = recipeOf([lab.survey], { id: lab.run.recipe.populationId } as never);
    const analysis = await buildAnalysis(lab.collaboration.id, recipe, student.id);
    const { run } = await runToEnd(lab.owner, `A-${analysis.number}`);
    const response = await ask(
      { kind: 'influence' },
      { headers: await tokenFor('student'), run: run.id },
    );
    expect(response.status).toBe(201);
    await untilEnded((await response.json()).job.id);
  });

  it('needs the scope to run', async () => {
    const scopes = ['read', 'write'] as const;
    const limited = bearer(await tokenOf(lab.people.owner, lab.collaboration, [...scopes]));
    expect((await ask({ kind: 'influence' }, { headers: limited })).status).toBe(403);
  });

  it.each([
    [{ kind: 'sweep', over: 'mass-min', from: 3, to: 400 }, 'to'],
    [{ kind: 'sweep', over: 'mass-min', from: -1, to: 4 }, 'from'],
    [{ kind: 'sweep', over: 'mass-index', from: 2, to: 1 }, 'from'],
    [{ kind: 'overlap-rules' }, 'kind'],
    [{ kind: 'counts', rate: 2 }, 'rate'],
    [{ kind: 'calibration', truthPopulationId: crypto.randomUUID() }, 'truthPopulationId'],
    [{ kind: 'systematics', changes: [{ change: 'combination', rule: 'deepest' }] }, 'changes.0'],
    [
      {
        kind: 'systematics',
        changes: [{ change: 'cooling', coolingTableId: crypto.randomUUID() }],
      },
      'changes.0.coolingTableId',
    ],
    [
      {
        kind: 'forecast',
        name: 'A plan',
        planned: { kind: 'stars-like-these', count: 5, surveyIds: [crypto.randomUUID()] },
      },
      'planned.surveyIds.0',
    ],
  ])('refuses %j with its place', async (settings, place) => {
    const response = await ask(settings);
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0].item).toContain(place);
  });

  it('refuses keys that it does not know, and kinds', async () => {
    expect((await ask({ kind: 'influence', deep: true })).status).toBe(400);
    expect((await ask({ kind: 'astrology' })).status).toBe(422);
  });

  it('waits for the result of the run', async () => {
    await worker.stop();
    const analysis = await buildAnalysis(lab.collaboration.id, lab.run.recipe, lab.people.owner.id);
    const [job] = await query<{ id: string }>(
      `insert into job (collaboration_id, kind, status) values ($1, 'compute-run', 'cancelled')
       returning id`,
      [lab.collaboration.id],
    );
    const run = await RunRow.create({
      collaborationId: lab.collaboration.id,
      analysisId: analysis.id,
      number: 1,
      jobId: job.id,
      recipe: lab.run.recipe,
      seed: 'none',
      engineVersion: 'none',
    });
    const response = await ask({ kind: 'influence' }, { run: run.id });
    expect(response.status).toBe(409);
    worker = await startWorker({ threads: 1 });
  });
});

describe('lists', () => {
  it('are newest first, of a run and of the collaboration, by kind', async () => {
    const read = async (response: Response) =>
      ((await response.json()) as { studies: unknown[] }).studies.map((one) =>
        studySummarySchema.parse(one),
      );
    const ofRun = await read(
      await call(listOfRun, { headers, params: paramsOf({ run: lab.run.id }) }),
    );
    const numbers = ofRun.map(({ number }) => number);
    expect(numbers).toEqual([...numbers].sort((a, b) => b - a));
    expect(numbers.length).toBeGreaterThan(2);
    const maps = await read(
      await call(listStudies, { headers, path: '/?kind=limit-map', params: paramsOf() }),
    );
    expect(maps.map(({ settings }) => settings.kind)).toEqual(['limit-map', 'limit-map']);
    const unknown = await call(listStudies, { headers, path: '/?kind=x', params: paramsOf() });
    expect(unknown.status).toBe(400);
  });
});

describe('another collaboration', () => {
  it('finds nothing', async () => {
    const study = await StudyRow.findOne({ where: { runId: lab.run.id }, rejectOnEmpty: true });
    const strange = { ...foreign, params: { collaboration: foreign.slug } };
    const own = { headers: foreign.headers, params: { ...strange.params, study: study.id } };
    const ofRun = { headers: foreign.headers, params: { ...strange.params, run: lab.run.id } };
    const statuses = [
      await call(getStudy, own),
      await call(removeStudy, { ...own, method: 'DELETE' }),
      await call(listOfRun, ofRun),
      await call(askRun, { ...ofRun, method: 'POST', body: { kind: 'influence' } }),
      await call(getStudy, { headers, params: paramsOf({ study: crypto.randomUUID() }) }),
      await call(getStudy, { headers, params: paramsOf({ study: '7' }) }),
    ].map(({ status }) => status);
    expect(statuses).toEqual([404, 404, 404, 404, 404, 404]);
    const list = await call(listStudies, strange);
    expect(await list.json()).toEqual({ studies: [] });
    expect((await call(getStudy, { params: paramsOf({ study: study.id }) })).status).toBe(401);
  });
});

describe('a study on its way', () => {
  it('is stopped and started again by its job, and deleted only after', async () => {
    await worker.stop();
    const asked = studySummarySchema.parse(
      await (await ask({ kind: 'sweep', over: 'mass-min', from: 4, to: 20 })).json(),
    );
    const job = paramsOf({ job: asked.job.id });
    const post = (handler: typeof cancelJob, by = headers) =>
      call(handler, { method: 'POST', headers: by, params: job, body: {} });
    const remove = (by = headers) =>
      call(removeStudy, { method: 'DELETE', headers: by, params: paramsOf({ study: asked.id }) });
    expect((await remove()).status).toBe(409);
    expect((await post(cancelJob, await tokenFor('student'))).status).toBe(403);
    expect((await post(cancelJob)).status).toBe(200);
    const other = studySummarySchema.parse(
      await (await ask({ kind: 'sweep', over: 'mass-min', from: 4, to: 20 })).json(),
    );
    expect(other.id).not.toBe(asked.id);
    expect((await post(retryJob)).status).toBe(200);
    worker = await startWorker({ threads: 1 });
    expect((await untilEnded(asked.job.id)).status).toBe('done');
    expect((await untilEnded(other.job.id)).status).toBe('done');
    const rows = await StudyRow.findAll({ where: { id: [asked.id, other.id] } });
    expect(new Set(rows.map(({ resultDigest }) => resultDigest)).size).toBe(1);
    await expect(query(`update study set result = '{}' where id = $1`, [asked.id])).rejects.toThrow(
      'a finished study does not change',
    );
    expect((await remove(await tokenFor('student'))).status).toBe(403);
    expect((await remove()).status).toBe(204);
    expect((await remove()).status).toBe(404);
    expect((await call(getJob, { headers, params: job })).status).toBe(404);
  });

  it('is one of twenty that a person may have', async () => {
    await query(
      `insert into job (collaboration_id, kind, requested_by)
       select $1, 'compute-study', $2 from generate_series(1, 20)`,
      [lab.collaboration.id, lab.people.author.id],
    );
    const crowded = await ask(
      { kind: 'sweep', over: 'mass-min', from: 4, to: 21 },
      { headers: await tokenFor('author') },
    );
    expect(crowded.status).toBe(429);
    await query('delete from job where requested_by = $1 and payload = $2', [
      lab.people.author.id,
      '{}',
    ]);
  });
});
