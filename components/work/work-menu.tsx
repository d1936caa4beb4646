'use client';

import { useState } from 'react';
import { Icon } from '@/components/ui/icon';
import { Popover } from '@/components/ui/popover';
import type { JobView } from '@/lib/schemas/jobs';
import { JobRow } from './job-row';
import { isOpenJob } from './job-words';

/** Ended ones that are still listed, so that a stopped or failed one can be taken up again. */
const ENDED_SHOWN = 5;

interface WorkMenuProps {
  collaboration: string;
  jobs: JobView[] | undefined;
  onChanged(): void;
}

/** What the workers are computing for the collaboration, and what ended last. */
export function WorkMenu({ collaboration, jobs = [], onChanged }: WorkMenuProps) {
  const [isOpen, setOpen] = useState(false);
  if (jobs.length === 0) return null;
  const open = jobs.filter(isOpenJob);
  const ended = jobs.filter((job) => !isOpenJob(job)).slice(0, ENDED_SHOWN);
  const count = open.length;
  return (
    <Popover
      look="quiet"
      align="right"
      title="Running work"
      isOpen={isOpen}
      onOpenChange={setOpen}
      accessibleName={
        count === 0 ? 'Work: nothing is running' : `Work: ${count} running or waiting`
      }
      label={
        <span
          className={`inline-flex items-center gap-1.5 max-lg:min-w-9 max-lg:justify-center ${count === 0 ? 'text-ink3' : 'text-ink'}`}
        >
          <Icon name={count === 0 ? 'clock' : 'running'} size={17} />
          {count > 0 && (
            <>
              {count}
              <span className="max-xl:sr-only"> running</span>
            </>
          )}
        </span>
      }
    >
      <h2 className="text-note text-ink3">
        {count === 0 ? 'Nothing is running' : 'Running and waiting'}
      </h2>
      <ul>
        {open.map((job) => (
          <JobRow key={job.id} collaboration={collaboration} job={job} onChanged={onChanged} />
        ))}
      </ul>
      {ended.length > 0 && (
        <>
          <h2 className="mt-4 text-note text-ink3">Ended last</h2>
          <ul>
            {ended.map((job) => (
              <JobRow key={job.id} collaboration={collaboration} job={job} onChanged={onChanged} />
            ))}
          </ul>
        </>
      )}
    </Popover>
  );
}
