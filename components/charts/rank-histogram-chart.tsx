'use client';

import { useState } from 'react';
import { formatPlain } from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { binomialBand } from './binomial-band';
import { ChartFigure, type ChartTable } from './chart-figure';
import { ChartReadout, type ReadPlace } from './chart-readout';
import { frameWithin, scaleLinear } from './scales';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface RankHistogramChartProps {
  /** Truths by rank among draws from their posterior, in bins of equal width. */
  bins: number[];
  /** Draws that each truth was ranked among. */
  draws: number;
}

const BAND = 0.999;
const margin = { left: 46, right: 16, top: 44, bottom: 48 };
const height = 340;

/** Where the truths lie in their posteriors: an even histogram is a right posterior. */
export function RankHistogramChart(props: RankHistogramChartProps) {
  const { bins } = props;
  const [measure, width] = useWidth<HTMLDivElement>(620);
  const [at, setAt] = useState<ReadPlace>();
  const frame = frameWithin(margin, width, height);
  const { total, even, band } = evenBins(bins);
  const most = Math.max(...bins, band[1]) * 1.08;
  const x = scaleLinear([0, bins.length], [frame.left, frame.right]);
  const y = scaleLinear([0, most], [frame.bottom, frame.top]);
  const say = ({ column }: ReadPlace) => [
    `${bins[column]} truths`,
    `between ${formatPlain((100 * column) / bins.length)} and ${formatPlain((100 * (column + 1)) / bins.length)}\u2009% of their posterior`,
    `even: ${formatPlain(even)}, band ${band[0]}–${band[1]}`,
  ];
  return (
    <ChartFigure
      name="ranks"
      label={rankSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [rankTable(props)]}
      caption="shaded: 99.9 % band of a bin, if posteriors are right"
      overlay={
        <ChartReadout
          frame={frame}
          columns={bins.map((_, bin) => x(bin + 0.5))}
          rows={[frame.top + 40]}
          at={at}
          onAt={setAt}
          label="Read the number of truths by rank"
          say={say}
        />
      }
    >
      <text className="quiet" x={0} y={14}>
        surveys, of {total}
      </text>
      <LeftAxis
        ticks={linearTicks(0, most, frame.bottom - frame.top, 46).filter(({ isMajor }) => isMajor)}
        scale={y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <rect
        className="tolerance"
        x={frame.left}
        width={frame.right - frame.left}
        y={y(band[1])}
        height={y(band[0]) - y(band[1])}
      />
      {bins.map((count, bin) => (
        <rect
          // biome-ignore lint/suspicious/noArrayIndexKey: a bin is its place
          key={bin}
          className="count-bar"
          x={x(bin) + 1}
          width={Math.max(1, x(bin + 1) - x(bin) - 2)}
          y={y(count)}
          height={frame.bottom - y(count)}
          fillOpacity={at?.column === bin ? 1 : 0.7}
        />
      ))}
      <line
        className="alternative-line"
        x1={frame.left}
        x2={frame.right}
        y1={y(even)}
        y2={y(even)}
      />
      <text className="page-halo" x={frame.right} y={34} textAnchor="end">
        dashed: {formatPlain(even)}, even
      </text>
      <BottomAxis
        ticks={withUnit(linearTicks(0, 100, frame.right - frame.left), '\u2009%')}
        scale={(percentage) => x((percentage / 100) * bins.length)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isFirstAtEdge
        isLastAtEdge
        name="rank of the truth in its posterior"
      />
    </ChartFigure>
  );
}

export function evenBins(bins: number[]): {
  total: number;
  even: number;
  band: [number, number];
  outside: number;
} {
  const total = bins.reduce((sum, count) => sum + count, 0);
  const band = binomialBand(total, 1 / bins.length, BAND);
  const outside = bins.filter((count) => count < band[0] || count > band[1]).length;
  return { total, even: total / bins.length, band, outside };
}

function rankSentence({ bins, draws }: RankHistogramChartProps): string {
  const { total, band, outside } = evenBins(bins);
  const verdict =
    outside === 0
      ? 'all of them inside'
      : `${outside} ${outside === 1 ? 'bin lies' : 'bins lie'} outside`;
  return `Ranks of ${total} truths among ${draws} draws from their posterior, in ${bins.length} bins of ${Math.min(...bins)} to ${Math.max(...bins)}; the 99.9 per cent band of an even bin is ${band[0]} to ${band[1]}: ${verdict}`;
}

function rankTable({ bins }: RankHistogramChartProps): ChartTable {
  const { band } = evenBins(bins);
  return {
    caption: `Truths by rank in their posterior; 99.9 % band of a bin ${band[0]}–${band[1]}`,
    columns: ['rank, % of the posterior', 'surveys'],
    rows: bins.map((count, bin) => [
      `${formatPlain((100 * bin) / bins.length)}–${formatPlain((100 * (bin + 1)) / bins.length)}`,
      String(count),
    ]),
  };
}
