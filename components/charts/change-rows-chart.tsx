'use client';

import { useState } from 'react';
import { formatLimit, type RateQuantity, rateUnit } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { fitText } from './fit-text';
import { spokenLimit } from './limit-bands';
import { scaleLinear, scaleLog } from './scales';
import { textWidth } from './text-width';
import { linearTicks, logTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface ChangeRow {
  key: string;
  name: string;
  limit: number;
  /** "+0.6 points", or that it changes nothing at two digits. */
  difference: string;
  /** "1.11 times". */
  ratio: string;
  /** Such as stars that the change cannot touch. */
  note?: string;
}

export interface ChangeRowsChartProps {
  /** In the order in which they are drawn. */
  rows: ChangeRow[];
  /** The run's own limit. */
  baseline: number;
  quantity: RateQuantity;
  levelLabel: string;
}

const head = 30;
const foot = 46;
/** Limits over more than this span are read on a logarithmic axis. */
const LOG_SPAN = 15;

/** One dot a change: how far it moves the limit from the run's own, which runs through as a bar. */
export function ChangeRowsChart(props: ChangeRowsChartProps) {
  const { rows, baseline, quantity, levelLabel } = props;
  const [measure, width] = useWidth<HTMLDivElement>(900);
  const [at, setAt] = useState<ReadPlace>();
  const isNarrow = width < 560;
  const rowHeight = isNarrow ? 58 : 40;
  const height = head + rows.length * rowHeight + foot;
  const frame = { left: 12, right: width - 16, top: head, bottom: height - foot };
  const { x, ticks } = axisOf(props, frame.left, frame.right);
  const y = (row: number) => frame.top + (row + 1) * rowHeight - 10;
  const own = `this run ${formatLimit(baseline, quantity)}`;
  const middle = x(baseline);
  const half = textWidth(own, 13) / 2;

  return (
    <ChartFigure
      name="systematics"
      label={rowsSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [rowsTable(props)]}
      overlay={
        rows.length > 0 && (
          <ChartReadout
            frame={frame}
            columns={[at ? x(rows[at.row].limit) : middle]}
            rows={rows.map((_, row) => y(row))}
            at={at}
            onAt={setAt}
            label="Read the limit under a change"
            say={({ row }) => [
              `${formatLimit(rows[row].limit, quantity)} (${levelLabel})`,
              rows[row].name,
              `${rows[row].difference}, ${rows[row].ratio} the run’s`,
              ...(rows[row].note === undefined ? [] : [rows[row].note]),
            ]}
          />
        )
      }
    >
      {ticks
        .filter(({ label }) => label !== undefined)
        .map(({ value }) => (
          <line
            key={value}
            className="grid-line"
            x1={x(value / 100)}
            x2={x(value / 100)}
            y1={frame.top}
            y2={frame.bottom}
          />
        ))}
      <rect
        className="bar"
        x={middle - 1.5}
        y={frame.top - 8}
        width="3"
        height={frame.bottom - frame.top + 8}
      />
      <text
        className="bound-text"
        x={Math.min(Math.max(middle, frame.left + half), frame.right - half)}
        y={frame.top - 14}
        textAnchor="middle"
      >
        {own}
      </text>
      {rows.map((row, index) => {
        const value = `${formatLimit(row.limit, quantity).replace(' per 100 stars', '')}, ${row.difference}`;
        const room = frame.right - frame.left - (isNarrow ? 0 : textWidth(value, 13) + 24);
        return (
          <g key={row.key}>
            <text className="bold page-halo" x={frame.left} y={y(index) - (isNarrow ? 29 : 12)}>
              {fitText(row.name, room)}
            </text>
            <text
              className="page-halo"
              x={isNarrow ? frame.left : frame.right}
              y={y(index) - 12}
              textAnchor={isNarrow ? 'start' : 'end'}
            >
              {value}
            </text>
            <line
              className="change-line"
              x1={middle}
              x2={x(row.limit)}
              y1={y(index)}
              y2={y(index)}
            />
            <circle
              className={row.limit <= baseline ? 'change-lower' : 'change-higher'}
              cx={x(row.limit)}
              cy={y(index)}
              r={at?.row === index ? 6.5 : 5}
            />
          </g>
        );
      })}
      <BottomAxis
        ticks={withRateUnit(ticks, quantity)}
        scale={(percentage) => x(percentage / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isFirstAtEdge
        isLastAtEdge
        name={`upper limit (${levelLabel}), ${rateUnit(quantity)}`}
      />
    </ChartFigure>
  );
}

function axisOf({ rows, baseline }: ChangeRowsChartProps, left: number, right: number) {
  const limits = [baseline, ...rows.map(({ limit }) => limit)];
  const [low, high] = [Math.min(...limits), Math.max(...limits)];
  if (high / low > LOG_SPAN) {
    const [from, to] = [low * 0.8, high * 1.25];
    const x = scaleLog([from, to], [left, right]);
    return { x, ticks: logTicks(100 * from, 100 * to, right - left) };
  }
  const pad = Math.max(0.12 * (high - low), 0.04 * baseline);
  const [from, to] = [Math.max(0, low - pad), high + pad];
  const x = scaleLinear([from, to], [left, right]);
  return { x, ticks: linearTicks(100 * from, 100 * to, right - left, 80) };
}

function rowsSentence({ rows, baseline, quantity, levelLabel }: ChangeRowsChartProps): string {
  const most = rows
    .slice(0, 3)
    .map((row) => `${row.name}, ${spokenLimit(row.limit, quantity)}, ${row.difference}`);
  return `Upper limit (${levelLabel}) under ${rows.length} changes, one at a time, beside ${spokenLimit(baseline, quantity)} of this run; largest first: ${most.join('; ')}`;
}

function rowsTable({ rows, baseline, quantity, levelLabel }: ChangeRowsChartProps): ChartTable {
  return {
    caption: `Upper limit (${levelLabel}) with one assumption changed, ${rateUnit(quantity)}`,
    columns: ['change', 'limit', 'against this run', 'ratio', 'remark'],
    rows: [
      ['this run', formatLimit(baseline, quantity), '', '', ''],
      ...rows.map((row) => [
        row.name,
        formatLimit(row.limit, quantity),
        row.difference,
        row.ratio,
        row.note ?? '',
      ]),
    ],
  };
}
