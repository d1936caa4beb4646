'use client';

import { useState } from 'react';
import {
  formatInterval,
  formatLimit,
  formatPlain,
  type RateQuantity,
  rateUnit,
} from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { spokenLimit } from './limit-bands';
import { bandPath, linePath } from './paths';
import { frameWithin, scaleLog } from './scales';
import { textWidth } from './text-width';
import { logTicks, withRateUnit } from './ticks';
import { useWidth } from './use-width';
import { ForecastMark } from './yield-chart';

export interface LimitByStarsChartProps {
  /** Rising numbers of planned stars. */
  stars: number[];
  limitIfNone: number[];
  /** Limits for the fewest and most detections within 68 %. */
  low: number[];
  high: number[];
  wanted: number;
  starsNeeded: number | null;
  quantity: RateQuantity;
  levelLabel: string;
  /** Of the rate that outcomes are drawn at: "at a host fraction of 3.0 %". */
  rateLabel: string;
}

const margin = { left: 52, right: 16, top: 52, bottom: 48 };
const height = 330;

/** The limit that so many planned stars would set, nothing found, and its spread if some are. */
export function LimitByStarsChart(props: LimitByStarsChartProps) {
  const { stars, limitIfNone, low, high, wanted, quantity, levelLabel, rateLabel } = props;
  const [measure, width] = useWidth<HTMLDivElement>(620);
  const [at, setAt] = useState<ReadPlace>();
  const frame = frameWithin(margin, width, height);
  const needed = neededInside(props);
  const ends = [stars[0], 1.1 * Math.max(stars[stars.length - 1], needed ?? 1, 2 * stars[0])];
  const limits = [wanted, ...limitIfNone, ...low, ...high];
  const [least, most] = [Math.min(...limits) * 0.85, Math.max(...limits) * 1.15];
  const x = scaleLog(ends, [frame.left, frame.right]);
  const y = scaleLog([least, most], [frame.bottom, frame.top]);
  const hangsLeft =
    needed !== undefined && x(needed) + textWidth(`${needed} stars`, 13) + 12 > frame.right;
  const words = `wanted ${formatLimit(wanted, quantity)}`;
  const say = ({ column }: ReadPlace) => [
    `${formatLimit(limitIfNone[column], quantity)} (${levelLabel}) if nothing is found`,
    `${stars[column]} ${stars[column] === 1 ? 'star' : 'stars'}`,
    `68\u2009% of outcomes ${formatInterval(low[column], high[column], quantity)}`,
  ];
  return (
    <ChartFigure
      name="limit-by-stars"
      label={starsSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [starsTable(props)]}
      caption={`shaded: 68 % of outcomes ${rateLabel}`}
      overlay={
        <ChartReadout
          frame={frame}
          columns={stars.map(x)}
          rows={[frame.top + 50]}
          at={at}
          onAt={setAt}
          label="Read the limit along the number of stars"
          say={say}
        />
      }
    >
      <text className="quiet" x={0} y={14}>
        upper limit ({levelLabel}), planned stars alone, {rateUnit(quantity)}
      </text>
      <ForecastMark x={frame.right} y={34} />
      <LeftAxis
        ticks={withRateUnit(logTicks(100 * least, 100 * most, frame.bottom - frame.top), quantity)}
        scale={(percentage) => y(percentage / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <path className="band" d={bandPath(stars, low, high, x, y)} />
      <line
        className="saved-limit"
        x1={frame.left}
        x2={frame.right}
        y1={y(wanted)}
        y2={y(wanted)}
      />
      <path className="sweep-line" d={linePath(stars, limitIfNone, x, y)} />
      {needed !== undefined && (
        <>
          <line className="stem" x1={x(needed)} x2={x(needed)} y1={y(wanted)} y2={frame.bottom} />
          <circle className="step-dot" cx={x(needed)} cy={y(wanted)} r="4.5" />
          <text
            className="bold page-halo"
            x={hangsLeft ? x(needed) - 9 : x(needed) + 9}
            y={y(wanted) - 9}
            textAnchor={hangsLeft ? 'end' : 'start'}
          >
            {needed} {needed === 1 ? 'star' : 'stars'}
          </text>
        </>
      )}
      <text className="bound-text page-halo" x={frame.left + 6} y={y(wanted) - 7}>
        {words}
      </text>
      {at && (
        <circle
          data-screen-only=""
          className="step-dot"
          cx={x(stars[at.column])}
          cy={y(limitIfNone[at.column])}
          r="4.5"
        />
      )}
      <BottomAxis
        ticks={logTicks(ends[0], ends[1], frame.right - frame.left)}
        scale={x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isLastAtEdge
        name="number of planned stars"
      />
    </ChartFigure>
  );
}

/** The number of stars that the wanted limit needs, where the axis can reach it. */
function neededInside({ stars, starsNeeded }: LimitByStarsChartProps): number | undefined {
  const last = stars[stars.length - 1];
  if (starsNeeded === null || starsNeeded < stars[0] || starsNeeded > 20 * last) return undefined;
  return starsNeeded;
}

function starsSentence(props: LimitByStarsChartProps): string {
  const { stars, limitIfNone, wanted, starsNeeded, quantity, levelLabel } = props;
  const last = stars.length - 1;
  return `Forecast: upper limit (${levelLabel}) if nothing is found, ${spokenLimit(limitIfNone[0], quantity)} with ${formatPlain(stars[0])} stars, ${spokenLimit(limitIfNone[last], quantity)} with ${formatPlain(stars[last])}; wanted: ${spokenLimit(wanted, quantity)}, ${starsNeeded === null ? 'out of reach' : `reached with ${starsNeeded} stars`}`;
}

function starsTable(props: LimitByStarsChartProps): ChartTable {
  const { stars, limitIfNone, low, high, quantity, levelLabel } = props;
  return {
    caption: `Forecast: upper limit (${levelLabel}) of the planned stars alone, ${rateUnit(quantity)}`,
    columns: ['stars', 'limit if nothing is found', '68 % of outcomes'],
    rows: stars.map((count, index) => [
      String(count),
      formatLimit(limitIfNone[index], quantity),
      formatInterval(low[index], high[index], quantity),
    ]),
  };
}
