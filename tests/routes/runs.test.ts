import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  GET as listRuns,
  POST as startRun,
} from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/runs/route';
import { GET as getMaps } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/maps/route';
import { GET as getRun } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/route';
import { viewPopulation } from '@/lib/inference';
import { runSchema, runSummarySchema } from '@/lib/schemas/runs';
import { CompletenessMapRow, PopulationRow, RunRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { POPULATION } from '../support/population';
import { buildAnalysis, buildPopulation, buildTarget, recipeOf } from '../support/sample';
import { untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let headers: Record<string, string>;
let foreign: { headers: Record<string, string>; slug: string };

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
  headers = bearer(await tokenOf(lab.people.owner, lab.collaboration));
  const other = await createCollaborationWith(['owner']);
  foreign = {
    headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
    slug: other.collaboration.slug,
  };
});
afterAll(killWorkers);

const paramsOf = (more: Record<string, string>) => ({
  collaboration: lab.collaboration.slug,
  ...more,
});

describe('GET runs/{id}', () => {
  it('answers the whole run by its schema', async () => {
    const response = await call(getRun, { headers, params: paramsOf({ run: lab.run.id }) });
    expect(response.status).toBe(200);
    const run = runSchema.parse(await response.json());
    expect(run.analysis.key).toBe(lab.key);
    expect(run.resultDigest).toBe(lab.run.resultDigest);
    expect(run.detections).toBe(1);
    expect(run.limit).toBe(run.result?.answer.limit);
    expect(run.zeroLimit).toBeLessThan(run.limit as number);
    expect(run.result?.levels.map(({ level }) => level)).toEqual([0.68, 0.9, 0.95, 0.99, 0.997]);
    const { massMjup, semiMajorAxisAu } = run.inputs?.grid ?? {};
    expect([massMjup?.length, semiMajorAxisAu?.length]).toEqual([6, 6]);
    const seen = run.result?.starTable.map(({ probability }) => probability) ?? [];
    expect(seen).toEqual([...seen].sort((a, b) => b - a));
    expect(run.result?.starTable.find(({ name }) => name === 'Star 3')?.hosts).toEqual([
      'Star 3 b',
    ]);
    expect(run.hasOlderInputs).toBe(false);
  });

  it('is "not found" for another collaboration and for an id that nobody has', async () => {
    const answers = [
      await call(getRun, {
        headers: foreign.headers,
        params: { collaboration: foreign.slug, run: lab.run.id },
      }),
      await call(getRun, { headers, params: paramsOf({ run: crypto.randomUUID() }) }),
      await call(getRun, { headers: foreign.headers, params: paramsOf({ run: lab.run.id }) }),
      await call(getMaps, {
        headers: foreign.headers,
        params: { collaboration: foreign.slug, run: lab.run.id },
      }),
    ];
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404]);
    expect((await call(getRun, { params: paramsOf({ run: lab.run.id }) })).status).toBe(401);
  });
});

describe('GET runs/{id}/maps', () => {
  it('gives the numbers that the run was computed from, and never changes', async () => {
    const response = await call(getMaps, { headers, params: paramsOf({ run: lab.run.id }) });
    expect(response.headers.get('x-rarebound-shape')).toBe('8,6,6');
    expect(response.headers.get('cache-control')).toContain('immutable');
    const etag = response.headers.get('etag') as string;
    expect(etag).toBe(`"${lab.run.inputsDigest}"`);
    const bytes = Buffer.from(await response.arrayBuffer());
    const values = Uint16Array.from({ length: bytes.length / 2 }, (_, i) =>
      bytes.readUInt16LE(2 * i),
    );
    const grid = lab.run.inputs?.grid;
    if (!grid) throw new Error('no grid');
    const axes = {
      massMjup: Float64Array.from(grid.massMjup),
      semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
    };
    const view = viewPopulation(values, axes, POPULATION);
    expect(view.exposure).toBe(lab.run.result?.exposure);
    const names = lab.run.inputs?.stars.map(({ name }) => name) ?? [];
    const table = new Map(
      lab.run.result?.starTable.map(({ name, probability }) => [name, probability]),
    );
    expect([...(view.completenessPerStar ?? [])]).toEqual(names.map((name) => table.get(name)));
    const kept = await call(getMaps, {
      headers: { ...headers, 'if-none-match': etag },
      params: paramsOf({ run: lab.run.id }),
    });
    expect(kept.status).toBe(304);
  });
});

describe('POST analyses/{key}/runs', () => {
  it('makes a new run with an equal digest where nothing has changed', async () => {
    const params = paramsOf({ analysis: lab.key });
    const response = await call(startRun, { method: 'POST', headers, params, body: {} });
    expect(response.status).toBe(201);
    const summary = runSummarySchema.parse(await response.json());
    expect(summary.number).toBe(lab.run.number + 1);
    await untilEnded(summary.job.id);
    const again = await RunRow.findByPk(summary.id, { rejectOnEmpty: true });
    expect(again.resultDigest).toBe(lab.run.resultDigest);
    expect(again.inputsDigest).toBe(lab.run.inputsDigest);
    const list = (await (await call(listRuns, { headers, params })).json()) as {
      runs: { number: number }[];
    };
    expect(list.runs.map(({ number }) => number)).toEqual([2, 1]);
  });

  it('says what a run needs before it is queued', async () => {
    const wide = await buildPopulation(lab.collaboration.id, {
      ...POPULATION,
      semiMajorAxisMaxAu: 5000,
    });
    const recipe = recipeOf([lab.survey], wide);
    const analysis = await buildAnalysis(lab.collaboration.id, recipe, lab.owner.personId);
    const response = await call(startRun, {
      method: 'POST',
      headers,
      params: paramsOf({ analysis: `A-${analysis.number}` }),
    });
    expect(response.status).toBe(422);
    const problem = await response.json();
    expect(problem.errors[0]).toMatchObject({
      code: 'outside-map',
      column: 'semi_major_axis_max',
    });
  });

  it('lets a student run only an analysis of their own, and a token only with the scope', async () => {
    const student = bearer(await tokenOf(lab.people.student, lab.collaboration));
    const readOnly = bearer(await tokenOf(lab.people.owner, lab.collaboration, ['read', 'write']));
    const params = paramsOf({ analysis: lab.key });
    const refused = await call(startRun, { method: 'POST', headers: student, params });
    expect(refused.status).toBe(403);
    expect((await refused.json()).detail).toContain('Copy the analysis and run the copy');
    expect((await call(startRun, { method: 'POST', headers: readOnly, params })).status).toBe(403);
    const elsewhere = { collaboration: foreign.slug, analysis: lab.key };
    const stranger = await call(startRun, {
      method: 'POST',
      headers: foreign.headers,
      params: elsewhere,
    });
    expect(stranger.status).toBe(404);
  });

  it('holds twenty runs of one person at most', async () => {
    await query(
      `insert into job (collaboration_id, kind, requested_by)
       select $1, 'compute-run', $2 from generate_series(1, 20)`,
      [lab.collaboration.id, lab.people.statistician.id],
    );
    const crowded = bearer(await tokenOf(lab.people.statistician, lab.collaboration));
    const params = paramsOf({ analysis: lab.key });
    const response = await call(startRun, { method: 'POST', headers: crowded, params });
    expect(response.status).toBe(429);
    expect(response.headers.get('retry-after')).toBe('30');
    await query('delete from job where requested_by = $1', [lab.people.statistician.id]);
  });
});

describe('a finished run', () => {
  it('is refused any change by the database', async () => {
    await expect(query(`update run set result = '{}' where id = $1`, [lab.run.id])).rejects.toThrow(
      'a finished run does not change',
    );
  });

  it('says when its survey has changed since', async () => {
    const older = async () =>
      (await (await call(getRun, { headers, params: paramsOf({ run: lab.run.id }) })).json())
        .hasOlderInputs;
    expect(await older()).toBe(false);
    const left = await TargetRow.findOne({
      where: { surveyId: lab.survey.id, name: 'Star 8' },
      rejectOnEmpty: true,
    });
    await left.update({ leftOutReason: 'a binary' });
    expect(await older()).toBe(true);
    await left.update({ leftOutReason: null });
    expect(await older()).toBe(false);
    await buildTarget(lab.survey, { name: 'Newcomer' });
    expect(await older()).toBe(true);
    expect(await PopulationRow.count()).toBeGreaterThan(0);
    expect(await CompletenessMapRow.count()).toBe(8);
  });
});
