import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useMoment } from '@/components/ui/time-zone';
import type { WorkView } from '@/lib/schemas/work';
import { kindWords } from './kind-words';

/** How much of each kind is open. */
export function QueueTable({ queue }: Pick<WorkView, 'queue'>) {
  const moment = useMoment();
  if (queue.length === 0) return <p className="text-ink3">Nothing waits and nothing runs.</p>;
  return (
    <Table caption="Open work of each kind">
      <TableHead>
        <Row>
          <HeadCell>kind</HeadCell>
          <HeadCell isNumeric>running</HeadCell>
          <HeadCell isNumeric>waiting</HeadCell>
          <HeadCell>oldest since</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {queue.map(({ kind, running, waiting, oldestWaitingAt }) => (
          <Row key={kind}>
            <Cell isRowHead>{kindWords[kind]}</Cell>
            <Cell isNumeric>{running}</Cell>
            <Cell isNumeric>{waiting}</Cell>
            <Cell className="whitespace-nowrap">
              {oldestWaitingAt === null ? '–' : moment(oldestWaitingAt)}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
