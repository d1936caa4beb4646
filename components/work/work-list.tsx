import type { JobView } from '@/lib/schemas/jobs';
import { JobRow } from './job-row';
import { isOpenJob } from './job-words';

/** Ended ones that are still listed, so that a stopped or failed one can be taken up again. */
const ENDED_SHOWN = 5;

interface WorkListProps {
  collaboration: string;
  jobs: JobView[];
  onChanged(): void;
}

/** Open computations, then those that ended last. */
export function WorkList({ collaboration, jobs, onChanged }: WorkListProps) {
  const open = jobs.filter(isOpenJob);
  const ended = jobs.filter((job) => !isOpenJob(job)).slice(0, ENDED_SHOWN);
  const rows = (some: JobView[]) => (
    <ul>
      {some.map((job) => (
        <JobRow key={job.id} collaboration={collaboration} job={job} onChanged={onChanged} />
      ))}
    </ul>
  );
  return (
    <>
      <h2 className="text-note text-ink3">
        {open.length === 0 ? 'Nothing is running' : 'Running and waiting'}
      </h2>
      {rows(open)}
      {ended.length > 0 && (
        <>
          <h2 className="mt-4 text-note text-ink3">Ended last</h2>
          {rows(ended)}
        </>
      )}
    </>
  );
}
