import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { percentBelow } from '@/components/runs/level-table';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describePrior } from '@/lib/inference';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { ShownRun } from '@/lib/schemas/release-page';

const LEVELS = [0.68, 0.9, 0.95, 0.99];
const isSame = (a: number, b: number) => Math.abs(a - b) < 1e-9;

/** Ranges × levels: one row a run, with its detections counted and with none. */
export function LimitsTable({ runs }: { runs: ShownRun[] }) {
  const [first] = runs;
  const isFraction = first.result.quantity === 'host_fraction';
  return (
    <>
      <Table caption="Upper limits by range and credible level">
        <TableHead>
          <tr>
            <HeadCell>mass</HeadCell>
            <HeadCell>semi-major axis</HeadCell>
            <HeadCell isNumeric>detections</HeadCell>
            {LEVELS.map((level) => (
              <HeadCell key={level} isNumeric>
                {formatPlain(100 * level)}
                {THIN_SPACE}%
              </HeadCell>
            ))}
          </tr>
        </TableHead>
        <TableBody>
          {runs.flatMap((run) =>
            [false, true].map((isZero) => {
              const { counted, levels, quantity, credibleLevel } = run.result;
              if (isZero && counted.length === 0) return null;
              const column =
                quantity === 'host_fraction'
                  ? isZero
                    ? 'hostFractionZero'
                    : 'hostFraction'
                  : isZero
                    ? 'meanNumberZero'
                    : 'meanNumber';
              return (
                <Row key={`${run.id}-${isZero}`} isSelected={run === first && !isZero}>
                  <Cell isRowHead className="whitespace-nowrap">
                    <MassRange definition={run.population} />
                  </Cell>
                  <Cell className="whitespace-nowrap">
                    <AxisRange definition={run.population} />
                  </Cell>
                  <Cell isNumeric>{isZero ? 'set aside' : counted.length}</Cell>
                  {LEVELS.map((level) => (
                    <Cell
                      key={level}
                      isNumeric
                      className={!isZero && isSame(level, credibleLevel) ? 'limit' : ''}
                    >
                      {percentBelow(
                        levels.find((row) => isSame(row.level, level))?.[column] ?? null,
                      )}
                    </Cell>
                  ))}
                </Row>
              );
            }),
          )}
        </TableBody>
      </Table>
      <p className="mt-2 max-w-[72ch] text-chart text-ink3">
        {isFraction ? 'In per cent of stars' : 'Planets per 100 stars'}, two significant digits.{' '}
        Prior: {describePrior(first.prior, first.result.quantity)}; population and conditions as
        above.
      </p>
    </>
  );
}
