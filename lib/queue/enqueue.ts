import type { Transaction } from 'sequelize';
import { requestIdNow } from '@/lib/access/request-id';
import { JobRow } from '@/models';
import { type JobKind, type JobPayload, jobKinds } from './kinds';
import { MAX_ATTEMPTS } from './lease';

import { select } from './statement';

interface NewJob<Kind extends JobKind> {
  collaborationId: string;
  kind: Kind;
  surveyId: string | null;
  payload: JobPayload<Kind>;
  requestedBy: string | null;
}

/**
 * Puts a job that has a row on the queue, in the caller's transaction.
 *
 * Its priority is the number of jobs that its collaboration has waiting: low goes first, so twenty
 * jobs of one collaboration do not hold up the first of another.
 */
export async function deliver(
  transaction: Transaction,
  job: { id: string; kind: JobKind; collaborationId: string },
): Promise<void> {
  await select(
    `select queue.add_job(
       $1::text, json_build_object('jobId', $2::text), job_key := $2::text, max_attempts := $3::int,
       priority := (select least(count(*), 10000)::int from job
         where collaboration_id = $4::uuid and status = 'waiting' and id <> $2::uuid))`,
    [job.kind, job.id, MAX_ATTEMPTS, job.collaborationId],
    transaction,
  );
}

async function insertJob<Kind extends JobKind>(
  transaction: Transaction,
  job: NewJob<Kind>,
): Promise<string> {
  const payload = jobKinds[job.kind].parse(job.payload);
  const row = await JobRow.create({ ...job, payload, requestId: requestIdNow() }, { transaction });
  await deliver(transaction, row);
  return row.id;
}

interface OpenMaps {
  id: string;
  payload: { targetIds?: string[] };
}

/**
 * Holds a survey and the open job of its maps until the transaction ends. A worker locks its job
 * before the targets: whoever changes targets and then asks for their maps calls this first, or the
 * two wait for each other.
 *
 * @returns the open job, at most one
 */
export async function holdMaps(transaction: Transaction, surveyId: string): Promise<OpenMaps[]> {
  // One after the other: two requests for one survey would both find no open job. The key stays
  // free, since a worker that ends its job looks at the survey while it holds what we ask for next.
  await select('select id from survey where id = $1 for no key update', [surveyId], transaction);
  return select<OpenMaps>(
    `select id, payload from job where survey_id = $1 and kind = 'compute-maps'
       and status in ('waiting', 'running') for update`,
    [surveyId],
    transaction,
  );
}

/**
 * Asks for the maps of a survey. A job that is open already is the answer: it looks again for
 * missing maps before it ends, and its row is locked here so that it cannot end in between.
 *
 * @returns the id of the job that will compute them
 */
export async function enqueueMaps(
  transaction: Transaction,
  asked: {
    collaborationId: string;
    surveyId: string;
    requestedBy: string | null;
    targetIds?: string[];
  },
): Promise<string> {
  const { collaborationId, surveyId, requestedBy, targetIds } = asked;
  const open = await holdMaps(transaction, surveyId);
  if (open.length === 0) {
    return insertJob(transaction, {
      collaborationId,
      kind: 'compute-maps',
      surveyId,
      requestedBy,
      payload: targetIds ? { surveyId, targetIds } : { surveyId },
    });
  }
  const wider = targetIds && open[0].payload.targetIds;
  await JobRow.update(
    {
      // Asked for again after it was told to stop: the newer wish holds.
      cancelRequestedAt: null,
      payload: wider
        ? { surveyId, targetIds: [...new Set([...wider, ...targetIds])] }
        : { surveyId },
    },
    { where: { id: open[0].id }, transaction },
  );
  return open[0].id;
}

/** Asks for a run; the run's row, which names the job, is made in the same transaction. */
export function enqueueRun(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  return insertJob(transaction, { ...asked, kind: 'compute-run', surveyId: null, payload: {} });
}

/** Asks for a study; the study's row, which names the job, is made in the same transaction. */
export function enqueueStudy(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  return insertJob(transaction, { ...asked, kind: 'compute-study', surveyId: null, payload: {} });
}

/** Asks for the check of a release; the release's row names the job. */
export function enqueueVerification(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  return insertJob(transaction, { ...asked, kind: 'verify-release', surveyId: null, payload: {} });
}

/** Asks for a run that a bundle brings in; its row, which names the job, is made with it. */
export function enqueueRecreation(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  return insertJob(transaction, { ...asked, kind: 'recreate-run', surveyId: null, payload: {} });
}

/** Asks for a copy of a release in an open repository; the deposit's row names the job. */
export function enqueueDeposit(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  return insertJob(transaction, { ...asked, kind: 'deposit-release', surveyId: null, payload: {} });
}

/** Asks for the collaboration as one archive; the export's row names the job. */
export function enqueueExport(
  transaction: Transaction,
  asked: { collaborationId: string; requestedBy: string | null },
): Promise<string> {
  const kind = 'export-collaboration';
  return insertJob(transaction, { ...asked, kind, surveyId: null, payload: {} });
}
