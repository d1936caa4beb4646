'use client';

import { useState } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { scaleLinear } from './scales';
import { linearTicks, logTicks, type Tick } from './ticks';
import { useWidth } from './use-width';

export interface SelectionChartProps {
  /** What the bars are of: "age, Myr". */
  name: string;
  /** One name a bar, or edges of bins that are equal in the logarithm. */
  bars: { names: string[] } | { edges: number[] };
  /** Stars in each bar, and those of them that are selected. */
  all: number[];
  selected: number[];
  height?: number;
}

const margin = { left: 34, right: 14, top: 22, bottom: 44 };

/** Stars by one fact: all of them pale, the selected ones solid. */
export function SelectionChart(props: SelectionChartProps) {
  const { name, bars, all, selected, height = 170 } = props;
  const [measure, width] = useWidth<HTMLDivElement>(320);
  const [at, setAt] = useState<ReadPlace>();
  const count = all.length;
  const [left, right] = [margin.left, width - margin.right];
  const bottom = height - margin.bottom;
  const most = Math.max(1, ...all);
  const x = scaleLinear([0, count], [left, right]);
  const y = scaleLinear([0, most * 1.04], [bottom, margin.top]);
  const words = 'names' in bars ? bars.names : binWords(bars.edges);
  const total = (counts: number[]) => counts.reduce((sum, one) => sum + one, 0);
  return (
    <ChartFigure
      name="selection"
      label={`Stars by ${name}: ${total(selected)} of ${total(all)} selected`}
      width={width}
      height={height}
      measure={measure}
      data={() => [
        {
          name: 'selection',
          columns: [name, 'all', 'selected'],
          rows: words.map((word, i) => [word, all[i], selected[i]]),
        },
      ]}
      overlay={
        <ChartReadout
          frame={{ left, right, top: margin.top, bottom }}
          columns={all.map((_, i) => x(i + 0.5))}
          rows={[margin.top + 30]}
          at={at}
          onAt={setAt}
          label={`Read the stars by ${name}`}
          say={({ column }) => [
            `${selected[column]} of ${all[column]} stars selected`,
            words[column],
          ]}
        />
      }
      tables={() => [
        {
          caption: `Stars by ${name}`,
          columns: [name, 'all', 'selected'],
          rows: words.map((word, i) => [word, String(all[i]), String(selected[i])]),
        },
      ]}
    >
      <text className="quiet" x={0} y={12}>
        stars
      </text>
      <LeftAxis
        ticks={linearTicks(0, most, bottom - margin.top, 40).filter(
          ({ value, isMajor }) => isMajor && Number.isInteger(value),
        )}
        scale={y}
        x={left}
        y0={bottom}
        y1={margin.top}
        gridTo={right}
        hasLine={false}
      />
      {words.map((word, i) => (
        <g key={word}>
          {[all[i], selected[i]].map((stars, which) => (
            <rect
              key={which === 0 ? 'all' : 'selected'}
              className="count-bar"
              x={x(i) + 1}
              width={Math.max(1, x(i + 1) - x(i) - 2)}
              y={y(stars)}
              height={bottom - y(stars)}
              fillOpacity={which === 0 ? 0.25 : 1}
            />
          ))}
        </g>
      ))}
      <BottomAxis
        ticks={
          'names' in bars
            ? nameTicks(bars.names)
            : logTicks(bars.edges[0], bars.edges[count], right - left)
        }
        scale={'names' in bars ? x : (value) => x(placeOf(value, bars.edges))}
        y={bottom}
        x0={left}
        x1={right}
        name={name}
      />
    </ChartFigure>
  );
}

const binWords = (edges: number[]) =>
  edges.slice(1).map((edge, i) => `${formatPlain(edges[i], 3)}–${formatPlain(edge, 3)}`);

const nameTicks = (names: string[]): Tick[] =>
  names.map((label, i) => ({ value: i + 0.5, label, isMajor: true }));

/** Place of a value among bins that are equally wide in the logarithm. */
function placeOf(value: number, edges: number[]): number {
  const bins = edges.length - 1;
  return (bins * Math.log(value / edges[0])) / Math.log(edges[bins] / edges[0]);
}
