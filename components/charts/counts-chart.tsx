'use client';

import { useState } from 'react';
import { formatPercent, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { frameWithin, scaleLinear } from './scales';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface CountsChartProps {
  /** P(k detections) at one rate, k from 0. */
  atRate: number[];
  /** P(k) of a repeat, the rate from the posterior. */
  predictive: number[];
  counted: number;
  /** "at a host fraction of 2.5 %". */
  rateLabel: string;
  height?: number;
}

const margin = { left: 52, right: 12, top: 74, bottom: 48 };
/** Bars that no screen could show. */
const NEGLIGIBLE = 5e-4;

/** Two bars for each number of detections: what one rate predicts, and what a repeat would find. */
export function CountsChart(props: CountsChartProps) {
  const { atRate, predictive, counted, rateLabel, height = 330 } = props;
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const shown = countsShown(atRate, predictive, counted);
  const frame = frameWithin(margin, width, height);
  const top = Math.max(...atRate, ...predictive) * 1.08;
  const x = scaleLinear([-0.5, shown - 0.5], [frame.left, frame.right]);
  const y = scaleLinear([0, top], [frame.bottom, frame.top]);
  const bar = Math.max(1.5, Math.min(26, ((frame.right - frame.left) / shown) * 0.36));
  const counts = Array.from({ length: shown }, (_, k) => k);
  const every = Math.ceil(shown / Math.max(2, (frame.right - frame.left) / 30));
  const ticks = counts.map((k) => ({
    value: k,
    isMajor: k % every === 0,
    label: k % every === 0 ? String(k) : undefined,
  }));
  const say = ({ column }: ReadPlace) => [
    `${column} ${column === 1 ? 'detection' : 'detections'}${column === counted ? ', as counted' : ''}`,
    `${percent(atRate[column])} ${rateLabel}`,
    `${percent(predictive[column])} in a repeat, rate from the posterior`,
  ];

  return (
    <ChartFigure
      name="counts"
      label={`Probability of each number of detections ${rateLabel}, most likely ${mostLikely(atRate)}; in a repeat with the rate from the posterior, most likely ${mostLikely(predictive)}; counted: ${counted}, with probability ${percent(atRate[counted])} at that rate`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [countsTable(props, shown)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={counts.map(x)}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label="Read the probability of a number of detections"
          say={say}
        />
      }
    >
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
      <text className="quiet" x={0} y={14}>
        probability
      </text>
      <g>
        <rect className="count-bar" x={frame.right - 11} y={5} width="11" height="11" />
        <text x={frame.right - 18} y={15} textAnchor="end">
          {rateLabel}
        </text>
        <rect className="count-bar-open" x={frame.right - 11} y={25} width="11" height="11" />
        <text x={frame.right - 18} y={35} textAnchor="end">
          in a repeat, rate from the posterior
        </text>
      </g>
      {at && (
        <line
          data-screen-only=""
          className="range-line"
          x1={x(at.column)}
          x2={x(at.column)}
          y1={frame.top}
          y2={frame.bottom}
        />
      )}
      {counts.map((k) => (
        <g key={k}>
          <rect
            className="count-bar"
            x={x(k) - bar - 1}
            y={y(atRate[k] ?? 0)}
            width={bar}
            height={frame.bottom - y(atRate[k] ?? 0)}
          />
          <rect
            className="count-bar-open"
            x={x(k) + 1}
            y={y(predictive[k] ?? 0)}
            width={bar}
            height={frame.bottom - y(predictive[k] ?? 0)}
          />
        </g>
      ))}
      <CountedMark
        x={x(counted)}
        y={y(Math.max(atRate[counted] ?? 0, predictive[counted] ?? 0))}
        counted={counted}
        frame={frame}
      />
      <BottomAxis
        ticks={ticks}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="number of detections"
      />
    </ChartFigure>
  );
}

/** A wedge over the bars of the number that was counted. */
function CountedMark({
  x,
  y,
  counted,
  frame,
}: {
  x: number;
  y: number;
  counted: number;
  frame: { left: number; right: number };
}) {
  const anchor = x < frame.left + 34 ? 'start' : x > frame.right - 34 ? 'end' : 'middle';
  const from = anchor === 'start' ? x - 7 : anchor === 'end' ? x + 7 : x;
  return (
    <g>
      <path className="count-mark" d={`M${x - 6},${y - 12}h12l-6,8z`} />
      <text className="bold page-halo" x={from} y={y - 17} textAnchor={anchor}>
        counted: {counted}
      </text>
    </g>
  );
}

/** Bars up to the last one worth drawing, and always the one that was counted. */
export function countsShown(atRate: number[], predictive: number[], counted: number): number {
  let last = Math.max(counted, 3);
  for (const series of [atRate, predictive]) {
    for (let k = series.length - 1; k > last; k -= 1) {
      if (series[k] >= NEGLIGIBLE) {
        last = k;
        break;
      }
    }
  }
  return last + 1;
}

function mostLikely(probability: number[]): number {
  return probability.indexOf(Math.max(...probability));
}

function percent(probability: number | undefined): string {
  if (probability === undefined || probability < 1e-6) return 'under 0.0001\u2009%';
  return formatPercent(probability);
}

function countsTable(props: CountsChartProps, shown: number): ChartTable {
  const cell = (value: number | undefined) =>
    value === undefined ? '0' : formatSignificant(100 * value, 3);
  return {
    caption: 'Probability of each number of detections, per cent',
    columns: ['detections', props.rateLabel, 'in a repeat'],
    rows: Array.from({ length: shown }, (_, k) => [
      k === props.counted ? `${k}, as counted` : String(k),
      cell(props.atRate[k]),
      cell(props.predictive[k]),
    ]),
  };
}
