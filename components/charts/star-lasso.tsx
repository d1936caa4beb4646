'use client';

import { type PointerEvent, useRef } from 'react';
import { nearestPoint, type PlacedPoint, PointReadout } from './chart-readout';
import type { Box } from './map-contours';

/** A frame that is being drawn around stars. */
export interface Lasso {
  from: PlacedPoint;
  to: PlacedPoint;
}

interface StarLassoProps {
  frame: Box;
  points: PlacedPoint[];
  at: number | undefined;
  onAt(index: number | undefined): void;
  say(index: number): string[];
  lasso: Lasso | undefined;
  onLasso(lasso: Lasso | undefined): void;
  /** Places of the chosen ones in `points`. */
  onSelect?(indices: number[]): void;
}

/** A press this short chooses one star [px]. */
const shortestDrag = 6;

/** The points inside a frame, whichever corner it began at. */
export function pointsInside(points: PlacedPoint[], { from, to }: Lasso): number[] {
  const [left, right] = [Math.min(from.x, to.x), Math.max(from.x, to.x)];
  const [top, bottom] = [Math.min(from.y, to.y), Math.max(from.y, to.y)];
  return points.flatMap(({ x, y }, index) =>
    x >= left && x <= right && y >= top && y <= bottom ? [index] : [],
  );
}

/** Reads stars one by one, and chooses several by a frame drawn around them. */
export function StarLasso(props: StarLassoProps) {
  const { frame, points, at, onAt, say, lasso, onLasso, onSelect } = props;
  const start = useRef<PlacedPoint>(undefined);
  const placeOf = (event: PointerEvent<HTMLDivElement>): PlacedPoint => {
    const box = event.currentTarget.getBoundingClientRect();
    return { x: event.clientX - box.left, y: event.clientY - box.top };
  };
  const isDrag = (place: PlacedPoint) =>
    start.current !== undefined &&
    Math.hypot(place.x - start.current.x, place.y - start.current.y) > shortestDrag;

  return (
    <div
      className="absolute inset-0"
      onPointerDownCapture={(event) => {
        if (!onSelect || event.pointerType === 'touch') return;
        start.current = placeOf(event);
        event.currentTarget.setPointerCapture(event.pointerId);
      }}
      onPointerMoveCapture={(event) => {
        const place = placeOf(event);
        if (start.current && isDrag(place)) onLasso({ from: start.current, to: place });
        else if (start.current === undefined) onAt(nearestPoint(points, place.x, place.y));
      }}
      onPointerUpCapture={(event) => {
        const place = placeOf(event);
        if (onSelect && lasso && isDrag(place)) {
          onSelect(pointsInside(points, { from: lasso.from, to: place }));
        } else if (onSelect) {
          const index = nearestPoint(points, place.x, place.y);
          if (index !== undefined) onSelect([index]);
        }
        start.current = undefined;
        onLasso(undefined);
      }}
      onPointerCancel={() => {
        start.current = undefined;
        onLasso(undefined);
      }}
    >
      <PointReadout
        frame={frame}
        points={points}
        at={lasso ? undefined : at}
        onAt={onAt}
        label="Read the stars one by one; Enter chooses one"
        say={say}
        onEnter={onSelect && ((index) => onSelect([index]))}
      />
    </div>
  );
}
