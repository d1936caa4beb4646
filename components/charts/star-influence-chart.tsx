'use client';

import { scaleLinear } from 'd3';
import { useMemo, useState } from 'react';
import {
  formatLimit,
  formatPercent,
  formatSignificant,
  type RateQuantity,
  rateUnit,
} from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { spokenLimit } from './limit-bands';
import type { Box } from './map-contours';
import { PointReadout } from './point-readout';
import { seriesColour } from './series';
import { textWidth } from './text-width';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface InfluenceStar {
  name: string;
  /** Its map averaged over the population, 0 to 1. */
  probability: number;
  limitWithout: number;
  /** Limit without it over the limit with all. */
  ratio: number;
  /** Place of its survey in the collaboration; undefined for a star in several. */
  seriesIndex?: number;
  /** Counted companions. */
  hosts: string[];
}

export interface StarInfluenceChartProps {
  stars: InfluenceStar[];
  limit: number;
  /** So many stars carry half of the exposure. */
  halfCarriedBy: number;
  quantity: RateQuantity;
  levelLabel: string;
}

const margin: Box = { left: 52, right: 14, top: 30, bottom: 48 };

/** A dot a star: how much of the sensitivity it brings, and the limit that would be left without it. */
export function StarInfluenceChart(props: StarInfluenceChartProps) {
  const { limit, quantity, levelLabel, halfCarriedBy } = props;
  const [measure, width] = useWidth<HTMLDivElement>(900);
  const [at, setAt] = useState<number>();
  const height = width < 520 ? 340 : 400;
  const frame: Box = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: height - margin.bottom,
  };
  const stars = useMemo(
    () => [...props.stars].sort((a, b) => a.probability - b.probability),
    [props.stars],
  );
  const most = Math.max(0.05, ...stars.map(({ probability }) => probability));
  const x = scaleLinear([0, most * 1.03], [frame.left, frame.right]);
  const y = scaleLinear(spanOf(stars, limit), [frame.bottom, frame.top]);
  const [low, high] = y.domain();
  const points = stars.map((star) => ({ x: x(star.probability), y: y(star.limitWithout) }));
  const half = stars[stars.length - halfCarriedBy]?.probability;
  const chosen = at === undefined ? undefined : points[at];
  const say = (index: number) => {
    const star = stars[index];
    return [
      star.name,
      ...(star.hosts.length > 0 ? [`hosts ${star.hosts.join(', ')}`] : []),
      `detection probability ${formatPercent(star.probability)}`,
      `without it ${formatLimit(star.limitWithout, quantity)} (${levelLabel}), ${formatSignificant(star.ratio, 3)} times`,
    ];
  };

  return (
    <ChartFigure
      label={influenceSentence(props)}
      width={width}
      height={height}
      measure={measure}
      tables={() => [influenceTable(props)]}
      overlay={
        <PointReadout
          frame={frame}
          points={points}
          at={at}
          onAt={setAt}
          label="Read the limit without a star"
          say={say}
        />
      }
    >
      <LeftAxis
        ticks={withUnit(
          linearTicks(100 * low, 100 * high, frame.bottom - frame.top, 46).filter(
            ({ isMajor }) => isMajor,
          ),
          quantity === 'host_fraction' ? '\u2009%' : '',
        )}
        scale={(percentage) => y(percentage / 100)}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        gridTo={frame.right}
        hasLine={false}
      />
      <text className="quiet" x={0} y={14}>
        upper limit ({levelLabel}) without the star, {rateUnit(quantity)}
      </text>
      {half !== undefined && <HalfLine x={x(half) - 5} stars={halfCarriedBy} frame={frame} />}
      <line className="trace-line" x1={frame.left} x2={frame.right} y1={y(limit)} y2={y(limit)} />
      {stars.map((star, index) => (
        <circle
          key={star.name}
          className="star-dot"
          cx={points[index].x}
          cy={points[index].y}
          r="4.2"
          style={{
            fill: star.seriesIndex === undefined ? 'var(--ink)' : seriesColour(star.seriesIndex),
          }}
        />
      ))}
      {stars.map((star, index) =>
        star.hosts.length === 0 ? null : (
          <Host key={star.name} {...points[index]} name={star.hosts.join(', ')} frame={frame} />
        ),
      )}
      <text className="bound-text page-halo" x={frame.left + 6} y={y(limit) - 7}>
        all stars: {formatLimit(limit, quantity)}
      </text>
      {chosen && <circle data-screen-only="" className="ring" cx={chosen.x} cy={chosen.y} r="7" />}
      <BottomAxis
        ticks={withUnit(linearTicks(0, 103 * most, frame.right - frame.left, 70), '\u2009%')}
        scale={(percentage) => x(percentage / 100)}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        isLastAtEdge
        name={width < 520 ? 'detection probability' : 'detection probability under the population'}
      />
    </ChartFigure>
  );
}

/** The limits that are drawn, and never less than a tenth of the limit around it. */
function spanOf(stars: InfluenceStar[], limit: number): [number, number] {
  const limits = [limit, ...stars.map(({ limitWithout }) => limitWithout)];
  const [low, high] = [Math.min(...limits), Math.max(...limits)];
  const pad = Math.max(0.14 * (high - low), 0.02 * limit);
  return [Math.max(0, low - pad), high + pad];
}

function HalfLine({ x, stars, frame }: { x: number; stars: number; frame: Box }) {
  const first = stars === 1 ? '1 star to the right' : `${stars} stars to the right`;
  const isLeft = x - frame.left > textWidth(first, 13) + 20;
  const words = { x: isLeft ? x - 6 : x + 6, textAnchor: isLeft ? ('end' as const) : undefined };
  return (
    <g>
      <line className="range-line" x1={x} x2={x} y1={frame.top} y2={frame.bottom} />
      <text className="bold page-halo" {...words} y={frame.top + 14}>
        {first}
      </text>
      <text className="page-halo" {...words} y={frame.top + 31}>
        {stars === 1 ? 'carries' : 'carry'} half of the sum
      </text>
    </g>
  );
}

function Host({ x, y, name, frame }: { x: number; y: number; name: string; frame: Box }) {
  const words = `hosts ${name}`;
  const hangsLeft = x + 12 + textWidth(words, 13) > frame.right;
  return (
    <g>
      <circle className="ring" cx={x} cy={y} r="7" />
      <text
        className="page-halo"
        x={hangsLeft ? x - 11 : x + 11}
        y={y + 4}
        textAnchor={hangsLeft ? 'end' : 'start'}
      >
        {words}
      </text>
    </g>
  );
}

function influenceSentence(props: StarInfluenceChartProps): string {
  const { stars, limit, halfCarriedBy, quantity, levelLabel } = props;
  const most = [...stars].sort((a, b) => Math.abs(Math.log(b.ratio)) - Math.abs(Math.log(a.ratio)));
  const parts = [
    `Detection probability of ${stars.length} stars against the upper limit (${levelLabel}) without each; with all, ${spokenLimit(limit, quantity)}`,
    `${halfCarriedBy} of them carry half of the sum`,
  ];
  if (most.length > 0) {
    parts.push(
      `most moved without ${most[0].name}: ${spokenLimit(most[0].limitWithout, quantity)}`,
    );
  }
  return parts.join('; ');
}

function influenceTable({ stars, quantity, levelLabel }: StarInfluenceChartProps): ChartTable {
  return {
    caption: `Upper limit (${levelLabel}) without each star, ${rateUnit(quantity)}, in the order of the answer`,
    columns: ['star', 'detection probability, %', 'limit without it', 'ratio', 'hosts'],
    rows: stars.map((star) => [
      star.name,
      formatSignificant(100 * star.probability, 3),
      formatLimit(star.limitWithout, quantity),
      formatSignificant(star.ratio, 3),
      star.hosts.join(', '),
    ]),
  };
}
