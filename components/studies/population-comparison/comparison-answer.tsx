'use client';

import { EvidenceChart, formatLogB } from '@/components/charts/evidence-chart';
import { FormulaWords } from '@/components/ui/formula-words';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describeLevel } from '@/lib/inference';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { evidenceInWords, evidenceSource, evidenceSteps } from './comparison-words';

/** Which population the data speak for, with its evidence, its limit and why one has none. */
export function ComparisonAnswer({ asked, result }: AnswerProps<'population-comparison'>) {
  const { rows } = result;
  const level = describeLevel(asked.credibleLevel);
  const unit = asked.quantity === 'host_fraction' ? '%' : 'per 100 stars';
  return (
    <>
      <EvidenceChart
        steps={evidenceSteps}
        rows={rows.map((row) => ({
          key: row.populationId,
          name: `${row.key} ${row.name}${row.isOwn ? ', the run’s own' : ''}`,
          logBayesFactor: row.logBayesFactor,
          isOwn: row.isOwn,
          fault: row.fault,
        }))}
      />
      <div className="mt-5">
        <Table caption="Evidence, limit and detections under each population">
          <TableHead>
            <tr>
              <HeadCell>population</HeadCell>
              <HeadCell isNumeric>
                ln <i>B</i>
              </HeadCell>
              <HeadCell className="max-md:hidden">which says</HeadCell>
              <HeadCell isNumeric className="max-md:whitespace-normal">
                limit ({level}), {unit}
              </HeadCell>
              <HeadCell isNumeric className="max-md:hidden">
                stars’ worth of sensitivity
              </HeadCell>
              <HeadCell isNumeric className="max-md:hidden">
                detections
              </HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {rows.map((row) => (
              <Row key={row.populationId} isSelected={row.isOwn}>
                <Cell isRowHead className="md:min-w-60">
                  <Link href={`/${asked.collaboration}/populations/${row.key}`}>
                    {row.key} {row.name}
                  </Link>
                  , version {row.version}
                  <span className="block font-normal text-chart text-ink3">
                    <FormulaWords text={row.words} />
                  </span>
                  <span className="block font-normal text-chart md:hidden">{saysOf(row)}</span>
                </Cell>
                <Cell isNumeric>
                  {row.logBayesFactor === null ? '–' : formatLogB(row.logBayesFactor)}
                </Cell>
                <Cell className="min-w-44 max-md:hidden">{saysOf(row)}</Cell>
                <Cell isNumeric className="max-md:whitespace-normal">
                  <span className={row.limit === null ? '' : 'limit'}>
                    {row.limit === null ? '–' : `<${formatSignificant(100 * row.limit, 2)}`}
                  </span>
                  {row.exposure !== null && row.detections !== null && (
                    <span className="block text-chart text-ink3 md:hidden">
                      {formatSignificant(row.exposure, 3)} stars’ worth, detections{' '}
                      {formatPlain(row.detections, 3)}
                    </span>
                  )}
                </Cell>
                <Cell isNumeric className="max-md:hidden">
                  {row.exposure === null ? '–' : formatSignificant(row.exposure, 3)}
                </Cell>
                <Cell isNumeric className="max-md:hidden">
                  {row.detections === null ? '–' : formatPlain(row.detections, 3)}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </div>
      <p className="mt-2 text-chart text-ink3">{evidenceSource}</p>
      <AnswerNotes notes={result.notes} />
    </>
  );
}

function saysOf(row: AnswerProps<'population-comparison'>['result']['rows'][number]) {
  if (row.isOwn) return 'the run’s own';
  if (row.fault !== null) return <StateMark kind="warn">{row.fault}</StateMark>;
  return row.logBayesFactor === null ? '–' : evidenceInWords(row.logBayesFactor);
}
