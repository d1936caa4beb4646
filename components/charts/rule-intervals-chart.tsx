'use client';

import { useState } from 'react';
import { formatInterval, formatLimit, type RateQuantity, rateUnit } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface RuleRow {
  key: string;
  name: string;
  limit: number | null;
  fault: string | null;
  isUsed: boolean;
}

export interface RuleIntervalsChartProps {
  rows: RuleRow[];
  /** Limits at both ends of what any correlation allows. */
  bracket: { lowest: number; highest: number };
  quantity: RateQuantity;
  levelLabel: string;
}

const rowHeight = 48;
const head = 46;
const foot = 46;

/** The limit under each rule on one axis, inside the bracket that no correlation can leave. */
export function RuleIntervalsChart(props: RuleIntervalsChartProps) {
  const { rows, bracket, quantity, levelLabel } = props;
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const height = head + rows.length * rowHeight + foot;
  const frame = { left: 12, right: width - 12, top: head, bottom: height - foot };
  const limits = rows.flatMap(({ limit }) => limit ?? []);
  const max = Math.max(bracket.highest, ...limits) * 1.12;
  const x = scaleLinear([0, max], [frame.left, frame.right]);
  const y = (row: number) => frame.top + (row + 0.5) * rowHeight + 8;
  const range = formatInterval(bracket.lowest, bracket.highest, quantity);
  const words = `whatever the correlation: ${range}`;
  const middle = (x(bracket.lowest) + x(bracket.highest)) / 2;
  const half = textWidth(words, 13) / 2;

  return (
    <ChartFigure
      name="overlap-rules"
      label={`Upper limit (${levelLabel}) under each rule for stars in several surveys: ${rows
        .map(
          (row) => `${row.name} ${row.limit === null ? 'none' : formatLimit(row.limit, quantity)}`,
        )
        .join('; ')}; ${words}`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [ruleTable(props)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={[x(max / 2)]}
          rows={rows.map((_, row) => y(row))}
          at={at}
          onAt={setAt}
          label="Read the limit under a rule"
          say={({ row }) => [
            rows[row].name,
            rows[row].limit === null
              ? 'no limit'
              : `${formatLimit(rows[row].limit, quantity)} (${levelLabel})`,
          ]}
        />
      }
    >
      <rect
        className="bracket"
        x={x(bracket.lowest)}
        y={frame.top - 12}
        width={Math.max(2, x(bracket.highest) - x(bracket.lowest))}
        height={frame.bottom - frame.top + 12}
      />
      <path
        className="leader"
        d={`M${x(bracket.lowest)},${frame.top - 12}v-8H${x(bracket.highest)}v8`}
      />
      <text
        className="quiet"
        x={Math.min(Math.max(middle, frame.left + half), frame.right - half)}
        y={frame.top - 26}
        textAnchor="middle"
      >
        {words}
      </text>
      {rows.map((row, index) => (
        <g key={row.key}>
          <text
            className={row.isUsed ? 'bold page-halo' : 'page-halo'}
            x={frame.left}
            y={y(index) - 11}
          >
            {row.name}
            {row.isUsed && ', as in the run'}
          </text>
          {row.limit === null ? (
            <text className="quiet page-halo" x={frame.left} y={y(index) + 8}>
              no limit
            </text>
          ) : (
            <>
              <line
                className="interval-line"
                x1={x(0)}
                x2={x(row.limit)}
                y1={y(index) + 4}
                y2={y(index) + 4}
              />
              <rect
                className={row.isUsed ? 'bar' : 'bar-open'}
                x={x(row.limit) - 1.5}
                y={y(index) - 7}
                width="3"
                height="22"
              />
              <text className="bound-text page-halo" x={x(row.limit) + 8} y={y(index) + 9}>
                {formatLimit(row.limit, quantity).replace(' per 100 stars', '')}
              </text>
            </>
          )}
        </g>
      ))}
      <BottomAxis
        ticks={withRateUnit(linearTicks(0, 100 * max, frame.right - frame.left), quantity)}
        scale={(percentage) => x(percentage / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isFirstAtEdge
        name={`upper limit (${levelLabel}), ${rateUnit(quantity)}`}
      />
    </ChartFigure>
  );
}

function ruleTable(props: RuleIntervalsChartProps): ChartTable {
  const { rows, bracket, quantity, levelLabel } = props;
  return {
    caption: `Upper limit (${levelLabel}) under each rule`,
    columns: ['rule', 'limit'],
    rows: [
      ...rows.map((row) => [
        `${row.name}${row.isUsed ? ', as in the run' : ''}`,
        row.limit === null ? `none: ${row.fault ?? ''}` : formatLimit(row.limit, quantity),
      ]),
      ['whatever the correlation', formatInterval(bracket.lowest, bracket.highest, quantity)],
    ],
  };
}
