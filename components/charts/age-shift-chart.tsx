'use client';

import { useState } from 'react';
import { formatLimit, formatPlain, type RateQuantity, rateUnit } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { spreadNames } from './end-names';
import { spokenLimit } from './limit-bands';
import { linePath } from './paths';
import { frameWithin, scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface AgeShiftLine {
  key: string;
  name: string;
  /** One for each shift; null where there is none. */
  limit: (number | null)[];
  exposure: (number | null)[];
}

export interface AgeShiftChartProps {
  /** Of every star, in sigma of its own age, increasing. */
  ageShifts: number[];
  /** A cooling model each, the run's own first. */
  lines: AgeShiftLine[];
  /** The run's limit. */
  baseline: number;
  quantity: RateQuantity;
  levelLabel: string;
}

const margin = { left: 48, right: 16, top: 30, bottom: 48 };
const height = 330;
const GAP = 8;

/** The limit against the age of all stars: a line a cooling model, and where the run stands. */
export function AgeShiftChart(props: AgeShiftChartProps) {
  const { ageShifts, lines, baseline, quantity, levelLabel } = props;
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const namesWidth = Math.min(170, Math.max(...lines.map(({ name }) => textWidth(name, 13))));
  const frame = frameWithin({ ...margin, right: namesWidth + 2 * GAP }, width, height);
  const limits = [baseline, ...lines.flatMap(({ limit }) => limit.flatMap((one) => one ?? []))];
  const top = 1.1 * Math.max(...limits);
  const x = scaleLinear([ageShifts[0], ageShifts[ageShifts.length - 1]], [frame.left, frame.right]);
  const y = scaleLinear([0, top], [frame.bottom, frame.top]);
  const names = spreadNames(
    lines.map(({ limit }) => y(lastOf(limit) ?? baseline)),
    frame,
  );
  const say = ({ row, column }: ReadPlace) => {
    const limit = lines[row].limit[column];
    const exposure = lines[row].exposure[column];
    return [
      limit === null ? 'no limit' : `${formatLimit(limit, quantity)} (${levelLabel})`,
      `${lines[row].name}, ages ${shiftWords(ageShifts[column])}`,
      ...(exposure === null ? [] : [`${formatPlain(exposure, 3)} stars’ worth of sensitivity`]),
    ];
  };
  return (
    <ChartFigure
      name="ages-and-cooling"
      label={ageShiftSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [ageShiftTable(props)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={ageShifts.map(x)}
          rows={names}
          at={at}
          onAt={setAt}
          label="Read the limit along the ages, a line a cooling model"
          say={say}
        />
      }
    >
      <LeftAxis
        ticks={withRateUnit(
          linearTicks(0, 100 * top, frame.bottom - frame.top, 46).filter((tick) => tick.isMajor),
          quantity,
        )}
        scale={(percentage) => y(percentage / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <text className="quiet" x={0} y={14}>
        upper limit ({levelLabel}), {rateUnit(quantity)}
      </text>
      {lines.map(({ key, name, limit }, index) => {
        const known = limit.flatMap((one, i) => (one === null ? [] : [i]));
        return (
          <g key={key}>
            <path
              className={index === 0 ? 'sweep-line' : 'alternative-line'}
              d={linePath(
                known.map((i) => ageShifts[i]),
                known.map((i) => limit[i] ?? 0),
                x,
                y,
              )}
            />
            {known.map((i) => (
              <circle
                key={ageShifts[i]}
                className="step-dot"
                cx={x(ageShifts[i])}
                cy={y(limit[i] ?? 0)}
                r={index === 0 ? 3.5 : 2.5}
              />
            ))}
            <text
              className={index === 0 ? 'bold' : undefined}
              x={frame.right + GAP}
              y={names[index] + 4}
            >
              {name}
            </text>
          </g>
        );
      })}
      <circle className="saved-dot" cx={x(0)} cy={y(baseline)} r="5.5" />
      {at && (
        <g data-screen-only="">
          <line
            className="range-line"
            x1={x(ageShifts[at.column])}
            x2={x(ageShifts[at.column])}
            y1={frame.top}
            y2={frame.bottom}
          />
        </g>
      )}
      <BottomAxis
        ticks={ageShifts.map((shift) => ({
          value: shift,
          label: shiftWords(shift),
          isMajor: true,
        }))}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="age shift of every star"
      />
    </ChartFigure>
  );
}

const shiftWords = (shift: number) => `${shift > 0 ? '+' : ''}${formatPlain(shift)} σ`;

const lastOf = (limit: (number | null)[]) => [...limit].reverse().find((one) => one !== null);

/** What the drawing shows, in one sentence. */
export function ageShiftSentence({ ageShifts, lines, quantity }: AgeShiftChartProps): string {
  const parts = lines.map(({ name, limit }) => {
    const known = limit.flatMap((one, i) => (one === null ? [] : [i]));
    if (known.length === 0) return `${name}: no limit`;
    const say = (i: number) =>
      `${spokenLimit(limit[i] ?? 0, quantity)} at ${shiftWords(ageShifts[i])}`;
    return `${name}: ${say(known[0])}, ${say(known[known.length - 1])}`;
  });
  return `Upper limit against the age of all stars, a line a cooling model. ${parts.join('; ')}`;
}

function ageShiftTable({ ageShifts, lines, quantity }: AgeShiftChartProps): ChartTable {
  return {
    caption: 'Upper limit by cooling model and age of all stars',
    columns: ['cooling model', ...ageShifts.map(shiftWords)],
    rows: lines.map(({ name, limit }) => [
      name,
      ...limit.map((one) => (one === null ? 'none' : formatLimit(one, quantity))),
    ]),
  };
}
