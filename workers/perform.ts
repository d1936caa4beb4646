import type { Transaction } from 'sequelize';
import { LabError } from '@/lib/errors';
import {
  type Attempt,
  claim,
  fail,
  giveBack,
  LeaseLost,
  renew,
  stopCancelled,
} from '@/lib/queue/attempt';
import { STOPPED_TOO_OFTEN } from '@/lib/queue/heartbeat';
import { MAX_ATTEMPTS } from '@/lib/queue/lease';
import { inTransaction } from '@/models';
import { describeError, log } from './log';
import { type ComputePool, ThreadFault } from './pool';
import { tellOfEnd } from './run-mail';

/** Renewals come more often than the lease asks for, because they also bring the wish to stop. */
const RENEW_MS = 2000;

/** Why the work of an attempt ended before its result. */
export class Stopped extends Error {
  constructor(readonly why: 'cancelled' | 'shutdown') {
    super(`stopped: ${why}`);
  }
}

export interface Work {
  attempt: Attempt;
  pool: ComputePool;
  /** Aborted when the attempt must end: cancelled, shut down, or its lease lost. */
  signal: AbortSignal;
}

/**
 * Performs one delivery of a job: claims it, works, and sees to it that the job's row tells how it
 * ended. Returning takes the delivery off the queue, throwing leaves it there for another try.
 */
export async function perform(
  delivery: { jobId: string; workerId: string; shutdown: AbortSignal; pool: ComputePool },
  task: (work: Work) => Promise<void>,
): Promise<void> {
  const { jobId, workerId, pool, shutdown } = delivery;
  const attempt = await claim(jobId, workerId);
  if (!attempt) {
    log('info', 'job not taken', { jobId, why: 'ended, stopped or held by another attempt' });
    return;
  }
  log('info', 'job taken', {
    jobId,
    request: attempt.requestId ?? undefined,
    kind: attempt.kind,
    attempt: attempt.number,
  });
  const stop = new AbortController();
  const onShutdown = () => stop.abort(new Stopped('shutdown'));
  shutdown.addEventListener('abort', onShutdown);
  if (shutdown.aborted) onShutdown();
  const renewal = setInterval(() => keepAlive(attempt, stop), RENEW_MS);
  try {
    await task({ attempt, pool, signal: stop.signal });
    log('info', 'job done', { jobId, attempt: attempt.number });
  } catch (error) {
    clearInterval(renewal);
    await conclude(attempt, stop.signal.aborted ? stop.signal.reason : error).catch(
      (failure: unknown) => {
        if (failure instanceof LeaseLost) {
          log('warning', 'late result refused', { jobId, attempt: attempt.number });
        }
        throw failure;
      },
    );
  } finally {
    clearInterval(renewal);
    shutdown.removeEventListener('abort', onShutdown);
  }
}

function keepAlive(attempt: Attempt, stop: AbortController): void {
  renew(attempt)
    .then(({ cancelRequested }) => {
      if (cancelRequested) stop.abort(new Stopped('cancelled'));
    })
    .catch((error: unknown) => {
      // A database that does not answer is no reason to stop: the lease decides.
      if (error instanceof LeaseLost) stop.abort(error);
      else log('warning', 'lease not renewed', { jobId: attempt.jobId, ...describeError(error) });
    });
}

const tellOfFailure = (jobId: string) => (transaction: Transaction) =>
  tellOfEnd(transaction, jobId, 'failed');

async function conclude(attempt: Attempt, error: unknown): Promise<void> {
  const { jobId } = attempt;
  if (error instanceof LeaseLost) throw error;
  if (error instanceof Stopped && error.why === 'cancelled') {
    const isStopped = await inTransaction((transaction) => stopCancelled(transaction, attempt));
    log('info', isStopped ? 'job cancelled' : 'job goes on', { jobId });
    if (!isStopped) await giveBack(attempt, false);
    return;
  }
  if (error instanceof Stopped) {
    log('info', 'job given back', { jobId });
    await giveBack(attempt, false);
    return;
  }
  if (error instanceof LabError || error instanceof ThreadFault) {
    log('info', 'job failed', { jobId, fault: error.message });
    await fail(attempt, error.message, tellOfFailure(jobId));
    return;
  }
  log('error', 'job stopped', { jobId, attempt: attempt.number, ...describeError(error) });
  if (attempt.number >= MAX_ATTEMPTS) {
    await fail(attempt, STOPPED_TOO_OFTEN, tellOfFailure(jobId));
  } else await giveBack(attempt, true);
}
