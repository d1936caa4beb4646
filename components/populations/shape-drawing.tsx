'use client';

import { type ReactNode, useId, useRef } from 'react';
import { BottomAxis } from '@/components/charts/axes';
import { areaPath, linePath } from '@/components/charts/paths';
import { scaleLinear, scaleLog } from '@/components/charts/scales';
import { logTicks } from '@/components/charts/ticks';
import { useWidth } from '@/components/charts/use-width';
import { type AxisShape, axisLaw } from '@/lib/population';

interface ShapeDrawingProps {
  /** Plain name: "Planet mass". */
  name: string;
  label: ReactNode;
  valueLabel?: ReactNode;
  shape: AxisShape;
  range: [number, number];
  /** Ends of the axis. */
  bounds: [number, number];
  /** A place on the axis that the law has: its break or its median. */
  place?: {
    name: string;
    value: number;
    savedValue?: number;
    valueText: string;
    onChange(value: number, isSettled: boolean): void;
  };
}

const resolution = 1000;
const inset = 10;
const height = 112;
const top = 14;
const bottom = 86;
const POINTS = 160;
/** The drawing reaches up to so many times the highest place of the range. */
const MOST_OUTSIDE = 3;

/** Server and browser differ in the last bit of a logarithm: what both write must not show it. */
const toHundredth = (px: number) => Math.round(100 * px) / 100;

/** The law per logarithm along its axis: what lies in the range solid, what it cuts off pale. */
export function ShapeDrawing(props: ShapeDrawingProps) {
  const { name, label, valueLabel, shape, range, bounds, place } = props;
  const [measure, width] = useWidth<HTMLDivElement>(188);
  const clipId = useId();
  const before = useRef(0);
  const isDragging = useRef(false);
  const log = scaleLog(bounds, [inset, width - inset]);
  const x = (value: number) => toHundredth(log(value));
  const at = Array.from(
    { length: POINTS + 1 },
    (_, i) => bounds[0] * (bounds[1] / bounds[0]) ** (i / POINTS),
  );
  const density = densityOf(shape);
  const heights = at.map(density);
  const inside = at.filter((value) => value >= range[0] && value <= range[1]);
  const tallest = Math.max(...[...inside, ...range].map(density), Number.MIN_VALUE);
  // What rises outside the range is cut only where it would flatten the part in question.
  const highest = Math.min(Math.max(tallest, ...heights), MOST_OUTSIDE * tallest);
  const y = scaleLinear([0, highest], [bottom, top + 8]);
  const clamped = (value: number) => toHundredth(Math.max(top - 20, y(value)));

  const share = (value: number) =>
    (resolution * (log(value) - inset)) / Math.max(1, width - 2 * inset);
  const valueAtShare = (of: number) => log.invert(inset + (of / resolution) * (width - 2 * inset));
  const quote = (value: number) => Number(value.toPrecision(2));

  return (
    <div className="min-w-0">
      <div className="flex items-baseline justify-between gap-2 whitespace-nowrap text-ink2 text-note">
        <span className="truncate">{label}</span>
        {valueLabel !== undefined && <b className="shrink-0 text-ink text-value">{valueLabel}</b>}
      </div>
      <div ref={measure} className="chart-control relative">
        {place && (
          <input
            className="range-native"
            style={{ left: inset - 12, width: width - 2 * inset + 24, top: 4, height: bottom - 4 }}
            type="range"
            min={0}
            max={resolution}
            step={1}
            value={Math.round(share(Math.min(bounds[1], Math.max(bounds[0], place.value))))}
            aria-label={`${name}, ${place.name}`}
            aria-valuetext={place.valueText}
            onFocus={() => {
              before.current = place.value;
            }}
            onKeyDown={(event) => {
              if (event.key === 'Escape') place.onChange(before.current, true);
              const direction = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1 }[
                event.key
              ];
              if (direction === undefined) return;
              event.preventDefault();
              const next = place.value * 1.06 ** (direction * (event.shiftKey ? 10 : 1));
              place.onChange(quote(Math.min(bounds[1], Math.max(bounds[0], next))), true);
            }}
            onPointerDown={() => {
              before.current = place.value;
              isDragging.current = true;
            }}
            onPointerUp={() => {
              isDragging.current = false;
              place.onChange(place.value, true);
            }}
            onChange={(event) =>
              place.onChange(quote(valueAtShare(Number(event.target.value))), !isDragging.current)
            }
          />
        )}
        <svg
          className="chart pointer-events-none"
          width="100%"
          height={height}
          viewBox={`0 0 ${width} ${height}`}
          aria-hidden="true"
        >
          <clipPath id={clipId}>
            <rect x={inset} y={top - 12} width={Math.max(0, width - 2 * inset)} height={bottom} />
          </clipPath>
          <g clipPath={`url(#${clipId})`}>
            <path className="profile-out" d={areaPath(at, heights, x, clamped, bottom)} />
            <path
              className="profile-in"
              d={areaPath(at, heights, x, clamped, bottom, range[0], range[1])}
            />
            <path className="spark-line" d={linePath(at, heights, x, clamped)} />
          </g>
          <BottomAxis
            ticks={logTicks(bounds[0], bounds[1], width - 2 * inset)}
            scale={x}
            y={bottom}
            x0={inset}
            x1={width - inset}
          />
          {place?.savedValue !== undefined && place.savedValue !== place.value && (
            <circle
              className="saved-dot"
              cx={x(place.savedValue)}
              cy={Math.max(top, clamped(density(place.savedValue)))}
              r="4"
            />
          )}
          {place && (
            <>
              <line
                className="stem"
                x1={x(place.value)}
                x2={x(place.value)}
                y1={Math.max(top, clamped(density(place.value)))}
                y2={bottom}
              />
              <circle
                className="knob"
                cx={x(place.value)}
                cy={Math.max(top, clamped(density(place.value)))}
                r="7"
              />
            </>
          )}
        </svg>
      </div>
    </div>
  );
}

/** A law that cannot be used, such as an empty table, is drawn as nothing. */
function densityOf(shape: AxisShape): (x: number) => number {
  try {
    const law = axisLaw(shape);
    return (x) => {
      const value = law.shape(x);
      return Number.isFinite(value) ? value : 0;
    };
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return () => 0;
  }
}
