import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { percentBelow } from '@/components/runs/level-table';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describePrior } from '@/lib/inference';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { ShownRun } from '@/lib/schemas/release-page';

const USUAL_LEVELS = [0.68, 0.9, 0.95, 0.99];
const isSame = (a: number, b: number) => Math.abs(a - b) < 1e-9;

interface LevelColumn {
  level: number;
  /** Where the column is seen; on a narrow screen released levels come first. */
  className: string;
}

/** The usual levels and the released ones; those released stand in front where others are cut off. */
export function levelColumns(levels: number[]): LevelColumn[] {
  const released = [...new Set(levels)];
  const isReleased = (level: number) => released.some((one) => isSame(one, level));
  const all = [...released, ...USUAL_LEVELS.filter((level) => !isReleased(level))];
  return [
    ...released.map((level) => ({ level, className: 'md:hidden print:hidden' })),
    ...all
      .sort((a, b) => a - b)
      .map((level) => ({
        level,
        className: isReleased(level) ? 'max-md:hidden print:table-cell' : '',
      })),
  ];
}

/** Ranges × levels: one row a run, with its detections counted and with none. */
export function LimitsTable({ runs }: { runs: ShownRun[] }) {
  const [first] = runs;
  const columns = levelColumns(runs.map(({ result }) => result.credibleLevel));
  const isFraction = first.result.quantity === 'host_fraction';
  return (
    <>
      <Table caption="Upper limits by range and credible level">
        <TableHead>
          <tr>
            <HeadCell>
              mass<span className="block md:hidden print:hidden">semi-major axis</span>
            </HeadCell>
            <HeadCell className="max-md:hidden print:table-cell">semi-major axis</HeadCell>
            <HeadCell isNumeric>detections</HeadCell>
            {columns.map(({ level, className }) => (
              <HeadCell key={`${level}${className}`} isNumeric className={className}>
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
                    <span className="block font-normal md:hidden print:hidden">
                      <AxisRange definition={run.population} />
                    </span>
                  </Cell>
                  <Cell className="whitespace-nowrap max-md:hidden print:table-cell">
                    <AxisRange definition={run.population} />
                  </Cell>
                  <Cell isNumeric>{isZero ? 'set aside' : counted.length}</Cell>
                  {columns.map(({ level, className }) => (
                    <Cell
                      key={`${level}${className}`}
                      isNumeric
                      className={`${className} ${!isZero && isSame(level, credibleLevel) ? 'limit' : ''}`}
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
