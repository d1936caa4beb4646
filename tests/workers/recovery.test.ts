import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith } from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildStars,
  buildSurvey,
  recipeOf,
} from '../support/sample';
import { askForMaps, jobOf, runToEnd, untilEnded } from '../support/work';
import { bundleWorker, hasLogged, killWorkers, startWorker, until } from '../support/worker';

const { query } = withDatabase();
const STARS = 400;
let main: string;

beforeAll(async () => {
  main = await bundleWorker('recovery');
});
afterEach(killWorkers);

interface StoredMap {
  digest: string;
  bytes: string;
}

/** Digest and bytes of every stored map, and a proof that each target has its own. */
async function mapsOf(collaborationId: string): Promise<StoredMap[]> {
  const maps = await query<StoredMap>(
    `select digest, encode(node_values, 'hex') as bytes from completeness_map
     where collaboration_id = $1 order by digest`,
    [collaborationId],
  );
  const [linked] = await query<{ targets: number; maps: number }>(
    `select count(*)::int as targets, count(distinct map_id)::int as maps from target
     where collaboration_id = $1 and map_state = 'ready'`,
    [collaborationId],
  );
  expect(linked).toEqual({ targets: maps.length, maps: maps.length });
  return maps;
}

async function newSurvey(stars: number) {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  const survey = await buildSurvey(collaboration.id);
  await buildStars(survey, stars);
  return { collaboration, survey, actor: await actorOf(people.owner, collaboration) };
}

/** Waits until the job is well under way, and says how far it has got. */
async function underWay(jobId: string, atLeast: number): Promise<number> {
  let done = 0;
  await until('the job is under way', async () => {
    const job = await jobOf(jobId);
    done = job.doneCount;
    return job.status === 'running' && done >= atLeast;
  });
  return done;
}

describe('a worker that is killed in the middle of 400 maps', () => {
  it('loses nothing: each map is there once, with the bytes of an undisturbed computation', async () => {
    const calm = await newSurvey(STARS);
    const steady = await startWorker(main, { threads: 2 });
    expect((await untilEnded(await askForMaps(calm.survey))).status).toBe('done');
    expect(await steady.stop()).toBe(0);

    const disturbed = await newSurvey(STARS);
    const victim = await startWorker(main, { threads: 1 });
    const jobId = await askForMaps(disturbed.survey);
    await underWay(jobId, 60);
    await victim.kill();
    const killedAt = Date.now();
    const left = await jobOf(jobId);
    expect(left.status).toBe('running');
    expect(left.doneCount).toBeLessThan(STARS);

    const heir = await startWorker(main, { threads: 2 });
    await until('the second attempt begins', async () => (await jobOf(jobId)).attempts === 2);
    const waitedS = (Date.now() - killedAt) / 1000;
    console.info(`second attempt ${waitedS.toFixed(1)} s after the kill at ${left.doneCount} maps`);
    expect(waitedS).toBeLessThan(30);
    const job = await untilEnded(jobId);
    expect(job.status).toBe('done');
    expect(hasLogged(heir, 'workers found dead')).toBe(true);

    const expected = await mapsOf(calm.collaboration.id);
    expect(expected).toHaveLength(STARS);
    expect(await mapsOf(disturbed.collaboration.id)).toEqual(expected);
  });
});

describe('a worker that stops for longer than its lease', () => {
  it('has its late result refused when it wakes, and says so', async () => {
    const { survey, collaboration } = await newSurvey(STARS / 2);
    const sleeper = await startWorker(main, { threads: 1 });
    const jobId = await askForMaps(survey);
    await underWay(jobId, 40);
    sleeper.signal('SIGSTOP');
    await startWorker(main, { threads: 2 });
    const job = await untilEnded(jobId);
    expect(job.status).toBe('done');
    expect(job.attempts).toBe(2);
    const before = await mapsOf(collaboration.id);
    sleeper.signal('SIGCONT');
    await until('the sleeper gives up', () => hasLogged(sleeper, 'late result refused'));
    expect(await mapsOf(collaboration.id)).toEqual(before);
    expect((await jobOf(jobId)).status).toBe('done');
    expect(await sleeper.stop()).toBe(0);
  });
});

describe('a worker that is asked to stop', () => {
  it('gives its lease back at once, and the next one goes on from there', async () => {
    const { survey, collaboration } = await newSurvey(STARS / 2);
    const first = await startWorker(main, { threads: 1 });
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
    await startWorker(main, { threads: 2 });
    const job = await untilEnded(jobId);
    expect(job.status).toBe('done');
    expect(await mapsOf(collaboration.id)).toHaveLength(STARS / 2);
  });
});

describe('threads', () => {
  it('one and two give the same bytes, for maps and for runs', async () => {
    const one = await newSurvey(40);
    const two = await newSurvey(40);
    const population = await buildPopulation(one.collaboration.id);
    const recipe = recipeOf([one.survey], population);
    const analysis = await buildAnalysis(one.collaboration.id, recipe, one.actor.personId);

    const single = await startWorker(main, { threads: 1 });
    expect((await untilEnded(await askForMaps(one.survey))).status).toBe('done');
    const first = await runToEnd(one.actor, `A-${analysis.number}`);
    await single.stop();
    await startWorker(main, { threads: 2 });
    expect((await untilEnded(await askForMaps(two.survey))).status).toBe('done');
    const second = await runToEnd(one.actor, `A-${analysis.number}`);

    expect(await mapsOf(two.collaboration.id)).toEqual(await mapsOf(one.collaboration.id));
    expect(first.run.resultDigest).toMatch(/^[0-9a-f]{64}$/);
    expect(second.run.resultDigest).toBe(first.run.resultDigest);
    expect(second.run.inputsDigest).toBe(first.run.inputsDigest);
    expect(second.run.number).toBe(first.run.number + 1);
  });
});
