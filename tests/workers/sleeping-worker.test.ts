import { afterEach, describe, expect, it } from 'vitest';
import { mapsOf, newSurvey, underWay } from '../support/interrupted-maps';
import { askForMaps, jobOf, untilEnded } from '../support/work';
import { hasLogged, killWorkers, startWorker, until } from '../support/worker';

const STARS = 200;

afterEach(killWorkers);

describe('a worker that stops for longer than its lease', () => {
  it('has its late result refused when it wakes, and says so', async () => {
    const { survey, collaboration } = await newSurvey(STARS);
    const sleeper = await startWorker({ threads: 1 });
    const jobId = await askForMaps(survey);
    await underWay(jobId, 40);
    sleeper.signal('SIGSTOP');
    await startWorker({ threads: 2 });
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
