import { afterEach, expect, it, vi } from 'vitest';
import { claim, renew } from '@/lib/queue/attempt';
import { enqueueRun } from '@/lib/queue/enqueue';
import { beat, buryDeadWorkers, sweep } from '@/lib/queue/heartbeat';
import { LEASE_S } from '@/lib/queue/lease';
import { inTransaction } from '@/models';
import { withDatabase } from '../support/database';
import { createCollaboration } from '../support/people';
import { jobOf } from '../support/work';

const { query } = withDatabase();
afterEach(() => {
  vi.useRealTimers();
});

const HOUR_MS = 3_600_000;

it.each([
  ['ahead', HOUR_MS],
  ['behind', -HOUR_MS],
])('a process whose clock is an hour %s holds and frees leases as any other', async (_, shift) => {
  vi.useFakeTimers({ toFake: ['Date'], now: Date.now() + shift });
  const { id: collaborationId } = await createCollaboration();
  const jobId = await inTransaction((t) => enqueueRun(t, { collaborationId, requestedBy: null }));
  await beat(['skewed'], 'host:1');
  const attempt = await claim(jobId, 'skewed');
  if (!attempt) throw new Error('not claimed');
  await renew(attempt);
  const [{ left }] = await query<{ left: number }>(
    'select extract(epoch from lease_until - clock_timestamp())::float as left from job where id = $1',
    [jobId],
  );
  expect(left).toBeGreaterThan(LEASE_S - 5);
  expect(left).toBeLessThanOrEqual(LEASE_S);

  // Neither does it take what others hold, nor lose what it holds.
  expect(await buryDeadWorkers()).toEqual([]);
  await sweep(async () => undefined);
  expect(await claim(jobId, 'other')).toBeNull();
  expect(await jobOf(jobId)).toMatchObject({ status: 'running', workerId: 'skewed' });

  await query(`update job set lease_until = clock_timestamp() - interval '1 s' where id = $1`, [
    jobId,
  ]);
  expect((await claim(jobId, 'other'))?.number).toBe(2);
});
