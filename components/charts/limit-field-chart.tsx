'use client';

import { type ReactNode, useMemo, useState } from 'react';
import { formatLimit, formatPlain, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { DetectionMarks, type MapDetection } from './detection-marks';
import { spokenLimit } from './limit-bands';
import { LimitField } from './limit-field';
import type { Box } from './map-contours';
import { frameWithin, scaleLinear, scaleLog } from './scales';
import { linearTicks, logTicks } from './ticks';
import { useWidth } from './use-width';

export interface FieldAxis {
  /** Nodes, increasing. */
  at: number[];
  isLog: boolean;
  /** On the drawing: "semi-major axis, AU". */
  name: ReactNode;
  /** The same in plain words, for tables. */
  plainName: string;
  /** A place along it: "45 AU". */
  say(value: number): string;
}

export interface LimitFieldChartProps {
  x: FieldAxis;
  y: FieldAxis;
  /** Shape [y, x]; null where nothing can be said. */
  limit: (number | null)[][];
  isSetByPrior?: boolean[][];
  quantity: RateQuantity;
  /** "95 %". */
  levelLabel: string;
  /** "Limit for companions at each place", for the sentence. */
  subject: string;
  /** More about a node, line by line. */
  sayMore?(row: number, column: number): string[];
  detections?: MapDetection[];
  /** The run's own place, marked and named. */
  here?: { x: number; y: number; name: string };
  height?: number;
}

const margin: Box = { left: 46, right: 16, top: 30, bottom: 48 };
const noDetections: MapDetection[] = [];

/** A limit over two axes: bands and contours of it, read at each node by pointer or keys. */
export function LimitFieldChart(props: LimitFieldChartProps) {
  const { x: xAxis, y: yAxis, limit, isSetByPrior, quantity, here, sayMore } = props;
  const { detections = noDetections } = props;
  const [measure, width] = useWidth<HTMLDivElement>(900);
  const [at, setAt] = useState<ReadPlace>();
  const height = props.height ?? (width < 520 ? 340 : 470);
  const plot = useMemo(() => {
    const frame = frameWithin(margin, width, height);
    const x = axisScale(xAxis, frame.left, frame.right);
    const y = axisScale(yAxis, frame.bottom, frame.top);
    return { frame, x, y, columnsPx: xAxis.at.map(x), rowsPx: yAxis.at.map(y) };
  }, [xAxis, yAxis, width, height]);
  const values = useMemo(
    () => Float64Array.from(limit.flat(), (one) => one ?? Number.NaN),
    [limit],
  );
  const hatched = useMemo(
    () => (isSetByPrior ? Uint8Array.from(isSetByPrior.flat(), Number) : undefined),
    [isSetByPrior],
  );
  const { frame, x, y, columnsPx, rowsPx } = plot;
  const marks = useMemo(() => {
    const around = (px: number, py: number, reach: number): Box => ({
      left: px - reach,
      right: px + reach,
      top: py - 12,
      bottom: py + 12,
    });
    return [
      ...detections.map((one) => around(x(one.semiMajorAxisAu), y(one.massMjup), 12)),
      ...(here ? [around(x(here.x), y(here.y), 90)] : []),
    ];
  }, [x, y, detections, here]);
  const say = ({ column, row }: ReadPlace) => {
    const one = limit[row][column];
    return [
      one === null
        ? 'no limit: nothing here can be seen'
        : `${formatLimit(one, quantity)} (${props.levelLabel})`,
      `${yAxis.say(yAxis.at[row])}, ${xAxis.say(xAxis.at[column])}`,
      ...(isSetByPrior?.[row][column] ? ['set by the prior'] : []),
      ...(sayMore?.(row, column) ?? []),
    ];
  };

  return (
    <ChartFigure
      name="limit-map"
      label={fieldSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => fieldTables(props)}
      overlay={
        <ChartReadout
          frame={frame}
          columns={columnsPx}
          rows={rowsPx}
          at={at}
          onAt={setAt}
          label={`Read the limit at a place: ${yAxis.plainName} and ${xAxis.plainName}`}
          say={say}
        />
      }
    >
      <LimitField
        limit={values}
        isSetByPrior={hatched}
        columnsPx={columnsPx}
        rowsPx={rowsPx}
        frame={frame}
        quantity={quantity}
        taken={marks}
      />
      <DetectionMarks
        detections={detections}
        frame={{ ...frame, x, y, invertX: x.invert, invertY: y.invert }}
        taken={marks}
      />
      {here && <Here x={x(here.x)} y={y(here.y)} name={here.name} frame={frame} />}
      {at &&
        ['cursor-edge', 'cursor-ring'].map((ring) => (
          <circle
            key={ring}
            data-screen-only=""
            className={ring}
            cx={columnsPx[at.column]}
            cy={rowsPx[at.row]}
            r="6"
          />
        ))}
      <BottomAxis
        ticks={axisTicks(xAxis, frame.right - frame.left)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={xAxis.name}
      />
      <LeftAxis
        ticks={axisTicks(yAxis, frame.bottom - frame.top)}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
      />
      <text className="quiet" x={0} y={14}>
        {yAxis.name}
      </text>
    </ChartFigure>
  );
}

function axisScale({ at, isLog }: FieldAxis, from: number, to: number) {
  const ends = [at[0], at[at.length - 1]];
  return isLog ? scaleLog(ends, [from, to]) : scaleLinear(ends, [from, to]);
}

function axisTicks({ at, isLog }: FieldAxis, length: number) {
  const [low, high] = [at[0], at[at.length - 1]];
  return isLog ? logTicks(low, high, length) : linearTicks(low, high, length, 56);
}

/** The run's own place, with its limit. */
function Here({ x, y, name, frame }: { x: number; y: number; name: string; frame: Box }) {
  const hangsLeft = x > frame.right - 170;
  const row = y < frame.top + 40 ? y + 24 : y - 12;
  return (
    <g>
      <circle className="knob" cx={x} cy={y} r="6" />
      <text
        className="bold page-halo"
        x={hangsLeft ? x - 10 : x + 10}
        y={row}
        textAnchor={hangsLeft ? 'end' : 'start'}
      >
        {name}
      </text>
    </g>
  );
}

function fieldSentence(props: LimitFieldChartProps): string {
  const { x, y, limit, isSetByPrior, quantity, levelLabel, subject, detections = [] } = props;
  let best: { value: number; row: number; column: number } | undefined;
  limit.forEach((cells, row) => {
    cells.forEach((value, column) => {
      if (value !== null && (!best || value < best.value)) best = { value, row, column };
    });
  });
  const share =
    isSetByPrior && isSetByPrior.flat().filter(Boolean).length / (x.at.length * y.at.length);
  const parts = [
    best
      ? `${subject}, level ${levelLabel}: strongest ${spokenLimit(best.value, quantity)} at ${y.say(y.at[best.row])} and ${x.say(x.at[best.column])}`
      : `${subject}: no limit anywhere`,
    share ? `set by the prior at ${formatPlain(100 * share, 2)} per cent of the places` : '',
    detections.length > 0 ? `detections: ${detections.map(({ name }) => name).join(', ')}` : '',
  ];
  return parts.filter(Boolean).join('; ');
}

const readNodes = 8;

/** The limit at 8 by 8 of its nodes, which is what can be read; files carry all of them. */
export function fieldTables(props: LimitFieldChartProps): ChartTable[] {
  const { x, y, limit, isSetByPrior, quantity, levelLabel } = props;
  const pick = (length: number) => {
    const count = Math.min(readNodes, length);
    return [
      ...new Set(
        Array.from({ length: count }, (_, i) => Math.round((i * (length - 1)) / (count - 1))),
      ),
    ];
  };
  const columns = pick(x.at.length);
  const hasPrior = isSetByPrior?.some((row) => row.some(Boolean));
  return [
    {
      caption: `Upper limit (${levelLabel}); rows: ${y.plainName}, columns: ${x.plainName}${hasPrior ? '; p: set by the prior' : ''}`,
      columns: [y.plainName, ...columns.map((column) => x.say(x.at[column]))],
      rows: pick(y.at.length)
        .reverse()
        .map((row) => [
          y.say(y.at[row]),
          ...columns.map((column) => {
            const one = limit[row][column];
            if (one === null) return '–';
            return `${formatLimit(one, quantity).replace(' per 100 stars', '')}${isSetByPrior?.[row][column] ? ' p' : ''}`;
          }),
        ]),
    },
  ];
}
