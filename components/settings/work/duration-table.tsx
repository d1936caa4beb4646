import { formatDuration } from '@/components/runs/time-words';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { WorkView } from '@/lib/schemas/work';
import { kindWords } from './kind-words';

/** How long work took in the last day, from its start to its end. */
export function DurationTable({ durations }: Pick<WorkView, 'durations'>) {
  if (durations.length === 0) {
    return <p className="text-ink3">Nothing ended in the last 24 hours.</p>;
  }
  return (
    <Table caption="Time from start to end, last 24 hours">
      <TableHead>
        <Row>
          <HeadCell>kind</HeadCell>
          <HeadCell isNumeric>ended</HeadCell>
          <HeadCell isNumeric>half within</HeadCell>
          <HeadCell isNumeric>95 % within</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {durations.map(({ kind, count, medianS, slowestTwentiethS }) => (
          <Row key={kind}>
            <Cell isRowHead>{kindWords[kind]}</Cell>
            <Cell isNumeric>{count}</Cell>
            <Cell isNumeric>{formatDuration(medianS)}</Cell>
            <Cell isNumeric>{formatDuration(slowestTwentiethS)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
