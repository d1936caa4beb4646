'use client';

import { useState } from 'react';
import { formatLimit, formatSignificant, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import type { Box } from './map-contours';
import { scaleLinear } from './scales';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface StepsChartProps {
  from: { name: string; limit: number };
  to: { name: string; limit: number };
  /** What each change does to the limit [fraction], in order. */
  steps: { name: string; change: number }[];
  quantity: RateQuantity;
  /** "averaged over all orders". */
  wayLabel: string;
}

const rowPx = 34;

/** Two totals with their bounds and the steps between them, in points. */
export function StepsChart(props: StepsChartProps) {
  const { from, to, quantity } = props;
  const [measure, width] = useWidth<HTMLDivElement>(720);
  const [at, setAt] = useState<ReadPlace>();
  const rows = rowsOf(props);
  const isNarrow = width < 560;
  const frame: Box = {
    left: isNarrow ? 108 : 150,
    right: width - 78,
    top: 8,
    bottom: 8 + rows.length * rowPx,
  };
  const height = frame.bottom + 46;
  const largest = Math.max(from.limit, to.limit);
  const most = 1.06 * Math.max(...rows.flatMap(({ start, end }) => [start, end]));
  const x = scaleLinear([0, most], [frame.left, frame.right]);
  const middle = (row: number) => frame.top + (row + 0.5) * rowPx;
  return (
    <ChartFigure
      name="steps"
      label={stepsSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [stepsTable(props)]}
      data={() => [
        {
          name: 'steps',
          columns: ['step', 'limit_before', 'limit_after'],
          rows: rows.map(({ name, start, end }) => [name, start, end]),
        },
      ]}
      caption={`steps ${props.wayLabel}`}
      overlay={
        <ChartReadout
          frame={frame}
          columns={[(frame.left + frame.right) / 2]}
          rows={rows.map((_, row) => middle(row))}
          at={at}
          onAt={setAt}
          label={`Read the steps from ${from.name} to ${to.name}`}
          say={({ row }) => sayRow(rows[row], quantity, largest)}
        />
      }
    >
      {rows.map((row, index) => {
        const y = middle(index);
        const [low, high] = [Math.min(row.start, row.end), Math.max(row.start, row.end)];
        return (
          <g key={row.name}>
            <text
              className={row.isTotal ? 'bold' : ''}
              x={frame.left - 10}
              y={y + 4}
              textAnchor="end"
            >
              {row.name}
            </text>
            <rect
              className={row.isTotal ? 'total-bar' : row.end < row.start ? 'step-down' : 'step-up'}
              x={x(low)}
              width={Math.max(1.5, x(high) - x(low))}
              y={y - 9}
              height="18"
            />
            {row.isTotal && (
              <rect className="bar" x={x(row.end) - 1.5} width="3" y={y - 13} height="26" />
            )}
            {index > 0 && (
              <line
                className="leader"
                x1={x(row.isTotal ? row.end : row.start)}
                x2={x(row.isTotal ? row.end : row.start)}
                y1={y - rowPx + 9}
                y2={y - 9}
              />
            )}
            <text className={row.isTotal ? 'bound-text' : ''} x={x(high) + 8} y={y + 4}>
              {row.isTotal ? formatLimit(row.end, quantity) : points(row.end - row.start, largest)}
            </text>
          </g>
        );
      })}
      <BottomAxis
        ticks={withRateUnit(linearTicks(0, 100 * most, frame.right - frame.left), quantity)}
        scale={(percent) => x(percent / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={quantity === 'host_fraction' ? 'upper limit' : 'upper limit, planets per 100 stars'}
      />
    </ChartFigure>
  );
}

interface Row {
  name: string;
  start: number;
  end: number;
  isTotal: boolean;
}

function rowsOf({ from, to, steps }: StepsChartProps): Row[] {
  let reached = from.limit;
  return [
    { name: from.name, start: 0, end: from.limit, isTotal: true },
    ...steps.map(({ name, change }) => {
      const start = reached;
      reached += change;
      return { name, start, end: reached, isTotal: false };
    }),
    { name: to.name, start: 0, end: to.limit, isTotal: true },
  ];
}

/** A step below this share of the larger limit would not show in three digits of it. */
const LEAST_SHARE = 5e-4;

/**
 * "+1.2 points", "−3.0 points", or "no change".
 *
 * @param most the larger of the two limits [fraction]
 */
export function points(change: number, most: number): string {
  if (Math.abs(change) < LEAST_SHARE * most || change === 0) return 'no change';
  const text = formatSignificant(Math.abs(100 * change), 2);
  return `${change < 0 ? '−' : '+'}${text} points`;
}

function sayRow(
  { name, start, end, isTotal }: Row,
  quantity: RateQuantity,
  largest: number,
): string[] {
  return isTotal
    ? [`${name} ${formatLimit(end, quantity)}`]
    : [`${name} ${points(end - start, largest)}`, `to ${formatLimit(end, quantity)}`];
}

function stepsSentence({ from, to, steps, quantity, wayLabel }: StepsChartProps): string {
  const largest = Math.max(from.limit, to.limit);
  const way = steps
    .map(({ name, change }) => `${name.toLowerCase()} ${points(change, largest)}`)
    .join(', ');
  return `From ${from.name}, ${formatLimit(from.limit, quantity)}, to ${to.name}, ${formatLimit(to.limit, quantity)}: ${way}; ${wayLabel}`;
}

function stepsTable(props: StepsChartProps): ChartTable {
  return {
    caption: `From ${props.from.name} to ${props.to.name}, steps ${props.wayLabel}`,
    columns: ['step', 'change', 'limit after it'],
    rows: rowsOf(props).map(({ name, start, end, isTotal }) => [
      name,
      isTotal ? '–' : points(end - start, Math.max(props.from.limit, props.to.limit)),
      formatLimit(end, props.quantity),
    ]),
  };
}
