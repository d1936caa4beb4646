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
    /** That leave, and of how many entries where some stay because others saw them. */
    stars: number;
    entries?: number;
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
          <HeadCell isNumeric className="max-md:whitespace-normal">
            stars that leave
          </HeadCell>
          <HeadCell isNumeric className="max-md:whitespace-normal">
            limit without ({levelLabel})
          </HeadCell>
          <HeadCell isNumeric>difference</HeadCell>
          <HeadCell isNumeric className="max-md:hidden">
            ratio
          </HeadCell>
          <HeadCell isNumeric className="max-md:hidden">
            stars’ worth left
          </HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {rows.map(({ key, name, stars, entries = stars, without }) => (
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
            <Cell isNumeric>{entries === stars ? stars : `${stars} of ${entries}`}</Cell>
            <Cell isNumeric className="max-md:whitespace-normal">
              <span className="font-semibold text-bound">
                {formatLimit(without.limit, quantity).replace(' per 100 stars', '')}
              </span>
              <span className="block text-chart text-ink3 md:hidden">
                {ratioInWords(without.ratio)}, {formatPlain(without.exposure, 3)} stars’ worth left
              </span>
            </Cell>
            <Cell isNumeric className="max-md:whitespace-normal">
              {limitDifference(without.limit, limit, quantity)}
            </Cell>
            <Cell isNumeric className="max-md:hidden">
              {ratioInWords(without.ratio)}
            </Cell>
            <Cell isNumeric className="max-md:hidden">
              {formatPlain(without.exposure, 3)}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
