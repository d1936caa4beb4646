'use client';

import type { KeyboardEvent, PointerEvent } from 'react';
import type { Box } from './map-contours';
import { textWidth } from './text-width';

/** A node of a drawing: its column, and its row where it has rows. */
export interface ReadPlace {
  column: number;
  row: number;
}

export interface PlacedPoint {
  /** Place in the drawing [px]. */
  x: number;
  y: number;
}

const lineHeight = 18;

interface ReadAreaProps {
  /** Where the marks lie, in px of the drawing. */
  frame: Box;
  /** What is read: "Limit along the outer cutoff". */
  label: string;
  /** Number of places, the one that is read or would be read first, and its words. */
  count: number;
  now: number;
  words: string[];
  /** The place is shown, and beside it these words. */
  note?: PlacedPoint;
  onPoint(x: number, y: number): void;
  onKey(key: string, step: number): boolean;
  onFirst(): void;
  onLeave(): void;
  /** What Enter does with the place. */
  onEnter?(): void;
}

/**
 * The surface over a drawing on which it is read: by pointer, by touch, and by the arrow keys once
 * it has the focus (Shift steps ten, Home and End go to the ends, Escape closes).
 */
function ReadArea(props: ReadAreaProps) {
  const { frame, label, count, now, words, note, onEnter } = props;
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    props.onPoint(event.clientX - box.left + frame.left, event.clientY - box.top + frame.top);
  };
  const press = (event: KeyboardEvent<HTMLDivElement>) => {
    if (event.key === 'Escape') props.onLeave();
    else if (event.key === 'Enter' && onEnter) onEnter();
    else if (props.onKey(event.key, event.shiftKey ? 10 : 1)) event.preventDefault();
  };
  return (
    <>
      <div
        className="absolute cursor-crosshair touch-pan-y focus-visible:outline-offset-0"
        style={{
          left: frame.left,
          top: frame.top,
          width: Math.max(0, frame.right - frame.left),
          height: Math.max(0, frame.bottom - frame.top),
        }}
        role="slider"
        tabIndex={0}
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={count - 1}
        aria-valuenow={now}
        aria-valuetext={words.join(', ')}
        onPointerMove={point}
        onPointerDown={point}
        onPointerLeave={(event) => {
          if (event.pointerType === 'mouse') props.onLeave();
        }}
        onFocus={(event) => {
          if (event.currentTarget.matches(':focus-visible')) props.onFirst();
        }}
        onBlur={props.onLeave}
        onKeyDown={press}
      />
      {note && <ReadoutNote frame={frame} x={note.x} y={note.y} lines={words} />}
    </>
  );
}

interface ChartReadoutProps {
  frame: Box;
  /** Places of the columns [px], and of the rows where there are any, in the order of the data. */
  columns: ArrayLike<number>;
  rows?: ArrayLike<number>;
  at: ReadPlace | undefined;
  onAt(place: ReadPlace | undefined): void;
  label: string;
  /** The place in words; the first line stands out. */
  say(place: ReadPlace): string[];
}

function nearest(places: ArrayLike<number>, at: number): number {
  let best = 0;
  for (let index = 1; index < places.length; index += 1) {
    if (Math.abs(places[index] - at) < Math.abs(places[best] - at)) best = index;
  }
  return best;
}

/** Reads a drawing at its nodes. */
export function ChartReadout(props: ChartReadoutProps) {
  const { frame, columns, rows = [0], at, onAt, label, say } = props;
  const place = at ?? { column: columns.length >> 1, row: rows.length >> 1 };
  if (columns.length === 0 || rows.length === 0) return null;
  return (
    <ReadArea
      frame={frame}
      label={label}
      count={columns.length * rows.length}
      now={place.row * columns.length + place.column}
      words={say(place)}
      note={at && { x: columns[at.column], y: rows[at.row] }}
      onPoint={(x, y) => onAt({ column: nearest(columns, x), row: nearest(rows, y) })}
      onKey={(key, step) => {
        const next = stepTo(key, step, place, columns.length, rows);
        if (next) onAt(next);
        return next !== undefined;
      }}
      onFirst={() => onAt(place)}
      onLeave={() => onAt(undefined)}
    />
  );
}

interface PointReadoutProps {
  frame: Box;
  /** In the order in which the arrow keys visit them. */
  points: PlacedPoint[];
  at: number | undefined;
  onAt(index: number | undefined): void;
  label: string;
  /** A point in words; the first line stands out. */
  say(index: number): string[];
  /** What Enter does with the point that is read. */
  onEnter?(index: number): void;
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
export function PointReadout(props: PointReadoutProps) {
  const { frame, points, at, onAt, label, say, onEnter } = props;
  if (points.length === 0) return null;
  const index = Math.min(at ?? 0, points.length - 1);
  return (
    <ReadArea
      frame={frame}
      label={label}
      count={points.length}
      now={index}
      words={say(index)}
      note={at === undefined ? undefined : points[index]}
      onPoint={(x, y) => onAt(nearestPoint(points, x, y))}
      onKey={(key, step) => {
        const sideways = key.replace('Up', 'Right').replace('Down', 'Left');
        const next = stepTo(sideways, step, { column: index, row: 0 }, points.length, [0]);
        if (next) onAt(next.column);
        return next !== undefined;
      }}
      onFirst={() => onAt(index)}
      onLeave={() => onAt(undefined)}
      onEnter={onEnter && (() => onEnter(index))}
    />
  );
}

/** Where a key leads; rows count as they stand on the screen, upwards or downwards. */
export function stepTo(
  key: string,
  step: number,
  place: ReadPlace,
  columns: number,
  rows: ArrayLike<number>,
): ReadPlace | undefined {
  const up = rows.length > 1 && rows[1] < rows[0] ? step : -step;
  const inside = (value: number, count: number) => Math.min(count - 1, Math.max(0, value));
  switch (key) {
    case 'ArrowRight':
      return { ...place, column: inside(place.column + step, columns) };
    case 'ArrowLeft':
      return { ...place, column: inside(place.column - step, columns) };
    case 'ArrowUp':
      return { ...place, row: inside(place.row + up, rows.length) };
    case 'ArrowDown':
      return { ...place, row: inside(place.row - up, rows.length) };
    case 'Home':
      return { ...place, column: 0 };
    case 'End':
      return { ...place, column: columns - 1 };
    default:
      return undefined;
  }
}

/** The numbers beside the pointer, on the side where there is room. */
export function ReadoutNote({
  frame,
  x,
  y,
  lines,
}: {
  frame: Box;
  x: number;
  y: number;
  lines: string[];
}) {
  const width = Math.max(...lines.map((line) => textWidth(line, 14))) + 26;
  const height = lines.length * lineHeight + 14;
  const hangsLeft = x + 14 + width > frame.right && x - 14 - width > 0;
  const left = hangsLeft ? x - 14 - width : Math.min(x + 14, Math.max(0, frame.right - width));
  const top = Math.max(0, Math.min(y - height / 2, frame.bottom - height));
  return (
    <div
      className="pointer-events-none absolute z-20 whitespace-nowrap rounded border border-rule2 bg-surface px-3 py-1.5 text-chart text-ink2 leading-[18px]"
      style={{ left, top }}
      aria-hidden="true"
    >
      {lines.map((line, index) => (
        <div key={line} className={index === 0 ? 'font-semibold text-ink' : ''}>
          {line}
        </div>
      ))}
    </div>
  );
}
