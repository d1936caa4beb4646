'use client';

import { useAction } from '@/components/hooks/use-action';
import { cancelJob, retryJob } from '@/components/hooks/use-runs';
import { formatDuration } from '@/components/runs/time-words';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { PopoverClose } from '@/components/ui/popover-parts';
import { TextAction } from '@/components/ui/text-action';
import type { JobView } from '@/lib/schemas/jobs';
import { isOpenJob, jobHref, jobTitle } from './job-words';

interface JobRowProps {
  collaboration: string;
  job: JobView;
  onChanged(): void;
}

const marks = {
  waiting: { icon: 'draft', colour: 'text-ink3', word: 'waiting for a worker' },
  running: { icon: 'running', colour: 'text-data', word: 'running' },
  done: { icon: 'ok', colour: 'text-ok', word: 'done' },
  failed: { icon: 'bad', colour: 'text-bad', word: 'failed' },
  cancelled: { icon: 'bad', colour: 'text-ink3', word: 'stopped' },
} as const;

function stateWords(job: JobView): string {
  if (job.cancelRequested) return 'stopping';
  if (job.status !== 'running' || job.total === 0) return marks[job.status].word;
  const left = job.timeLeftS === null ? '' : `, about ${formatDuration(job.timeLeftS)} left`;
  return `${job.done} of ${job.total}${left}`;
}

/** One computation in the list of the bar: what it is, how far, and the verb that fits its state. */
export function JobRow({ collaboration, job, onChanged }: JobRowProps) {
  const { perform, isBusy, problem } = useAction();
  const mark = marks[job.status];
  const title = jobTitle(job);
  const act = (work: () => Promise<unknown>) =>
    perform(async () => {
      await work();
      onChanged();
    });
  const share = job.total > 0 ? Math.min(1, job.done / job.total) : 0;
  return (
    <li className="grid grid-cols-[20px_minmax(0,1fr)_auto] gap-x-2.5 border-rule border-b py-2.5 text-note last:border-0">
      <span className={mark.colour}>
        <Icon name={mark.icon} />
      </span>
      <div className="min-w-0">
        <PopoverClose asChild>
          <Link href={jobHref(collaboration, job)} className="font-semibold text-ink">
            {title}
          </Link>
        </PopoverClose>
        {job.status === 'running' && job.total > 0 && (
          <div
            role="progressbar"
            aria-label={title}
            aria-valuemin={0}
            aria-valuemax={job.total}
            aria-valuenow={job.done}
            className="mt-1.5 h-[5px] bg-well"
          >
            <div className="h-full bg-data" style={{ width: `${100 * share}%` }} />
          </div>
        )}
        <p className="mt-0.5 text-ink3">
          {stateWords(job)}
          {job.status === 'failed' && job.fault !== null && `: ${job.fault}`}
        </p>
        {problem !== undefined && (
          <p role="alert" className="mt-0.5 text-bad">
            {problem}
          </p>
        )}
      </div>
      {isOpenJob(job) ? (
        <TextAction
          aria-disabled={isBusy || job.cancelRequested}
          onClick={() => void act(() => cancelJob(collaboration, job.id))}
        >
          Stop<span className="sr-only"> {title}</span>
        </TextAction>
      ) : (
        job.status !== 'done' && (
          <TextAction
            aria-disabled={isBusy}
            onClick={() => void act(() => retryJob(collaboration, job.id))}
          >
            {job.status === 'failed' ? 'Retry' : 'Go on'}
            <span className="sr-only"> {title}</span>
          </TextAction>
        )
      )}
    </li>
  );
}
