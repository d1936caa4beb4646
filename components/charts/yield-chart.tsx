'use client';

import { useState } from 'react';
import { formatPercent, formatPlain, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { frameWithin, scaleLinear } from './scales';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface YieldChartProps {
  /** P(n detections), n from 0. */
  distribution: number[];
  mean: number;
  interval68: [number, number];
  /** "at a host fraction of 2.5 %", or where the rate comes from. */
  rateLabel: string;
}

const margin = { left: 52, right: 12, top: 52, bottom: 48 };
const height = 330;
/** Bars that no screen could show. */
const NEGLIGIBLE = 5e-4;

/** Chances of each number of detections in a planned survey; none stands apart. */
export function YieldChart(props: YieldChartProps) {
  const { distribution, interval68, rateLabel } = props;
  const [measure, width] = useWidth<HTMLDivElement>(620);
  const [at, setAt] = useState<ReadPlace>();
  const frame = frameWithin(margin, width, height);
  const shown = countsWorthDrawing(distribution);
  const counts = Array.from({ length: shown }, (_, n) => n);
  const top = Math.max(...distribution.slice(0, shown)) * 1.08;
  const x = scaleLinear([-0.5, shown - 0.5], [frame.left, frame.right]);
  const y = scaleLinear([0, top], [frame.bottom, frame.top]);
  const bar = Math.max(1.5, Math.min(34, ((frame.right - frame.left) / shown) * 0.72));
  const every = Math.ceil(shown / Math.max(2, (frame.right - frame.left) / 34));
  const atLeast = atLeastEach(distribution);
  return (
    <ChartFigure
      name="expected-detections"
      label={yieldSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [yieldTable(props)]}
      caption={`fuller: central 68 %, ${interval68[0]} to ${interval68[1]} detections`}
      overlay={
        <ChartReadout
          frame={frame}
          columns={counts.map(x)}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label="Read the chance of a number of detections"
          say={({ column }) => [
            `${column} ${column === 1 ? 'detection' : 'detections'}: ${formatPercent(distribution[column], 3)}`,
            `${formatPercent(atLeast[column], 3)} for at least so many`,
          ]}
        />
      }
    >
      <text className="quiet" x={0} y={14}>
        probability {rateLabel}
      </text>
      <ForecastMark x={frame.right} y={34} />
      <LeftAxis
        ticks={withUnit(
          linearTicks(0, 100 * top, frame.bottom - frame.top, 46).filter(({ isMajor }) => isMajor),
          '\u2009%',
        )}
        scale={(percentage) => y(percentage / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      {counts.map((n) => {
        const isCentral = n >= interval68[0] && n <= interval68[1];
        return (
          <rect
            key={n}
            className="count-bar"
            fillOpacity={at?.column === n ? 1 : isCentral ? 0.85 : 0.4}
            x={x(n) - bar / 2}
            width={bar}
            y={y(distribution[n])}
            height={frame.bottom - y(distribution[n])}
          />
        );
      })}
      <BottomAxis
        ticks={counts.map((n) => ({
          value: n,
          isMajor: n % every === 0,
          label: n % every === 0 ? String(n) : undefined,
        }))}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="number of detections"
      />
    </ChartFigure>
  );
}

/** Inside every drawing of what is not observed yet, and so in its files too. */
export function ForecastMark({ x, y }: { x: number; y: number }) {
  return (
    <text className="bold page-halo" x={x} y={y} textAnchor="end" style={{ fontStyle: 'italic' }}>
      forecast
    </text>
  );
}

/** P(at least n), n from 0. */
export function atLeastEach(distribution: number[]): number[] {
  let sum = 0;
  return distribution
    .map((_, index) => {
      sum += distribution[distribution.length - 1 - index];
      return Math.min(1, sum);
    })
    .reverse();
}

function countsWorthDrawing(distribution: number[]): number {
  let last = Math.min(3, distribution.length - 1);
  for (let n = distribution.length - 1; n > last; n -= 1) {
    if (distribution[n] >= NEGLIGIBLE) last = n;
  }
  return last + 1;
}

function yieldSentence({ distribution, mean, interval68, rateLabel }: YieldChartProps): string {
  return `Forecast: ${formatPlain(mean, 2)} detections expected ${rateLabel}, 68 per cent between ${interval68[0]} and ${interval68[1]}, chance of none ${formatPercent(distribution[0])}`;
}

function yieldTable({ distribution, rateLabel }: YieldChartProps): ChartTable {
  const atLeast = atLeastEach(distribution);
  const shown = countsWorthDrawing(distribution);
  return {
    caption: `Forecast: chance of each number of detections ${rateLabel}, per cent`,
    columns: ['detections', 'exactly so many', 'at least so many'],
    rows: distribution
      .slice(0, shown)
      .map((chance, n) => [
        String(n),
        formatSignificant(100 * chance, 3),
        formatSignificant(100 * atLeast[n], 3),
      ]),
  };
}
