'use client';

import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import type { MapData } from './map-contours';
import type { MapFrame } from './map-frame';

export interface MapRange {
  massMinMjup: number;
  massMaxMjup: number;
  semiMajorAxisMinAu: number;
  semiMajorAxisMaxAu: number;
}

interface RangeHandlesProps {
  frame: MapFrame;
  width: number;
  height: number;
  range: MapRange;
  /** Ends of the map: the box stays inside. */
  bounds: MapRange;
  /** `isSettled` is false while a handle is being dragged. */
  onChange(range: MapRange, isSettled: boolean): void;
}

const sides: {
  key: keyof MapRange;
  name: string;
  unit: string;
  isAxis: boolean;
  isLow: boolean;
}[] = [
  {
    key: 'semiMajorAxisMinAu',
    name: 'Smallest semi-major axis',
    unit: 'AU',
    isAxis: true,
    isLow: true,
  },
  {
    key: 'semiMajorAxisMaxAu',
    name: 'Largest semi-major axis',
    unit: 'AU',
    isAxis: true,
    isLow: false,
  },
  { key: 'massMinMjup', name: 'Smallest mass', unit: 'Jupiter masses', isAxis: false, isLow: true },
  { key: 'massMaxMjup', name: 'Largest mass', unit: 'Jupiter masses', isAxis: false, isLow: false },
];

/** One step of an arrow key: 6 % of the value, kept to the two digits that a range is quoted in. */
const step = 1.06;

/** Two digits, inside the map, and never past the other end. */
export function placeRangeEnd(
  range: MapRange,
  key: keyof MapRange,
  value: number,
  bounds: MapRange,
): MapRange {
  const side = sides.find((candidate) => candidate.key === key) ?? sides[0];
  const other = sides.find((it) => it.isAxis === side.isAxis && it.key !== key) ?? sides[1];
  const rounded = Number(value.toPrecision(2));
  const low = side.isLow ? bounds[key] : range[other.key] * step;
  const high = side.isLow ? range[other.key] / step : bounds[key];
  return { ...range, [key]: Math.min(Math.max(rounded, low), high) };
}

/** Handles on the four sides of the range box, by pointer and by keyboard. */
export function RangeHandles({ frame, width, height, range, bounds, onChange }: RangeHandlesProps) {
  const before = useRef(range);
  const middleX = (frame.x(range.semiMajorAxisMinAu) + frame.x(range.semiMajorAxisMaxAu)) / 2;
  const middleY = (frame.y(range.massMinMjup) + frame.y(range.massMaxMjup)) / 2;

  return (
    <svg
      className="chart pointer-events-none absolute inset-0"
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
    >
      <title>Handles of the range</title>
      {sides.map((side) => {
        const { key, isAxis } = side;
        const x = isAxis ? frame.x(range[key]) : middleX;
        const y = isAxis ? middleY : frame.y(range[key]);
        const [w, h] = isAxis ? [8, 22] : [22, 8];
        const drag = (event: PointerEvent<SVGGElement>, isSettled: boolean) => {
          const box = event.currentTarget.ownerSVGElement?.getBoundingClientRect();
          if (!box) return;
          const value = isAxis
            ? frame.invertX(event.clientX - box.left)
            : frame.invertY(event.clientY - box.top);
          onChange(placeRangeEnd(range, key, value, bounds), isSettled);
        };
        const press = (event: KeyboardEvent<SVGGElement>) => {
          if (event.key === 'Escape') {
            onChange(before.current, true);
            return;
          }
          const factor = step ** (event.shiftKey ? 10 : 1);
          const next = {
            ArrowRight: range[key] * factor,
            ArrowUp: range[key] * factor,
            ArrowLeft: range[key] / factor,
            ArrowDown: range[key] / factor,
            Home: bounds[isAxis ? 'semiMajorAxisMinAu' : 'massMinMjup'],
            End: bounds[isAxis ? 'semiMajorAxisMaxAu' : 'massMaxMjup'],
          }[event.key];
          if (next === undefined) return;
          event.preventDefault();
          onChange(placeRangeEnd(range, key, next, bounds), true);
        };
        return (
          <g
            key={key}
            role="slider"
            tabIndex={0}
            aria-label={side.name}
            aria-orientation={isAxis ? 'horizontal' : 'vertical'}
            aria-valuemin={bounds[isAxis ? 'semiMajorAxisMinAu' : 'massMinMjup']}
            aria-valuemax={bounds[isAxis ? 'semiMajorAxisMaxAu' : 'massMaxMjup']}
            aria-valuenow={range[key]}
            aria-valuetext={`${formatPlain(range[key])} ${side.unit}`}
            className={`pointer-events-auto touch-none ${isAxis ? 'cursor-ew-resize' : 'cursor-ns-resize'}`}
            onFocus={() => {
              before.current = range;
            }}
            onKeyDown={press}
            onPointerDown={(event) => {
              before.current = range;
              event.currentTarget.setPointerCapture(event.pointerId);
            }}
            onPointerMove={(event) => {
              if (event.currentTarget.hasPointerCapture(event.pointerId)) drag(event, false);
            }}
            onPointerUp={(event) => drag(event, true)}
          >
            <rect x={x - 22} y={y - 22} width="44" height="44" fill="transparent" />
            <rect className="handle" x={x - w / 2} y={y - h / 2} width={w} height={h} rx="2" />
          </g>
        );
      })}
    </svg>
  );
}

/** What a map covers, end to end. */
export const mapEnds = ({ massMjup, semiMajorAxisAu }: MapData): MapRange => ({
  massMinMjup: massMjup[0],
  massMaxMjup: massMjup[massMjup.length - 1],
  semiMajorAxisMinAu: semiMajorAxisAu[0],
  semiMajorAxisMaxAu: semiMajorAxisAu[semiMajorAxisAu.length - 1],
});
