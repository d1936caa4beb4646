'use client';

import { memo } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { areaPath, linePath } from './paths';
import { scaleLinear } from './scales';
import { evenTicks } from './ticks';

/** The limit as a function of a parameter, both as they come. */
export interface LimitTrace {
  parameter: Float64Array;
  limit: Float64Array;
}

/** px inside the drawing of a slider. */
export const TRACK = { top: 18, bottom: 86, inset: 10 };

interface TraceTrackProps {
  /** Undefined while it is being computed. */
  trace?: LimitTrace;
  /** px of the drawing. */
  width: number;
  min: number;
  max: number;
  /** Numbers under the track, where even steps would be wrong. */
  ticks?: number[];
  /** The same function from one drawing to the next, or the track is drawn anew. */
  formatLimit(limit: number): string;
}

/** The scales on which track and knob stand. */
export function traceScales({ trace, width, min, max }: Omit<TraceTrackProps, 'formatLimit'>) {
  const limits = trace ? Array.from(trace.limit).filter(Number.isFinite) : [];
  const [low, high] = [Math.min(...limits), Math.max(...limits)];
  return {
    x: scaleLinear([min, max], [TRACK.inset, width - TRACK.inset]),
    y: scaleLinear([0.45 * low, Math.max(high, low * 1.02)], [TRACK.bottom, TRACK.top]),
  };
}

/** What stands still under a knob: the area, its line, the limits at both ends and the axis. */
export const TraceTrack = memo(function TraceTrack(props: TraceTrackProps) {
  const { trace, width, min, max, formatLimit } = props;
  const { x, y } = traceScales(props);
  const ticks =
    props.ticks?.map((tick) => ({ value: tick, isMajor: true, label: formatPlain(tick) })) ??
    evenTicks(min, max);
  return (
    <>
      {trace ? (
        <>
          <path className="track" d={areaPath(trace.parameter, trace.limit, x, y, TRACK.bottom)} />
          <path className="trace-line" d={linePath(trace.parameter, trace.limit, x, y)} />
          <EndValues trace={trace} width={width} y={y} formatLimit={formatLimit} />
        </>
      ) : (
        <rect
          className="track"
          x={TRACK.inset}
          y={TRACK.top}
          width={Math.max(0, width - 2 * TRACK.inset)}
          height={TRACK.bottom - TRACK.top}
        />
      )}
      <BottomAxis
        ticks={ticks}
        scale={x}
        y={TRACK.bottom}
        x0={TRACK.inset}
        x1={width - TRACK.inset}
      />
    </>
  );
});

interface EndValuesProps {
  trace: LimitTrace;
  width: number;
  y(limit: number): number;
  formatLimit(limit: number): string;
}

function EndValues({ trace, width, y, formatLimit }: EndValuesProps) {
  const last = trace.limit.length - 1;
  return (
    <>
      <text className="quiet" x={TRACK.inset} y={Math.max(11, y(trace.limit[0]) - 7)}>
        {formatLimit(trace.limit[0])}
      </text>
      <text
        className="quiet"
        x={width - TRACK.inset}
        y={Math.max(11, y(trace.limit[last]) - 7)}
        textAnchor="end"
      >
        {formatLimit(trace.limit[last])}
      </text>
    </>
  );
}
