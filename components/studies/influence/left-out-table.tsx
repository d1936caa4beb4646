import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatLimit, formatPlain, type RateQuantity } from '@/lib/quantities/display';
import { limitDifference, ratioInWords } from '../limit-difference';
import { isStrong } from './influence-words';

interface LeftOutTableProps {
  caption: string;
  /** What a row leaves out. */
  head: string;
  rows: {
    key: string;
    name: string;
    stars: number;
    without: { limit: number; ratio: number; exposure: number };
  }[];
  /** With all stars. */
  limit: number;
  quantity: RateQuantity;
  levelLabel: string;
}

/** What the limit would be without each of several sets of stars. */
export function LeftOutTable({ caption, head, rows, limit, ...words }: LeftOutTableProps) {
  const { quantity, levelLabel } = words;
  return (
    <Table caption={caption}>
      <TableHead>
        <tr>
          <HeadCell>{head}</HeadCell>
          <HeadCell isNumeric>stars</HeadCell>
          <HeadCell isNumeric className="max-md:whitespace-normal">
            limit without ({levelLabel})
          </HeadCell>
          <HeadCell isNumeric>difference</HeadCell>
          <HeadCell isNumeric>ratio</HeadCell>
          <HeadCell isNumeric className="max-md:whitespace-normal">
            stars’ worth left
          </HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {rows.map(({ key, name, stars, without }) => (
          <Row key={key}>
            <Cell isRowHead>
              {isStrong(without.ratio) ? (
                <StateMark kind="warn">
                  {name}
                  <span className="sr-only">, moves the limit by more than 20 per cent</span>
                </StateMark>
              ) : (
                name
              )}
            </Cell>
            <Cell isNumeric>{stars}</Cell>
            <Cell isNumeric className="font-semibold text-bound">
              {formatLimit(without.limit, quantity).replace(' per 100 stars', '')}
            </Cell>
            <Cell isNumeric>{limitDifference(without.limit, limit, quantity)}</Cell>
            <Cell isNumeric>{ratioInWords(without.ratio)}</Cell>
            <Cell isNumeric>{formatPlain(without.exposure, 3)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
