import type { Transaction } from 'sequelize';
import { Conflict } from '@/lib/errors';
import type { JobRow } from '@/models';
import { deliver } from './enqueue';
import { select } from './statement';

/**
 * Stops a job: a waiting one at once, a running one when its worker next shows that it lives.
 *
 * @returns false when the job had ended already
 */
export async function requestCancel(transaction: Transaction, jobId: string): Promise<boolean> {
  const [row] = await select<{ status: string }>(
    `update job set cancel_requested_at = coalesce(cancel_requested_at, now()),
       status = case when status = 'waiting' then 'cancelled' else status end,
       finished_at = case when status = 'waiting' then now() end
     where id = $1 and status in ('waiting', 'running') returning status`,
    [jobId],
    transaction,
  );
  if (!row) return false;
  if (row.status === 'cancelled') {
    await select('select queue.remove_job($1::text)', [jobId], transaction);
    await forgetWaitingMaps(transaction, jobId);
  }
  return true;
}

/** Targets that waited for a job that will not come are as they were before they were asked for. */
export async function forgetWaitingMaps(transaction: Transaction, jobId: string): Promise<void> {
  await select(
    `update target t set map_state = case when t.map_id is null then 'none' else 'ready' end
     from job j where j.id = $1 and t.survey_id = j.survey_id and t.map_state = 'waiting'
     returning t.id`,
    [jobId],
    transaction,
  );
}

/** Puts a job that failed or was cancelled on the queue again, with three attempts. */
export async function retry(transaction: Transaction, job: JobRow): Promise<void> {
  const [row] = await select<{ id: string }>(
    `update job set status = 'waiting', attempts = 0, cancel_requested_at = null, fault = null,
       stage = '', done_count = 0, total_count = 0, started_at = null, finished_at = null
     where id = $1 and status in ('failed', 'cancelled')
       and (kind <> 'compute-maps' or not exists (
         select 1 from job o where o.survey_id = job.survey_id and o.kind = 'compute-maps'
           and o.status in ('waiting', 'running')))
     returning id`,
    [job.id],
    transaction,
  );
  if (!row) throw new Conflict('Only a job that failed or was cancelled starts again');
  await deliver(transaction, job);
}
