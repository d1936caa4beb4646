'use client';

import { useState } from 'react';
import { formatSignificant } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks } from './ticks';
import { useWidth } from './use-width';

export interface EvidenceRow {
  key: string;
  name: string;
  /** ln B against the population of the run; null where there is none. */
  logBayesFactor: number | null;
  isOwn: boolean;
  /** Why there is none. */
  fault: string | null;
}

export interface EvidenceChartProps {
  rows: EvidenceRow[];
  /** ln B at which the words change, and the words between them, from the scale that is cited. */
  steps: { at: number; words: string }[];
}

const rowHeight = 46;
const head = 52;
const foot = 46;

/** ln B of each population as a dot; the ends of the scale's steps are drawn, not judged. */
export function EvidenceChart({ rows, steps }: EvidenceChartProps) {
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const height = head + rows.length * rowHeight + foot;
  const frame = { left: 12, right: width - 12, top: head, bottom: height - foot };
  const known = rows.flatMap(({ logBayesFactor }) => logBayesFactor ?? []);
  const reach = Math.max(steps[0].at * 1.6, ...known.map(Math.abs)) * 1.15;
  const x = scaleLinear([-reach, reach], [frame.left, frame.right]);
  const y = (row: number) => frame.top + (row + 0.5) * rowHeight + 8;
  const shown = steps.filter((step) => step.at < reach);
  const say = ({ row }: ReadPlace) => {
    const one = rows[row];
    return [
      one.name,
      one.logBayesFactor === null ? 'no Bayes factor' : `ln B = ${formatLogB(one.logBayesFactor)}`,
    ];
  };

  return (
    <ChartFigure
      name="population-comparison"
      label={`Logarithm of the Bayes factor against the population of the run: ${rows
        .map(
          (row) =>
            `${row.name} ${row.logBayesFactor === null ? 'none' : formatLogB(row.logBayesFactor)}`,
        )
        .join('; ')}`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [evidenceTable(rows)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={[x(0)]}
          rows={rows.map((_, row) => y(row))}
          at={at}
          onAt={setAt}
          label="Read the Bayes factor of a population"
          say={say}
        />
      }
    >
      <text className="quiet" x={x(0) - 10} y={16} textAnchor="end">
        for the run’s own
      </text>
      <text className="quiet" x={x(0) + 10} y={16}>
        for the other
      </text>
      {shown.flatMap((step) =>
        [-step.at, step.at].map((value) => (
          <g key={value}>
            <line
              className="grid-line"
              x1={x(value)}
              x2={x(value)}
              y1={frame.top - 8}
              y2={frame.bottom}
            />
            <StepName step={step} value={value} x={x} reach={reach} steps={shown} />
          </g>
        )),
      )}
      <line className="axis" x1={x(0)} x2={x(0)} y1={frame.top - 28} y2={frame.bottom} />
      {rows.map((row, index) => (
        <EvidenceMark key={row.key} row={row} x={x} y={y(index)} frame={frame} />
      ))}
      <BottomAxis
        ticks={linearTicks(-reach, reach, frame.right - frame.left)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={
          <>
            ln <tspan fontStyle="italic">B</tspan> against the population of the run
          </>
        }
      />
    </ChartFigure>
  );
}

/** The words of a step stand between its end and the next one's, where they fit. */
function StepName({
  step,
  value,
  x,
  reach,
  steps,
}: {
  step: { at: number; words: string };
  value: number;
  x(value: number): number;
  reach: number;
  steps: { at: number; words: string }[];
}) {
  const next = steps.find(({ at }) => at > step.at)?.at ?? reach;
  const room = Math.abs(x(next) - x(step.at)) - 10;
  if (textWidth(step.words, 13) > room) return null;
  return (
    <text
      className="quiet"
      x={x(value) + (value > 0 ? 5 : -5)}
      y={head - 14}
      textAnchor={value > 0 ? 'start' : 'end'}
    >
      {step.words}
    </text>
  );
}

function EvidenceMark({
  row,
  x,
  y,
  frame,
}: {
  row: EvidenceRow;
  x(value: number): number;
  y: number;
  frame: { left: number; right: number };
}) {
  const value = row.logBayesFactor;
  const words = value === null ? `${row.name}: no Bayes factor` : row.name;
  const width = textWidth(words, 13.5);
  const from = Math.min(
    Math.max(x(value ?? 0) - width / 2, frame.left),
    Math.max(frame.left, frame.right - width),
  );
  return (
    <g>
      {value !== null && (
        <>
          <line className="interval-line" x1={x(0)} x2={x(value)} y1={y} y2={y} />
          <circle
            className={row.isOwn ? 'evidence-own' : 'evidence-dot'}
            cx={x(value)}
            cy={y}
            r="6"
          />
          <text
            className="page-halo"
            x={x(value) + (value < 0 ? -12 : 12)}
            y={y + 4}
            textAnchor={value < 0 ? 'end' : 'start'}
          >
            {formatLogB(value)}
          </text>
        </>
      )}
      <text
        className={value === null ? 'quiet page-halo' : 'bold page-halo'}
        x={from}
        y={value === null ? y + 4 : y - 13}
      >
        {words}
      </text>
    </g>
  );
}

/** Three digits, with its sign: "+1.64". */
export function formatLogB(value: number): string {
  if (value === 0) return '0';
  return `${value > 0 ? '+' : ''}${formatSignificant(value, 3)}`;
}

function evidenceTable(rows: EvidenceRow[]): ChartTable {
  return {
    caption: 'Logarithm of the Bayes factor against the population of the run',
    columns: ['population', 'ln B'],
    rows: rows.map((row) => [
      row.name,
      row.logBayesFactor === null ? `none: ${row.fault ?? ''}` : formatLogB(row.logBayesFactor),
    ]),
  };
}
