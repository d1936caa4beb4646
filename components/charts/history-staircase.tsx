'use client';

import { useState } from 'react';
import { useDay } from '@/components/ui/time-zone';
import { formatLimit, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { CursorMarks } from './reading-marks';
import { scaleLinear } from './scales';
import { textWidth } from './text-width';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface HistoryStep {
  /** When the limit took this value, ms since 1970: the table gives its date. */
  at: number;
  /** Number of the run that gave it. */
  run: number;
  /** What changed: "ages, table 4". */
  change: string;
  limit: number;
  /** The same inputs with zero detections. */
  limitWithZero?: number;
}

export interface HistoryStaircaseProps {
  steps: HistoryStep[];
  quantity: RateQuantity;
  height?: number;
}

const margin = { left: 44, right: 56, top: 48, bottom: 34 };

/**
 * How the limit has moved: a staircase with one ring and two lines of text at each change.
 *
 * Runs are spaced evenly, in their order: several of one day would lie on each other on a clock.
 */
export function HistoryStaircase({ steps, quantity, height = 296 }: HistoryStaircaseProps) {
  const day = useDay();
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const last = steps.at(-1);
  const zeroText =
    last?.limitWithZero === undefined ? '' : formatLimit(last.limitWithZero, quantity);
  const frame = {
    left: margin.left,
    right: width - Math.max(margin.right, textWidth(zeroText, 13) + 12),
    top: margin.top,
    bottom: height - margin.bottom,
  };
  const end = Math.max(1, steps.length - 0.25);
  const x = scaleLinear([-0.08 * end, end], [frame.left, frame.right]);
  const peak = Math.max(1e-6, ...steps.map(({ limit }) => limit));
  const y = scaleLinear([0, peak], [frame.bottom, frame.top]);
  const rates = linearTicks(0, 100 * peak, frame.bottom - frame.top, 60).filter(
    (tick) => tick.isMajor,
  );
  const hasZero = steps.some(({ limitWithZero }) => limitWithZero !== undefined);
  const labels = placeLabels(steps, x, y, frame.right, quantity);

  return (
    <ChartFigure
      name="limit-history"
      label={`History of the upper limit: ${steps
        .map(({ change, limit }) => `${change} ${formatLimit(limit, quantity)}`)
        .join(', then ')}`}
      width={width}
      height={height}
      measure={measure}
      data={() => [
        {
          name: 'limit-history',
          columns: ['run', 'change', 'date', 'limit', 'limit_zero_detections'],
          rows: steps.map((step) => [
            step.run,
            step.change,
            new Date(step.at).toISOString(),
            step.limit,
            step.limitWithZero ?? null,
          ]),
        },
      ]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={steps.map((_, index) => x(index))}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label="Read the limit run by run"
          say={({ column }) => sayStep(steps[column], quantity, day)}
        />
      }
      tables={() => [
        {
          caption: 'History of the upper limit',
          columns: ['run', 'change', 'date', 'limit', 'with zero detections'],
          rows: steps.map((step) => [
            String(step.run),
            step.change,
            day(step.at),
            formatLimit(step.limit, quantity),
            step.limitWithZero === undefined ? '–' : formatLimit(step.limitWithZero, quantity),
          ]),
        },
      ]}
    >
      <LeftAxis
        ticks={withRateUnit(rates, quantity)}
        scale={(percent) => y(percent / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={width - 16}
        hasLine={false}
      />
      <BottomAxis
        ticks={steps.map((step, index) => ({
          value: index,
          label: `run ${step.run}`,
          isMajor: true,
        }))}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={width - 16}
      />
      {hasZero && last && (
        <>
          <path
            className="alternative-line"
            d={stairs(steps, x, (step) => y(step.limitWithZero ?? step.limit), x(end))}
          />
          {last.limitWithZero !== undefined && (
            <text className="quiet" x={x(end) + 6} y={y(last.limitWithZero) + 4}>
              {zeroText}
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
      <path className="step-line" d={stairs(steps, x, (step) => y(step.limit), x(end))} />
      {at && <CursorMarks x={x(at.column)} top={frame.top} bottom={frame.bottom} />}
      {steps.map((step, index) => (
        <circle key={step.run} className="step-dot" cx={x(index)} cy={y(step.limit)} r="4.5" />
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

function sayStep(
  step: HistoryStep,
  quantity: RateQuantity,
  day: (moment: number) => string,
): string[] {
  return [
    `${formatLimit(step.limit, quantity)}, run ${step.run}`,
    step.change,
    day(step.at),
    ...(step.limitWithZero === undefined
      ? []
      : [`${formatLimit(step.limitWithZero, quantity)} with zero detections`]),
  ];
}

function stairs(
  steps: HistoryStep[],
  x: (index: number) => number,
  y: (step: HistoryStep) => number,
  end: number,
): string {
  return `${steps.map((step, index) => (index === 0 ? `M${x(index)},${y(step)}` : `H${x(index)}V${y(step)}`)).join('')}H${end}`;
}

/**
 * Two lines above the tread. The last change, whose tread may be short, rises on a leader above the
 * tread before it; any other without room keeps its limit and is read in the table.
 */
function placeLabels(
  steps: HistoryStep[],
  x: (index: number) => number,
  y: (limit: number) => number,
  right: number,
  quantity: RateQuantity,
) {
  return steps.map((step, index) => {
    const at = x(index);
    const top = y(step.limit);
    const words = textWidth(step.change, 13);
    const limit = formatLimit(step.limit, quantity);
    const isLast = index === steps.length - 1;
    const room = (isLast ? right + 50 : x(index + 1)) - at - 12;
    const fits = words <= room;
    const rises = !fits && isLast && index > 0 && words < at - x(0) && right > 480;
    const riseTo = rises ? Math.min(top, y(steps[index - 1].limit)) - 46 : 0;
    return {
      key: step.run,
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
