'use client';

import type { KeyboardEvent, PointerEvent } from 'react';
import type { Box } from './map-contours';
import { textWidth } from './text-width';

/** A node of a drawing: its column, and its row where it has rows. */
export interface ReadPlace {
  column: number;
  row: number;
}

interface ChartReadoutProps {
  /** Where the marks lie, in px of the drawing. */
  frame: Box;
  /** Places of the columns [px], and of the rows where there are any, in the order of the data. */
  columns: number[];
  rows?: number[];
  at: ReadPlace | undefined;
  onAt(place: ReadPlace | undefined): void;
  /** What is read: "Limit along the outer cutoff". */
  label: string;
  /** The place in words; the first line stands out. */
  say(place: ReadPlace): string[];
}

const lineHeight = 18;

function nearest(places: number[], at: number): number {
  let best = 0;
  for (let index = 1; index < places.length; index += 1) {
    if (Math.abs(places[index] - at) < Math.abs(places[best] - at)) best = index;
  }
  return best;
}

/**
 * Reads a drawing at its nodes: by pointer, by touch, and by the arrow keys once it has the focus
 * (Shift steps ten, Home and End go to the ends, Escape closes).
 */
export function ChartReadout(props: ChartReadoutProps) {
  const { frame, columns, rows = [0], at, onAt, label, say } = props;
  const middle = { column: columns.length >> 1, row: rows.length >> 1 };
  const place = at ?? middle;
  const lines = at ? say(at) : [];
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    onAt({
      column: nearest(columns, event.clientX - box.left + frame.left),
      row: nearest(rows, event.clientY - box.top + frame.top),
    });
  };
  const press = (event: KeyboardEvent<HTMLDivElement>) => {
    if (event.key === 'Escape') {
      onAt(undefined);
      return;
    }
    const next = stepTo(event.key, event.shiftKey ? 10 : 1, place, columns.length, rows);
    if (!next) return;
    event.preventDefault();
    onAt(next);
  };

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
        aria-valuemax={columns.length * rows.length - 1}
        aria-valuenow={place.row * columns.length + place.column}
        aria-valuetext={say(place).join(', ')}
        onPointerMove={point}
        onPointerDown={point}
        onPointerLeave={(event) => {
          if (event.pointerType === 'mouse') onAt(undefined);
        }}
        onFocus={(event) => {
          if (event.currentTarget.matches(':focus-visible')) onAt(place);
        }}
        onBlur={() => onAt(undefined)}
        onKeyDown={press}
      />
      {at && <ReadoutNote frame={frame} x={columns[at.column]} y={rows[at.row]} lines={lines} />}
    </>
  );
}

/** Where a key leads; rows count as they stand on the screen, upwards or downwards. */
export function stepTo(
  key: string,
  step: number,
  place: ReadPlace,
  columns: number,
  rows: number[],
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
