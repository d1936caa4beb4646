'use client';

import { useId, useMemo, useState } from 'react';
import { formatPlain, formatRange } from '@/lib/quantities/display';
import { ChartFigure, type ChartTable } from './chart-figure';
import { PointReadout } from './chart-readout';
import { tableOfColumns } from './data-table';
import type { Box, MapData } from './map-contours';
import { MapAxes, type MapFrame, mapFrame } from './map-frame';
import { MapBands } from './map-layers';
import { areaPath } from './paths';
import { type MapRange, mapEnds, RangeHandles } from './range-box';
import { CursorRing } from './reading-marks';
import { scaleLinear } from './scales';
import { useWidth } from './use-width';

/** Planets drawn from a population, with what the surveys would see of them. */
export interface DrawnCompanions {
  massMjup: Float64Array;
  semiMajorAxisAu: Float64Array;
  /** 1 where it would be seen, shape [companion]. */
  isSeen: Uint8Array;
}

/** Density along one axis: of all planets, and of those that would be seen. */
export interface MarginCurve {
  at: Float64Array;
  all: Float64Array;
  seen: Float64Array;
}

export interface CompanionScatterProps {
  map: MapData;
  /** "mean completeness of 287 stars". */
  subject: string;
  companions: DrawnCompanions;
  range: MapRange;
  onRangeChange?(range: MapRange, isSettled: boolean): void;
  massMargin?: MarginCurve;
  semiMajorAxisMargin?: MarginCurve;
  height?: number;
}

/** Drawn planets over the mean map: filled ones would be seen; their margins above and beside it. */
export function CompanionScatter(props: CompanionScatterProps) {
  const { map, subject, companions, range, onRangeChange, massMargin, semiMajorAxisMargin } = props;
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const [at, setAt] = useState<number>();
  const clipId = useId();
  const isNarrow = width < 560;
  const total = props.height ?? (isNarrow ? 380 : 500);
  const margin = useMemo<Box>(
    () => ({
      left: 46,
      right: isNarrow || !massMargin ? 16 : 128,
      top: semiMajorAxisMargin ? (isNarrow ? 62 : 84) : 8,
      bottom: 46,
    }),
    [isNarrow, massMargin, semiMajorAxisMargin],
  );
  const frame = useMemo(() => mapFrame(map, width, total, margin), [map, width, total, margin]);
  const { massMjup, semiMajorAxisAu, isSeen } = companions;
  const seen = isSeen.reduce((sum, value) => sum + value, 0);
  const points = useMemo(
    () => Array.from(massMjup, (mass, i) => ({ x: frame.x(semiMajorAxisAu[i]), y: frame.y(mass) })),
    [massMjup, semiMajorAxisAu, frame],
  );
  const box = {
    left: frame.x(range.semiMajorAxisMinAu),
    right: frame.x(range.semiMajorAxisMaxAu),
    top: frame.y(range.massMaxMjup),
    bottom: frame.y(range.massMinMjup),
  };

  return (
    <ChartFigure
      name="drawn-planets"
      label={`${massMjup.length} planets drawn from the population over ${subject}: ${seen} would be seen, ${massMjup.length - seen} missed; range ${formatRange(range.massMinMjup, range.massMaxMjup, 'Jupiter masses')} at ${formatRange(range.semiMajorAxisMinAu, range.semiMajorAxisMaxAu, 'AU')}`}
      width={width}
      height={total}
      measure={measure}
      tables={() => companionTables(companions, seen)}
      data={() => [
        tableOfColumns('drawn-planets', {
          mass_mjup: massMjup,
          semi_major_axis_au: semiMajorAxisAu,
          would_be_seen: isSeen,
        }),
      ]}
      overlay={
        <>
          <PointReadout
            frame={frame}
            points={points}
            at={at}
            onAt={setAt}
            label="Read the drawn planets one by one"
            say={(index) => [
              isSeen[index] ? 'would be seen' : 'would be missed',
              `${formatPlain(massMjup[index], 2)} MJ at ${formatPlain(semiMajorAxisAu[index], 2)} AU`,
            ]}
          />
          {onRangeChange && (
            <RangeHandles
              frame={frame}
              width={width}
              height={total}
              range={range}
              bounds={mapEnds(map)}
              onChange={onRangeChange}
            />
          )}
        </>
      }
    >
      <clipPath id={clipId}>
        <rect
          x={frame.left}
          y={frame.top}
          width={frame.right - frame.left}
          height={frame.bottom - frame.top}
        />
      </clipPath>
      <g clipPath={`url(#${clipId})`} opacity="0.62">
        <MapBands map={map} width={width} height={total} margin={margin} />
      </g>
      <rect
        className="range-box"
        x={box.left}
        y={box.top}
        width={box.right - box.left}
        height={box.bottom - box.top}
      />
      {Array.from(massMjup, (mass, index) => ({
        id: index,
        x: frame.x(semiMajorAxisAu[index]),
        y: frame.y(mass),
        className: isSeen[index] ? 'planet-seen' : 'planet-missed',
        r: isSeen[index] ? 4.2 : 3.6,
      })).map(({ id, x, y, className, r }) => (
        <circle key={id} className={className} cx={x} cy={y} r={r} />
      ))}
      {at !== undefined && points[at] && <CursorRing {...points[at]} />}
      <MapAxes map={map} frame={frame} />
      {semiMajorAxisMargin && (
        <TopMargin curve={semiMajorAxisMargin} frame={frame} hasNames={!isNarrow} />
      )}
      {massMargin && !isNarrow && <SideMargin curve={massMargin} frame={frame} />}
    </ChartFigure>
  );
}

function TopMargin({
  curve,
  frame,
  hasNames,
}: {
  curve: MarginCurve;
  frame: MapFrame;
  hasNames: boolean;
}) {
  const base = frame.top - 8;
  const y = scaleLinear([0, Math.max(1e-12, ...curve.all)], [base, 8]);
  const end = frame.x(curve.at[curve.at.length - 1]) + 10;
  const fits = hasNames && end < frame.right - 60;
  return (
    <g>
      <path className="margin-all" d={areaPath(curve.at, curve.all, frame.x, y, base)} />
      <path className="margin-seen" d={areaPath(curve.at, curve.seen, frame.x, y, base)} />
      {fits && (
        <>
          <text x={end} y={28}>
            all planets of the population
          </text>
          <text className="bold" x={end} y={base - 4}>
            those the surveys would see
          </text>
        </>
      )}
    </g>
  );
}

/** The same lying on its side: density runs to the right, mass upwards. */
function SideMargin({ curve, frame }: { curve: MarginCurve; frame: MapFrame }) {
  const base = frame.right + 8;
  const x = scaleLinear([0, Math.max(1e-12, ...curve.all)], [base, base + 104]);
  const path = (values: Float64Array) => {
    const points = Array.from(curve.at, (mass, index) => `${x(values[index])},${frame.y(mass)}`);
    const [first, last] = [frame.y(curve.at[0]), frame.y(curve.at[curve.at.length - 1])];
    return `M${base},${first}L${points.join('L')}L${base},${last}Z`;
  };
  return (
    <g>
      <path className="margin-all" d={path(curve.all)} />
      <path className="margin-seen" d={path(curve.seen)} />
    </g>
  );
}

function companionTables(companions: DrawnCompanions, seen: number): ChartTable[] {
  const edges = [0, 1, 3, 10, 30, Number.POSITIVE_INFINITY];
  const rows = edges.slice(0, -1).map((low, index) => {
    const high = edges[index + 1];
    const inside = Array.from(companions.massMjup.keys()).filter(
      (it) => companions.massMjup[it] >= low && companions.massMjup[it] < high,
    );
    const name = high === Number.POSITIVE_INFINITY ? `${low} and more` : `${low} to ${high}`;
    return [
      name,
      String(inside.length),
      String(inside.filter((it) => companions.isSeen[it]).length),
    ];
  });
  const all = companions.massMjup.length;
  return [
    {
      caption: 'Drawn planets by mass',
      columns: ['mass, Jupiter masses', 'drawn', 'seen'],
      rows: [...rows, ['all', String(all), String(seen)]],
    },
  ];
}
