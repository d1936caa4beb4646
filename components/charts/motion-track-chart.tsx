'use client';

import { useState } from 'react';
import { formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure } from './chart-figure';
import { PointReadout } from './chart-readout';
import type { Box } from './map-contours';
import { type MotionEpoch, type MotionPlace, motionColumns, motionTable } from './motion-tables';
import { frameWithin, scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export type { MotionEpoch };

export interface TrackPoint extends MotionPlace {
  julianYear: number;
}

export interface MotionTrackChartProps {
  /** "NTY 2037-08 cc1". */
  name: string;
  epochs: MotionEpoch[];
  /** Empty where the star's motion is not known. */
  track: TrackPoint[];
}

const margin: Box = { left: 56, right: 16, top: 30, bottom: 48 };
const MIN_SPAN_ARCSEC = 0.01;
/** Nearer to the measured point, whose name says the epoch already, a second name would lie on it. */
const NAMED_FROM_PX = 48;

/** The path of a source that stands still behind its star, and where this one was seen. */
export function MotionTrackChart({ name, epochs, track }: MotionTrackChartProps) {
  const [measure, width] = useWidth<HTMLDivElement>(720);
  const [at, setAt] = useState<number>();
  const height = Math.round(Math.min(520, Math.max(320, width * 0.66)));
  const frame = frameWithin(margin, width, height);
  const { x, y } = scalesOf(epochs, track, frame);
  const place = ({ eastArcsec, northArcsec }: MotionPlace) => ({
    x: x(eastArcsec),
    y: y(northArcsec),
  });
  const seen = epochs.map(place);
  const chosen = at === undefined ? undefined : seen[at];
  const reference = epochs.find(({ isReference }) => isReference);
  const path = track
    .map(place)
    .map((point, index) => `${index === 0 ? 'M' : 'L'}${point.x.toFixed(2)},${point.y.toFixed(2)}`)
    .join('');
  const ticks = (domain: number[], lengthPx: number) =>
    linearTicks(Math.min(...domain), Math.max(...domain), lengthPx, 54).filter(
      ({ isMajor }) => isMajor,
    );

  return (
    <ChartFigure
      name="motion"
      label={motionSentence({ name, epochs, track })}
      width={width}
      height={height}
      measure={measure}
      tables={() => [motionTable(name, epochs)]}
      data={() => [motionColumns(epochs)]}
      caption={
        track.length > 0
          ? 'dashed: a source at rest behind the star; hollow: where it would be at each epoch. East is left'
          : 'East is left'
      }
      overlay={
        <PointReadout
          frame={frame}
          points={seen}
          at={at}
          onAt={setAt}
          label="Read an epoch"
          say={(index) => sayEpoch(epochs[index])}
        />
      }
    >
      <LeftAxis
        ticks={withUnit(ticks(y.domain(), frame.bottom - frame.top), '″')}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <text className="quiet" x={0} y={14}>
        north of the star, arcsec
      </text>
      {track.length > 0 && <path className="alternative-line" d={path} />}
      {epochs.map((epoch, index) =>
        epoch.background && !epoch.isReference ? (
          <Predicted
            key={epoch.id}
            from={seen[index]}
            to={place(epoch.background)}
            words={epoch.date.slice(0, 7)}
            frame={frame}
          />
        ) : null,
      )}
      {reference && (
        <circle className="ring" cx={place(reference).x} cy={place(reference).y} r="9" />
      )}
      {epochs.map((epoch, index) => (
        <Seen key={epoch.id} epoch={epoch} at={seen[index]} x={x} y={y} />
      ))}
      <SeenNames epochs={epochs} seen={seen} frame={frame} />
      {chosen && <circle data-screen-only="" className="ring" cx={chosen.x} cy={chosen.y} r="7" />}
      <BottomAxis
        ticks={withUnit(ticks(x.domain(), frame.right - frame.left), '″')}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isLastAtEdge
        name="east of the star, arcsec"
      />
    </ChartFigure>
  );
}

/** One scale for both directions, so that angles are angles; east to the left as on the sky. */
function scalesOf(epochs: MotionEpoch[], track: TrackPoint[], frame: Box) {
  // The ends of the error bars belong into the frame.
  const ends = epochs.flatMap(({ eastArcsec, northArcsec, errorEastArcsec, errorNorthArcsec }) =>
    [-1, 1].map((side) => ({
      eastArcsec: eastArcsec + side * (errorEastArcsec ?? 0),
      northArcsec: northArcsec + side * (errorNorthArcsec ?? 0),
    })),
  );
  const places: MotionPlace[] = [...ends, ...track];
  const east = places.map(({ eastArcsec }) => eastArcsec);
  const north = places.map(({ northArcsec }) => northArcsec);
  const middle = (values: number[]) => (Math.min(...values) + Math.max(...values)) / 2;
  const span = (values: number[]) =>
    Math.max(MIN_SPAN_ARCSEC, Math.max(...values) - Math.min(...values));
  const [wide, high] = [frame.right - frame.left, frame.bottom - frame.top];
  const perPx = 1.28 * Math.max(span(east) / wide, span(north) / high);
  const [halfEast, halfNorth] = [(perPx * wide) / 2, (perPx * high) / 2];
  return {
    x: scaleLinear([middle(east) + halfEast, middle(east) - halfEast], [frame.left, frame.right]),
    y: scaleLinear(
      [middle(north) - halfNorth, middle(north) + halfNorth],
      [frame.bottom, frame.top],
    ),
  };
}

interface Point {
  x: number;
  y: number;
}

function Predicted({
  from,
  to,
  words,
  frame,
}: {
  from: Point;
  to: Point;
  words: string;
  frame: Box;
}) {
  const hangsLeft = to.x + 10 + textWidth(words, 13) > frame.right;
  const isNamed = Math.hypot(to.x - from.x, to.y - from.y) > NAMED_FROM_PX;
  return (
    <g>
      <line className="leader" x1={from.x} x2={to.x} y1={from.y} y2={to.y} />
      <circle className="saved-dot" cx={to.x} cy={to.y} r="4.5" />
      {isNamed && (
        <text
          className="quiet page-halo"
          x={hangsLeft ? to.x - 9 : to.x + 9}
          y={to.y + 4}
          textAnchor={hangsLeft ? 'end' : 'start'}
        >
          {words}
        </text>
      )}
    </g>
  );
}

function Seen({
  epoch,
  at,
  x,
  y,
}: {
  epoch: MotionEpoch;
  at: Point;
  x(value: number): number;
  y(value: number): number;
}) {
  const { eastArcsec, northArcsec, errorEastArcsec, errorNorthArcsec } = epoch;
  return (
    <g>
      {errorEastArcsec !== null && (
        <line
          className="stem"
          x1={x(eastArcsec + errorEastArcsec)}
          x2={x(eastArcsec - errorEastArcsec)}
          y1={at.y}
          y2={at.y}
        />
      )}
      {errorNorthArcsec !== null && (
        <line
          className="stem"
          x1={at.x}
          x2={at.x}
          y1={y(northArcsec - errorNorthArcsec)}
          y2={y(northArcsec + errorNorthArcsec)}
        />
      )}
      <circle className="star-dot" cx={at.x} cy={at.y} r="4.2" style={{ fill: 'var(--ink)' }} />
    </g>
  );
}

/** Names of the epochs, each where no earlier one stands; the others are read by pointer or key. */
function SeenNames({ epochs, seen, frame }: { epochs: MotionEpoch[]; seen: Point[]; frame: Box }) {
  const named: number[] = [];
  seen.forEach((point, index) => {
    const isFree = named.every(
      (other) => Math.abs(seen[other].y - point.y) > 17 || Math.abs(seen[other].x - point.x) > 130,
    );
    if (isFree) named.push(index);
  });
  return named.map((index) => {
    const { x, y } = seen[index];
    const words = epochs[index].isReference
      ? `${epochs[index].date.slice(0, 7)}, reference`
      : epochs[index].date.slice(0, 7);
    const hangsRight = x - 12 - textWidth(words, 13) < frame.left;
    return (
      <text
        key={epochs[index].id}
        className="bold page-halo"
        x={hangsRight ? x + 13 : x - 13}
        y={y - 8}
        textAnchor={hangsRight ? 'start' : 'end'}
      >
        {words}
      </text>
    );
  });
}

const sigmaWords = (sigma: number) => `${formatSignificant(sigma, 2)} σ`;

function sayEpoch(epoch: MotionEpoch): string[] {
  const { date, isReference, eastArcsec, northArcsec, sigmaCommon, sigmaBackground } = epoch;
  const where = `${eastArcsec.toFixed(3)}″ east, ${northArcsec.toFixed(3)}″ north`;
  if (isReference) return [`${date}, reference`, where];
  if (sigmaCommon === null || sigmaBackground === null) return [date, where, 'not tested'];
  return [
    date,
    where,
    `${sigmaWords(sigmaCommon)} from moving with the star`,
    `${sigmaWords(sigmaBackground)} from background`,
  ];
}

/** The sentence that the drawing says to readers. */
export function motionSentence({ name, epochs, track }: MotionTrackChartProps): string {
  const dates = epochs.map(({ date }) => date);
  const count = epochs.length === 1 ? '1 epoch' : `${epochs.length} epochs`;
  const parts = [
    `Offsets of ${name} from its star at ${count}${epochs.length > 1 ? `, ${dates[0]} to ${dates[dates.length - 1]}` : ''}`,
  ];
  if (track.length === 0) parts.push('the track of a background source is not known');
  const last = [...epochs].reverse().find(({ sigmaCommon }) => sigmaCommon !== null);
  if (last && !last.isReference && last.sigmaCommon !== null && last.sigmaBackground !== null) {
    parts.push(
      `on ${last.date} it lies ${sigmaWords(last.sigmaCommon)} from moving with the star and ${sigmaWords(last.sigmaBackground)} from a source at rest behind it`,
    );
  }
  return parts.join('; ');
}
