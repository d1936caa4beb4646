'use client';

import { type ReactNode, useMemo, useState } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { type JointPlane, jointAreas } from './joint-contours';
import type { Box } from './map-contours';
import { areaPath, linePath } from './paths';
import { type Scale, scaleLinear } from './scales';
import { linearTicks } from './ticks';
import { useWidth } from './use-width';

export interface CornerParameter {
  key: string;
  /** On the drawing, with its unit or convention. */
  name: ReactNode;
  plainName: string;
  /** Density along the parameter, as it is quoted. */
  value: number[];
  density: number[];
  median: number;
  interval68: [number, number];
  interval95: [number, number];
  /** The value that the run held fixed. */
  fixed?: number;
  say(value: number): string;
}

export interface CornerChartProps {
  /** Three parameters; the last row and column belong to the last of them. */
  parameters: [CornerParameter, CornerParameter, CornerParameter];
  /** Densities below the diagonal: second over first, third over first, third over second. */
  planes: [JointPlane, JointPlane, JointPlane];
  /** Limits of the third parameter: free, and with the others held fixed. */
  limit: { free: number; fixed: number; words: string };
  height?: number;
}

interface Cell extends Box {
  row: number;
  column: number;
}

const SIDES = 3;
const foot = 44;
const head = 26;
const between = { columns: 24, rows: 32 };
const NARROW = 140;

/** Marginals on the diagonal, joint densities with their 68 and 95 per cent areas below it. */
export function CornerChart(props: CornerChartProps) {
  const { parameters, planes, limit } = props;
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const height = props.height ?? Math.min(760, Math.max(400, Math.round(width * 0.82)));
  const cells = useMemo(() => cornerCells(width, height), [width, height]);
  const drawn = useMemo(() => {
    const scaleOf = (index: number, from: number, to: number) => {
      const { value } = parameters[index];
      return scaleLinear([value[0], value[value.length - 1]], [from, to]);
    };
    return cells.map((cell) => {
      const x = scaleOf(cell.column, cell.left, cell.right);
      const y = scaleOf(cell.row, cell.bottom, cell.top);
      const areas =
        cell.row === cell.column ? [] : jointAreas(planes[cell.row + cell.column - 1], x, y);
      return { cell, x, y, areas };
    });
  }, [cells, parameters, planes]);

  return (
    <ChartFigure
      name="corner"
      label={cornerSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => cornerTables(props)}
      overlay={drawn
        .filter(({ cell }) => cell.row === cell.column)
        .map(({ cell, x }) => (
          <MarginalReadout key={cell.row} cell={cell} x={x} parameter={parameters[cell.row]} />
        ))}
    >
      {drawn.map(({ cell, x, y, areas }) =>
        cell.row === cell.column ? (
          <Marginal
            key={`${cell.row}${cell.column}`}
            cell={cell}
            x={x}
            parameter={parameters[cell.row]}
            limit={cell.row === SIDES - 1 ? limit : undefined}
          />
        ) : (
          <g key={`${cell.row}${cell.column}`}>
            {areas.map((area) => (
              <path
                key={area.share}
                className={area.share === 0.95 ? 'joint-outer' : 'joint-inner'}
                d={area.path}
                fillRule="evenodd"
              />
            ))}
            <FixedLines cell={cell} x={x} y={y} parameters={parameters} />
            <line className="axis" x1={cell.left} x2={cell.left} y1={cell.top} y2={cell.bottom} />
            {cell.column === 0 && <RowAxis cell={cell} y={y} parameter={parameters[cell.row]} />}
          </g>
        ),
      )}
      {drawn.map(({ cell, x }) => (
        <BottomAxis
          key={`${cell.row}${cell.column}`}
          ticks={cellTicks(parameters[cell.column], cell, cell.row === SIDES - 1)}
          scale={x}
          y={cell.bottom}
          x0={cell.left}
          x1={cell.right}
          name={cell.row === SIDES - 1 ? parameters[cell.column].name : undefined}
        />
      ))}
    </ChartFigure>
  );
}

/** Cells on and below the diagonal, all of one size. */
export function cornerCells(width: number, height: number): Cell[] {
  const left = 46;
  const size = {
    width: (width - left - 14 - (SIDES - 1) * between.columns) / SIDES,
    height: (height - head - foot - (SIDES - 1) * between.rows) / SIDES,
  };
  return Array.from({ length: SIDES }, (_, row) =>
    Array.from({ length: row + 1 }, (_, column): Cell => {
      const x = left + column * (size.width + between.columns);
      const y = head + row * (size.height + between.rows);
      return { row, column, left: x, right: x + size.width, top: y, bottom: y + size.height };
    }),
  ).flat();
}

function cellTicks({ value }: CornerParameter, cell: Cell, isLabelled: boolean) {
  const ticks = linearTicks(
    value[0],
    value[value.length - 1],
    cell.right - cell.left,
    cell.right - cell.left < NARROW ? 34 : 48,
  );
  return isLabelled ? ticks : ticks.map((tick) => ({ ...tick, label: undefined }));
}

function RowAxis({ cell, y, parameter }: { cell: Cell; y: Scale; parameter: CornerParameter }) {
  const { value } = parameter;
  return (
    <g>
      {linearTicks(value[0], value[value.length - 1], cell.bottom - cell.top, 34).map((tick) => (
        <g key={tick.value}>
          <line
            className="tick"
            x1={cell.left - (tick.isMajor ? 7 : 4)}
            x2={cell.left}
            y1={y(tick.value)}
            y2={y(tick.value)}
          />
          {tick.label !== undefined && (
            <text x={cell.left - 10} y={y(tick.value) + 4} textAnchor="end">
              {tick.label}
            </text>
          )}
        </g>
      ))}
      <text className="quiet page-halo" x={0} y={cell.top - 9}>
        {parameter.name}
      </text>
    </g>
  );
}

function Marginal({
  cell,
  x,
  parameter,
  limit,
}: {
  cell: Cell;
  x: Scale;
  parameter: CornerParameter;
  limit?: CornerChartProps['limit'];
}) {
  const { value, density, interval68, median, fixed } = parameter;
  const y = scaleLinear([0, Math.max(...density) * 1.08], [cell.bottom, cell.top + 18]);
  return (
    <g>
      <path className="posterior-fill" d={areaPath(value, density, x, y, cell.bottom)} />
      <path
        className="posterior-core"
        d={areaPath(value, density, x, y, cell.bottom, ...interval68)}
      />
      <path className="posterior-line" d={linePath(value, density, x, y)} />
      <line
        className="median-line"
        x1={x(median)}
        x2={x(median)}
        y1={cell.top + 22}
        y2={cell.bottom}
      />
      {fixed !== undefined && isInside(value, fixed) && (
        <line
          className="alternative-limit"
          x1={x(fixed)}
          x2={x(fixed)}
          y1={cell.top + 22}
          y2={cell.bottom}
        />
      )}
      {limit && isInside(value, limit.fixed) && (
        <line
          className="saved-limit"
          x1={x(limit.fixed)}
          x2={x(limit.fixed)}
          y1={cell.top + 22}
          y2={cell.bottom}
        />
      )}
      {limit && isInside(value, limit.free) && (
        <rect
          className="bar"
          x={x(limit.free) - 1.5}
          y={cell.top + 22}
          width="3"
          height={cell.bottom - cell.top - 22}
        />
      )}
      {!(limit && cell.right - cell.left < NARROW) && (
        <text className="bold page-halo" x={cell.left} y={cell.top + 12}>
          {parameter.say(median)}
        </text>
      )}
      {limit && (
        <text className="bound-text page-halo" x={cell.right} y={cell.top + 12} textAnchor="end">
          {limit.words}
        </text>
      )}
    </g>
  );
}

/** The run's own values, which the question lets go. */
function FixedLines({
  cell,
  x,
  y,
  parameters,
}: {
  cell: Cell;
  x: Scale;
  y: Scale;
  parameters: CornerChartProps['parameters'];
}) {
  const [across, up] = [parameters[cell.column], parameters[cell.row]];
  return (
    <g>
      {across.fixed !== undefined && isInside(across.value, across.fixed) && (
        <line
          className="alternative-limit"
          x1={x(across.fixed)}
          x2={x(across.fixed)}
          y1={cell.top}
          y2={cell.bottom}
        />
      )}
      {up.fixed !== undefined && isInside(up.value, up.fixed) && (
        <line
          className="alternative-limit"
          x1={cell.left}
          x2={cell.right}
          y1={y(up.fixed)}
          y2={y(up.fixed)}
        />
      )}
    </g>
  );
}

function isInside(value: number[], at: number): boolean {
  return at >= value[0] && at <= value[value.length - 1];
}

function MarginalReadout({
  cell,
  x,
  parameter,
}: {
  cell: Cell;
  x: Scale;
  parameter: CornerParameter;
}) {
  const [at, setAt] = useState<ReadPlace>();
  const { value, density } = parameter;
  return (
    <ChartReadout
      frame={cell}
      columns={value.map(x)}
      rows={[cell.top + 40]}
      at={at}
      onAt={setAt}
      label={`Read the posterior of the ${parameter.plainName}`}
      say={({ column }) => [
        parameter.say(value[column]),
        `density ${formatPlain(density[column], 3)}`,
      ]}
    />
  );
}

function cornerSentence({ parameters, limit }: CornerChartProps): string {
  const each = parameters.map(
    (one) =>
      `${one.plainName} median ${one.say(one.median)}, 68 per cent from ${one.say(one.interval68[0])} to ${one.say(one.interval68[1])}`,
  );
  return `Posterior with free indices, limit ${limit.words}: ${each.join('; ')}`;
}

function cornerTables({ parameters }: CornerChartProps): ChartTable[] {
  return [
    {
      caption: 'Marginal posteriors',
      columns: ['parameter', 'median', '68 % from', '68 % to', '95 % from', '95 % to'],
      rows: parameters.map((one) => [
        one.plainName,
        ...[one.median, ...one.interval68, ...one.interval95].map((value) => one.say(value)),
      ]),
    },
    ...parameters.map((one) => ({
      caption: `Density of the ${one.plainName}`,
      columns: [one.plainName, 'density'],
      rows: one.value
        .map((value, index) => [one.say(value), formatPlain(one.density[index], 3)])
        .filter((_, index) => index % 3 === 0),
    })),
  ];
}
