'use client';

import type { ReactNode } from 'react';
import { formatLevel } from './posterior-words';
import { scaleLinear } from './scales';
import { linearTicks, withUnit } from './ticks';

export interface LimitInterval {
  /** Upper limit: the bar. */
  limit: number;
  /** Central 68 %, or [0, x] where nothing was detected. */
  interval68?: [number, number];
  median?: number;
  /** No detection: the box is paler and has no median. */
  isZero?: boolean;
}

interface IntervalMarkProps extends LimitInterval {
  /** End of the axis that the rows share. */
  max: number;
  width?: number;
  height?: number;
  /** "upper limit <5.8 % (95 %)". */
  label: string;
}

const inset = 2;

/** One analysis as an interval with its bound, for a cell of a table. */
export function IntervalMark(props: IntervalMarkProps) {
  const { limit, interval68, median, isZero = false, max, width = 236, height = 26, label } = props;
  const x = scaleLinear([0, max], [inset, width - inset - 2]).clamp(true);
  const middle = height / 2;
  return (
    <svg
      className="chart"
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={label}
    >
      {gridValues(max, width).map((value) => (
        <line
          key={value}
          className="grid-line"
          x1={x(value)}
          x2={x(value)}
          y1="2"
          y2={height - 2}
        />
      ))}
      <line className="interval-line" x1={x(0)} x2={x(limit)} y1={middle} y2={middle} />
      {interval68 && (
        <rect
          className={`interval-box ${isZero ? 'interval-box-zero' : ''}`}
          x={x(interval68[0])}
          y={middle - 5}
          width={Math.max(0, x(interval68[1]) - x(interval68[0]))}
          height="10"
        />
      )}
      {median !== undefined && !isZero && (
        <line
          className="interval-median"
          x1={x(median)}
          x2={x(median)}
          y1={middle - 5}
          y2={middle + 5}
        />
      )}
      <rect className="bar" x={x(limit) - 1.5} y={middle - 11} width="3" height="22" />
    </svg>
  );
}

/** The axis over a column of intervals; rates in per cent of stars unless `unit` says otherwise. */
export function IntervalAxis({
  max,
  width = 236,
  unit = '\u2009%',
}: {
  max: number;
  width?: number;
  unit?: string;
}) {
  const x = scaleLinear([0, max], [inset, width - inset - 2]);
  const ticks = withUnit(
    linearTicks(0, 100 * max, width, 64).filter((tick) => tick.isMajor),
    unit,
  );
  return (
    <svg
      className="chart"
      width={width}
      height="18"
      viewBox={`0 0 ${width} 18`}
      aria-hidden="true"
      fill="none"
    >
      {ticks.map((tick, index) => (
        <text
          key={tick.value}
          className="quiet"
          x={x(tick.value / 100)}
          y="13"
          textAnchor={index === 0 ? 'start' : x(tick.value / 100) > width - 24 ? 'end' : 'middle'}
        >
          {tick.label}
        </text>
      ))}
    </svg>
  );
}

function gridValues(max: number, width: number): number[] {
  return linearTicks(0, 100 * max, width, 64)
    .filter((tick) => tick.isMajor)
    .map((tick) => tick.value / 100);
}

/** End of a common axis for several limits, with room for the last bar. */
export function intervalMax(limits: number[]): number {
  return Math.max(...limits) * 1.08;
}

/** Analyses as intervals on one axis, where they do not stand in a table of their own. */
export function IntervalsOnAxis({
  rows,
  unit = '\u2009%',
  width = 236,
}: {
  rows: (LimitInterval & { name: ReactNode; key: string; limitLabel: string })[];
  unit?: string;
  width?: number;
}) {
  const max = intervalMax(rows.map(({ limit }) => limit));
  return (
    <table className="text-note">
      <caption className="sr-only">Upper limits on one axis; box: central 68 %</caption>
      <thead>
        <tr>
          <th scope="col" className="pr-4 text-left font-normal text-ink3">
            analysis
          </th>
          <th scope="col">
            <span className="sr-only">interval</span>
            <IntervalAxis max={max} width={width} unit={unit} />
          </th>
          <th scope="col" className="pl-4 text-right font-normal text-ink3">
            limit
          </th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ key, name, limitLabel, ...interval }) => (
          <tr key={key} className="border-rule border-t">
            <th scope="row" className="py-1.5 pr-4 text-left font-semibold">
              {name}
            </th>
            <td>
              <IntervalMark
                {...interval}
                max={max}
                width={width}
                label={`upper limit ${limitLabel}`}
              />
            </td>
            <td className="limit pl-4 text-right">{limitLabel}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Limits of one analysis at several credible levels, the chosen level on its own ground. */
export function LimitLevels({
  levels,
  chosenLevel,
  unit = '\u2009%',
  width = 236,
}: {
  levels: { level: number; limit: number; limitLabel: string }[];
  chosenLevel?: number;
  unit?: string;
  width?: number;
}) {
  const max = intervalMax(levels.map(({ limit }) => limit));
  return (
    <table className="w-full text-note">
      <caption className="sr-only">Upper limit by credible level</caption>
      <thead>
        <tr className="border-rule2 border-b">
          <th scope="col" className="py-1 pr-4 text-left font-normal text-ink3">
            level
          </th>
          <th scope="col" className="text-left">
            <span className="sr-only">interval</span>
            <IntervalAxis max={max} width={width} unit={unit} />
          </th>
          <th scope="col" className="py-1 pl-4 text-right font-normal text-ink3">
            limit
          </th>
        </tr>
      </thead>
      <tbody>
        {levels.map(({ level, limit, limitLabel }) => {
          const isChosen = level === chosenLevel;
          return (
            <tr key={level} className={`border-rule border-b ${isChosen ? 'bg-act-soft' : ''}`}>
              <th scope="row" className="py-1 pr-4 text-left font-semibold">
                {formatLevel(level)}
              </th>
              <td>
                <IntervalMark
                  limit={limit}
                  max={max}
                  width={width}
                  height={26}
                  label={`upper limit ${limitLabel}`}
                />
              </td>
              <td className={`pl-4 text-right ${isChosen ? 'limit' : ''}`}>{limitLabel}</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
