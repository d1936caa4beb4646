interface Progress {
  status: string;
  doneCount: number;
  totalCount: number;
  payload: Record<string, unknown>;
}

/**
 * Seconds left, from the pace of the stage that runs.
 *
 * @returns null before there is a pace: nothing done yet in this attempt
 */
export function timeLeftS(job: Progress, now: Date): number | null {
  const { paceAt, paceDone } = job.payload;
  if (job.status !== 'running' || typeof paceAt !== 'string' || typeof paceDone !== 'number') {
    return null;
  }
  const done = job.doneCount - paceDone;
  const elapsedS = (now.getTime() - Date.parse(paceAt)) / 1000;
  if (done <= 0 || elapsedS <= 0) return null;
  return Math.round((elapsedS / done) * (job.totalCount - job.doneCount));
}
