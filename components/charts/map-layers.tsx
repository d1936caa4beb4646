'use client';

import { memo, useMemo } from 'react';
import { BottomAxis, JupiterMassText, LeftAxis } from './axes';
import { type Box, isobands, isolines, labelPoint, type MapData } from './map-contours';
import { scaleLog } from './scales';
import { logTicks } from './ticks';

export interface MapFrame extends Box {
  x(semiMajorAxisAu: number): number;
  y(massMjup: number): number;
  invertX(px: number): number;
  invertY(px: number): number;
}

/** Frame of a drawing over semi-major axis and mass, both logarithmic, mass upwards. */
export function mapFrame(map: MapData, width: number, height: number, margin: Box): MapFrame {
  const box = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: height - margin.bottom,
  };
  const ends = (values: Float64Array): [number, number] => [values[0], values[values.length - 1]];
  const x = scaleLog(ends(map.semiMajorAxisAu), [box.left, box.right]);
  const y = scaleLog(ends(map.massMjup), [box.bottom, box.top]);
  return { ...box, x, y, invertX: (px) => x.invert(px), invertY: (px) => y.invert(px) };
}

interface MapLayersProps {
  map: MapData;
  width: number;
  height: number;
  margin: Box;
}

/** Bands and contours: drawn once for a map and a size, whatever moves above them. */
export const MapBands = memo(function MapBands({ map, width, height, margin }: MapLayersProps) {
  const { left, top, right, bottom } = margin;
  const layers = useMemo(() => {
    const frame = mapFrame(map, width, height, { left, top, right, bottom });
    return { frame, bands: isobands(map, frame), lines: isolines(map, contourLevels, frame) };
  }, [map, width, height, left, top, right, bottom]);
  const { frame } = layers;
  return (
    <g>
      <rect
        x={frame.left}
        y={frame.top}
        width={frame.right - frame.left}
        height={frame.bottom - frame.top}
        fill="var(--q0)"
      />
      {layers.bands.map((band, index) => (
        <path key={band.level} d={band.path} fill={`var(--q${index + 1})`} fillRule="evenodd" />
      ))}
      {layers.lines.map((line) => (
        <path
          key={line.level}
          className={`isoline ${line.level === 0.5 ? 'isoline-half' : ''}`}
          d={line.path}
        />
      ))}
    </g>
  );
});

export const contourLevels = [0.1, 0.3, 0.5, 0.7, 0.9];

/** Places for the numbers of the contours, inside a part of the frame and clear of other marks. */
export function contourLabels(map: MapData, frame: MapFrame, inside: Box, marks: Box[] = []) {
  const wantedX = inside.left + 0.62 * (inside.right - inside.left);
  const taken = [...marks];
  return isolines(map, contourLevels, frame).flatMap((line) => {
    const place = labelPoint(line, wantedX, inside, taken);
    if (!place) return [];
    taken.push(place.box);
    return [{ level: line.level, ...place }];
  });
}

export function ContourNumbers({ places }: { places: ReturnType<typeof contourLabels> }) {
  return places.map(({ level, x, y }) => (
    <text
      key={level}
      className="isoline-text"
      style={{
        fill: level < 0.4 ? 'var(--iso-low)' : level < 0.6 ? '#ffffff' : 'var(--iso-high)',
        stroke: `var(--q${Math.round(level * 20)})`,
      }}
      x={x}
      y={y + 4}
      textAnchor="middle"
    >
      {Math.round(100 * level)}
      {'\u2009'}%
    </text>
  ));
}

/** Both axes of a map. */
export function MapAxes({ map, frame }: { map: MapData; frame: MapFrame }) {
  const [au, mass] = [map.semiMajorAxisAu, map.massMjup];
  return (
    <>
      <BottomAxis
        ticks={logTicks(au[0], au[au.length - 1], frame.right - frame.left)}
        scale={frame.x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="semi-major axis, AU"
      />
      <LeftAxis
        ticks={logTicks(mass[0], mass[mass.length - 1], (frame.bottom - frame.top) * 1.2)}
        scale={frame.y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        nameClassName="page-halo-thin"
        name={
          <>
            planet mass, <JupiterMassText />
          </>
        }
      />
    </>
  );
}
