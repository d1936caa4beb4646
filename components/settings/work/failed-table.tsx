import { Link } from '@/components/ui/link';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import { jobHref, jobTitle } from '@/components/work/job-words';
import type { JobView } from '@/lib/schemas/jobs';

interface FailedTableProps {
  collaboration: string;
  failed: JobView[];
  onRetry: (job: JobView) => void;
}

/** What was given up, with its sentence, and another try. */
export function FailedTable({ collaboration, failed, onRetry }: FailedTableProps) {
  const moment = useMoment();
  if (failed.length === 0) return <p className="text-ink3">Nothing has failed.</p>;
  return (
    <Table caption="Work that failed, the newest first">
      <TableHead>
        <Row>
          <HeadCell>what</HeadCell>
          <HeadCell isNumeric className="max-md:hidden">
            attempts
          </HeadCell>
          <HeadCell>ended</HeadCell>
          <HeadCell>
            <span className="sr-only">again</span>
          </HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {failed.map((job) => (
          <Row key={job.id}>
            <Cell isRowHead>
              <Link href={jobHref(collaboration, job)}>{jobTitle(job)}</Link>
              <span className="block font-normal text-ink3 [overflow-wrap:anywhere]">
                {job.fault}
              </span>
            </Cell>
            <Cell isNumeric className="max-md:hidden">
              {job.attempts}
            </Cell>
            <Cell className="md:whitespace-nowrap">
              {job.finishedAt === null ? '–' : moment(job.finishedAt)}
            </Cell>
            <Cell>
              <TextAction onClick={() => onRetry(job)}>
                Retry<span className="sr-only"> {jobTitle(job)}</span>
              </TextAction>
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
