import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { studySettingsSchema } from '@/lib/schemas/study-settings';
import { removeStudy, startStudy } from '@/lib/services/studies';
import { StudyRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { askToEnd } from '../support/study';
import { jobOf, untilEnded } from '../support/work';
import { killWorkers, startWorker, until, type WorkerProcess } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let worker: WorkerProcess;

beforeAll(async () => {
  worker = await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
});
afterAll(killWorkers);

describe('a worker that is killed in the middle', () => {
  it('leaves its parts to the next one, which ends with the same bytes', async () => {
    const asked = { surveys: 10_000, truths: [0.3] };
    const settings = studySettingsSchema.parse({ kind: 'calibration', ...asked });
    const calm = await askToEnd<'calibration'>(lab.owner, lab.run, {
      kind: 'calibration',
      ...asked,
    });
    await removeStudy(lab.owner, calm.study.id);
    await worker.stop();

    const victim = await startWorker({ threads: 1 });
    const { id, job } = await startStudy(lab.owner, lab.run.id, settings);
    await until('parts are stored', async () => (await jobOf(job.id)).doneCount >= 1000);
    await victim.kill();
    const partsOf = () =>
      query<{ part: number; created_at: Date }>(
        'select part, created_at from study_part where study_id = $1 order by part',
        [id],
      );
    const before = await partsOf();
    expect(before.length).toBeGreaterThan(2);
    expect(before.length).toBeLessThan(40);

    await startWorker({ threads: 2 });
    expect((await untilEnded(job.id)).status).toBe('done');
    const after = await partsOf();
    expect(after).toHaveLength(40);
    for (const { part, created_at } of before) {
      expect(after[part].created_at).toEqual(created_at);
    }
    const study = await StudyRow.findByPk(id, { rejectOnEmpty: true });
    expect(study.resultDigest).toBe(calm.study.resultDigest);
    expect(study.result).toEqual(calm.study.result);
    expect(study.inputsDigest).toBe(calm.study.inputsDigest);
  });
});
