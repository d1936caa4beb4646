import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { RateQuantity } from '@/lib/inference';
import { formatPlain, formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { DrawnResult } from '@/lib/schemas/runs';

interface LevelTableProps {
  levels: DrawnResult['levels'];
  credibleLevel: number;
  quantity: RateQuantity;
  detections: number;
  /** Ranges and priors, since a limit without them says nothing. */
  foot: React.ReactNode;
  /** Takes the limit of one row along. */
  copyOf?(level: number, limit: number): React.ReactNode;
}

/** Two numbers that stand nearest each other must belong together: each group begins at a line. */
const groupEdge = 'border-rule border-l sm:pl-5';

/** Limits by level, with and without detections, for the fraction of hosts and the mean number. */
export function LevelTable({
  levels,
  credibleLevel,
  quantity,
  detections,
  foot,
  copyOf,
}: LevelTableProps) {
  const isChosen = (level: number) => Math.abs(level - credibleLevel) < 1e-9;
  const bound = (chosen: boolean, column: RateQuantity) =>
    chosen && column === quantity ? 'limit' : '';
  // Candidates may count without a detection; where nothing counts, both groups are the same.
  const isZeroAlone =
    detections === 0 &&
    levels.every(
      (row) => row.hostFraction === row.hostFractionZero && row.meanNumber === row.meanNumberZero,
    );
  const zero = 'zero detections';
  const groups = isZeroAlone ? [zero] : [countOf(detections), zero];
  return (
    <>
      <Table
        caption={`Upper limits by credible level, with ${isZeroAlone ? zero : `${countOf(detections)} and with none`}`}
      >
        <TableHead>
          <tr>
            <HeadCell scope="col" aria-hidden="true" className="border-b-0" />
            {groups.map((group) => (
              <HeadCell
                key={group}
                scope="colgroup"
                colSpan={2}
                className={`border-b-rule text-center ${groupEdge}`}
              >
                {group}
              </HeadCell>
            ))}
            {copyOf && <HeadCell scope="col" aria-hidden="true" className="border-b-0" />}
          </tr>
          <tr>
            <HeadCell>level</HeadCell>
            {groups.map((group) => [
              <HeadCell key={`f ${group}`} isNumeric className={groupEdge}>
                <i>f</i>, %
              </HeadCell>,
              <HeadCell key={`rate ${group}`} isNumeric className="max-sm:whitespace-normal">
                Poisson rate,
                <br className="max-sm:hidden" /> per 100
              </HeadCell>,
            ])}
            {copyOf && (
              <HeadCell>
                <span className="sr-only">take along</span>
              </HeadCell>
            )}
          </tr>
        </TableHead>
        <TableBody>
          {levels.map((row) => {
            const chosen = isChosen(row.level);
            return (
              <Row key={row.level} isSelected={chosen}>
                <Cell isRowHead>
                  {formatPlain(100 * row.level)}
                  {THIN_SPACE}%
                </Cell>
                <Cell isNumeric className={`${bound(chosen, 'host_fraction')} ${groupEdge}`}>
                  {percentBelow(row.hostFraction)}
                </Cell>
                <Cell isNumeric className={bound(chosen, 'companions_per_star')}>
                  {percentBelow(row.meanNumber)}
                </Cell>
                {!isZeroAlone && (
                  <>
                    <Cell isNumeric className={groupEdge}>
                      {percentBelow(row.hostFractionZero)}
                    </Cell>
                    <Cell isNumeric>{percentBelow(row.meanNumberZero)}</Cell>
                  </>
                )}
                {copyOf && (
                  <Cell className="py-0">
                    <CopyOfRow row={row} quantity={quantity} copyOf={copyOf} />
                  </Cell>
                )}
              </Row>
            );
          })}
        </TableBody>
      </Table>
      <p className="mt-2 text-chart text-ink3">{foot} Poisson rate: planets per 100 stars.</p>
    </>
  );
}

/** The limit of the shown quantity; without one there is nothing to take along. */
function CopyOfRow({
  row,
  quantity,
  copyOf,
}: {
  row: DrawnResult['levels'][number];
  quantity: RateQuantity;
  copyOf: NonNullable<LevelTableProps['copyOf']>;
}) {
  const limit = quantity === 'host_fraction' ? row.hostFraction : row.meanNumber;
  return limit === null ? null : copyOf(row.level, limit);
}

/** "2 detections", "1 detection", "no detection". */
export function countOf(detections: number): string {
  if (detections === 0) return 'no detection';
  return detections === 1 ? '1 detection' : `${detections} detections`;
}

/** "<5.8", in per cent, or planets per 100 stars; a dash where the prior belongs to the other quantity. */
export function percentBelow(limit: number | null): string {
  return limit === null ? '–' : `<${formatSignificant(100 * limit, 2)}`;
}
