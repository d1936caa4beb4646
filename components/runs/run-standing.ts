import type { RunSummary } from '@/lib/schemas/runs';

export function isFinished(run: RunSummary): boolean {
  return run.job.status === 'done' && run.limit !== null;
}

export function isOnItsWay(run: RunSummary | undefined): run is RunSummary {
  return run?.job.status === 'waiting' || run?.job.status === 'running';
}
