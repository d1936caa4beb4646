'use client';

import { memo, useState } from 'react';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { mapMargin } from './completeness-map-chart';
import { tableOfColumns } from './data-table';
import { bandPath, linePath } from './paths';
import { CursorMarks } from './reading-marks';
import { scaleLinear, scaleLog } from './scales';
import { seriesColour, seriesTextColour } from './series';
import { textWidth } from './text-width';
import { linearTicks, logTicks } from './ticks';
import { useWidth } from './use-width';

export interface DepthSeries {
  name: string;
  /** Place of the survey in the collaboration, from 0: its colour everywhere. */
  seriesIndex: number;
  /** Stars' worth of sensitivity, shape [semiMajorAxis]. */
  depth: Float64Array;
}

export interface DepthChartProps {
  semiMajorAxisAu: Float64Array;
  series: DepthSeries[];
  /** Dashed lines that run on into the map below. */
  range?: { semiMajorAxisMinAu: number; semiMajorAxisMaxAu: number };
  height?: number;
  /** Above a map the axis carries no numbers of its own. */
  hasAxisNumbers?: boolean;
}

/** Depth of search: areas of the surveys on each other, the largest at the bottom, named inside. */
export const DepthChart = memo(function DepthChart(props: DepthChartProps) {
  const { semiMajorAxisAu, series, range, height = 150, hasAxisNumbers = false } = props;
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const [at, setAt] = useState<ReadPlace>();
  const total = (of: DepthSeries) => of.depth.reduce((sum, value) => sum + value, 0);
  const ordered = [...series].sort((a, b) => total(b) - total(a));
  const layers = stackUp(ordered);
  const top = layers.at(-1)?.upper ?? new Float64Array(semiMajorAxisAu.length);
  const peak = Math.max(1e-9, ...top);

  const frame = {
    left: mapMargin.left,
    right: width - mapMargin.right,
    top: 24,
    bottom: height - (hasAxisNumbers ? 46 : 1),
  };
  const last = semiMajorAxisAu[semiMajorAxisAu.length - 1];
  const x = scaleLog([semiMajorAxisAu[0], last], [frame.left, frame.right]);
  const y = scaleLinear([0, peak * 1.05], [frame.bottom, frame.top]);
  const bestAt = top.indexOf(peak);
  const names = placeNames(layers, semiMajorAxisAu.map(x), y, frame.right);

  return (
    <ChartFigure
      name="depth-of-search"
      label={`Depth of search by survey against semi-major axis: ${formatSignificant(peak, 3)} stars at ${formatPlain(semiMajorAxisAu[Math.max(0, bestAt)], 2)} AU, where it is deepest; ${ordered.map(({ name }) => name).join(', ')}`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [depthTable(semiMajorAxisAu, ordered)]}
      data={() => [depthColumns(semiMajorAxisAu, ordered, top)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={semiMajorAxisAu.map(x)}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label="Read the depth of search along the semi-major axis"
          say={({ column }) => [
            `${formatSignificant(top[column], 3)} stars at ${formatPlain(semiMajorAxisAu[column], 3)} AU`,
            ...ordered.map(({ name, depth }) => `${name} ${formatSignificant(depth[column], 3)}`),
          ]}
        />
      }
    >
      <LeftAxis
        ticks={linearTicks(0, peak, frame.bottom - frame.top, 40).filter(({ value }) => value > 0)}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      {layers.map(({ of, lower, upper }) => (
        <g key={of.name}>
          <path
            d={bandPath(semiMajorAxisAu, lower, upper, x, y)}
            style={{ fill: seriesColour(of.seriesIndex), fillOpacity: 0.96 }}
          />
          <path className="stack-edge" d={linePath(semiMajorAxisAu, upper, x, y)} />
        </g>
      ))}
      {range &&
        [range.semiMajorAxisMinAu, range.semiMajorAxisMaxAu].map((end) => (
          <line
            key={end}
            className="range-line"
            x1={x(end)}
            x2={x(end)}
            y1={12}
            y2={frame.bottom}
          />
        ))}
      {names.map((place) => (
        <LayerName key={place.layer.of.name} place={place} />
      ))}
      {at && (
        <CursorMarks
          x={x(semiMajorAxisAu[at.column])}
          top={frame.top}
          bottom={frame.bottom}
          ys={[y(top[at.column])]}
        />
      )}
      <BottomAxis
        ticks={hasAxisNumbers ? logTicks(semiMajorAxisAu[0], last, frame.right - frame.left) : []}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name={hasAxisNumbers ? 'semi-major axis, AU' : undefined}
      />
      <text className="quiet" x={frame.left + 6} y={14}>
        depth of search, stars
      </text>
    </ChartFigure>
  );
});

interface Layer {
  of: DepthSeries;
  lower: Float64Array;
  upper: Float64Array;
}

function stackUp(ordered: DepthSeries[]): Layer[] {
  let lower = new Float64Array(ordered[0]?.depth.length ?? 0);
  return ordered.map((of) => {
    const upper = lower.map((value, index) => value + of.depth[index]);
    const layer = { of, lower, upper };
    lower = upper;
    return layer;
  });
}

interface NamePlace {
  layer: Layer;
  x: number;
  y: number;
  /** Place of the words at the end of a leader, for an area too thin for its name. */
  leader?: { x: number; y: number };
}

/** A name stands inside where its area is thick enough over the whole word, else at a leader. */
function placeNames(
  layers: Layer[],
  x: Float64Array,
  y: (depth: number) => number,
  right: number,
): NamePlace[] {
  const top = layers.at(-1)?.upper;
  const places = layers.map((layer): NamePlace & { fits: boolean } => {
    const { of, lower, upper } = layer;
    const half = textWidth(of.name, 13) / 2 + 2;
    const thickest = of.depth.indexOf(Math.max(...of.depth));
    const middle = (at: number) => (y(lower[at]) + y(upper[at])) / 2;
    const isClear = x.every(
      (px, at) =>
        Math.abs(px - x[thickest]) > half ||
        (y(lower[at]) > middle(thickest) + 6 && y(upper[at]) < middle(thickest) - 6),
    );
    const fits = isClear && y(lower[thickest]) - y(upper[thickest]) >= 17;
    const at = fits ? thickest : Math.min(x.length - 1, thickest + Math.ceil(x.length / 16));
    return { layer, x: x[at], y: middle(at), fits };
  });
  // Leaders that start further right end lower, so that none crosses another.
  const led = places.filter(({ fits }) => !fits).sort((a, b) => a.x - b.x);
  led.forEach((place, index) => {
    const row = 24 + 17 * index;
    const clear = lastWhere(x, (at) => top !== undefined && y(top[at]) < row + 8) ?? place.x;
    const wide = textWidth(place.layer.of.name, 13);
    place.leader = { x: Math.min(Math.max(clear, place.x) + 30, right - wide), y: row };
  });
  return places;
}

function lastWhere(values: Float64Array, holds: (index: number) => boolean) {
  for (let index = values.length - 1; index >= 0; index -= 1) {
    if (holds(index)) return values[index];
  }
  return undefined;
}

function LayerName({ place }: { place: NamePlace }) {
  const { of } = place.layer;
  if (place.leader === undefined) {
    return (
      <text
        className="stack-name"
        style={{ fill: seriesTextColour(of.seriesIndex) }}
        x={place.x}
        y={place.y + 4}
        textAnchor="middle"
      >
        {of.name}
      </text>
    );
  }
  return (
    <g>
      <path
        className="leader"
        d={`M${place.x},${place.y}L${place.leader.x - 3},${place.leader.y - 4}`}
      />
      <text className="page-halo" x={place.leader.x} y={place.leader.y}>
        {of.name}
      </text>
    </g>
  );
}

const depthColumns = (au: Float64Array, ordered: DepthSeries[], sum: Float64Array) =>
  tableOfColumns('depth-of-search', {
    semi_major_axis_au: au,
    ...Object.fromEntries(ordered.map(({ name, depth }) => [`${name}, stars`, depth])),
    sum_stars: sum,
  });

function depthTable(au: Float64Array, ordered: DepthSeries[]): ChartTable {
  const picked = Array.from({ length: 12 }, (_, index) =>
    Math.round((index * (au.length - 1)) / 11),
  );
  return {
    caption: 'Depth of search, stars',
    columns: ['semi-major axis, AU', ...ordered.map(({ name }) => name), 'sum'],
    rows: [...new Set(picked)].map((index) => [
      formatPlain(au[index], 3),
      ...ordered.map(({ depth }) => formatSignificant(depth[index], 3)),
      formatSignificant(
        ordered.reduce((sum, { depth }) => sum + depth[index], 0),
        3,
      ),
    ]),
  };
}
