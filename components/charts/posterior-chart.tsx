'use client';

import { useId, useMemo, useState } from 'react';
import { BottomAxis, LeftAxis } from './axes';
import { BoundFlag } from './bound-flag';
import { ChartFigure } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { areaPath, linePath, valueAt } from './paths';
import { PosteriorLabels } from './posterior-labels';
import { densityTop } from './posterior-layout';
import {
  formatLevel,
  limitWithLevel,
  type PosteriorData,
  posteriorColumns,
  posteriorSentence,
  posteriorTables,
  sayPosterior,
} from './posterior-words';
import { CursorMarks } from './reading-marks';
import { scaleLinear } from './scales';
import { linearTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';

export type PosteriorView = 'density' | 'cumulative';

export interface PosteriorChartProps extends PosteriorData {
  view?: PosteriorView;
  /** Without it the chart keeps the choice itself. */
  onViewChange?(view: PosteriorView): void;
  height?: number;
}

const margin = { top: 8, right: 14, bottom: 50 };

/** Posterior with its 68 % band, the bound, the tail beyond it, the prior, and one other curve. */
export function PosteriorChart({ view, onViewChange, height, ...data }: PosteriorChartProps) {
  const [own, setOwn] = useState<PosteriorView>('density');
  const [measure, width] = useWidth<HTMLDivElement>(820);
  const [at, setAt] = useState<ReadPlace>();
  const hatchId = useId();
  const clipId = useId();
  const shown = view ?? own;
  const isNarrow = width < 560;
  const total = height ?? (isNarrow ? 250 : 388);
  const isCumulative = shown === 'cumulative';

  const { curve, limit, quantity, credibleLevel } = data;
  const frame = {
    left: isCumulative ? 48 : 8,
    right: width - margin.right,
    top: margin.top,
    bottom: total - margin.bottom,
  };
  const max = curve.rate[curve.rate.length - 1];
  const x = scaleLinear([0, max], [frame.left, frame.right]);
  const y = scaleLinear([0, isCumulative ? 1 : densityTop(data)], [frame.bottom, frame.top]);
  const values = (of: PosteriorData['curve']) => (isCumulative ? of.cumulative : of.density);
  const line = (of: PosteriorData['curve']) => linePath(of.rate, values(of), x, y);
  const area = (from: number, to: number) =>
    areaPath(curve.rate, curve.density, x, y, frame.bottom, from, to);

  const picked = useMemo(() => readPoints(curve.rate.length), [curve]);
  const columns = picked.map((point) => x(curve.rate[point]));
  const ticks = linearTicks(0, 100 * max, frame.right - frame.left, isNarrow ? 72 : 96);
  const flagTop = isCumulative
    ? y(credibleLevel)
    : data.second
      ? frame.top + Math.max(84, 0.36 * (frame.bottom - frame.top))
      : frame.top + Math.max(36, 0.17 * (frame.bottom - frame.top));

  return (
    <ChartFigure
      name="posterior"
      label={posteriorSentence(data)}
      width={width}
      height={total}
      measure={measure}
      tables={() => posteriorTables(data)}
      data={() => posteriorColumns(data)}
      overlay={
        <ChartReadout
          frame={frame}
          columns={columns}
          rows={[frame.top + 60]}
          at={at}
          onAt={setAt}
          label="Read the posterior along the rate"
          say={({ column }) => sayPosterior(data, picked[column])}
        />
      }
      header={
        <ViewChoice
          shown={shown}
          onChoose={(next) => {
            setOwn(next);
            onViewChange?.(next);
          }}
        />
      }
    >
      <defs>
        <pattern
          id={hatchId}
          width="5"
          height="5"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <line className="hatch-line" x1="0" x2="0" y1="0" y2="5" />
        </pattern>
        <clipPath id={clipId}>
          <rect
            x={frame.left}
            y={frame.top}
            width={Math.max(0, frame.right - frame.left)}
            height={frame.bottom - frame.top + 2}
          />
        </clipPath>
      </defs>
      <text className="quiet" data-file-only="" visibility="hidden" x={frame.left} y={-4}>
        {isCumulative ? 'cumulative probability' : 'posterior density'}
      </text>
      {isCumulative && (
        <LeftAxis
          ticks={[0, 0.5, credibleLevel].map((value) => ({
            value,
            isMajor: true,
            label: formatLevel(value),
          }))}
          scale={y}
          x={frame.left}
          y0={frame.bottom}
          y1={frame.top}
          gridTo={frame.right}
        />
      )}
      <g clipPath={`url(#${clipId})`}>
        {!isCumulative && (
          <>
            <path className="posterior-fill" d={area(0, limit)} />
            {data.interval68 && !data.second && (
              <path className="posterior-core" d={area(...data.interval68)} />
            )}
            <path d={area(limit, max)} fill={`url(#${hatchId})`} />
            {data.prior && (
              <path className="prior-line" d={linePath(curve.rate, data.prior.density, x, y)} />
            )}
          </>
        )}
        {data.saved && <path className="saved-line" d={line(data.saved.curve)} />}
        <path className="posterior-line" d={line(curve)} />
        {data.alternative && <path className="alternative-line" d={line(data.alternative.curve)} />}
        {data.second && <path className="second-line" d={line(data.second.curve)} />}
        {data.median !== undefined && !data.second && (
          <line
            className="median-line"
            x1={x(data.median)}
            x2={x(data.median)}
            y1={y(valueAt(curve.rate, values(curve), data.median)) + 1}
            y2={frame.bottom}
          />
        )}
      </g>
      {at && picked[at.column] !== undefined && (
        <CursorMarks
          x={columns[at.column]}
          top={frame.top}
          bottom={frame.bottom}
          ys={[y(values(curve)[picked[at.column]])]}
        />
      )}
      <BottomAxis
        ticks={withRateUnit(ticks, quantity)}
        scale={(percent) => x(percent / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isFirstAtEdge={!isCumulative}
        isLastAtEdge
        name={axisName(quantity, isNarrow)}
      />
      {data.alternative && (
        <line
          className="alternative-limit"
          x1={x(data.alternative.limit)}
          x2={x(data.alternative.limit)}
          y1={frame.bottom}
          y2={frame.bottom - 34}
        />
      )}
      {data.second && (
        <BoundFlag
          x={x(data.second.limit)}
          top={isCumulative ? y(credibleLevel) + 44 : frame.top + 46}
          bottom={frame.bottom}
          right={frame.right}
          left={frame.left}
          text={`${data.second.name} ${limitWithLevel(data.second.limit, credibleLevel, quantity)}`}
          isOpen
        />
      )}
      <PosteriorLabels
        data={data}
        frame={frame}
        x={x}
        y={y}
        flagTop={flagTop}
        isCumulative={isCumulative}
        isNarrow={isNarrow}
      />
      <BoundFlag
        x={x(limit)}
        top={flagTop}
        bottom={frame.bottom}
        right={frame.right}
        left={frame.left}
        text={`${data.name ? `${data.name} ` : ''}${limitWithLevel(limit, credibleLevel, quantity)}`}
      />
    </ChartFigure>
  );
}

const mostRead = 200;

/** Points of the curve at which it is read: enough for every pixel that a finger finds. */
function readPoints(length: number): number[] {
  const count = Math.min(length, mostRead);
  return Array.from({ length: count }, (_, i) => Math.round((i * (length - 1)) / (count - 1)));
}

function axisName(quantity: PosteriorData['quantity'], isNarrow: boolean) {
  if (quantity === 'companions_per_star') return 'planets per 100 stars';
  return (
    <>
      host fraction <tspan fontStyle="italic">f</tspan>
      {isNarrow ? '' : ', stars with at least one such planet'}
    </>
  );
}

function ViewChoice({
  shown,
  onChoose,
}: {
  shown: PosteriorView;
  onChoose(view: PosteriorView): void;
}) {
  return (
    <div className="mb-1 flex items-baseline justify-between text-chart text-ink3">
      <span>{shown === 'density' ? 'posterior density' : 'cumulative probability'}</span>
      <span className="flex gap-3.5 text-note">
        {(['density', 'cumulative'] as const).map((option) => (
          <button
            key={option}
            type="button"
            aria-pressed={option === shown}
            className={`border-b-2 max-md:min-h-11 ${option === shown ? 'border-ink font-semibold text-ink' : 'border-transparent'}`}
            onClick={() => onChoose(option)}
          >
            {option}
          </button>
        ))}
      </span>
    </div>
  );
}
