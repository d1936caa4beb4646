import type { Transaction } from 'sequelize';
import { inTransaction } from '@/models';
import { forgetWaitingMaps } from './cancel';
import { deliver } from './enqueue';
import type { JobKind } from './kinds';
import { LEASE_S, MAX_ATTEMPTS } from './lease';
import { select } from './statement';

/** Shows that these workers live. */
export async function beat(
  workerIds: string[],
  processId: string,
  { threads, engineVersion }: { threads?: number; engineVersion?: string } = {},
): Promise<void> {
  await select(
    `insert into worker_heartbeat (worker_id, process_id, seen_at, threads, engine_version)
       select unnest($1::text[]), $2, clock_timestamp(), $3::integer, $4::text
     on conflict (worker_id) do update set seen_at = excluded.seen_at returning worker_id`,
    [workerIds, processId, threads ?? null, engineVersion ?? null],
  );
}

/** Takes the workers of a process that stops off the list. */
export async function signOff(workerIds: string[]): Promise<void> {
  await select('delete from worker_heartbeat where worker_id = any($1) returning worker_id', [
    workerIds,
  ]);
}

/** Locked deliveries whose worker is on no list: it died before its first beat. */
const UNKNOWN_HOLDERS = `
  select distinct locked_by as worker_id from queue._private_jobs
  where locked_at < now() - make_interval(secs => $1)
    and locked_by not in (select worker_id from worker_heartbeat)`;

/**
 * Frees what dead workers held: their rows go, the queue's locks and the leases with them.
 *
 * @returns the ids of the workers found dead
 */
export function buryDeadWorkers(): Promise<string[]> {
  return inTransaction(async (transaction) => {
    const dead = await select<{ worker_id: string }>(
      `delete from worker_heartbeat
       where seen_at < clock_timestamp() - make_interval(secs => $1) returning worker_id`,
      [LEASE_S],
      transaction,
    );
    const unknown = await select<{ worker_id: string }>(UNKNOWN_HOLDERS, [LEASE_S], transaction);
    const ids = [...new Set([...dead, ...unknown].map((row) => row.worker_id))];
    if (ids.length === 0) return ids;
    await select('select queue.force_unlock_workers($1::text[])', [ids], transaction);
    await select(
      `update job set lease_until = clock_timestamp() - interval '1 ms'
       where id in (
         select id from job where status = 'running' and worker_id = any($1)
         for update skip locked)
       returning id`,
      [ids],
      transaction,
    );
    return ids;
  });
}

interface Stranded {
  id: string;
  kind: JobKind;
  collaboration_id: string;
  attempts: number;
  cancelled: boolean;
}

/** A job open for longer than a lease that no delivery of the queue will ever bring to a worker. */
const STRANDED = `
  select j.id, j.kind, j.collaboration_id, j.attempts,
    j.cancel_requested_at is not null as cancelled from job j
  where ((j.status = 'running' and j.lease_until < clock_timestamp())
      or (j.status = 'waiting' and j.created_at < now() - make_interval(secs => $1)))
    and not exists (
      select 1 from queue._private_jobs q
      where q.payload->>'jobId' = j.id::text and (q.locked_at is not null or q.attempts < q.max_attempts))
  for update of j skip locked`;

/**
 * Queues stranded jobs again, or ends those that were cancelled or have had their attempts.
 *
 * @param onFailed what else belongs into the transaction in which a job fails
 */
export function sweep(
  onFailed?: (transaction: Transaction, jobId: string) => Promise<void>,
): Promise<{ requeued: string[]; ended: string[] }> {
  return inTransaction(async (transaction) => {
    const requeued: string[] = [];
    const ended: string[] = [];
    for (const job of await select<Stranded>(STRANDED, [LEASE_S], transaction)) {
      const status = job.cancelled
        ? 'cancelled'
        : job.attempts >= MAX_ATTEMPTS
          ? 'failed'
          : 'waiting';
      const fault = status === 'failed' ? STOPPED_TOO_OFTEN : null;
      await select(
        `update job set attempt_token = null, lease_until = null, worker_id = null, status = $2,
           finished_at = case when $2 <> 'waiting' then now() end, fault = $3
         where id = $1 returning id`,
        [job.id, status, fault],
        transaction,
      );
      if (status === 'waiting') {
        requeued.push(job.id);
        const { id, kind, collaboration_id: collaborationId } = job;
        await deliver(transaction, { id, kind, collaborationId });
      } else {
        ended.push(job.id);
        await forgetWaitingMaps(transaction, job.id);
        if (status === 'failed') await onFailed?.(transaction, job.id);
      }
    }
    return { requeued, ended };
  });
}

export const STOPPED_TOO_OFTEN = `The computation stopped ${MAX_ATTEMPTS} times before its end; the worker's log says why`;
