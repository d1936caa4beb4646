'use client';

import { useState } from 'react';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import { BottomAxis, JupiterMassText, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { PointReadout } from './chart-readout';
import type { DataTable } from './data-table';
import { linePath } from './paths';
import { scaleLinear, scaleLog } from './scales';
import { linearTicks, logTicks } from './ticks';
import { useWidth } from './use-width';

export interface Track {
  massMjup: number;
  /** Magnitude, or a difference of magnitudes, shape [age]; NaN where there is none. */
  values: Float64Array;
}

export interface TrackChartProps {
  /** What is drawn: "absolute magnitude in H". */
  subject: string;
  /** Increasing [Myr]. */
  ageMyr: Float64Array;
  tracks: Track[];
  /** Magnitudes grow downwards; differences grow upwards, with a line at zero. */
  isDifference?: boolean;
  height?: number;
}

const margin = { left: 46, right: 62, top: 26, bottom: 46 };

/** One line a mass against age, named where the lines are apart. */
export function TrackChart(props: TrackChartProps) {
  const { subject, ageMyr, tracks, isDifference = false, height = 340 } = props;
  const [measure, width] = useWidth<HTMLDivElement>(620);
  const [at, setAt] = useState<number>();
  const [left, right] = [margin.left, width - margin.right];
  const bottom = height - margin.bottom;
  const all = tracks.flatMap(({ values }) => [...values].filter(Number.isFinite));
  const ends: [number, number] = isDifference
    ? [Math.min(-0.1, ...all), Math.max(0.1, ...all)]
    : [Math.min(...all), Math.max(...all)];
  const [first, last] = [ageMyr[0], ageMyr[ageMyr.length - 1]];
  const x = scaleLog([first, last], [left, right]);
  // A name on the outermost line must not lie on the axis.
  const room = isDifference ? 0.06 * (ends[1] - ends[0]) : 0;
  const drawn: [number, number] = [ends[0] - room, ends[1] + room];
  const y = scaleLinear(drawn, isDifference ? [bottom, margin.top] : [margin.top, bottom]);
  const points = tracks.flatMap(({ massMjup, values }) =>
    [...values].flatMap((value, i) =>
      Number.isFinite(value)
        ? [{ massMjup, age: ageMyr[i], value, x: x(ageMyr[i]), y: y(value) }]
        : [],
    ),
  );
  const names = placeNames(tracks, ageMyr, x, y);
  return (
    <ChartFigure
      name="cooling-tracks"
      label={trackSentence(props, ends)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [trackTable(props)]}
      data={() => [trackColumns(props)]}
      overlay={
        <PointReadout
          frame={{ left, right, top: margin.top, bottom }}
          points={points}
          at={at}
          onAt={setAt}
          label={`Read ${subject} by mass and age`}
          say={(index) => [
            `${points[index].value.toFixed(2)} mag`,
            `${formatPlain(points[index].massMjup)} MJ at ${formatPlain(points[index].age, 3)} Myr`,
          ]}
        />
      }
    >
      <text className="quiet" x={0} y={12}>
        {subject}
      </text>
      <LeftAxis
        ticks={linearTicks(...drawn, bottom - margin.top, 40).filter(({ isMajor }) => isMajor)}
        scale={y}
        x={left}
        y0={bottom}
        y1={margin.top}
        gridTo={right}
        hasLine={false}
      />
      {isDifference && (
        <line className="alternative-line" x1={left} x2={right} y1={y(0)} y2={y(0)} />
      )}
      {tracks.map(({ massMjup, values }) => (
        <path
          key={massMjup}
          d={linePath(ageMyr, values, x, y)}
          fill="none"
          stroke="var(--data)"
          strokeWidth={1.4}
        />
      ))}
      {at !== undefined && points[at] && (
        <circle
          data-screen-only=""
          className="cursor-dot"
          cx={points[at].x}
          cy={points[at].y}
          r="4"
        />
      )}
      {names.map((name, index) => (
        <text key={name.massMjup} className="page-halo" {...besideOrOn(name, left)} y={name.y + 4}>
          {formatPlain(name.massMjup)}
          {index === 0 && (
            <>
              {THIN_SPACE}
              <JupiterMassText />
            </>
          )}
        </text>
      ))}
      <BottomAxis
        ticks={logTicks(first, last, right - left)}
        scale={x}
        y={bottom}
        x0={left}
        x1={right}
        name="age, Myr"
      />
    </ChartFigure>
  );
}

interface TrackName {
  massMjup: number;
  x: number;
  y: number;
  /** At the end of its line it stands beside it, else on it. */
  isOnLine: boolean;
}

const NAME_APART = 14;

/**
 * Names at the ends of the lines; where most of those would lie on each other, at the age where the
 * most names have room. One that would still lie on another is left out.
 */
export function placeNames(
  tracks: Track[],
  ageMyr: Float64Array,
  x: (age: number) => number,
  y: (value: number) => number,
): TrackName[] {
  const at = ({ massMjup, values }: Track, index: number, isOnLine: boolean) => ({
    ...{ massMjup, isOnLine },
    x: x(ageMyr[index]),
    y: y(values[index]),
  });
  const ends = apart(
    tracks.flatMap((track) => {
      let end = track.values.length - 1;
      while (end >= 0 && !Number.isFinite(track.values[end])) end--;
      return end < 0 ? [] : [at(track, end, false)];
    }),
  );
  if (2 * ends.length >= tracks.length) return ends;
  const columns = [...ageMyr.keys()].map((index) =>
    apart(
      tracks
        .filter(({ values }) => Number.isFinite(values[index]))
        .map((track) => at(track, index, true)),
    ),
  );
  return columns.reduce((best, names) => (hasMoreRoom(names, best) ? names : best), ends);
}

/** A name on its line would reach over the axis at the first age: there it stands beside. */
const besideOrOn = ({ x, isOnLine }: TrackName, left: number) =>
  isOnLine && x > left + 24
    ? ({ x, textAnchor: 'middle' } as const)
    : ({ x: x + 5, textAnchor: 'start' } as const);

/** From the top down, those that do not lie on one before. */
function apart(names: TrackName[]): TrackName[] {
  const placed: TrackName[] = [];
  for (const name of [...names].sort((a, b) => a.y - b.y)) {
    if (placed.every((other) => Math.hypot(other.x - name.x, other.y - name.y) > NAME_APART)) {
      placed.push(name);
    }
  }
  return placed;
}

const heightOf = (names: TrackName[]) => (names.at(-1)?.y ?? 0) - (names[0]?.y ?? 0);

const hasMoreRoom = (names: TrackName[], than: TrackName[]) =>
  names.length > than.length || (names.length === than.length && heightOf(names) > heightOf(than));

function trackSentence({ subject, ageMyr, tracks }: TrackChartProps, ends: [number, number]) {
  const ages = `${formatPlain(ageMyr[0])} to ${formatPlain(ageMyr[ageMyr.length - 1])} Myr`;
  return `${subject} against age, ${ages}, for ${tracks.length} masses from ${formatPlain(tracks[0]?.massMjup ?? 0)} to ${formatPlain(tracks.at(-1)?.massMjup ?? 0)} Jupiter masses: from ${ends[0].toFixed(1)} to ${ends[1].toFixed(1)} mag`;
}

function trackColumns({ ageMyr, tracks }: TrackChartProps): DataTable {
  return {
    name: 'tracks',
    columns: ['mass_mjup', 'age_myr', 'mag'],
    rows: tracks.flatMap(({ massMjup, values }) =>
      Array.from(ageMyr, (age, i) => [massMjup, age, values[i]]),
    ),
  };
}

function trackTable({ subject, ageMyr, tracks }: TrackChartProps): ChartTable {
  const cell = (value: number) => (Number.isFinite(value) ? value.toFixed(2) : '–');
  return {
    caption: subject,
    columns: ['age, Myr', ...tracks.map(({ massMjup }) => `${formatPlain(massMjup)} MJ`)],
    rows: [...ageMyr].map((age, i) => [
      formatPlain(age, 3),
      ...tracks.map(({ values }) => cell(values[i])),
    ]),
  };
}
