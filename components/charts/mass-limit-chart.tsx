'use client';

import { useMemo, useState } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { massLimits } from '@/lib/sensitivity/mass-limits';
import { BottomAxis, JupiterMassText, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { mapMargin } from './completeness-map-chart';
import { tableOfColumns } from './data-table';
import type { Box, MapData } from './map-contours';
import { linePath } from './paths';
import { CursorMarks } from './reading-marks';
import { scaleLog } from './scales';
import { logTicks } from './ticks';
import { useWidth } from './use-width';

export interface MassLimitChartProps {
  map: MapData;
  /** Whose map it is: "NTY 2037-08", "mean of 78 stars". */
  subject: string;
  height?: number;
}

const shares = [0.5, 0.9] as const;
const classOf = { 0.5: 'median-curve', 0.9: 'chosen-curve' } as const;

/** The smallest mass that is seen half of the time, and nine times in ten, along the axis. */
export function MassLimitChart({ map, subject, height = 230 }: MassLimitChartProps) {
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const [at, setAt] = useState<ReadPlace>();
  const { massMjup, semiMajorAxisAu: au } = map;
  const limits = useMemo(
    () => shares.map((share) => massLimits(massMjup, au.length, map.completeness, share)),
    [map, massMjup, au],
  );
  const frame = {
    left: mapMargin.left,
    right: width - mapMargin.right,
    top: 24,
    bottom: height - mapMargin.bottom,
  };
  const [firstAu, lastAu] = [au[0], au[au.length - 1]];
  const [low, high] = [massMjup[0], massMjup[massMjup.length - 1]];
  const x = scaleLog([firstAu, lastAu], [frame.left, frame.right]);
  const y = scaleLog([low, high], [frame.bottom, frame.top]);
  return (
    <ChartFigure
      name="mass-limits"
      label={massSentence(map, subject, limits)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [massTable(map, subject, limits)]}
      data={() => [
        tableOfColumns('mass-limits', {
          semi_major_axis_au: au,
          mass_seen_50_percent_mjup: limits[0],
          mass_seen_90_percent_mjup: limits[1],
        }),
      ]}
      caption="a line ends where even the heaviest planet of the map is seen less often"
      overlay={
        <ChartReadout
          frame={frame}
          columns={au.map(x)}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label={`Read the detectable mass of ${subject} along the semi-major axis`}
          say={({ column }) => [
            `${formatPlain(au[column], 3)} AU`,
            ...shares.map((share, i) => `${100 * share}\u2009%: ${massWords(limits[i][column])}`),
          ]}
        />
      }
    >
      <text className="quiet" x={0} y={12}>
        detectable planet mass, <JupiterMassText />
      </text>
      <LeftAxis
        ticks={logTicks(low, high, frame.bottom - frame.top)}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
      />
      {shares.map((share, index) => (
        <path key={share} className={classOf[share]} d={linePath(au, limits[index], x, y)} />
      ))}
      {shares.map((share, index) => {
        const place = namePlace(limits[index], au, { x, y }, frame, share === 0.5);
        return (
          place && (
            <text
              key={share}
              className="bold page-halo"
              x={place.x}
              y={place.y}
              textAnchor={place.anchor}
            >
              seen {100 * share}
              {'\u2009'}% of the time
            </text>
          )
        );
      })}
      {at && (
        <CursorMarks
          x={x(au[at.column])}
          top={frame.top}
          bottom={frame.bottom}
          ys={limits.map((one) => y(one[at.column]))}
        />
      )}
      <BottomAxis
        ticks={logTicks(firstAu, lastAu, frame.right - frame.left)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="semi-major axis, AU"
      />
    </ChartFigure>
  );
}

/** Place of the smallest mass; undefined where none is seen often enough. */
function lowest(limits: Float64Array): number | undefined {
  let best: number | undefined;
  for (let index = 0; index < limits.length; index += 1) {
    if (Number.isFinite(limits[index]) && !(best !== undefined && limits[best] <= limits[index])) {
      best = index;
    }
  }
  return best;
}

/** Half the width of a name [px]. */
const NAME_HALF = 62;

/** The lower line is named under its best place, above it where the axis is near; the upper one beside its beginning, where nothing else is. */
function namePlace(
  limits: Float64Array,
  au: Float64Array,
  { x, y }: { x(au: number): number; y(mass: number): number },
  { left, right, bottom }: Box,
  isLower: boolean,
) {
  const best = lowest(limits);
  if (best === undefined) return undefined;
  if (isLower) {
    const lowestY = y(limits[best]);
    return {
      x: Math.min(right - NAME_HALF, Math.max(left + NAME_HALF, x(au[best]))),
      y: lowestY + 22 < bottom ? lowestY + 18 : lowestY - 8,
      anchor: 'middle',
    } as const;
  }
  const start = limits.findIndex(Number.isFinite);
  const at = { x: x(au[start]), y: y(limits[start]) };
  return at.x + 150 < right
    ? ({ x: at.x + 9, y: at.y + 6, anchor: 'start' } as const)
    : ({ x: right, y: at.y - 8, anchor: 'end' } as const);
}

const massWords = (mass: number) =>
  Number.isFinite(mass) ? `${formatPlain(mass, 2)} MJ and more` : 'no mass of the map';

function massSentence({ semiMajorAxisAu: au }: MapData, subject: string, limits: Float64Array[]) {
  const parts = shares.map((share, index) => {
    const best = lowest(limits[index]);
    return best === undefined
      ? `no mass is seen ${100 * share} per cent of the time`
      : `${100 * share} per cent from ${formatPlain(limits[index][best], 2)} Jupiter masses at ${formatPlain(au[best], 2)} AU, its best place`;
  });
  return `Detectable mass of ${subject} against semi-major axis: ${parts.join('; ')}`;
}

function massTable(map: MapData, subject: string, limits: Float64Array[]): ChartTable {
  const { semiMajorAxisAu: au } = map;
  const picked = [
    ...new Set(Array.from({ length: 12 }, (_, i) => Math.round((i * (au.length - 1)) / 11))),
  ];
  return {
    caption: `Detectable mass of ${subject}, Jupiter masses`,
    columns: ['semi-major axis, AU', ...shares.map((share) => `seen ${100 * share}\u2009%`)],
    rows: picked.map((column) => [
      formatPlain(au[column], 3),
      ...limits.map((one) => (Number.isFinite(one[column]) ? formatPlain(one[column], 3) : '–')),
    ]),
  };
}
