import type { JobView } from '@/lib/schemas/jobs';

/** "Maps of CURLEW", "A-31, run 18". */
export function jobTitle({ kind, subject }: Pick<JobView, 'kind' | 'subject'>): string {
  if (kind === 'export-collaboration') return 'An archive of the collaboration';
  if (subject === '') return kind === 'compute-maps' ? 'Maps' : 'A computation';
  if (kind === 'deposit-release') return `${subject} to the open repository`;
  return kind === 'compute-maps' ? `Maps of ${subject}` : subject;
}

/** The page on which the work stands. */
export function jobHref(collaboration: string, { page }: Pick<JobView, 'page'>): string {
  return page === null ? `/${collaboration}` : `/${collaboration}/${page}`;
}

/** How a computation ended, as the sentence of a toast; undefined while it goes on. */
export function endedSentence(
  job: JobView,
): { tone: 'ok' | 'warn' | 'bad'; title: string } | undefined {
  const title = jobTitle(job);
  if (job.status === 'done') return { tone: 'ok', title: `${title}: done.` };
  if (job.status === 'failed') return { tone: 'bad', title: `${title}: failed.` };
  if (job.status === 'cancelled') return { tone: 'warn', title: `${title}: stopped.` };
  return undefined;
}

export const isOpenJob = ({ status }: Pick<JobView, 'status'>) =>
  status === 'waiting' || status === 'running';
