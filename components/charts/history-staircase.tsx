'use client';

import { scaleLinear } from 'd3';
import { formatLimit, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure } from './chart-figure';
import { textWidth } from './text-width';
import { linearTicks, type Tick, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface HistoryStep {
  /** When the limit took this value, ms since 1970. */
  at: number;
  /** What changed: "ages, table 4". */
  change: string;
  limit: number;
  /** The same inputs with zero detections. */
  limitWithZero?: number;
}

export interface HistoryStaircaseProps {
  steps: HistoryStep[];
  /** End of the time axis, ms since 1970. */
  now: number;
  quantity: RateQuantity;
  height?: number;
}

const margin = { left: 44, right: 56, top: 48, bottom: 34 };

/** How the limit has moved: a staircase with one ring and two lines of text at each change. */
export function HistoryStaircase({ steps, now, quantity, height = 296 }: HistoryStaircaseProps) {
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const frame = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: height - margin.bottom,
  };
  const start = steps[0]?.at ?? now - 1;
  const span = Math.max(1, now - start);
  const x = scaleLinear([start - 0.06 * span, now + 0.02 * span], [frame.left, frame.right]);
  const peak = Math.max(1e-6, ...steps.map(({ limit }) => limit));
  const y = scaleLinear([0, peak], [frame.bottom, frame.top]);
  const unit = quantity === 'host_fraction' ? '\u2009%' : '';
  const rates = linearTicks(0, 100 * peak, frame.bottom - frame.top, 60).filter(
    (tick) => tick.isMajor,
  );
  const last = steps.at(-1);
  const hasZero = steps.some(({ limitWithZero }) => limitWithZero !== undefined);
  const labels = placeLabels(steps, x, y, frame.right, quantity);

  return (
    <ChartFigure
      label={`History of the upper limit: ${steps
        .map(({ change, limit }) => `${change} ${formatLimit(limit, quantity)}`)
        .join(', then ')}`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [
        {
          caption: 'History of the upper limit',
          columns: ['change', 'date', 'limit', 'with zero detections'],
          rows: steps.map((step) => [
            step.change,
            new Date(step.at).toISOString().slice(0, 10),
            formatLimit(step.limit, quantity),
            step.limitWithZero === undefined ? '–' : formatLimit(step.limitWithZero, quantity),
          ]),
        },
      ]}
    >
      <LeftAxis
        ticks={withUnit(rates, unit)}
        scale={(percent) => y(percent / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right + 40}
        hasLine={false}
      />
      <BottomAxis
        ticks={timeTicks(start, now)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right + 40}
      />
      {hasZero && last && (
        <>
          <path
            className="alternative-line"
            d={stairs(steps, x, (step) => y(step.limitWithZero ?? step.limit), x(now))}
          />
          {last.limitWithZero !== undefined && (
            <text className="quiet" x={x(now) + 6} y={y(last.limitWithZero) + 4}>
              {formatLimit(last.limitWithZero, quantity)}
            </text>
          )}
          <text
            className="quiet page-halo"
            x={(frame.left + frame.right) / 2}
            y={frame.bottom - 10}
            textAnchor="middle"
          >
            dashed: with zero detections
          </text>
        </>
      )}
      <path className="step-line" d={stairs(steps, x, (step) => y(step.limit), x(now))} />
      {steps.map((step) => (
        <circle key={step.at} className="step-dot" cx={x(step.at)} cy={y(step.limit)} r="4.5" />
      ))}
      {labels.map((label) => (
        <g key={label.key}>
          {label.leader && <path className="leader" d={label.leader} />}
          {label.change !== '' && (
            <text
              className="page-halo"
              x={label.changeX}
              y={label.changeY}
              textAnchor={label.leader ? 'end' : 'start'}
            >
              {label.change}
            </text>
          )}
          <text className="bold page-halo" x={label.x} y={label.y}>
            {label.limit}
          </text>
        </g>
      ))}
    </ChartFigure>
  );
}

function stairs(
  steps: HistoryStep[],
  x: (at: number) => number,
  y: (step: HistoryStep) => number,
  end: number,
): string {
  return `${steps.map((step, index) => (index === 0 ? `M${x(step.at)},${y(step)}` : `H${x(step.at)}V${y(step)}`)).join('')}H${end}`;
}

/**
 * Two lines above the tread. The last change, whose tread may be short, rises on a leader above the
 * tread before it; any other without room keeps its limit and is read in the table.
 */
function placeLabels(
  steps: HistoryStep[],
  x: (at: number) => number,
  y: (limit: number) => number,
  right: number,
  quantity: RateQuantity,
) {
  return steps.map((step, index) => {
    const at = x(step.at);
    const top = y(step.limit);
    const words = textWidth(step.change, 13);
    const limit = formatLimit(step.limit, quantity);
    const isLast = index === steps.length - 1;
    const room = (isLast ? right + 50 : x(steps[index + 1].at)) - at - 12;
    const fits = words <= room;
    const rises = !fits && isLast && index > 0 && words < at - x(steps[0].at) && right > 480;
    const riseTo = rises ? Math.min(top, y(steps[index - 1].limit)) - 46 : 0;
    return {
      key: step.at,
      x: at + 9,
      y: top - 9,
      change: fits || rises ? step.change : '',
      changeX: rises ? Math.min(at + 40, right + 50) : at + 9,
      changeY: rises ? riseTo : top - 25,
      leader: rises ? `M${at},${top - 8}V${riseTo + 6}` : undefined,
      limit: textWidth(limit, 13) <= room ? limit : '',
    };
  });
}

/** Starts of years, or of months where the axis is shorter than two years. */
function timeTicks(start: number, end: number): Tick[] {
  const from = new Date(start);
  const months = (end - start) / 2_629_800_000;
  const every = months > 24 ? 12 : months > 8 ? 3 : 1;
  const ticks: Tick[] = [];
  for (let month = 0; month <= months + every; month += 1) {
    const at = Date.UTC(from.getUTCFullYear(), from.getUTCMonth() + month, 1);
    const date = new Date(at);
    if (at < start || at > end || date.getUTCMonth() % every !== 0) continue;
    const label =
      every === 12
        ? String(date.getUTCFullYear())
        : date.toLocaleDateString('en-GB', { month: 'short', year: 'numeric', timeZone: 'UTC' });
    ticks.push({ value: at, isMajor: true, label });
  }
  return ticks;
}
