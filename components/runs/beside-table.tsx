import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describeLevel, type RateQuantity } from '@/lib/inference';
import { formatInterval, formatLimit } from '@/lib/quantities/display';
import type { DrawnResult } from '@/lib/schemas/runs';

export type Beside = NonNullable<DrawnResult['beside']>;

interface BesideTableProps {
  beside: Beside;
  quantity: RateQuantity;
}

/** Limits and intervals that use no prior, and how they differ from the credible one. */
export function BesideTable({ beside, quantity }: BesideTableProps) {
  return (
    <div className="mt-6">
      <h3 className="mb-1.5 font-semibold text-note">Beside: limits without a prior</h3>
      {beside.rows.length > 0 && (
        <Table caption="Limits and intervals of the same detections that use no prior">
          <TableHead>
            <tr>
              <HeadCell>construction</HeadCell>
              <HeadCell isNumeric>limit or interval</HeadCell>
              <HeadCell>source</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {beside.rows.map((row) => (
              <Row key={row.name}>
                <Cell isRowHead>
                  {row.name}
                  {row.isApproximate && (
                    <span className="ml-1.5 font-normal text-ink3">approximate</span>
                  )}
                </Cell>
                <Cell isNumeric>
                  {row.lower === null
                    ? formatLimit(row.upper, quantity)
                    : formatInterval(row.lower, row.upper, quantity)}
                  <span className="ml-1.5 text-ink3">{describeLevel(row.level)}</span>
                </Cell>
                <Cell className="text-ink3">{row.source}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
      <p className="mt-2 text-chart text-ink3">{beside.sentence}</p>
    </div>
  );
}
