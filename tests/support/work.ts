import type { Actor } from '@/lib/access/actor';
import { enqueueMaps } from '@/lib/queue/enqueue';
import { startRun } from '@/lib/services/runs';
import { inTransaction, JobRow, RunRow, type SurveyRow } from '@/models';
import { until } from './worker';

export function askForMaps(survey: SurveyRow): Promise<string> {
  const { id: surveyId, collaborationId } = survey;
  return inTransaction((transaction) =>
    enqueueMaps(transaction, { collaborationId, surveyId, requestedBy: null }),
  );
}

export const jobOf = (id: string) => JobRow.findByPk(id, { rejectOnEmpty: true });

const ENDED = ['done', 'failed', 'cancelled'];

export async function untilEnded(jobId: string): Promise<JobRow> {
  await until(`job ${jobId} has ended`, async () => ENDED.includes((await jobOf(jobId)).status));
  return jobOf(jobId);
}

/** Starts a run of an analysis and waits for its end. */
export async function runToEnd(actor: Actor, key: string): Promise<{ run: RunRow; job: JobRow }> {
  const { id } = await startRun(actor, key);
  const run = await RunRow.findByPk(id, { rejectOnEmpty: true });
  const job = await untilEnded(run.jobId);
  return { run: await run.reload(), job };
}
