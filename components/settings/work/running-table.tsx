import { formatDuration } from '@/components/runs/time-words';
import { Link } from '@/components/ui/link';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useMoment } from '@/components/ui/time-zone';
import { jobHref, jobTitle } from '@/components/work/job-words';
import type { WorkView } from '@/lib/schemas/work';

interface RunningTableProps extends Pick<WorkView, 'running' | 'maxAttempts'> {
  collaboration: string;
}

/** What is computed just now: how far, in which attempt, and how long its worker may be silent. */
export function RunningTable({ collaboration, running, maxAttempts }: RunningTableProps) {
  const moment = useMoment();
  if (running.length === 0) return <p className="text-ink3">Nothing is being computed.</p>;
  return (
    <Table caption="Work that runs">
      <TableHead>
        <Row>
          <HeadCell>what</HeadCell>
          <HeadCell isNumeric>done</HeadCell>
          <HeadCell isNumeric>attempt</HeadCell>
          <HeadCell isNumeric>lease left</HeadCell>
          <HeadCell className="max-md:hidden">since</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {running.map(({ job, leaseLeftS }) => (
          <Row key={job.id}>
            <Cell isRowHead>
              <Link href={jobHref(collaboration, job)}>{jobTitle(job)}</Link>
              <span className="block font-normal text-ink3">{job.stage}</span>
            </Cell>
            <Cell isNumeric>{job.total > 0 ? `${job.done} of ${job.total}` : '–'}</Cell>
            <Cell isNumeric>
              {job.attempts} of {maxAttempts}
            </Cell>
            <Cell isNumeric>{leaseLeftS === 0 ? 'run out' : formatDuration(leaseLeftS)}</Cell>
            <Cell className="whitespace-nowrap max-md:hidden">
              {job.startedAt === null ? '–' : moment(job.startedAt)}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
