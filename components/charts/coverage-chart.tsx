'use client';

import { useState } from 'react';
import { formatPercent, formatPlain, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import type { Box } from './map-contours';
import { linePath } from './paths';
import { scaleLinear, scaleLog } from './scales';
import { linearTicks, logTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface CoveragePoint {
  /** Level or true rate [fraction]. */
  x: number;
  /** Share of the surveys whose limit lies above the truth. */
  observed: number;
  /** What theory predicts. */
  expected: number;
  /** Of a share of that many surveys (binomial). */
  standardError: number;
}

export interface CoverageChartProps {
  points: CoveragePoint[];
  /** "credible level", "true host fraction". */
  xName: string;
  /** Stands behind the last number of the axis. */
  xUnit: string;
  isLog?: boolean;
  /** What is covered, for the sentence: "Coverage of limits at five levels". */
  subject: string;
}

/** Standard errors inside which a coverage passes. */
export const PASSING_ERRORS = 4;
const margin = { left: 46, right: 16, top: 44, bottom: 48 };
const upperHeight = 190;
const gap = 46;
const lowerHeight = 110;

/** How often limits held against how often they should have; below, the difference alone. */
export function CoverageChart(props: CoverageChartProps) {
  const { points, xName, xUnit, isLog = false } = props;
  const [measure, width] = useWidth<HTMLDivElement>(620);
  const [at, setAt] = useState<ReadPlace>();
  const upper: Box = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: margin.top + upperHeight,
  };
  const lower: Box = {
    ...upper,
    top: upper.bottom + gap,
    bottom: upper.bottom + gap + lowerHeight,
  };
  const height = lower.bottom + margin.bottom;
  const { x, ticks } = levelAxis(points, isLog, upper);
  const y = scaleLinear(coverageSpan(points), [upper.bottom, upper.top]);
  const widest = Math.max(
    ...points.map(
      ({ observed, expected, standardError }) =>
        Math.max(Math.abs(observed - expected), PASSING_ERRORS * standardError) + standardError,
    ),
    0.002,
  );
  const d = scaleLinear([-widest, widest], [lower.bottom, lower.top]);
  const [low, high] = y.domain();
  const percentTicks = (from: number, to: number, length: number, spacing: number) =>
    linearTicks(100 * from, 100 * to, length, spacing).filter(({ isMajor }) => isMajor);

  return (
    <ChartFigure
      name="coverage"
      label={coverageSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [coverageTable(props)]}
      caption={`shaded: within ${PASSING_ERRORS} standard errors`}
      overlay={
        <ChartReadout
          frame={{ ...upper, bottom: lower.bottom }}
          columns={points.map((point) => x(point.x))}
          rows={[upper.top + 60]}
          at={at}
          onAt={setAt}
          label={`Read the coverage along the ${xName}`}
          say={({ column }) => pointInWords(points[column], xName)}
        />
      }
    >
      <text className="quiet" x={0} y={14}>
        surveys whose limit lies above the truth, %
      </text>
      <Names right={upper.right} />
      <LeftAxis
        ticks={withUnit(percentTicks(low, high, upperHeight, 36), '\u2009%')}
        scale={(percentage) => y(percentage / 100)}
        x={upper.left}
        y0={upper.bottom}
        y1={upper.top}
        gridTo={upper.right}
        hasLine={false}
      />
      <path
        className="expected-line"
        d={linePath(
          points.map((point) => point.x),
          points.map(({ expected }) => expected),
          x,
          y,
        )}
      />
      <text className="quiet" x={0} y={lower.top - 14}>
        observed less expected, points
      </text>
      <LeftAxis
        ticks={percentTicks(-widest, widest, lowerHeight, 24)}
        scale={(percentage) => d(percentage / 100)}
        x={lower.left}
        y0={lower.bottom}
        y1={lower.top}
        gridTo={lower.right}
        hasLine={false}
      />
      {points.map((point, index) => (
        <Point
          key={point.x}
          point={point}
          x={x(point.x)}
          y={y}
          d={d}
          isRead={at?.column === index}
        />
      ))}
      <line className="expected-line" x1={lower.left} x2={lower.right} y1={d(0)} y2={d(0)} />
      <BottomAxis
        ticks={withUnit(ticks, xUnit)}
        scale={(percentage) => x(percentage / 100)}
        y={lower.bottom}
        x0={lower.left}
        x1={lower.right}
        isLastAtEdge
        name={xName}
      />
    </ChartFigure>
  );
}

type Scale = (value: number) => number;

function Names({ right }: { right: number }) {
  return (
    <g>
      <circle className="observed-dot" cx={right - 132} cy={30} r="3.6" />
      <text x={right - 124} y={34}>
        observed
      </text>
      <line className="expected-line" x1={right - 64} x2={right - 46} y1={30} y2={30} />
      <text x={right} y={34} textAnchor="end">
        theory
      </text>
    </g>
  );
}

function Point({
  point,
  x,
  y,
  d,
  isRead,
}: {
  point: CoveragePoint;
  x: number;
  y: Scale;
  d: Scale;
  isRead: boolean;
}) {
  const { observed, expected, standardError } = point;
  const difference = observed - expected;
  const radius = isRead ? 5.5 : 3.6;
  const top = d(PASSING_ERRORS * standardError);
  return (
    <g>
      <rect
        className="tolerance"
        x={x - 6}
        width="12"
        y={top}
        height={d(-PASSING_ERRORS * standardError) - top}
      />
      <circle className="expected-dot" cx={x} cy={y(expected)} r="4.5" />
      <ErrorBar x={x} from={y(observed - standardError)} to={y(observed + standardError)} />
      <circle className="observed-dot" cx={x} cy={y(observed)} r={radius} />
      <ErrorBar x={x} from={d(difference - standardError)} to={d(difference + standardError)} />
      <circle className="observed-dot" cx={x} cy={d(difference)} r={radius} />
    </g>
  );
}

function ErrorBar({ x, from, to }: { x: number; from: number; to: number }) {
  return <line className="error-bar" x1={x} x2={x} y1={from} y2={to} />;
}

function levelAxis(points: CoveragePoint[], isLog: boolean, { left, right }: Box) {
  const values = points.map((point) => point.x);
  const [low, high] = [Math.min(...values), Math.max(...values)];
  if (isLog && low > 0 && high > low) {
    const ends = [low / 1.3, high * 1.3];
    const x = scaleLog(ends, [left, right]);
    return { x, ticks: logTicks(100 * ends[0], 100 * ends[1], right - left) };
  }
  const pad = high > low ? 0.06 * (high - low) : 0.1 * high;
  const ends = [Math.max(0, low - pad), high + pad];
  const x = scaleLinear(ends, [left, right]);
  return { x, ticks: linearTicks(100 * ends[0], 100 * ends[1], right - left) };
}

function coverageSpan(points: CoveragePoint[]): [number, number] {
  const all = points.flatMap(({ observed, expected, standardError }) => [
    expected,
    observed - standardError,
    observed + standardError,
  ]);
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const pad = Math.max(0.06 * (high - low), 0.01);
  return [Math.max(0, low - pad), Math.min(1, high + pad)];
}

/** "94.7 ± 0.7 %" in the digits that the error allows. */
export function shareWithError(share: number, error: number): string {
  const decimals = error > 0 ? Math.max(0, Math.min(3, -Math.floor(Math.log10(100 * error)))) : 1;
  return `${(100 * share).toFixed(decimals)} ± ${(100 * error).toFixed(decimals)}\u2009%`;
}

function pointInWords(point: CoveragePoint, xName: string): string[] {
  const { observed, expected, standardError } = point;
  const errors = standardError > 0 ? Math.abs(observed - expected) / standardError : 0;
  return [
    `held in ${shareWithError(observed, standardError)}`,
    `expected ${formatPercent(expected, 3)}`,
    `${xName} ${formatPlain(100 * point.x)}\u2009%`,
    `${formatSignificant(errors, 2)} standard errors apart`,
  ];
}

function coverageSentence({ points, subject, xName }: CoverageChartProps): string {
  const said = points.map(
    (point) =>
      `${formatPlain(100 * point.x)} per cent: held in ${formatPercent(point.observed, 3)}, expected ${formatPercent(point.expected, 3)}`,
  );
  return `${subject}, by ${xName}. ${said.join('; ')}`;
}

function coverageTable({ points, subject, xName }: CoverageChartProps): ChartTable {
  return {
    caption: subject,
    columns: [`${xName}, %`, 'observed, %', 'expected, %', 'standard error, points'],
    rows: points.map((point) => [
      formatPlain(100 * point.x),
      formatSignificant(100 * point.observed, 4),
      formatSignificant(100 * point.expected, 4),
      formatSignificant(100 * point.standardError, 2),
    ]),
  };
}
