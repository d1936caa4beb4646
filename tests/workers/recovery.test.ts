import { afterEach, describe, expect, it } from 'vitest';
import { withDatabase } from '../support/database';
import { mapsOf, newSurvey, underWay } from '../support/interrupted-maps';
import { buildAnalysis, buildPopulation, recipeOf } from '../support/sample';
import { askForMaps, jobOf, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
const STARS = 200;

afterEach(killWorkers);

describe('a worker that is asked to stop', () => {
  it('gives its lease back at once, and the next one goes on from there', async () => {
    const { survey, collaboration } = await newSurvey(STARS);
    const first = await startWorker({ threads: 1 });
    const jobId = await askForMaps(survey);
    await underWay(jobId, 20);
    const beats = await query<{ count: number }>(
      `select count(*)::int from worker_heartbeat where process_id like '%:' || $1`,
      [String(first.pid)],
    );
    expect(beats).toEqual([{ count: 2 }]);
    expect(await first.stop()).toBe(0);
    const given = await jobOf(jobId);
    expect(given.status).toBe('waiting');
    expect(given.attempts).toBe(0);
    const signs = `select worker_id from worker_heartbeat where process_id like '%:' || $1`;
    expect(await query(signs, [String(first.pid)])).toEqual([]);
    await startWorker({ threads: 2 });
    const job = await untilEnded(jobId);
    expect(job.status).toBe('done');
    expect(await mapsOf(collaboration.id)).toHaveLength(STARS);
  });
});

describe('threads', () => {
  it('one and two give the same bytes, for maps and for runs', async () => {
    const one = await newSurvey(40);
    const two = await newSurvey(40);
    const population = await buildPopulation(one.collaboration.id);
    const recipe = recipeOf([one.survey], population);
    const analysis = await buildAnalysis(one.collaboration.id, recipe, one.actor.personId);

    const single = await startWorker({ threads: 1 });
    expect((await untilEnded(await askForMaps(one.survey))).status).toBe('done');
    const first = await runToEnd(one.actor, `A-${analysis.number}`);
    await single.stop();
    await startWorker({ threads: 2 });
    expect((await untilEnded(await askForMaps(two.survey))).status).toBe('done');
    const second = await runToEnd(one.actor, `A-${analysis.number}`);

    expect(await mapsOf(two.collaboration.id)).toEqual(await mapsOf(one.collaboration.id));
    expect(first.run.resultDigest).toMatch(/^[0-9a-f]{64}$/);
    expect(second.run.resultDigest).toBe(first.run.resultDigest);
    expect(second.run.inputsDigest).toBe(first.run.inputsDigest);
    expect(second.run.number).toBe(first.run.number + 1);
  });
});
