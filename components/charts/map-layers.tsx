'use client';

import { memo, useMemo } from 'react';
import { type Box, isobands, isolines, labelPoint, type MapData } from './map-contours';
import { type MapFrame, mapFrame } from './map-frame';

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

/** The contours whose numbers `contourLabels` places. */
export const contoursOf = (map: MapData, frame: MapFrame) => isolines(map, contourLevels, frame);

/** Places for the numbers of the contours, inside a part of the frame and clear of other marks. */
export function contourLabels(
  contours: ReturnType<typeof contoursOf>,
  inside: Box,
  marks: Box[] = [],
) {
  const wantedX = inside.left + 0.62 * (inside.right - inside.left);
  const taken = [...marks];
  return contours.flatMap((line) => {
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
