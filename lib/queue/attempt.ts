import type { Transaction } from 'sequelize';
import { inTransaction, type JobRow } from '@/models';
import { forgetWaitingMaps } from './cancel';
import { deliver } from './enqueue';
import type { JobKind } from './kinds';
import { LEASE_S, MAX_ATTEMPTS } from './lease';
import { select } from './statement';

/** The job is held by another attempt, or has ended: what this one computed is thrown away. */
export class LeaseLost extends Error {
  constructor(jobId: string) {
    super(`the lease of job ${jobId} was lost`);
    this.name = 'LeaseLost';
  }
}

/** One attempt at a job; its token is the fence that every write passes. */
export interface Attempt {
  jobId: string;
  token: string;
  number: number;
  collaborationId: string;
  kind: JobKind;
  payload: JobRow['payload'];
  /** Of the request that asked for the job, where one did. */
  requestId: string | null;
}

interface Claimed {
  token: string;
  number: number;
  collaboration_id: string;
  kind: JobKind;
  payload: JobRow['payload'];
  request_id: string | null;
}

/**
 * Takes a job: waiting, or left behind by an attempt whose lease has run out.
 *
 * @param workerId the queue's name of the worker, which its heartbeat carries
 * @returns the attempt, or null when the job has ended or another attempt holds it
 */
export async function claim(jobId: string, workerId: string): Promise<Attempt | null> {
  const [row] = await select<Claimed>(
    `update job set status = 'running', attempt_token = gen_random_uuid(), worker_id = $2,
       attempts = attempts + 1, lease_until = clock_timestamp() + make_interval(secs => $3),
       started_at = coalesce(started_at, now()), fault = null
     where id = $1 and attempts < $4 and cancel_requested_at is null
       and (status = 'waiting' or (status = 'running' and lease_until < clock_timestamp()))
     returning attempt_token as token, attempts as number, collaboration_id, kind, payload, request_id`,
    [jobId, workerId, LEASE_S, MAX_ATTEMPTS],
  );
  if (!row) return null;
  const { token, number, collaboration_id: collaborationId, kind, payload, request_id } = row;
  return { jobId, token, number, collaborationId, kind, payload, requestId: request_id };
}

/**
 * A sign of life of a running attempt.
 *
 * @returns whether a person has asked it to stop
 * @throws LeaseLost when another attempt holds the job, or the job has ended
 */
export async function renew(attempt: Attempt): Promise<{ cancelRequested: boolean }> {
  const [row] = await select<{ cancel: boolean }>(
    `update job set lease_until = clock_timestamp() + make_interval(secs => $3)
     where id = $1 and attempt_token = $2 and status = 'running'
     returning cancel_requested_at is not null as cancel`,
    [attempt.jobId, attempt.token, LEASE_S],
  );
  if (!row) throw new LeaseLost(attempt.jobId);
  return { cancelRequested: row.cancel };
}

/**
 * Locks the job's row for the rest of the transaction: what is written beside it is written by the
 * attempt that holds the job, or not at all. A process that falls asleep in such a transaction
 * would keep the next attempt waiting, so the server ends it after the length of a lease.
 *
 * @throws LeaseLost
 */
export async function hold(
  transaction: Transaction,
  attempt: Attempt,
): Promise<{ cancelRequested: boolean; payload: JobRow['payload'] }> {
  const [row] = await select<{ cancel: boolean; payload: JobRow['payload'] }>(
    `select cancel_requested_at is not null as cancel, payload,
       set_config('idle_in_transaction_session_timeout', $3, true) as patience from job
     where id = $1 and attempt_token = $2 and status = 'running' for update`,
    [attempt.jobId, attempt.token, `${LEASE_S}s`],
    transaction,
  );
  if (!row) throw new LeaseLost(attempt.jobId);
  return { cancelRequested: row.cancel, payload: row.payload };
}

/**
 * Where the attempt has got to. The first report of a stage also notes from where its pace counts,
 * because a second attempt starts with what the first has stored.
 *
 * @throws LeaseLost
 */
export async function reportProgress(
  attempt: Attempt,
  stage: string,
  done: number,
  total: number,
  transaction?: Transaction,
): Promise<void> {
  const [row] = await select<{ id: string }>(
    `update job set done_count = $4, total_count = $5, stage = $3,
       payload = case when stage = $3 and payload->>'paceToken' = $2::text then payload
         else payload || jsonb_build_object('paceToken', $2::text, 'paceDone', $4::int,
           'paceAt', to_char(clock_timestamp() at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')) end
     where id = $1 and attempt_token = $2::uuid and status = 'running' returning id`,
    [attempt.jobId, attempt.token, stage, done, total],
    transaction,
  );
  if (!row) throw new LeaseLost(attempt.jobId);
}

async function end(
  attempt: Attempt,
  change: string,
  extra: unknown[],
  transaction: Transaction,
): Promise<void> {
  const [row] = await select<{ id: string }>(
    `update job set attempt_token = null, lease_until = null, worker_id = null, ${change}
     where id = $1 and attempt_token = $2 and status = 'running' returning id`,
    [attempt.jobId, attempt.token, ...extra],
    transaction,
  );
  if (!row) throw new LeaseLost(attempt.jobId);
}

/**
 * Ends the job in the transaction that stores its result: the two stand or fall together.
 *
 * @throws LeaseLost when the job is no longer this attempt's; the caller's transaction must fail
 */
export function complete(transaction: Transaction, attempt: Attempt): Promise<void> {
  return end(attempt, `status = 'done', finished_at = now(), fault = null`, [], transaction);
}

/**
 * Ends the job with a sentence that a person may read.
 *
 * @param also what else belongs into the same transaction
 */
export function fail(
  attempt: Attempt,
  fault: string,
  also?: (transaction: Transaction) => Promise<void>,
): Promise<void> {
  return inTransaction(async (transaction) => {
    const change = `status = 'failed', finished_at = now(), fault = $3`;
    await end(attempt, change, [fault], transaction);
    await forgetWaitingMaps(transaction, attempt.jobId);
    await also?.(transaction);
  });
}

/** Ends the job because a person asked for it; false when the wish was taken back. */
export async function stopCancelled(transaction: Transaction, attempt: Attempt): Promise<boolean> {
  const { cancelRequested } = await hold(transaction, attempt);
  if (!cancelRequested) return false;
  await end(attempt, `status = 'cancelled', finished_at = now()`, [], transaction);
  await forgetWaitingMaps(transaction, attempt.jobId);
  return true;
}

/**
 * Gives the job back: the worker stops, or something failed that may go right the next time.
 *
 * @param counts whether this attempt is one of the three
 */
export async function giveBack(attempt: Attempt, counts: boolean): Promise<void> {
  await inTransaction(async (transaction) => {
    const change = counts ? `status = 'waiting'` : `status = 'waiting', attempts = attempts - 1`;
    await end(attempt, change, [], transaction);
    await deliver(transaction, {
      id: attempt.jobId,
      kind: attempt.kind,
      collaborationId: attempt.collaborationId,
    });
  });
}
