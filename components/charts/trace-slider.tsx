'use client';

import { type KeyboardEvent, type ReactNode, useId, useRef, useState } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';
import { formatPlain } from '@/lib/quantities/display';
import { valueAt } from './paths';
import { type LimitTrace, TRACK, TraceTrack, traceScales } from './trace-track';
import { useWidth } from './use-width';

export interface TraceSliderProps {
  /** Plain name, for readers and for the number field: "Mass index". */
  name: string;
  /** The name as it is seen, where it holds a symbol. */
  label?: ReactNode;
  /** Short form in the spoken value: "β". */
  symbol?: string;
  /** The limit as a function of the parameter: the track. Undefined while it is being computed. */
  trace?: LimitTrace;
  value: number;
  /** Place of the stored state, shown as a hollow dot while the value differs from it. */
  savedValue?: number;
  min: number;
  max: number;
  step: number;
  /** `isSettled` is false while the knob is being dragged. */
  onChange(value: number, isSettled: boolean): void;
  /** A limit in words for the eye: "6.6 %". */
  formatLimit(limit: number): string;
  /** Value as seen; a plain number unless given: "95 %", "+1 σ". */
  formatValue?(value: number): string;
  /** Ends of a number that is typed, where they are not those of the track. */
  typed?: readonly [number, number];
  /** "at 95 per cent": the end of the spoken sentence. */
  levelWords?: string;
  /** Numbers under the track, where even steps would be wrong. */
  ticks?: number[];
  /** The word that a mark behind the name explains. */
  help?: HelpWord;
}

const height = 112;

/** What a screen reader says: "β 0.4, limit below 6.6 per cent at 95 per cent". */
export function traceValueText(
  props: Pick<
    TraceSliderProps,
    'name' | 'symbol' | 'value' | 'trace' | 'formatLimit' | 'formatValue' | 'levelWords'
  >,
): string {
  const { name, symbol, value, trace, formatLimit, formatValue = formatPlain, levelWords } = props;
  const head = `${symbol ?? name} ${formatValue(value)}`;
  if (!trace) return head;
  const limit = formatLimit(valueAt(trace.parameter, trace.limit, value))
    .replace('\u2009', ' ')
    .replace('%', 'per cent');
  return `${head}, limit below ${limit}${levelWords ? ` ${levelWords}` : ''}`;
}

/** Keeps a stepped value on the grid of steps and between the ends. */
export function snapToStep(value: number, min: number, max: number, step: number): number {
  const snapped = Math.round((value - min) / step) * step + min;
  const decimals = Math.max(0, Math.ceil(-Math.log10(step)) + 1);
  return Number(Math.min(max, Math.max(min, snapped)).toFixed(decimals));
}

/** A slider whose track is its consequence: the limit against the parameter. */
export function TraceSlider(props: TraceSliderProps) {
  const { name, label, trace, value, savedValue, min, max, step, onChange, formatLimit } = props;
  const formatValue = props.formatValue ?? ((number: number) => formatPlain(number));
  const [measure, width] = useWidth<HTMLDivElement>(188);
  const [isDragging, setDragging] = useState(false);
  const before = useRef(value);
  const inputId = useId();
  const { x, y } = traceScales({ trace, width, min, max });
  const at = (parameter: number) =>
    trace ? y(valueAt(trace.parameter, trace.limit, parameter)) : (TRACK.top + TRACK.bottom) / 2;
  const isMoved = savedValue !== undefined && Math.abs(savedValue - value) > step / 2;

  const press = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'Escape') {
      onChange(before.current, true);
      return;
    }
    const direction = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1 }[event.key];
    if (direction === undefined || !event.shiftKey) return;
    event.preventDefault();
    onChange(snapToStep(value + 10 * direction * step, min, max, step), true);
  };

  return (
    <div className="min-w-0">
      <div className="flex items-baseline justify-between gap-2 whitespace-nowrap text-ink2 text-note">
        <span className="flex min-w-0 items-baseline">
          <label htmlFor={inputId} className="truncate">
            {label ?? name}
          </label>
          {props.help !== undefined && <HelpMark word={props.help} />}
        </span>
        <NumberOnDemand {...props} formatValue={formatValue} />
      </div>
      <div ref={measure} className="chart-control relative">
        <input
          id={inputId}
          className="range-native"
          style={{
            left: TRACK.inset - 12,
            width: width - 2 * TRACK.inset + 24,
            top: 4,
            height: 90,
          }}
          type="range"
          min={min}
          max={max}
          step={step}
          value={value}
          aria-valuetext={traceValueText({ ...props, formatValue })}
          onFocus={() => {
            before.current = value;
          }}
          onKeyDown={press}
          onPointerDown={() => {
            before.current = value;
            setDragging(true);
          }}
          onPointerUp={() => {
            setDragging(false);
            onChange(value, true);
          }}
          onPointerCancel={() => setDragging(false)}
          onChange={(event) => onChange(Number(event.target.value), !isDragging)}
        />
        <svg
          className="chart pointer-events-none"
          width="100%"
          height={height}
          viewBox={`0 0 ${width} ${height}`}
          aria-hidden="true"
        >
          <TraceTrack
            trace={trace}
            width={width}
            min={min}
            max={max}
            ticks={props.ticks}
            formatLimit={formatLimit}
          />
          {isMoved && (
            <>
              <line
                className="saved-stem"
                x1={x(savedValue)}
                x2={x(savedValue)}
                y1={at(savedValue)}
                y2={TRACK.bottom}
              />
              <circle className="saved-dot" cx={x(savedValue)} cy={at(savedValue)} r="4" />
            </>
          )}
          <line className="stem" x1={x(value)} x2={x(value)} y1={at(value)} y2={TRACK.bottom} />
          <circle
            className={isDragging ? 'knob knob-drag' : 'knob'}
            cx={x(value)}
            cy={at(value)}
            r={isDragging ? 10 : 7}
          />
        </svg>
      </div>
    </div>
  );
}

/** The value above the track; pressed, it becomes a field for an exact number, off the steps. */
function NumberOnDemand(props: TraceSliderProps & { formatValue(value: number): string }) {
  const { name, value, min, max, typed = [min, max], onChange, formatValue } = props;
  const [isOpen, setOpen] = useState(false);
  const [isRefused, setRefused] = useState(false);
  const button = useRef<HTMLButtonElement>(null);
  const close = () => {
    setOpen(false);
    setRefused(false);
  };
  const closeByKey = () => {
    close();
    requestAnimationFrame(() => button.current?.focus());
  };
  if (!isOpen) {
    return (
      <button
        ref={button}
        type="button"
        className="shrink-0 font-semibold text-ink text-value"
        aria-label={`${name} ${formatValue(value)}, enter a number`}
        onClick={() => setOpen(true)}
      >
        {formatValue(value)}
      </button>
    );
  }
  const ends = typed.map(formatValue).join(' to ');
  const commit = (text: string, leave: () => void) => {
    const number = typedNumber(text, typed);
    if (number === undefined && text !== String(value)) return setRefused(true);
    if (number !== undefined) onChange(number, true);
    leave();
  };
  return (
    <span className="text-right">
      <input
        ref={selectOnce}
        className="w-16 rounded border border-rule2 bg-surface px-1 text-right font-semibold text-ink"
        aria-label={`${name}, ${ends}`}
        aria-invalid={isRefused}
        inputMode="decimal"
        defaultValue={String(value)}
        onBlur={(event) => commit(event.target.value, close)}
        onKeyDown={(event) => {
          if (event.key === 'Enter') commit(event.currentTarget.value, closeByKey);
          if (event.key === 'Escape') closeByKey();
        }}
      />
      {isRefused && (
        <span role="alert" className="block whitespace-normal">
          Give a number, {ends}.
        </span>
      )}
    </span>
  );
}

const selectOnce = (element: HTMLInputElement | null) => element?.select();

/** The number that somebody wrote, if it is one between the ends. */
export function typedNumber(
  text: string,
  [low, high]: readonly [number, number],
): number | undefined {
  const number = text.trim() === '' ? Number.NaN : Number(text.replace('−', '-').replace(',', '.'));
  return number >= low && number <= high ? number : undefined;
}
