import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { LEASE_S, MAX_ATTEMPTS } from '@/lib/queue/lease';
import type { WorkView } from '@/lib/schemas/work';
import { database, JobRow } from '@/models';
import { describeJobs } from './jobs';

const FAILED_SHOWN = 50;

const ask = <Row extends object>(sql: string, bind: unknown[]) =>
  database().query<Row>(sql, { bind, type: QueryTypes.SELECT });

interface QueueRow {
  kind: WorkView['queue'][number]['kind'];
  waiting: number;
  running: number;
  oldest: Date | null;
}

async function queueOf(collaborationId: string): Promise<WorkView['queue']> {
  const rows = await ask<QueueRow>(
    `select kind, count(*) filter (where status = 'waiting')::int as waiting,
            count(*) filter (where status = 'running')::int as running,
            min(created_at) filter (where status = 'waiting') as oldest
       from job where collaboration_id = $1 and status in ('waiting', 'running')
      group by kind order by kind`,
    [collaborationId],
  );
  return rows.map(({ oldest, ...row }) => ({
    ...row,
    oldestWaitingAt: oldest?.toISOString() ?? null,
  }));
}

async function runningOf(collaborationId: string): Promise<WorkView['running']> {
  const jobs = await JobRow.findAll({
    where: { collaborationId, status: 'running' },
    order: [['startedAt', 'ASC']],
  });
  // By the database's clock, as the lease itself.
  const left = await ask<{ id: string; left: number }>(
    `select id, extract(epoch from lease_until - clock_timestamp())::float as left
       from job where id = any($1::uuid[])`,
    [jobs.map(({ id }) => id)],
  );
  const views = await describeJobs(jobs);
  return views.map((job) => ({
    job,
    leaseLeftS: Math.max(0, Math.round(left.find(({ id }) => id === job.id)?.left ?? 0)),
  }));
}

const durationsOf = (collaborationId: string) =>
  ask<WorkView['durations'][number]>(
    `select kind, count(*)::int as count,
            percentile_cont(0.5) within group (order by seconds) as "medianS",
            percentile_cont(0.95) within group (order by seconds) as "slowestTwentiethS"
       from (select kind, extract(epoch from finished_at - started_at)::float as seconds from job
              where collaboration_id = $1 and status = 'done' and started_at is not null
                and finished_at > now() - interval '24 hours') ended
      group by kind order by kind`,
    [collaborationId],
  );

/** Counts only: which collaboration a worker serves just now is nobody else's business. */
async function workersOf(): Promise<WorkView['workers']> {
  const [row] = await ask<{ processes: number; threads: number; versions: string[]; last: Date }>(
    `select count(*)::int as processes, coalesce(sum(threads), 0)::int as threads,
            coalesce(array_agg(distinct version) filter (where version is not null), '{}') as versions,
            max(seen) as last
       from (select process_id, max(threads) as threads, max(engine_version) as version,
                    max(seen_at) as seen
               from worker_heartbeat where seen_at > now() - make_interval(secs => $1)
              group by process_id) living`,
    [2 * LEASE_S],
  );
  const { processes, threads, versions, last } = row;
  return { processes, threads, engineVersions: versions, lastSeenAt: last?.toISOString() ?? null };
}

/** What waits, runs and failed in the collaboration, how long it takes, and who works. */
export async function getWork(actor: Actor): Promise<WorkView> {
  demand(actor, 'watch-work');
  const { collaborationId } = actor;
  const [queue, running, failed, durations, workers] = await Promise.all([
    queueOf(collaborationId),
    runningOf(collaborationId),
    JobRow.findAll({
      where: { collaborationId, status: 'failed' },
      order: [
        ['finishedAt', 'DESC NULLS LAST'],
        ['id', 'DESC'],
      ],
      limit: FAILED_SHOWN,
    }),
    durationsOf(collaborationId),
    workersOf(),
  ]);
  return {
    queue,
    running,
    failed: await describeJobs(failed),
    durations,
    workers,
    maxAttempts: MAX_ATTEMPTS,
  };
}
