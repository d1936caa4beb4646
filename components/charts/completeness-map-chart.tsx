'use client';

import { memo, useId, useMemo, useState } from 'react';
import { formatPercent, formatPlain, formatRange } from '@/lib/quantities/display';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { tableOfField } from './data-table';
import { DetectionMarks, type MapDetection, placeNames } from './detection-marks';
import type { Box, MapData } from './map-contours';
import { MapAxes, mapFrame } from './map-frame';
import { ContourNumbers, contourLabels, contoursOf, MapBands } from './map-layers';
import { type MapRange, mapEnds, RangeHandles } from './range-box';
import { CursorRing } from './reading-marks';
import { useWidth } from './use-width';

export interface CompletenessMapChartProps {
  map: MapData;
  /** What the map is of: "mean detection probability, 287 stars". */
  subject: string;
  range?: MapRange;
  /** Given, the box has handles. `isSettled` is false while one is being dragged. */
  onRangeChange?(range: MapRange, isSettled: boolean): void;
  detections?: MapDetection[];
  height?: number;
}

const none: MapDetection[] = [];

/** Left and right edges that a chart above the map shares with it. */
export const mapMargin: Box = { left: 46, right: 16, top: 8, bottom: 46 };

/** Probability of detection in bands of 5 %, with contours, the range in question and detections. */
export const CompletenessMapChart = memo(function CompletenessMapChart(
  props: CompletenessMapChartProps,
) {
  const { map, subject, range, onRangeChange, detections = none, height } = props;
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const [at, setAt] = useState<ReadPlace>();
  const clipId = useId();
  const total = height ?? (width < 520 ? 300 : 350);
  const frame = useMemo(() => mapFrame(map, width, total, mapMargin), [map, width, total]);
  const places = useMemo(
    () => ({ columns: map.semiMajorAxisAu.map(frame.x), rows: map.massMjup.map(frame.y) }),
    [map, frame],
  );
  const box = range ? rangePx(range, frame) : undefined;
  const isMovable = onRangeChange !== undefined;
  const handles = box && isMovable ? handleBoxes(box) : [];
  const contours = useMemo(() => contoursOf(map, frame), [map, frame]);
  const numbers = useMemo(() => {
    const dots = detections.map(({ semiMajorAxisAu, massMjup }) =>
      around(frame.x(semiMajorAxisAu), frame.y(massMjup), 9),
    );
    const inside = range && rangePx(range, frame);
    // A number has the whole of its contour to move along, a name only the places around its dot.
    const names = placeNames(
      detections,
      frame,
      inside && isMovable ? handleBoxes(inside) : [],
      inside,
    );
    return contourLabels(contours, inside ?? frame, [...dots, ...names.map((place) => place.box)]);
  }, [contours, frame, range, detections, isMovable]);
  const sentence = useMemo(
    () => mapSentence(map, subject, range, detections),
    [map, subject, range, detections],
  );

  return (
    <ChartFigure
      name="completeness-map"
      label={sentence}
      width={width}
      height={total}
      measure={measure}
      tables={() => mapTables(map, subject, detections)}
      data={() => [mapColumns(map)]}
      overlay={
        <>
          <ChartReadout
            frame={frame}
            columns={places.columns}
            rows={places.rows}
            at={at}
            onAt={setAt}
            label={`Read the ${subject}`}
            say={(place) => sayNode(map, place)}
          />
          {range && onRangeChange && (
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
      <g clipPath={`url(#${clipId})`}>
        <MapBands map={map} width={width} height={total} margin={mapMargin} />
        {box && (
          <>
            <path
              className="veil"
              fillRule="evenodd"
              d={`M${frame.left},${frame.top}H${frame.right}V${frame.bottom}H${frame.left}ZM${box.left},${box.top}V${box.bottom}H${box.right}V${box.top}Z`}
            />
            {['range-edge', 'range-box'].map((edge) => (
              <rect
                key={edge}
                className={edge}
                x={box.left}
                y={box.top}
                width={box.right - box.left}
                height={box.bottom - box.top}
              />
            ))}
          </>
        )}
      </g>
      <ContourNumbers places={numbers} />
      <DetectionMarks detections={detections} frame={frame} taken={handles} range={box} />
      {at && <CursorRing x={places.columns[at.column]} y={places.rows[at.row]} />}
      <MapAxes map={map} frame={frame} />
    </ChartFigure>
  );
});

function around(x: number, y: number, reach: number): Box {
  return { left: x - reach, right: x + reach, top: y - reach, bottom: y + reach };
}

function handleBoxes(box: Box): Box[] {
  const [x, y] = [(box.left + box.right) / 2, (box.top + box.bottom) / 2];
  return [
    around(box.left, y, 12),
    around(box.right, y, 12),
    around(x, box.top, 12),
    around(x, box.bottom, 12),
  ];
}

function rangePx(range: MapRange, frame: ReturnType<typeof mapFrame>): Box {
  return {
    left: frame.x(range.semiMajorAxisMinAu),
    right: frame.x(range.semiMajorAxisMaxAu),
    top: frame.y(range.massMaxMjup),
    bottom: frame.y(range.massMinMjup),
  };
}

function mapSentence(
  map: MapData,
  subject: string,
  range: MapRange | undefined,
  detections: MapDetection[],
): string {
  let best = 0;
  for (let index = 1; index < map.completeness.length; index += 1) {
    if (map.completeness[index] > map.completeness[best]) best = index;
  }
  const columns = map.semiMajorAxisAu.length;
  const mass = map.massMjup[Math.floor(best / columns)];
  const axis = map.semiMajorAxisAu[best % columns];
  const parts = [
    `Map of ${subject} over semi-major axis and planet mass: highest ${formatPercent(map.completeness[best])} at ${formatPlain(mass, 2)} Jupiter masses and ${formatPlain(axis, 2)} AU`,
    range &&
      `range ${formatRange(range.massMinMjup, range.massMaxMjup, 'Jupiter masses')} at ${formatRange(range.semiMajorAxisMinAu, range.semiMajorAxisMaxAu, 'AU')}`,
    ...byStanding(detections).map(
      ({ caption, marks }) => `${caption}: ${marks.map(({ name }) => name).join(', ')}`,
    ),
  ];
  return parts.filter(Boolean).join('; ');
}

/** Those that count, and those that do not; none of a kind without a mark. */
function byStanding(detections: MapDetection[]) {
  return [
    { caption: 'detections', marks: detections.filter(({ isAside }) => !isAside) },
    { caption: 'companions that do not count', marks: detections.filter(({ isAside }) => isAside) },
  ].filter(({ marks }) => marks.length > 0);
}

function sayNode(map: MapData, { column, row }: ReadPlace): string[] {
  const value = map.completeness[row * map.semiMajorAxisAu.length + column];
  return [
    `${formatPercent(value)} detected`,
    `${formatPlain(map.massMjup[row], 3)} MJ, ${formatPlain(map.semiMajorAxisAu[column], 3)} AU`,
  ];
}

const mapColumns = (map: MapData) =>
  tableOfField(
    'completeness',
    ['mass_mjup', map.massMjup],
    ['semi_major_axis_au', map.semiMajorAxisAu],
    ['completeness', map.completeness],
  );

const readMasses = 8;
const readAxes = 8;

/** The map at 8 by 8 of its nodes, which is what can be read; exports carry all of them. */
export function mapTables(map: MapData, subject: string, detections: MapDetection[]): ChartTable[] {
  const pick = (values: Float64Array, count: number) =>
    Array.from({ length: Math.min(count, values.length) }, (_, index) =>
      Math.round((index * (values.length - 1)) / (Math.min(count, values.length) - 1)),
    );
  const columns = pick(map.semiMajorAxisAu, readAxes);
  const rows = pick(map.massMjup, readMasses).reverse();
  const tables: ChartTable[] = [
    {
      caption: `${subject}, per cent; rows: planet mass, columns: semi-major axis`,
      columns: [
        'mass, Jupiter masses',
        ...columns.map((index) => `${formatPlain(map.semiMajorAxisAu[index], 3)} AU`),
      ],
      rows: rows.map((row) => [
        formatPlain(map.massMjup[row], 3),
        ...columns.map((column) =>
          (100 * map.completeness[row * map.semiMajorAxisAu.length + column]).toFixed(1),
        ),
      ]),
    },
  ];
  for (const { caption, marks } of byStanding(detections)) {
    tables.push({
      caption,
      columns: ['name', 'mass, Jupiter masses', 'semi-major axis, AU'],
      rows: marks.map((it) => [
        it.name,
        withError(it.massMjup, it.massErrorMjup),
        withError(it.semiMajorAxisAu, it.semiMajorAxisErrorAu),
      ]),
    });
  }
  return tables;
}

function withError(value: number, error: number | undefined): string {
  return error === undefined ? formatPlain(value) : `${formatPlain(value)} ± ${formatPlain(error)}`;
}
