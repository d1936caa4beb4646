import { beforeAll, describe, expect, it } from 'vitest';
import { GET as getWork } from '@/app/api/v1/collaborations/[collaboration]/work/route';
import { beat } from '@/lib/queue/heartbeat';
import { type WorkView, workSchema } from '@/lib/schemas/work';
import { JobRow } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildSurvey } from '../support/sample';

const { query } = withDatabase();
type Team = Awaited<ReturnType<typeof createCollaborationWith<'owner' | 'author'>>>;
let ours: Team;
let theirs: Team;

const add = (collaborationId: string, given: Partial<JobRow['dataValues']>) =>
  JobRow.create({ collaborationId, kind: 'compute-run', ...given } as never);

/** A job that ended an hour ago and took so long. */
const ended = (collaborationId: string, seconds: number) => {
  const finishedAt = new Date(Date.now() - 3_600_000);
  const startedAt = new Date(finishedAt.getTime() - 1000 * seconds);
  return add(collaborationId, { status: 'done', startedAt, finishedAt });
};

beforeAll(async () => {
  ours = await createCollaborationWith(['owner', 'author']);
  theirs = await createCollaborationWith(['owner', 'author']);
  const { id } = ours.collaboration;
  const survey = await buildSurvey(id, { name: 'Curlew' });
  for (const seconds of [1, 2, 3, 4, 100]) await ended(id, seconds);
  await add(id, { status: 'waiting' });
  const running = await add(id, { kind: 'compute-maps', surveyId: survey.id, status: 'waiting' });
  await query(
    `update job set status = 'running', attempt_token = gen_random_uuid(), attempts = 2,
            started_at = now(), lease_until = clock_timestamp() + interval '12 s' where id = $1`,
    [running.id],
  );
  await add(id, { status: 'failed', attempts: 3, fault: 'The thread ran out of memory.' });
  for (let i = 0; i < 7; i++) await add(theirs.collaboration.id, { status: 'waiting' });
  await add(theirs.collaboration.id, { status: 'failed', fault: 'A secret of theirs.' });
  await ended(theirs.collaboration.id, 5000);
  const facts = { threads: 3, engineVersion: '9' };
  await beat(['one', 'two'], 'host:1', facts);
  await beat(['three'], 'host:2', { ...facts, engineVersion: '10' });
  await beat(['gone'], 'host:3', facts);
  await query(
    `update worker_heartbeat set seen_at = now() - interval '5 min' where worker_id = $1`,
    ['gone'],
  );
});

async function read(team: Team): Promise<{ work: WorkView; text: string }> {
  const headers = bearer(await tokenOf(team.people.owner, team.collaboration));
  const params = { collaboration: team.collaboration.slug };
  const text = await (await call(getWork, { headers, params })).text();
  return { work: workSchema.parse(JSON.parse(text)), text };
}

describe('queue and workers', () => {
  it('hold what waits, runs and failed, with lease, attempt and sentence', async () => {
    const { work } = await read(ours);
    expect(work.queue).toMatchObject([
      { kind: 'compute-maps', waiting: 0, running: 1, oldestWaitingAt: null },
      { kind: 'compute-run', waiting: 1, running: 0 },
    ]);
    expect(work.running).toMatchObject([{ job: { subject: 'Curlew', attempts: 2 } }]);
    expect(work.running[0].leaseLeftS).toBeGreaterThan(5);
    expect(work.running[0].leaseLeftS).toBeLessThanOrEqual(12);
    expect(work.failed).toMatchObject([{ fault: 'The thread ran out of memory.', attempts: 3 }]);
    expect(work.maxAttempts).toBe(3);
  });

  it('give the middle and the slow end of the last day', async () => {
    const { work } = await read(ours);
    // percentile_cont of 1, 2, 3, 4, 100 at 0.95: 4 + 0.8 (100 - 4).
    expect(work.durations).toMatchObject([{ kind: 'compute-run', count: 5 }]);
    expect(work.durations[0].medianS).toBeCloseTo(3, 6);
    expect(work.durations[0].slowestTwentiethS).toBeCloseTo(80.8, 6);
  });

  it('count the workers that live, each process once, whoever asks', async () => {
    for (const team of [ours, theirs]) {
      const { work } = await read(team);
      expect(work.workers).toMatchObject({ processes: 2, threads: 6 });
      expect(work.workers.engineVersions).toEqual(['10', '9']);
    }
  });

  it('tell nothing of another collaboration, not even how much it has', async () => {
    const { work, text } = await read(ours);
    expect(text).not.toMatch(/secret of theirs|host:|"one"/);
    expect(work.queue.reduce((sum, { waiting }) => sum + waiting, 0)).toBe(1);
    expect(work.durations[0].count).toBe(5);
  });

  it('are an owner’s', async () => {
    const headers = bearer(await tokenOf(ours.people.author, ours.collaboration));
    const params = { collaboration: ours.collaboration.slug };
    expect((await call(getWork, { headers, params })).status).toBe(403);
  });
});
