import { afterEach, describe, expect, it } from 'vitest';
import { mapsOf, newSurvey, underWay } from '../support/interrupted-maps';
import { askForMaps, jobOf, untilEnded } from '../support/work';
import { hasLogged, killWorkers, startWorker, until } from '../support/worker';

const STARS = 400;

afterEach(killWorkers);

describe('a worker that is killed in the middle of 400 maps', () => {
  it('loses nothing: each map is there once, with the bytes of an undisturbed computation', async () => {
    const calm = await newSurvey(STARS);
    const steady = await startWorker({ threads: 2 });
    expect((await untilEnded(await askForMaps(calm.survey))).status).toBe('done');
    expect(await steady.stop()).toBe(0);

    const disturbed = await newSurvey(STARS);
    const victim = await startWorker({ threads: 1 });
    const jobId = await askForMaps(disturbed.survey);
    await underWay(jobId, 60);
    await victim.kill();
    const killedAt = Date.now();
    const left = await jobOf(jobId);
    expect(left.status).toBe('running');
    expect(left.doneCount).toBeLessThan(STARS);

    const heir = await startWorker({ threads: 2 });
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
