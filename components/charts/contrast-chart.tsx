'use client';

import { quantile } from 'd3';
import { memo, useMemo, useState } from 'react';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import {
  type ContrastDomain,
  contrastColumns,
  contrastDomain,
  magAt,
  type NamedContrastCurve,
  SAMPLES,
  sampleSeparations,
} from './contrast-curves';
import { bandPath, linePath, valueAt } from './paths';
import { CursorMarks } from './reading-marks';
import { scaleLinear, scaleLog } from './scales';
import { linearTicks, logTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface ContrastChartProps {
  curves: NamedContrastCurve[];
  /** Name of the curve that is drawn in ink. */
  selected?: string;
  /** Number of sigma that the contrast is quoted at; the axis says so. */
  nSigma?: number;
  height?: number;
}

const margin = { left: 46, right: 20, top: 12, bottom: 46 };

/** All curves thin, the median with its 68 % band, the selected one in ink; contrast grows downwards. */
export function ContrastChart({ curves, selected, nSigma, height }: ContrastChartProps) {
  const [measure, width] = useWidth<HTMLDivElement>(420);
  const [at, setAt] = useState<ReadPlace>();
  const total = height ?? 300;
  const domain = useMemo(() => contrastDomain(curves), [curves]);
  const summary = useMemo(() => summarise(curves, domain.separation), [curves, domain]);
  const chosen = curves.find((curve) => curve.name === selected);
  const frame = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: total - margin.bottom,
  };
  const x = scaleLog(domain.separation, [frame.left, frame.right]);
  const y = scaleLinear(domain.contrast, [frame.top, frame.bottom]);
  const contrastName =
    nSigma === undefined ? 'contrast, mag' : `contrast at ${formatPlain(nSigma)}\u2009σ, mag`;
  const xTicks = logTicks(...domain.separation, frame.right - frame.left);

  return (
    <ChartFigure
      name="contrast-curves"
      label={contrastSentence(curves, summary, chosen)}
      width={width}
      height={total}
      measure={measure}
      tables={() => [contrastTable(summary, chosen)]}
      data={() => [contrastColumns(curves)]}
      overlay={
        curves.length > 0 && (
          <ChartReadout
            frame={frame}
            columns={summary.separation.map(x)}
            rows={[frame.top + 60]}
            at={at}
            onAt={setAt}
            label="Read the contrast along the separation"
            say={({ column }) => sayContrast(summary, chosen, column)}
          />
        )
      }
    >
      <LeftAxis
        ticks={linearTicks(...domain.contrast, frame.bottom - frame.top, 40).filter(
          (tick) => tick.isMajor,
        )}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
      />
      <ThinCurves curves={curves} domain={domain} frame={frame} />
      {curves.length > 2 && (
        <path className="band" d={bandPath(summary.separation, summary.low, summary.high, x, y)} />
      )}
      {curves.length > 1 && (
        <path className="median-curve" d={linePath(summary.separation, summary.median, x, y)} />
      )}
      {chosen && (
        <path
          className="chosen-curve"
          d={linePath(chosen.separationArcsec, chosen.contrastMag, x, y)}
        />
      )}
      <text className="quiet page-halo" x={frame.right} y={frame.top + 8} textAnchor="end">
        {contrastName}
      </text>
      {curves.length > 2 && (
        <text className="page-halo" x={frame.right} y={frame.top + 28} textAnchor="end">
          median, 68{'\u2009'}% band
        </text>
      )}
      {chosen && (
        // Above, where no curve reaches: they end deep at the right.
        <text
          className="bold page-halo"
          x={frame.right}
          y={frame.top + (curves.length > 2 ? 48 : 28)}
          textAnchor="end"
        >
          {chosen.name}
        </text>
      )}
      {at && (
        <CursorMarks
          x={x(summary.separation[at.column])}
          top={frame.top}
          bottom={frame.bottom}
          ys={[
            ...(curves.length > 1 ? [y(summary.median[at.column])] : []),
            ...(chosen ? [y(magAt(chosen, summary.separation[at.column]))] : []),
          ]}
        />
      )}
      <BottomAxis
        ticks={withUnit(xTicks, '″')}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="angular separation"
      />
    </ChartFigure>
  );
}

const ThinCurves = memo(function ThinCurves({
  curves,
  domain,
  frame,
}: {
  curves: NamedContrastCurve[];
  domain: ContrastDomain;
  frame: { left: number; right: number; top: number; bottom: number };
}) {
  const x = scaleLog(domain.separation, [frame.left, frame.right]);
  const y = scaleLinear(domain.contrast, [frame.top, frame.bottom]);
  return curves.map((curve) => (
    <path
      key={curve.name}
      className="thin-curve"
      d={linePath(curve.separationArcsec, curve.contrastMag, x, y)}
    />
  ));
});

interface Summary {
  separation: Float64Array;
  median: Float64Array;
  low: Float64Array;
  high: Float64Array;
}

/** At each separation, over the curves that reach it. */
function summarise(curves: NamedContrastCurve[], reach: [number, number]): Summary {
  const separation = sampleSeparations(reach);
  const at = (share: number) =>
    separation.map((arcsec) => {
      const values = curves
        .filter(({ separationArcsec: it }) => it[0] <= arcsec && it[it.length - 1] >= arcsec)
        .map((curve) => valueAt(curve.separationArcsec, curve.contrastMag, arcsec));
      return quantile(values, share) ?? Number.NaN;
    });
  return { separation, median: at(0.5), low: at(0.16), high: at(0.84) };
}

function sayContrast(summary: Summary, chosen: NamedContrastCurve | undefined, at: number) {
  const arcsec = summary.separation[at];
  const mag = (value: number) =>
    Number.isFinite(value) ? `${value.toFixed(2)} mag` : 'not reached';
  return [
    `${formatPlain(arcsec, 3)} arcsec`,
    `median ${mag(summary.median[at])}`,
    ...(Number.isFinite(summary.low[at]) && summary.low[at] < summary.high[at]
      ? [`68\u2009% between ${mag(summary.low[at])} and ${mag(summary.high[at])}`]
      : []),
    ...(chosen ? [`${chosen.name} ${mag(magAt(chosen, arcsec))}`] : []),
  ];
}

function contrastSentence(
  curves: NamedContrastCurve[],
  summary: Summary,
  chosen: NamedContrastCurve | undefined,
): string {
  const at = [0.2, 0.5, 1, 2].filter(
    (arcsec) => arcsec >= summary.separation[0] && arcsec <= summary.separation[SAMPLES - 1],
  );
  const say = (xs: Float64Array, ys: Float64Array) =>
    at
      .map((arcsec) => [arcsec, valueAt(xs, ys, arcsec)])
      .filter(([, mag]) => Number.isFinite(mag))
      .map(([arcsec, mag]) => `${formatSignificant(mag, 3)} mag at ${formatPlain(arcsec)} arcsec`)
      .join(', ');
  const head = `Contrast curves of ${curves.length} ${curves.length === 1 ? 'target' : 'targets'}`;
  const median = curves.length > 1 ? `; median ${say(summary.separation, summary.median)}` : '';
  const own = chosen ? `; ${chosen.name} ${say(chosen.separationArcsec, chosen.contrastMag)}` : '';
  return `${head}${median}${own}`;
}

function contrastTable(summary: Summary, chosen: NamedContrastCurve | undefined): ChartTable {
  const mag = (value: number) => (Number.isFinite(value) ? value.toFixed(2) : '–');
  const rows = Array.from({ length: 12 }, (_, index) =>
    Math.round((index * (SAMPLES - 1)) / 11),
  ).map((index) => {
    const arcsec = summary.separation[index];
    const cells = [summary.low[index], summary.median[index], summary.high[index]];
    if (chosen) cells.push(magAt(chosen, arcsec));
    return [formatPlain(arcsec, 3), ...cells.map(mag)];
  });
  return {
    caption: 'Contrast, mag',
    columns: [
      'separation, arcsec',
      '16\u2009%',
      'median',
      '84\u2009%',
      ...(chosen ? [chosen.name] : []),
    ],
    rows,
  };
}
