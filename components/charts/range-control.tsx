'use client';

import { type KeyboardEvent, type PointerEvent, type ReactNode, useRef, useState } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { areaPath } from './paths';
import { scaleLinear, scaleLog } from './scales';
import { linearTicks, logTicks } from './ticks';
import { useWidth } from './use-width';

export interface RangeControlProps {
  /** Plain name: "Semi-major axis". */
  name: string;
  label?: ReactNode;
  /** The range as it is seen: "20–300 AU". */
  valueLabel: ReactNode;
  /** Spoken after a number: "AU", "Jupiter masses". */
  unitWords: string;
  value: [number, number];
  /** Ends of the axis. */
  bounds: [number, number];
  /** `isSettled` is false while a handle is being dragged. */
  onChange(value: [number, number], isSettled: boolean): void;
  /** What could be seen along the axis, at its own points; a plain block without it. */
  profile?: { at: Float64Array; height: Float64Array };
  isLog?: boolean;
  height?: number;
}

/** Positions of the native inputs: thousandths of the axis' length. */
const resolution = 1000;
const inset = 10;

/** Two handles over a sensitivity profile; the middle moves both. */
export function RangeControl(props: RangeControlProps) {
  const { name, label, valueLabel, unitWords, value, bounds, onChange, profile } = props;
  const { isLog = true, height = 112 } = props;
  const [measure, width] = useWidth<HTMLDivElement>(188);
  const [focused, setFocused] = useState<0 | 1>();
  const before = useRef(value);
  const isDragging = useRef(false);
  const grip = useRef<{ from: number; range: [number, number] }>(undefined);
  const bottom = height - 26;
  const top = 12;

  const ends: [number, number] = [inset, width - inset];
  const x = isLog ? scaleLog(bounds, ends) : scaleLinear(bounds, ends);
  const toShare = (at: number) => (resolution * (x(at) - ends[0])) / (ends[1] - ends[0]);
  const fromShare = (share: number) =>
    x.invert(ends[0] + (share / resolution) * (ends[1] - ends[0]));
  const quote = (at: number) => Number(at.toPrecision(2));
  const clamp = (at: number) => Math.min(bounds[1], Math.max(bounds[0], at));

  /** Two digits, inside the bounds, and at least a fiftieth of the axis from the other end. */
  const place = (end: 0 | 1, at: number): [number, number] => {
    const gap = resolution / 50;
    const other = toShare(value[1 - end]);
    const share =
      end === 0
        ? Math.min(toShare(clamp(at)), other - gap)
        : Math.max(toShare(clamp(at)), other + gap);
    const next = clamp(quote(fromShare(Math.min(resolution, Math.max(0, share)))));
    return end === 0 ? [next, value[1]] : [value[0], next];
  };

  const press = (end: 0 | 1) => (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'Escape') {
      onChange(before.current, true);
      return;
    }
    const direction = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1 }[event.key];
    if (direction === undefined) return;
    event.preventDefault();
    const steps = direction * (event.shiftKey ? 10 : 1);
    const at = isLog
      ? value[end] * 1.06 ** steps
      : value[end] + (steps * (bounds[1] - bounds[0])) / 100;
    onChange(place(end, at), true);
  };

  const dragMiddle = (event: PointerEvent<SVGRectElement>, isSettled: boolean) => {
    const held = grip.current;
    if (!held) return;
    const moved = (resolution * (event.clientX - held.from)) / (ends[1] - ends[0]);
    const [low, high] = held.range.map(toShare);
    const allowed = Math.min(resolution - high, Math.max(-low, moved));
    onChange(
      [clamp(quote(fromShare(low + allowed))), clamp(quote(fromShare(high + allowed)))],
      isSettled,
    );
    if (isSettled) grip.current = undefined;
  };

  const tallest = profile ? Math.max(1e-9, ...profile.height) : 1;
  const y = scaleLinear([0, tallest], [bottom, top + 20]);
  const shape = profile ?? {
    at: Float64Array.from(bounds),
    height: Float64Array.of(0.5, 0.5),
  };
  const ticks = isLog
    ? logTicks(bounds[0], bounds[1], width - 2 * inset)
    : linearTicks(bounds[0], bounds[1], width - 2 * inset, 40);

  return (
    <div className="min-w-0">
      <div className="flex items-baseline justify-between gap-2 whitespace-nowrap text-ink2 text-note">
        <span className="truncate">{label ?? name}</span>
        <b className="shrink-0 text-ink text-value">{valueLabel}</b>
      </div>
      <div ref={measure} className="chart-control relative">
        {([0, 1] as const).map((end) => (
          <input
            key={end}
            className="range-native range-native-pair"
            style={{ left: inset - 12, width: width - 2 * inset + 24, top: 4, height: bottom - 4 }}
            type="range"
            min={0}
            max={resolution}
            step={1}
            value={toShare(value[end])}
            aria-label={`${name}, ${end === 0 ? 'lower' : 'upper'} end`}
            aria-valuetext={`${formatPlain(value[end])} ${unitWords}`}
            onFocus={(event) => {
              before.current = value;
              if (event.target.matches(':focus-visible')) setFocused(end);
            }}
            onBlur={() => setFocused(undefined)}
            onKeyDown={press(end)}
            onPointerDown={() => {
              before.current = value;
              isDragging.current = true;
            }}
            onPointerUp={() => {
              isDragging.current = false;
              onChange(value, true);
            }}
            onChange={(event) =>
              onChange(place(end, fromShare(Number(event.target.value))), !isDragging.current)
            }
          />
        ))}
        <svg
          className="chart pointer-events-none"
          width="100%"
          height={height}
          viewBox={`0 0 ${width} ${height}`}
          aria-hidden="true"
        >
          <path className="profile-out" d={areaPath(shape.at, shape.height, x, y, bottom)} />
          <path
            className="profile-in"
            d={areaPath(shape.at, shape.height, x, y, bottom, value[0], value[1])}
          />
          <rect
            className="pointer-events-auto cursor-grab touch-pan-y"
            x={x(value[0]) + 12}
            y={top + 8}
            width={Math.max(0, x(value[1]) - x(value[0]) - 24)}
            height={bottom - top - 8}
            fill="transparent"
            onPointerDown={(event) => {
              grip.current = { from: event.clientX, range: value };
              event.currentTarget.setPointerCapture(event.pointerId);
            }}
            onPointerMove={(event) => dragMiddle(event, false)}
            onPointerUp={(event) => dragMiddle(event, true)}
          />
          <BottomAxis ticks={ticks} scale={x} y={bottom} x0={inset} x1={width - inset} />
          {value.map((at, end) => (
            <g key={end === 0 ? 'lower' : 'upper'}>
              <line className="stem" x1={x(at)} x2={x(at)} y1={top + 2} y2={bottom} />
              <rect
                className={`knob ${focused === end ? 'knob-focus' : ''}`}
                x={x(at) - 4.5}
                y={top}
                width="9"
                height="20"
                rx="2"
              />
            </g>
          ))}
        </svg>
      </div>
    </div>
  );
}
