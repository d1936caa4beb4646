'use client';

import { useState } from 'react';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import {
  contrastColumns,
  contrastDomain,
  magAt,
  type NamedContrastCurve,
  SAMPLES,
  sampleSeparations,
} from './contrast-curves';
import { spreadNames } from './end-names';
import { linePath } from './paths';
import { CursorMarks } from './reading-marks';
import { scaleLinear, scaleLog } from './scales';
import { seriesColour } from './series';
import { textWidth } from './text-width';
import { linearTicks, logTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface StarCurve extends NamedContrastCurve {
  /** Place of its survey in the collaboration, from 0: its colour everywhere. */
  seriesIndex: number;
}

interface StarCurvesChartProps {
  curves: StarCurve[];
  /** Number of sigma that all are quoted at; the axis says so. */
  nSigma?: number;
}

const HEIGHT = 300;
/** Between the end of the longest curve and the names. */
const GAP = 14;

const magWords = (value: number) =>
  Number.isFinite(value) ? `${value.toFixed(2)} mag` : 'not reached';

/** The curves of one star, each in the colour of its survey and named at its end; downwards is fainter. */
export function StarCurvesChart({ curves, nSigma }: StarCurvesChartProps) {
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const [at, setAt] = useState<ReadPlace>();
  const domain = contrastDomain(curves);
  const separations = sampleSeparations(domain.separation);
  const wide = Math.max(0, ...curves.map(({ name }) => textWidth(name, 14)));
  const frame = { left: 46, right: width - wide - GAP - 4, top: 26, bottom: HEIGHT - 46 };
  const x = scaleLog(domain.separation, [frame.left, frame.right]);
  const y = scaleLinear(domain.contrast, [frame.top, frame.bottom]);
  const ends = curves.map(({ separationArcsec, contrastMag }) => ({
    x: x(separationArcsec[separationArcsec.length - 1]),
    y: y(contrastMag[contrastMag.length - 1]),
  }));
  const names = spreadNames(
    ends.map((end) => end.y),
    frame,
  );
  return (
    <ChartFigure
      name="contrast-curves"
      label={curvesSentence(curves)}
      width={width}
      height={HEIGHT}
      measure={measure}
      tables={() => [curvesTable(curves, separations)]}
      data={() => [contrastColumns(curves)]}
      overlay={
        <ChartReadout
          frame={frame}
          columns={separations.map(x)}
          rows={[frame.top + 60]}
          at={at}
          onAt={setAt}
          label="Read the contrast along the separation"
          say={({ column }) => [
            `${formatPlain(separations[column], 3)} arcsec`,
            ...curves.map(
              (curve) => `${curve.name} ${magWords(magAt(curve, separations[column]))}`,
            ),
          ]}
        />
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
      {curves.map((curve, i) => (
        <g key={curve.name}>
          <path
            d={linePath(curve.separationArcsec, curve.contrastMag, x, y)}
            style={{ fill: 'none', stroke: seriesColour(curve.seriesIndex), strokeWidth: 2.2 }}
          />
          <path
            className="leader"
            d={`M${ends[i].x + 2},${ends[i].y}L${frame.right + GAP - 3},${names[i]}`}
          />
          <text className="page-halo" x={frame.right + GAP} y={names[i] + 5}>
            {curve.name}
          </text>
        </g>
      ))}
      <text className="quiet page-halo" x={frame.right} y={14} textAnchor="end">
        {nSigma === undefined ? 'contrast, mag' : `contrast at ${formatPlain(nSigma)}\u2009σ, mag`}
      </text>
      {at && (
        <CursorMarks
          x={x(separations[at.column])}
          top={frame.top}
          bottom={frame.bottom}
          ys={curves.map((curve) => y(magAt(curve, separations[at.column])))}
        />
      )}
      <BottomAxis
        ticks={withUnit(logTicks(...domain.separation, frame.right - frame.left), '″')}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="angular separation"
      />
    </ChartFigure>
  );
}

function curvesSentence(curves: StarCurve[]): string {
  const say = ({ name, separationArcsec: it, contrastMag }: StarCurve) => {
    const last = it.length - 1;
    return `${name} ${formatSignificant(contrastMag[0], 3)} mag at ${formatPlain(it[0], 2)} to ${formatSignificant(contrastMag[last], 3)} mag at ${formatPlain(it[last], 2)} arcsec`;
  };
  return `Contrast curves of one star: ${curves.map(say).join('; ')}`;
}

function curvesTable(curves: StarCurve[], separations: Float64Array): ChartTable {
  const rows = Array.from({ length: 12 }, (_, i) => Math.round((i * (SAMPLES - 1)) / 11));
  return {
    caption: 'Contrast, mag',
    columns: ['separation, arcsec', ...curves.map(({ name }) => name)],
    rows: rows.map((row) => [
      formatPlain(separations[row], 3),
      ...curves.map((curve) => {
        const mag = magAt(curve, separations[row]);
        return Number.isFinite(mag) ? mag.toFixed(2) : '–';
      }),
    ]),
  };
}
