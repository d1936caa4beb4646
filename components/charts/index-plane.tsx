'use client';

import { contours } from 'd3';
import { useMemo, useState } from 'react';
import { formatLimit, formatPlain, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { tableOfField } from './data-table';
import { type Box, boxesMeet } from './map-contours';
import { CursorRing } from './reading-marks';
import { frameWithin, scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks } from './ticks';
import { useWidth } from './use-width';

export interface IndexPlaneProps {
  /** Index of the mass law at the rows, increasing. */
  massIndex: Float64Array;
  /** Index of the semi-major-axis law at the columns, increasing. */
  semiMajorAxisIndex: Float64Array;
  /** Upper limit, shape [massIndex, semiMajorAxisIndex], row-major. */
  limit: Float64Array;
  /** The indices in question, and the limit there. */
  here: { massIndex: number; semiMajorAxisIndex: number; limit: number };
  /** Half axes of their 1 σ ellipse, where the indices have a prior. */
  spread?: { massIndex: number; semiMajorAxisIndex: number };
  quantity: RateQuantity;
  /** "95 %": the level of the limits, for the sentence. */
  levelLabel: string;
  height?: number;
}

const margin = { left: 46, right: 20, top: 10, bottom: 46 };

/** The limit over the plane of both indices, as contours with their value on the line. */
export function IndexPlane(props: IndexPlaneProps) {
  const { massIndex, semiMajorAxisIndex, limit, here, spread, quantity, levelLabel } = props;
  const { height = 230 } = props;
  const [measure, width] = useWidth<HTMLDivElement>(440);
  const [at, setAt] = useState<ReadPlace>();
  const frame = frameWithin(margin, width, height);
  const ends = (values: Float64Array): [number, number] => [values[0], values[values.length - 1]];
  const x = scaleLinear(ends(semiMajorAxisIndex), [frame.left, frame.right]);
  const y = scaleLinear(ends(massIndex), [frame.bottom, frame.top]);
  const lines = useMemo(
    () => limitLines(limit, semiMajorAxisIndex.length, massIndex.length, Math.floor(height / 26)),
    [limit, semiMajorAxisIndex, massIndex, height],
  );
  const px = (i: number) =>
    frame.left + ((i - 0.5) / (semiMajorAxisIndex.length - 1)) * (frame.right - frame.left);
  const py = (j: number) =>
    frame.bottom - ((j - 0.5) / (massIndex.length - 1)) * (frame.bottom - frame.top);
  const [hereX, hereY] = [x(here.semiMajorAxisIndex), y(here.massIndex)];
  const hereWords = `here: ${formatLimit(here.limit, quantity)}`;
  const hereWidth = 12 + 1.1 * textWidth(hereWords, 13);
  const hangsLeft = hereX + hereWidth > frame.right;
  const taken: Box[] = [
    {
      left: hereX - (hangsLeft ? hereWidth : 10),
      right: hereX + (hangsLeft ? 10 : hereWidth),
      top: hereY - 26,
      bottom: hereY + 10,
    },
    { left: frame.left, right: frame.left + 90, top: frame.top, bottom: frame.top + 24 },
  ];
  const numbers = lines.flatMap(({ level, runs }) => {
    const longest = runs.reduce<[number, number][]>((a, b) => (b.length > a.length ? b : a), []);
    for (const share of [0.28, 0.5, 0.72, 0.15, 0.85]) {
      const point = longest[Math.floor(longest.length * share)];
      if (longest.length < 7) break;
      const [at, row] = [px(point[0]), py(point[1])];
      const box = { left: at - 26, right: at + 26, top: row - 9, bottom: row + 9 };
      const isInside =
        box.left > frame.left && box.right < frame.right && box.bottom < frame.bottom;
      if (!isInside || taken.some((other) => boxesMeet(box, other))) continue;
      taken.push(box);
      return [{ level, x: at, y: row }];
    }
    return [];
  });

  return (
    <ChartFigure
      name="limit-over-indices"
      label={`Upper limit (${levelLabel}) over both indices: ${formatLimit(here.limit, quantity)} at mass index ${formatPlain(here.massIndex)} and semi-major-axis index ${formatPlain(here.semiMajorAxisIndex)}; from ${formatLimit(Math.min(...limit), quantity)} to ${formatLimit(Math.max(...limit), quantity)} over the plane`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [planeTable(props)]}
      data={() => [
        tableOfField(
          'limit-over-indices',
          ['mass_index', massIndex],
          ['semi_major_axis_index', semiMajorAxisIndex],
          ['limit', limit],
        ),
      ]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={semiMajorAxisIndex.map(x)}
          rows={massIndex.map(y)}
          at={at}
          onAt={setAt}
          label="Read the limit over both indices"
          say={({ column, row }) => [
            `${formatLimit(limit[row * semiMajorAxisIndex.length + column], quantity)} (${levelLabel})`,
            `mass index ${formatPlain(massIndex[row], 3)}, axis index ${formatPlain(semiMajorAxisIndex[column], 3)}`,
          ]}
        />
      }
    >
      {lines.map(({ level, runs }) => (
        <path
          key={level}
          className="level-line"
          d={runs
            .map(
              (run) =>
                `M${run.map(([i, j]) => `${px(i).toFixed(1)},${py(j).toFixed(1)}`).join('L')}`,
            )
            .join('')}
        />
      ))}
      {numbers.map(({ level, x: at, y: row }) => (
        <text key={level} className="page-halo" x={at} y={row + 4} textAnchor="middle">
          {formatLimit(level, quantity).replace(' per 100 stars', '')}
        </text>
      ))}
      {spread && (
        <ellipse
          className="level-ellipse"
          cx={hereX}
          cy={hereY}
          rx={Math.abs(x(here.semiMajorAxisIndex + spread.semiMajorAxisIndex) - hereX)}
          ry={Math.abs(y(here.massIndex + spread.massIndex) - hereY)}
        />
      )}
      {at && <CursorRing x={x(semiMajorAxisIndex[at.column])} y={y(massIndex[at.row])} />}
      <circle className="knob" cx={hereX} cy={hereY} r="6" />
      <text
        className="bound-text page-halo"
        x={hereX + (hangsLeft ? -12 : 12)}
        y={hereY - 10}
        textAnchor={hangsLeft ? 'end' : 'start'}
      >
        {hereWords}
      </text>
      <BottomAxis
        ticks={linearTicks(...ends(semiMajorAxisIndex), frame.right - frame.left)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={
          <>
            semi-major-axis index <tspan fontStyle="italic">β</tspan>
          </>
        }
      />
      <LeftAxis
        ticks={linearTicks(...ends(massIndex), frame.bottom - frame.top, 36)}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        nameClassName="quiet page-halo"
        name={
          <>
            mass index <tspan fontStyle="italic">α</tspan>
          </>
        }
      />
    </ChartFigure>
  );
}

/** Contours at round limits, cut where they would follow the edge of the plane. */
function limitLines(limit: Float64Array, columns: number, rows: number, wanted: number) {
  const [low, high] = [Math.min(...limit), Math.max(...limit)];
  if (!(high > low)) return [];
  const levels = linearTicks(100 * low, 100 * high, wanted * 64)
    .filter((tick) => tick.isMajor)
    .map((tick) => tick.value / 100)
    .filter((level) => level > low && level < high);
  return contours()
    .size([columns, rows])
    .thresholds(levels)(limit as unknown as number[])
    .map((shape) => ({
      level: shape.value,
      runs: shape.coordinates.flat().flatMap((ring) => {
        const isEdge = ([i, j]: number[]) => i <= 0 || i >= columns || j <= 0 || j >= rows;
        const runs: [number, number][][] = [[]];
        for (const point of ring) {
          if (isEdge(point)) runs.push([]);
          else runs[runs.length - 1].push([point[0], point[1]]);
        }
        return runs.filter((run) => run.length > 1);
      }),
    }));
}

function planeTable({ massIndex, semiMajorAxisIndex, limit, quantity }: IndexPlaneProps) {
  const pick = (length: number) => [
    ...new Set(Array.from({ length: 6 }, (_, index) => Math.round((index * (length - 1)) / 5))),
  ];
  const columns = pick(semiMajorAxisIndex.length);
  return {
    caption: 'Upper limit; rows: mass index, columns: semi-major-axis index',
    columns: ['mass index', ...columns.map((index) => formatPlain(semiMajorAxisIndex[index], 3))],
    rows: pick(massIndex.length).map((row) => [
      formatPlain(massIndex[row], 3),
      ...columns.map((column) =>
        formatLimit(limit[row * semiMajorAxisIndex.length + column], quantity),
      ),
    ]),
  };
}
