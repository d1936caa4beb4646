'use client';

import type { KeyboardEvent, PointerEvent } from 'react';
import { ReadoutNote, stepTo } from './chart-readout';
import type { Box } from './map-contours';

export interface PlacedPoint {
  /** Place in the drawing [px]. */
  x: number;
  y: number;
}

interface PointReadoutProps {
  /** Where the marks lie, in px of the drawing. */
  frame: Box;
  /** In the order in which the arrow keys visit them. */
  points: PlacedPoint[];
  at: number | undefined;
  onAt(index: number | undefined): void;
  /** What is read: "Read the limit without a star". */
  label: string;
  /** A point in words; the first line stands out. */
  say(index: number): string[];
}

/** The point closest to a place, or undefined where there is none. */
export function nearestPoint(points: PlacedPoint[], x: number, y: number): number | undefined {
  let best: number | undefined;
  let least = Number.POSITIVE_INFINITY;
  for (const [index, point] of points.entries()) {
    const distance = (point.x - x) ** 2 + (point.y - y) ** 2;
    if (distance < least) {
      least = distance;
      best = index;
    }
  }
  return best;
}

/** Reads points that lie anywhere: the nearest one by pointer or touch, the next one by arrow key. */
export function PointReadout({ frame, points, at, onAt, label, say }: PointReadoutProps) {
  const index = at ?? 0;
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const [x, y] = [event.clientX - box.left + frame.left, event.clientY - box.top + frame.top];
    onAt(nearestPoint(points, x, y));
  };
  const press = (event: KeyboardEvent<HTMLDivElement>) => {
    if (event.key === 'Escape') {
      onAt(undefined);
      return;
    }
    const sideways = event.key.replace('Up', 'Right').replace('Down', 'Left');
    const step = event.shiftKey ? 10 : 1;
    const next = stepTo(sideways, step, { column: index, row: 0 }, points.length, [0]);
    if (!next) return;
    event.preventDefault();
    onAt(next.column);
  };
  if (points.length === 0) return null;
  return (
    <>
      <div
        className="absolute cursor-crosshair touch-pan-y focus-visible:outline-offset-0"
        style={{
          left: frame.left,
          top: frame.top,
          width: frame.right - frame.left,
          height: frame.bottom - frame.top,
        }}
        role="slider"
        tabIndex={0}
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={points.length - 1}
        aria-valuenow={index}
        aria-valuetext={say(index).join(', ')}
        onPointerMove={point}
        onPointerDown={point}
        onPointerLeave={(event) => {
          if (event.pointerType === 'mouse') onAt(undefined);
        }}
        onFocus={(event) => {
          if (event.currentTarget.matches(':focus-visible')) onAt(index);
        }}
        onBlur={() => onAt(undefined)}
        onKeyDown={press}
      />
      {at !== undefined && (
        <ReadoutNote frame={frame} x={points[at].x} y={points[at].y} lines={say(at)} />
      )}
    </>
  );
}
