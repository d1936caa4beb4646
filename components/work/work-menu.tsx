'use client';

import dynamic from 'next/dynamic';
import { Icon } from '@/components/ui/icon';
import { Popover } from '@/components/ui/popover';
import type { JobView } from '@/lib/schemas/jobs';
import { isOpenJob } from './job-words';

const WorkList = dynamic(() => import('./work-list').then((list) => list.WorkList));

interface WorkMenuProps {
  collaboration: string;
  jobs: JobView[] | undefined;
  onChanged(): void;
}

/** What the workers are computing for the collaboration, and what ended last. */
export function WorkMenu({ collaboration, jobs = [], onChanged }: WorkMenuProps) {
  if (jobs.length === 0) return null;
  const count = jobs.filter(isOpenJob).length;
  return (
    <Popover
      look="quiet"
      align="right"
      title="Running work"
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
      <WorkList collaboration={collaboration} jobs={jobs} onChanged={onChanged} />
    </Popover>
  );
}
