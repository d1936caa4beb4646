import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import { select } from '@/lib/queue/statement';
import { cancelJob, getJob, retryJob } from '@/lib/services/jobs';
import { startRun } from '@/lib/services/runs';
import { CompletenessMapRow, CoolingTableRow, RunRow, TargetRow } from '@/models';
import { packMap } from '@/models/map-values';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith, type TestCollaboration } from '../support/people';
import { POPULATION } from '../support/population';
import {
  buildAnalysis,
  buildCompanion,
  buildCurve,
  buildPopulation,
  buildStars,
  buildSurvey,
  buildTarget,
  recipeOf,
  SMALL_GRID,
} from '../support/sample';
import { askForMaps, jobOf, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker, until } from '../support/worker';

const { query } = withDatabase();
let actor: Actor;
let collaboration: TestCollaboration;

beforeAll(async () => {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  actor = await actorOf(made.people.owner, collaboration);
  await startWorker({ threads: 2 });
});
afterAll(killWorkers);

async function readySurvey(stars = 6) {
  const survey = await buildSurvey((await newTeam()).id);
  await buildStars(survey, stars);
  expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
  return survey;
}

/** A collaboration of its own, so that stars of one test are not those of another. */
async function newTeam() {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  actor = await actorOf(made.people.owner, collaboration);
  return collaboration;
}

async function analysisOf(...given: Parameters<typeof recipeOf>): Promise<string> {
  const recipe = recipeOf(...given);
  const row = await buildAnalysis(collaboration.id, recipe, actor.personId);
  return `A-${row.number}`;
}

describe('a job that is delivered twice', () => {
  it('ends in one result, at once or later', async () => {
    const survey = await readySurvey();
    const key = await analysisOf([survey], await buildPopulation(collaboration.id));
    const { id } = await startRun(actor, key);
    const run = await RunRow.findByPk(id, { rejectOnEmpty: true });
    const again = () =>
      select(`select queue.add_job('compute-run', json_build_object('jobId', $1::text))`, [
        run.jobId,
      ]);
    await Promise.all([again(), again()]);
    const job = await untilEnded(run.jobId);
    expect(job.status).toBe('done');
    await run.reload();
    const { result, resultDigest, finishedAt } = run;
    expect(result?.stars).toBe(6);

    await again();
    const left = () => query('select id from queue._private_jobs');
    await until('the queue is empty', async () => (await left()).length === 0);
    await run.reload();
    expect(run.resultDigest).toBe(resultDigest);
    expect(run.finishedAt).toEqual(finishedAt);
    expect((await jobOf(run.jobId)).attempts).toBe(1);
    const [stars] = await query('select count(*)::int as count from run_star where run_id = $1', [
      id,
    ]);
    expect(stars).toEqual({ count: 6 });
  });

  it('computes no map twice, and reuses those that are there', async () => {
    const survey = await readySurvey(4);
    const maps = () =>
      CompletenessMapRow.findAll({
        where: { collaborationId: collaboration.id },
        attributes: ['id', 'createdAt'],
        order: ['id'],
        raw: true,
      });
    const before = await maps();
    expect(before).toHaveLength(4);
    await TargetRow.update(
      { mapState: 'waiting', mapId: null },
      { where: { surveyId: survey.id } },
    );
    const job = await untilEnded(await askForMaps(survey));
    expect([job.doneCount, job.totalCount]).toEqual([4, 4]);
    expect(await maps()).toEqual(before);
    const ready = { surveyId: survey.id, mapState: 'ready' };
    expect(await TargetRow.count({ where: ready })).toBe(4);
  });
});

describe('stopping and starting again', () => {
  it('a running job stops within 5 s, keeps what it has, and goes on when started again', async () => {
    const survey = await buildSurvey((await newTeam()).id, {
      mapSettings: { ...SMALL_GRID, massMjup: { min: 1, max: 60, count: 80 } },
    });
    await buildStars(survey, 400);
    const jobId = await askForMaps(survey);
    await until('maps come', async () => (await jobOf(jobId)).doneCount >= 8);
    const askedAt = Date.now();
    await cancelJob(actor, jobId);
    const stopped = await untilEnded(jobId);
    expect(stopped.status).toBe('cancelled');
    expect(Date.now() - askedAt).toBeLessThan(5000);
    expect(stopped.doneCount).toBeLessThan(400);
    const states = await query<{ state: string }>(
      'select distinct map_state as state from target where survey_id = $1 order by 1',
      [survey.id],
    );
    expect(states.map(({ state }) => state)).toEqual(['none', 'ready']);
    await expect(cancelJob(actor, jobId)).rejects.toThrow('ended already');

    // An idle worker may have taken it before the answer is made.
    expect(['waiting', 'running']).toContain((await retryJob(actor, jobId)).status);
    expect((await untilEnded(jobId)).status).toBe('done');
    const [{ count }] = await query<{ count: number }>(
      'select count(*)::int from completeness_map where collaboration_id = $1',
      [collaboration.id],
    );
    expect(count).toBe(400);
    await expect(retryJob(actor, jobId)).rejects.toThrow('failed or was cancelled');
    expect((await getJob(actor, jobId)).status).toBe('done');
  });
});

describe('targets whose map cannot be made', () => {
  it('say why, each in a sentence, while the others go on', async () => {
    const table = await CoolingTableRow.create({
      collaborationId: (await newTeam()).id,
      name: 'Tabulated',
      massMjup: [1, 10, 60],
      ageMyr: [30, 100, 1000],
      magnitudes: { H: [16, 18, 22, 11, 13, 17, 7, 8, 11] },
      digest: 'a'.repeat(64),
    });
    const survey = await buildSurvey(collaboration.id, {
      mapSettings: { ...SMALL_GRID, cooling: { kind: 'table', coolingTableId: table.id } },
    });
    const good = await buildTarget(survey, { name: 'Good' });
    await buildTarget(survey, {
      name: 'No age',
      ageMyr: null,
      ageLowerMyr: null,
      ageUpperMyr: null,
    });
    await buildTarget(survey, { name: 'No band', magnitudes: {} });
    await buildTarget(survey, { name: 'No place', distancePc: null, distanceErrorPc: null });
    await buildTarget(survey, { name: 'Young', ageMyr: 5, ageLowerMyr: 4, ageUpperMyr: 6 });
    const bare = await buildTarget(survey, { name: 'Bare', curves: [] });
    const job = await untilEnded(await askForMaps(survey));
    expect(job.status).toBe('done');
    expect([job.doneCount, job.totalCount]).toEqual([5, 5]);
    const faults = await TargetRow.findAll({
      where: { surveyId: survey.id, mapState: 'failed' },
      order: [['name', 'ASC']],
    });
    expect(faults.map(({ name }) => name)).toEqual(['No age', 'No band', 'No place', 'Young']);
    expect(faults[0].mapFault).toBe('No age: a contrast curve needs one');
    expect(faults[1].mapFault).toContain('No magnitude of the star in H');
    expect(faults[2].mapFault).toContain('No distance or parallax');
    expect(faults[3].mapFault).toMatch(/Young.*30/);
    expect((await good.reload()).mapState).toBe('ready');
    expect((await bare.reload()).mapState).toBe('none');

    const population = await buildPopulation(collaboration.id);
    const refused = await runToEnd(actor, await analysisOf([survey], population));
    expect(refused.job.status).toBe('failed');
    expect(refused.job.fault).toContain('4 stars have no completeness map: No age, No band');

    await TargetRow.update({ leftOutReason: 'not usable' }, { where: { mapState: 'failed' } });
    const { run } = await runToEnd(actor, await analysisOf([survey], population));
    expect(run.inputs?.stars.map(({ name }) => name)).toEqual(['Good']);
    expect(run.inputs?.leftOut).toContainEqual({
      name: 'Bare',
      survey: survey.name,
      reason: 'no curve and no map',
    });
    expect(run.inputs?.leftOut).toHaveLength(5);
  });
});

describe('what is imported while maps are computed', () => {
  it('is computed by the job that is open', async () => {
    const survey = await buildSurvey((await newTeam()).id);
    await buildStars(survey, 150);
    const jobId = await askForMaps(survey);
    await until('maps come', async () => (await jobOf(jobId)).doneCount >= 4);
    const late = await buildTarget(survey, { name: 'Late', distancePc: 77 });
    expect(await askForMaps(survey)).toBe(jobId);
    expect((await untilEnded(jobId)).status).toBe('done');
    expect((await late.reload()).mapState).toBe('ready');
  });
});

describe('runs', () => {
  it('read ready maps on their own grid and leave them alone', async () => {
    const survey = await buildSurvey((await newTeam()).id);
    const massMjup = [2, 8, 30, 60];
    const semiMajorAxisAu = [5, 20, 80, 250];
    const completeness = Float64Array.from({ length: 16 }, (_, i) => i / 20);
    const map = await CompletenessMapRow.create({
      collaborationId: collaboration.id,
      digest: 'b'.repeat(64),
      origin: 'uploaded',
      engineVersion: '1',
      massMjup,
      semiMajorAxisAu,
      ...packMap(completeness),
      inputs: {},
    });
    const ready = { mapId: map.id, mapState: 'ready' as const, curves: [] };
    const target = await buildTarget(survey, { name: 'Uploaded', ...ready });
    const other = await buildTarget(survey, { name: 'Other', ...ready });
    expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
    expect((await target.reload()).mapId).toBe(map.id);
    await buildCompanion(other, { name: 'c', massMjup: 31, semiMajorAxisAu: 100 });
    await buildCompanion(other, { name: 'far', massMjup: 31, semiMajorAxisAu: 240 });
    await buildCompanion(other, { name: 'cc1', status: 'candidate', massMjup: null });
    const population = await buildPopulation(collaboration.id);
    const { run } = await runToEnd(actor, await analysisOf([survey], population));
    expect(run.inputs?.grid).toEqual({ massMjup, semiMajorAxisAu });
    expect(run.inputs?.threshold).toBe('as in the uploaded maps');
    expect(run.result?.counted.map(({ name }) => name)).toEqual(['Other c']);
    expect(run.result?.outside.map(({ name }) => name)).toEqual(['Other far']);
    expect(run.inputs?.undecided).toEqual([
      {
        name: 'Other cc1',
        star: 'Other',
        starId: other.starId,
        status: 'candidate',
        insideRanges: null,
        probability: null,
        massMjup: null,
        semiMajorAxisAu: 45,
      },
    ]);
    const seen = run.result?.starTable.map(({ probability }) => probability) ?? [];
    expect(seen[0]).toBe(seen[1]);
    expect(run.result?.exposure).toBeCloseTo(2 * seen[0], 12);
  });

  it('count one star once that two surveys list, and the companion that both found', async () => {
    const first = await buildSurvey((await newTeam()).id);
    const second = await buildSurvey(collaboration.id);
    for (const survey of [first, second]) {
      const target = await buildTarget(survey, { name: 'Shared' });
      await buildCompanion(target, { name: 'b' });
      expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
    }
    const population = await buildPopulation(collaboration.id);
    const { run } = await runToEnd(actor, await analysisOf([first, second], population));
    expect(run.result?.stars).toBe(1);
    expect(run.result?.entries).toBe(2);
    expect(run.result?.counted).toHaveLength(1);
    expect(run.result?.counted[0].companionIds).toHaveLength(2);
    const map = await CompletenessMapRow.findByPk(run.inputs?.stars[0].mapId as string);
    expect(map?.inputs.kind).toBe('combined');
    expect(map?.inputs.rule).toBe('same-position');
  });

  it('name a detection where the map says that nothing can be seen', async () => {
    const survey = await buildSurvey((await newTeam()).id);
    const blind = await buildTarget(survey, { name: 'Blind', curves: [] });
    await buildCurve(blind, { separationArcsec: [90, 99], contrastMag: [1, 1] });
    await buildTarget(survey, { name: 'Seeing' });
    await buildCompanion(blind);
    expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
    const population = await buildPopulation(collaboration.id);
    const { job } = await runToEnd(actor, await analysisOf([survey], population));
    expect(job.status).toBe('failed');
    expect(job.fault).toContain('Blind b was detected where the map of its star says nothing');
  });

  it('reach beyond the maps only where a person says that nothing is seen there', async () => {
    const survey = await readySurvey(3);
    const wide = await buildPopulation(collaboration.id, {
      ...POPULATION,
      semiMajorAxisMaxAu: 5000,
    });
    await expect(startRun(actor, await analysisOf([survey], wide))).rejects.toThrow(
      'Found 5000 AU; the maps reach 300 AU. Choose "completeness is zero outside the maps" to go on',
    );
    const key = await analysisOf([survey], wide, { zeroOutsideMaps: true });
    const { run, job } = await runToEnd(actor, key);
    expect(job.fault).toBeNull();
    expect(run.result?.shareOutsideMaps).toBeGreaterThan(0.5);
    expect(run.result?.statement.conditions.join()).toContain('outside the maps');
  });

  it('need at least one star', async () => {
    const survey = await readySurvey(2);
    await TargetRow.update({ leftOutReason: 'a test' }, { where: { surveyId: survey.id } });
    const key = await analysisOf([survey], await buildPopulation(collaboration.id));
    await expect(startRun(actor, key)).rejects.toThrow('0 of 2 targets are left');
  });
});
