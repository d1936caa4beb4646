import { beforeEach, describe, expect, it } from 'vitest';
import {
  claim,
  complete,
  fail,
  giveBack,
  LeaseLost,
  renew,
  reportProgress,
  stopCancelled,
} from '@/lib/queue/attempt';
import { requestCancel, retry } from '@/lib/queue/cancel';
import { enqueueRun } from '@/lib/queue/enqueue';
import { beat, buryDeadWorkers, STOPPED_TOO_OFTEN, sweep } from '@/lib/queue/heartbeat';
import { inTransaction } from '@/models';
import { withDatabase } from '../support/database';
import { createCollaboration } from '../support/people';
import { buildStars, buildSurvey } from '../support/sample';
import { askForMaps, jobOf } from '../support/work';

const { query } = withDatabase();
let collaborationId: string;

beforeEach(async () => {
  await query('delete from queue._private_jobs');
  await query('delete from job');
  await query('delete from worker_heartbeat');
  collaborationId = (await createCollaboration()).id;
});

const newJob = () =>
  inTransaction((transaction) => enqueueRun(transaction, { collaborationId, requestedBy: null }));

async function claimed(jobId: string, worker = 'worker-a') {
  const attempt = await claim(jobId, worker);
  if (!attempt) throw new Error('not claimed');
  return attempt;
}

const expireLease = (jobId: string) =>
  query(`update job set lease_until = now() - interval '1 s' where id = $1`, [jobId]);
const deliveries = () =>
  query<{ key: string | null; priority: number }>(
    'select key, priority from queue._private_jobs order by id',
  );

describe('claim', () => {
  it('gives a waiting job to one worker only', async () => {
    const jobId = await newJob();
    const both = await Promise.all([claim(jobId, 'worker-a'), claim(jobId, 'worker-b')]);
    expect(both.filter(Boolean)).toHaveLength(1);
    const job = await jobOf(jobId);
    expect(job.status).toBe('running');
    expect(job.attempts).toBe(1);
  });

  it('takes over a job whose lease has run out, not one whose lease lives', async () => {
    const jobId = await newJob();
    await claimed(jobId);
    expect(await claim(jobId, 'worker-b')).toBeNull();
    await expireLease(jobId);
    expect((await claimed(jobId, 'worker-b')).number).toBe(2);
  });

  it('leaves a job that has had its three attempts', async () => {
    const jobId = await newJob();
    for (const worker of ['a', 'b', 'c']) {
      await claimed(jobId, worker);
      await expireLease(jobId);
    }
    expect(await claim(jobId, 'd')).toBeNull();
  });
});

describe('an attempt that lost its job', () => {
  it('can neither renew, report, end, fail nor give back', async () => {
    const jobId = await newJob();
    const old = await claimed(jobId);
    await expireLease(jobId);
    const present = await claimed(jobId, 'worker-b');
    await expect(renew(old)).rejects.toThrow(LeaseLost);
    await expect(reportProgress(old, 'collect', 1, 1)).rejects.toThrow(LeaseLost);
    await expect(fail(old, 'no')).rejects.toThrow(LeaseLost);
    await expect(giveBack(old, true)).rejects.toThrow(LeaseLost);
    await expect(inTransaction((transaction) => complete(transaction, old))).rejects.toThrow(
      LeaseLost,
    );
    await inTransaction((transaction) => complete(transaction, present));
    expect((await jobOf(jobId)).status).toBe('done');
    await expect(inTransaction((transaction) => complete(transaction, present))).rejects.toThrow(
      LeaseLost,
    );
  });

  it('takes what it wrote in the same transaction with it', async () => {
    const jobId = await newJob();
    const old = await claimed(jobId);
    await expireLease(jobId);
    await claimed(jobId, 'worker-b');
    const storing = inTransaction(async (transaction) => {
      await buildSurvey(collaborationId, { name: 'Late', transaction });
      await complete(transaction, old);
    });
    await expect(storing).rejects.toThrow(LeaseLost);
    expect(await query(`select id from survey where name = 'Late'`)).toEqual([]);
  });
});

describe('giving back', () => {
  it('queues the job once more, and counts the attempt only where it failed', async () => {
    const jobId = await newJob();
    await giveBack(await claimed(jobId), false);
    expect((await jobOf(jobId)).attempts).toBe(0);
    await giveBack(await claimed(jobId), true);
    const job = await jobOf(jobId);
    expect([job.status, job.attempts]).toEqual(['waiting', 1]);
    expect(await deliveries()).toHaveLength(1);
  });
});

describe('cancel', () => {
  it('ends a waiting job at once and takes it off the queue', async () => {
    const jobId = await newJob();
    expect(await inTransaction((transaction) => requestCancel(transaction, jobId))).toBe(true);
    expect((await jobOf(jobId)).status).toBe('cancelled');
    expect(await deliveries()).toEqual([]);
    expect(await claim(jobId, 'worker-a')).toBeNull();
    expect(await inTransaction((transaction) => requestCancel(transaction, jobId))).toBe(false);
  });

  it('reaches a running attempt with its next renewal', async () => {
    const jobId = await newJob();
    const attempt = await claimed(jobId);
    expect(await renew(attempt)).toEqual({ cancelRequested: false });
    await inTransaction((transaction) => requestCancel(transaction, jobId));
    expect(await renew(attempt)).toEqual({ cancelRequested: true });
    await inTransaction((transaction) => stopCancelled(transaction, attempt));
    expect((await jobOf(jobId)).status).toBe('cancelled');
  });

  it('can be taken back by starting again', async () => {
    const jobId = await newJob();
    await inTransaction((transaction) => requestCancel(transaction, jobId));
    await inTransaction(async (transaction) => retry(transaction, await jobOf(jobId)));
    expect((await jobOf(jobId)).status).toBe('waiting');
    expect((await claimed(jobId)).number).toBe(1);
  });
});

describe('heartbeat and sweep', () => {
  const age = (worker: string, seconds: number) =>
    query(
      `update worker_heartbeat set seen_at = now() - make_interval(secs => $2) where worker_id = $1`,
      [worker, seconds],
    );

  it('frees the jobs of a dead worker and leaves those of a living one', async () => {
    const [dead, living] = [await newJob(), await newJob()];
    await claimed(dead, 'worker-dead');
    await claimed(living, 'worker-living');
    await query(`update queue._private_jobs set locked_at = now(), locked_by = 'worker-dead'`);
    await beat(['worker-dead', 'worker-living'], 'host:1');
    await age('worker-dead', 16);
    expect(await buryDeadWorkers()).toEqual(['worker-dead']);
    expect(await claim(living, 'worker-b')).toBeNull();
    expect((await claimed(dead, 'worker-b')).number).toBe(2);
    expect(await query('select id from queue._private_jobs where locked_by is not null')).toEqual(
      [],
    );
  });

  it('frees what a worker held that died before its first beat', async () => {
    await newJob();
    await query(
      `update queue._private_jobs set locked_at = now() - interval '16 s', locked_by = 'worker-x'`,
    );
    expect(await buryDeadWorkers()).toEqual(['worker-x']);
  });

  it('queues a running job again that no delivery will bring back', async () => {
    const jobId = await newJob();
    await claimed(jobId);
    await query('delete from queue._private_jobs');
    expect(await sweep()).toEqual({ requeued: [], ended: [] });
    await expireLease(jobId);
    expect(await sweep()).toEqual({ requeued: [jobId], ended: [] });
    expect(await deliveries()).toHaveLength(1);
    expect((await jobOf(jobId)).status).toBe('waiting');
  });

  it('fails a job that stopped three times, with a sentence', async () => {
    const jobId = await newJob();
    for (const worker of ['a', 'b', 'c']) {
      await claimed(jobId, worker);
      await expireLease(jobId);
    }
    await query('delete from queue._private_jobs');
    expect(await sweep()).toEqual({ requeued: [], ended: [jobId] });
    const job = await jobOf(jobId);
    expect([job.status, job.fault]).toEqual(['failed', STOPPED_TOO_OFTEN]);
  });

  it('ends a job that was cancelled while its worker died', async () => {
    const jobId = await newJob();
    await claimed(jobId);
    await inTransaction((transaction) => requestCancel(transaction, jobId));
    await expireLease(jobId);
    await query('delete from queue._private_jobs');
    expect(await sweep()).toEqual({ requeued: [], ended: [jobId] });
    expect((await jobOf(jobId)).status).toBe('cancelled');
  });
});

describe('enqueue', () => {
  it('is part of the transaction of what it belongs to', async () => {
    const failing = inTransaction(async (transaction) => {
      await enqueueRun(transaction, { collaborationId, requestedBy: null });
      throw new Error('changed my mind');
    });
    await expect(failing).rejects.toThrow('changed my mind');
    expect(await deliveries()).toEqual([]);
  });

  it('gives one job to all who ask for the maps of a survey at once', async () => {
    const survey = await buildSurvey(collaborationId);
    await buildStars(survey, 2);
    const ids = await Promise.all([askForMaps(survey), askForMaps(survey), askForMaps(survey)]);
    expect(new Set(ids).size).toBe(1);
    expect(await deliveries()).toHaveLength(1);
  });

  it('lets the first job of one collaboration pass the many of another', async () => {
    for (let i = 0; i < 5; i++) await newJob();
    collaborationId = (await createCollaboration()).id;
    const theirs = await newJob();
    const found = await deliveries();
    expect(found.map(({ priority }) => priority)).toEqual([0, 1, 2, 3, 4, 0]);
    expect(found[5].key).toBe(theirs);
  });
});
