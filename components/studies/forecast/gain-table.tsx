'use client';

import { useState } from 'react';
import { ProbabilityBar } from '@/components/charts/probability-bar';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import {
  formatLimit,
  formatPercent,
  formatSignificant,
  type RateQuantity,
} from '@/lib/quantities/display';
import type { ResultOf } from '@/lib/schemas/study-results';

interface GainTableProps {
  gain: ResultOf<'forecast'>['gain'];
  /** The run's own limit, to which one star is added. */
  limitNow: number;
  quantity: RateQuantity;
  levelLabel: string;
}

const FIRST = 20;

/** Which stars next: those that would lower the limit most, each added alone. */
export function GainTable({ gain, limitNow, quantity, levelLabel }: GainTableProps) {
  const [isWhole, setWhole] = useState(false);
  const rows = isWhole ? gain : gain.slice(0, FIRST);
  const unit = quantity === 'host_fraction' ? 'points' : 'per 100 stars';
  return (
    <>
      <div className={`max-w-5xl ${isWhole ? 'max-h-[44rem] overflow-y-auto' : ''}`}>
        <Table caption="Forecast: planned stars by how much each would lower the limit, nothing found">
          <TableHead>
            <tr>
              <HeadCell isNumeric>rank</HeadCell>
              <HeadCell>star</HeadCell>
              <HeadCell isNumeric className="max-md:whitespace-normal">
                detection probability
              </HeadCell>
              <HeadCell isNumeric className="max-md:whitespace-normal">
                limit with it added ({levelLabel})
              </HeadCell>
              <HeadCell isNumeric className="max-md:whitespace-normal">
                gain, {unit}
              </HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {rows.map(({ name, probability, limitWithItAlone }, index) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: planned stars may share a name; their rank tells them apart
              <Row key={`${index} ${name}`}>
                <Cell isNumeric>{index + 1}</Cell>
                <Cell isRowHead className="whitespace-nowrap">
                  {name}
                </Cell>
                <Cell isNumeric>
                  <span className="mr-2 max-md:hidden">
                    <ProbabilityBar value={probability} />
                  </span>
                  {formatPercent(probability)}
                </Cell>
                <Cell isNumeric className="text-bound">
                  {formatLimit(limitWithItAlone, quantity).replace(' per 100 stars', '')}
                </Cell>
                <Cell isNumeric>
                  {formatSignificant(100 * Math.max(0, limitNow - limitWithItAlone), 2)}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </div>
      {gain.length > FIRST && (
        <p className="mt-2 text-note">
          <TextAction onClick={() => setWhole(!isWhole)}>
            {isWhole ? `Only the first ${FIRST}` : `All ${gain.length} stars`}
          </TextAction>
        </p>
      )}
    </>
  );
}
