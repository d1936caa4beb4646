import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatPercent, formatPlain, formatSignificant } from '@/lib/quantities/display';
import type { ResultOf } from '@/lib/schemas/study-results';

/** How often the limit held at fixed truths, where theory leaves some of it open. */
export function TruthTable({
  rows,
  rateName,
  unit,
}: {
  rows: ResultOf<'calibration'>['atTruth'];
  rateName: string;
  /** Written after each true rate: a thin space and %, or nothing. */
  unit: string;
}) {
  return (
    <Table caption="How often the limit held at fixed truths">
      <TableHead>
        <tr>
          <HeadCell>{rateName}</HeadCell>
          <HeadCell isNumeric>held in</HeadCell>
          <HeadCell isNumeric>standard error</HeadCell>
          <HeadCell isNumeric>theory</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {rows.map(({ rate, exact, observed, standardError }) => (
          <Row key={rate}>
            <Cell>{`${formatPlain(100 * rate)}${unit}`}</Cell>
            <Cell isNumeric>{formatPercent(observed, 3)}</Cell>
            <Cell isNumeric>{`${formatSignificant(100 * standardError, 2)} points`}</Cell>
            <Cell isNumeric>{exact === null ? 'left open' : formatPercent(exact, 3)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
