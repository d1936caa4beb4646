'use client';

import { useId, useMemo, useState } from 'react';
import { formatRate, type RateQuantity } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { BoundFlag, flagBoxes } from './bound-flag';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { type DataTable, tableOfColumns } from './data-table';
import { overlaidTop, placeNames } from './overlaid-layout';
import { areaPath, linePath, valueAt } from './paths';
import { limitWithLevel } from './posterior-words';
import type { RateCurve } from './rate-curve';
import { CursorMarks } from './reading-marks';
import { scaleLinear } from './scales';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export interface NamedPosterior {
  /** One letter: it stands beside the curve and on the flag. */
  letter: string;
  /** "A-31, zero detections". */
  label: string;
  curve: RateCurve;
  limit: number;
  /** Fraction, such as 0.95. */
  credibleLevel: number;
}

export interface OverlaidPosteriorsChartProps {
  /** All on one axis, so all of one quantity. */
  posteriors: NamedPosterior[];
  quantity: RateQuantity;
  height?: number;
}

const margin = { left: 8, right: 14, top: 24, bottom: 50 };
/** The first is solid and filled; the others differ by their dashes, and all by their letters. */
const dashes = ['none', '7 4', '2 3', '10 3 2 3', '1 5', '14 5'];
const flagApart = 32;

/** Posteriors of several runs on one axis, each with its name beside the curve and its bound. */
export function OverlaidPosteriorsChart(props: OverlaidPosteriorsChartProps) {
  const { posteriors, quantity } = props;
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const clipId = useId();
  const total = props.height ?? (width < 560 ? 300 : 400);
  const frame = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: total - margin.bottom,
  };
  const max = Math.max(...posteriors.map(({ curve }) => curve.rate[curve.rate.length - 1]));
  const top = useMemo(() => overlaidTop(posteriors.map(({ curve }) => curve)), [posteriors]);
  const x = scaleLinear([0, max], [frame.left, frame.right]);
  const y = scaleLinear([0, top], [frame.bottom, frame.top]);
  const densityAt = (curve: RateCurve, rate: number) => valueAt(curve.rate, curve.density, rate);
  const first = posteriors[0];
  const reads = useMemo(() => Array.from({ length: 121 }, (_, i) => (max * i) / 120), [max]);
  // From the top down, the smallest limit first: no bar then runs through the flag of another.
  const flags = [...posteriors]
    .sort((a, b) => a.limit - b.limit)
    .map((one, index) => ({
      one,
      x: x(one.limit),
      top: frame.top + 6 + flagApart * index,
      text: `${one.letter} ${limitWithLevel(one.limit, one.credibleLevel, quantity)}`,
    }));
  const names = placeNames(
    posteriors.map(({ letter, label, curve }) => ({
      words: width < 560 ? [letter] : [`${letter}: ${label}`, letter],
      curve,
    })),
    { x, y, frame },
    flags.flatMap((flag) => flagBoxes({ ...frame, ...flag })),
  );
  return (
    <ChartFigure
      name="posteriors"
      label={overlaidSentence(props)}
      width={width}
      height={total}
      measure={measure}
      tables={() => [overlaidTable(props)]}
      data={() => posteriors.map((one) => columnsOf(one, quantity))}
      overlay={
        <ChartReadout
          frame={frame}
          columns={reads.map(x)}
          rows={[frame.top + 60]}
          at={at}
          onAt={setAt}
          label="Read the posteriors along the rate"
          say={({ column }) => [
            formatRate(reads[column], quantity),
            ...posteriors.map(({ letter, curve }) => {
              const below = valueAt(curve.rate, curve.cumulative, reads[column]);
              return `${letter}: ${(100 * Math.min(1, below)).toFixed(1)}\u2009% lie below`;
            }),
          ]}
        />
      }
    >
      <clipPath id={clipId}>
        <rect
          x={frame.left}
          y={frame.top}
          width={Math.max(0, frame.right - frame.left)}
          height={frame.bottom - frame.top + 2}
        />
      </clipPath>
      <g clipPath={`url(#${clipId})`}>
        <path
          className="posterior-fill"
          d={areaPath(first.curve.rate, first.curve.density, x, y, frame.bottom, 0, first.limit)}
        />
        {posteriors.map(({ letter, curve }, index) => (
          <path
            key={letter}
            className={index === 0 ? 'posterior-line' : 'other-posterior'}
            style={{ strokeDasharray: dashes[index % dashes.length] }}
            d={linePath(curve.rate, curve.density, x, y)}
          />
        ))}
      </g>
      <text className="quiet" x={frame.left} y={12}>
        posterior density
      </text>
      {names.map((place) => (
        <text
          key={place.words}
          className="bold page-halo"
          x={place.x}
          y={place.y}
          textAnchor={place.anchor}
        >
          {place.words}
        </text>
      ))}
      {at && (
        <CursorMarks
          x={x(reads[at.column])}
          top={frame.top}
          bottom={frame.bottom}
          ys={posteriors.map(({ curve }) =>
            Math.max(frame.top, y(densityAt(curve, reads[at.column]))),
          )}
        />
      )}
      <BottomAxis
        ticks={withRateUnit(
          linearTicks(0, 100 * max, frame.right - frame.left, width < 560 ? 72 : 96),
          quantity,
        )}
        scale={(percent) => x(percent / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isFirstAtEdge
        isLastAtEdge
        name={quantity === 'host_fraction' ? 'host fraction' : 'planets per 100 stars'}
      />
      {flags.map(({ one, ...flag }) => (
        <BoundFlag
          key={one.letter}
          {...flag}
          bottom={frame.bottom}
          right={frame.right}
          left={frame.left}
          isOpen={one !== first}
        />
      ))}
    </ChartFigure>
  );
}

function columnsOf({ letter, curve }: NamedPosterior, quantity: RateQuantity): DataTable {
  return tableOfColumns(`posterior ${letter}`, {
    [quantity]: curve.rate,
    density: curve.density,
    cumulative: curve.cumulative,
  });
}

function overlaidSentence({ posteriors, quantity }: OverlaidPosteriorsChartProps): string {
  return `Posteriors on one axis: ${posteriors
    .map(
      ({ letter, label, limit, credibleLevel }) =>
        `${letter}, ${label}, ${limitWithLevel(limit, credibleLevel, quantity)}`,
    )
    .join('; ')}`;
}

function overlaidTable({ posteriors, quantity }: OverlaidPosteriorsChartProps): ChartTable {
  const shares = [0.05, 0.16, 0.5, 0.84, 0.95];
  const at = (curve: RateCurve, share: number) => {
    const index = curve.cumulative.findIndex((value) => value >= share);
    return index < 0 ? '–' : formatRate(curve.rate[index], quantity);
  };
  return {
    caption: 'Quantiles of the posteriors',
    columns: ['probability below', ...posteriors.map(({ letter, label }) => `${letter}: ${label}`)],
    rows: shares.map((share) => [
      `${Math.round(100 * share)}\u2009%`,
      ...posteriors.map(({ curve }) => at(curve, share)),
    ]),
  };
}
