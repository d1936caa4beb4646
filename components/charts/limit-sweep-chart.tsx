'use client';

import { useState } from 'react';
import { formatLimit, formatPlain, type RateQuantity, rateUnit } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { spokenLimit } from './limit-bands';
import type { FieldAxis } from './limit-field-chart';
import type { Box } from './map-contours';
import { linePath } from './paths';
import { frameWithin, scaleLinear, scaleLog } from './scales';
import { textWidth } from './text-width';
import { linearTicks, logTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface LimitSweepChartProps {
  /** The parameter that is moved. */
  x: FieldAxis;
  /** With the detections inside the population at each value, and with none. */
  limit: number[];
  limitZero: number[];
  detections: number[];
  exposure: number[];
  isSetByPrior: boolean[];
  /** Where companions lie along the parameter: there the number of detections changes at once. */
  entries?: number[];
  /** The run's own value and limit. */
  here?: { x: number; limit: number };
  quantity: RateQuantity;
  levelLabel: string;
  height?: number;
}

const margin: Box = { left: 48, right: 16, top: 44, bottom: 48 };
/** Limits over more than this span are read on a logarithmic axis. */
const LOG_SPAN = 15;

/** The limit as a function of one choice, with detections and without, and where the run stands. */
export function LimitSweepChart(props: LimitSweepChartProps) {
  const { x: axis, limit, limitZero, detections, exposure, isSetByPrior, here, quantity } = props;
  const [measure, width] = useWidth<HTMLDivElement>(900);
  const [at, setAt] = useState<ReadPlace>();
  const height = props.height ?? (width < 520 ? 320 : 400);
  const frame = frameWithin(margin, width, height);
  const ends = [axis.at[0], axis.at[axis.at.length - 1]];
  const x = (axis.isLog ? scaleLog : scaleLinear)(ends, [frame.left, frame.right]);
  const all = [...limit, ...limitZero];
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const isLog = high / low > LOG_SPAN;
  const y = isLog
    ? scaleLog([low * 0.9, high * 1.1], [frame.bottom, frame.top])
    : scaleLinear([0, high * 1.08], [frame.bottom, frame.top]);
  const stepAt = stepPlaces(axis.at, detections, props.entries ?? []);
  const curve = steppedCurve(axis.at, limit, stepAt);
  const hasDetections = detections.some((count) => count > 0);
  const yTicks = isLog
    ? logTicks(90 * low, 110 * high, frame.bottom - frame.top)
    : linearTicks(0, 108 * high, frame.bottom - frame.top, 46).filter((tick) => tick.isMajor);
  const say = ({ column }: ReadPlace) => [
    `${formatLimit(limit[column], quantity)} (${props.levelLabel})`,
    `at ${axis.say(axis.at[column])}`,
    countWords(detections[column]),
    ...(detections[column] > 0 ? [`${formatLimit(limitZero[column], quantity)} with none`] : []),
    `${formatPlain(exposure[column], 3)} stars’ worth of sensitivity`,
    ...(isSetByPrior[column] ? ['set by the prior'] : []),
  ];

  return (
    <ChartFigure
      name="limit-against-cutoff"
      label={sweepSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [sweepTable(props)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={axis.at.map(x)}
          rows={[frame.top + 70]}
          at={at}
          onAt={setAt}
          label={`Read the limit along ${axis.plainName}`}
          say={say}
        />
      }
    >
      <LeftAxis
        ticks={withRateUnit(yTicks, quantity)}
        scale={(percentage) => y(percentage / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <text className="quiet" x={0} y={14}>
        upper limit ({props.levelLabel}), {rateUnit(quantity)}
      </text>
      <Counts
        detections={detections}
        edge={(index) => {
          const place = stepAt.get(index - 1);
          return place === undefined ? (x(axis.at[index]) + x(axis.at[index - 1])) / 2 : x(place);
        }}
        frame={frame}
      />
      {hasDetections && (
        <path className="alternative-line" d={linePath(axis.at, limitZero, x, y)} />
      )}
      {stretches(isSetByPrior).map(([from, to]) => (
        <g key={from}>
          <rect
            className="prior-stretch"
            x={x(axis.at[from])}
            y={frame.top}
            width={Math.max(2, x(axis.at[to]) - x(axis.at[from]))}
            height={frame.bottom - frame.top}
          />
          <text
            className="quiet page-halo"
            x={stretchName(x(axis.at[from]), x(axis.at[to])).x}
            y={frame.top + 16}
            textAnchor={stretchName(x(axis.at[from]), x(axis.at[to])).anchor}
          >
            set by the prior
          </text>
        </g>
      ))}
      <path className="sweep-line" d={linePath(curve.at, curve.values, x, y)} />
      {hasDetections && <ZeroName data={props} frame={frame} x={x} y={y} />}
      {here && here.x >= ends[0] && here.x <= ends[1] && (
        <Here
          x={x(here.x)}
          y={y(here.limit)}
          curve={curve.at.map((value, index) => ({ x: x(value), y: y(curve.values[index]) }))}
          frame={frame}
          words={`this run: ${formatLimit(here.limit, quantity)}`}
        />
      )}
      {at && (
        <g data-screen-only="">
          <line
            className="range-line"
            x1={x(axis.at[at.column])}
            x2={x(axis.at[at.column])}
            y1={frame.top}
            y2={frame.bottom}
          />
          <circle
            className="step-dot"
            cx={x(axis.at[at.column])}
            cy={y(limit[at.column])}
            r="4.5"
          />
        </g>
      )}
      <BottomAxis
        ticks={
          axis.isLog
            ? logTicks(ends[0], ends[1], frame.right - frame.left)
            : linearTicks(ends[0], ends[1], frame.right - frame.left)
        }
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={axis.name}
      />
    </ChartFigure>
  );
}

type Scale = (value: number) => number;

/** Where the number of detections inside changes, along the top. */
function Counts({
  detections,
  edge,
  frame,
}: {
  detections: number[];
  /** Where the value of this index begins to hold. */
  edge(index: number): number;
  frame: Box;
}) {
  const runs = stepsOf(detections);
  if (runs.length === 1 && runs[0].count === 0) return null;
  return runs.map(({ from, to, count }, index) => {
    const start = index === 0 ? frame.left : edge(from);
    const end = index === runs.length - 1 ? frame.right : edge(to + 1);
    const words = end - start > 96 ? countWords(count) : String(count);
    return (
      <g key={from}>
        {index > 0 && (
          <line className="tick" x1={start} x2={start} y1={frame.top - 18} y2={frame.top} />
        )}
        {end - start > textWidth(words, 13) + 8 && (
          <text className="quiet" x={start + 5} y={frame.top - 6}>
            {words}
          </text>
        )}
      </g>
    );
  });
}

function countWords(count: number): string {
  if (count === 0) return 'no detection';
  return count === 1 ? '1 detection' : `${formatPlain(count, 3)} detections`;
}

export function stepsOf(counts: number[]): { from: number; to: number; count: number }[] {
  const steps: { from: number; to: number; count: number }[] = [];
  counts.forEach((count, index) => {
    const last = steps.at(-1);
    if (last?.count === count) last.to = index;
    else steps.push({ from: index, to: index, count });
  });
  return steps;
}

/**
 * Where a companion enters or leaves between two values: after the index of the first. Without one
 * such place, as with two companions between the same values, nothing is known of it.
 */
export function stepPlaces(
  at: number[],
  detections: number[],
  entries: number[],
): Map<number, number> {
  const places = new Map<number, number>();
  for (let index = 0; index < at.length - 1; index += 1) {
    if (detections[index] === detections[index + 1]) continue;
    const inside = entries.filter((entry) => entry >= at[index] && entry <= at[index + 1]);
    if (inside.length === 1) places.set(index, inside[0]);
  }
  return places;
}

/** The curve through its values, with a jump at each step. */
export function steppedCurve(at: number[], values: number[], stepAt: Map<number, number>) {
  const points = at.flatMap((value, index) => {
    const place = stepAt.get(index);
    const own = [value, values[index]];
    return place === undefined ? [own] : [own, [place, values[index]], [place, values[index + 1]]];
  });
  return { at: points.map(([value]) => value), values: points.map(([, value]) => value) };
}

/** First and last index of each run of true. */
function stretches(flags: boolean[]): [number, number][] {
  return stepsOf(flags.map(Number))
    .filter(({ count }) => count === 1)
    .map(({ from, to }) => [from, to]);
}

/** Inside a stretch that is wide enough, else beside it on the left. */
function stretchName(from: number, to: number) {
  const isWide = to - from > textWidth('set by the prior', 13) + 10;
  return isWide || from < 130
    ? { x: from + 5, anchor: 'start' as const }
    : { x: from - 5, anchor: 'end' as const };
}

/** The dashed curve carries its name where it lies furthest below the other. */
function ZeroName({
  data,
  frame,
  x,
  y,
}: {
  data: LimitSweepChartProps;
  frame: Box;
  x: Scale;
  y: Scale;
}) {
  const { x: axis, limit, limitZero } = data;
  const words = 'with no detection';
  let best = 0;
  limit.forEach((one, index) => {
    const isInside = x(axis.at[index]) < frame.right - textWidth(words, 13) - 10;
    if (isInside && y(limitZero[index]) - y(one) > y(limitZero[best]) - y(limit[best]))
      best = index;
  });
  return (
    <text
      className="page-halo"
      x={x(axis.at[best]) + 6}
      y={Math.min(y(limitZero[best]) + 20, frame.bottom - 8)}
    >
      {words}
    </text>
  );
}

interface HereProps {
  x: number;
  y: number;
  /** Points of the curve, px. */
  curve: { x: number; y: number }[];
  frame: Box;
  words: string;
}

/** The run on the curve; its words stand above what of the curve passes there, else below. */
function Here({ x, y, curve, frame, words }: HereProps) {
  const width = textWidth(words, 13) + 24;
  const hangsLeft = x + width > frame.right;
  const [from, to] = hangsLeft ? [x - width, x] : [x, x + width];
  const passing = [y, ...curve.filter((one) => one.x >= from && one.x <= to).map((one) => one.y)];
  const above = Math.min(...passing) - 12;
  const below = Math.min(Math.max(...passing) + 22, frame.bottom - 6);
  return (
    <g>
      <line className="stem" x1={x} x2={x} y1={y} y2={frame.bottom} />
      <circle className="knob" cx={x} cy={y} r="6" />
      <text
        className="bound-text page-halo"
        x={hangsLeft ? x - 11 : x + 11}
        y={above >= frame.top + 14 ? above : below}
        textAnchor={hangsLeft ? 'end' : 'start'}
      >
        {words}
      </text>
    </g>
  );
}

function sweepSentence(props: LimitSweepChartProps): string {
  const { x: axis, limit, quantity, levelLabel, here } = props;
  const last = axis.at.length - 1;
  const best = limit.indexOf(Math.min(...limit));
  const parts = [
    `Upper limit, level ${levelLabel}, along ${axis.plainName}: ${spokenLimit(limit[0], quantity)} at ${axis.say(axis.at[0])}, ${spokenLimit(limit[last], quantity)} at ${axis.say(axis.at[last])}`,
    `strongest ${spokenLimit(limit[best], quantity)} at ${axis.say(axis.at[best])}`,
    here ? `this run: ${spokenLimit(here.limit, quantity)} at ${axis.say(here.x)}` : '',
  ];
  return parts.filter(Boolean).join('; ');
}

function sweepTable(props: LimitSweepChartProps): ChartTable {
  const { x: axis, quantity } = props;
  return {
    caption: `Upper limit (${props.levelLabel}) along ${axis.plainName}, ${rateUnit(quantity)}`,
    columns: [axis.plainName, 'limit', 'with no detection', 'detections', 'stars’ worth', 'prior'],
    rows: axis.at.map((value, index) => [
      axis.say(value),
      formatLimit(props.limit[index], quantity),
      formatLimit(props.limitZero[index], quantity),
      formatPlain(props.detections[index], 3),
      formatPlain(props.exposure[index], 4),
      props.isSetByPrior[index] ? 'sets it' : '',
    ]),
  };
}
