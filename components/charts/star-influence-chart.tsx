'use client';

import { useMemo, useState } from 'react';
import {
  formatLimit,
  formatPercent,
  formatRate,
  formatSignificant,
  type RateQuantity,
  rateUnit,
} from '@/lib/quantities/display';
import { BottomAxis, LeftAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import { PointReadout } from './chart-readout';
import {
  hangsLeft,
  type InfluencePanel,
  type InfluenceStar,
  influencePanels,
  nameHeights,
} from './influence-panels';
import { spokenLimit } from './limit-bands';
import type { Box } from './map-contours';
import { frameWithin, scaleLinear } from './scales';
import { seriesColour } from './series';
import { textWidth } from './text-width';
import { linearTicks, withRateUnit, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface StarInfluenceChartProps {
  stars: InfluenceStar[];
  limit: number;
  /** So many stars carry half of the exposure. */
  halfCarriedBy: number;
  quantity: RateQuantity;
  levelLabel: string;
}

/** One star moves a limit little: two digits would all read the same. */
const DIGITS = 4;
const margin: Box = { left: 52, right: 14, top: 30, bottom: 48 };

/** A dot a star: how much of the sensitivity it brings, and the limit that would be left without it. */
export function StarInfluenceChart(props: StarInfluenceChartProps) {
  const { limit, quantity, levelLabel, halfCarriedBy } = props;
  const [measure, width] = useWidth<HTMLDivElement>(900);
  const [at, setAt] = useState<number>();
  const height = width < 520 ? 380 : 440;
  const frame = frameWithin(margin, width, height);
  const stars = useMemo(
    () => [...props.stars].sort((a, b) => a.probability - b.probability),
    [props.stars],
  );
  const most = Math.max(0.05, ...stars.map(({ probability }) => probability));
  const x = scaleLinear([0, most * 1.03], [frame.left, frame.right]);
  const { main, far, isFar } = influencePanels(stars, limit, frame);
  const panelOf = (star: InfluenceStar) => (far && isFar(star) ? far : main);
  const points = stars.map((star) => ({
    x: x(star.probability),
    y: panelOf(star).y(star.limitWithout),
  }));
  const hosting = stars.flatMap(({ hosts }, index) =>
    hosts.length === 0 ? [] : [{ ...points[index], words: `hosts ${hosts.join(', ')}` }],
  );
  const heights = nameHeights(hosting, frame.right);
  const half = stars[stars.length - halfCarriedBy]?.probability;
  const chosen = at === undefined ? undefined : points[at];
  const say = (index: number) => {
    const star = stars[index];
    return [
      star.name,
      ...(star.hosts.length > 0 ? [`hosts ${star.hosts.join(', ')}`] : []),
      `detection probability ${formatPercent(star.probability)}`,
      `without it <${formatRate(star.limitWithout, quantity, DIGITS)} (${levelLabel}), ${formatSignificant(star.ratio, 4)} times`,
    ];
  };

  return (
    <ChartFigure
      name="star-influence"
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
      {[main, ...(far ? [far] : [])].map((panel) => (
        <LimitAxis key={panel.top} panel={panel} frame={frame} quantity={quantity} />
      ))}
      <text className="quiet" x={0} y={14}>
        upper limit ({levelLabel}) without the star, {rateUnit(quantity)}
      </text>
      {half !== undefined && <HalfLine x={x(half) - 5} stars={halfCarriedBy} frame={frame} />}
      <line
        className="trace-line"
        x1={frame.left}
        x2={frame.right}
        y1={main.y(limit)}
        y2={main.y(limit)}
      />
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
      {far && (
        <text className="quiet page-halo" x={frame.left + 6} y={far.top - 6}>
          hosts of detections, on a scale of their own
        </text>
      )}
      {hosting.map((host, index) => (
        <text
          key={host.words}
          className="page-halo"
          x={hangsLeft(host, frame.right) ? host.x - 11 : host.x + 11}
          y={heights[index]}
          textAnchor={hangsLeft(host, frame.right) ? 'end' : 'start'}
        >
          {host.words}
        </text>
      ))}
      {hosting.map(({ x: at, y, words }) => (
        <circle key={words} className="ring" cx={at} cy={y} r="7" />
      ))}
      <text className="bound-text page-halo" x={frame.left + 6} y={main.y(limit) + 17}>
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

function LimitAxis({
  panel,
  frame,
  quantity,
}: {
  panel: InfluencePanel;
  frame: Box;
  quantity: RateQuantity;
}) {
  const [low, high] = panel.span;
  const spacing = panel.bottom - panel.top > 150 ? 46 : 30;
  return (
    <LeftAxis
      ticks={withRateUnit(
        linearTicks(100 * low, 100 * high, panel.bottom - panel.top, spacing).filter(
          ({ isMajor }) => isMajor,
        ),
        quantity,
      )}
      scale={(percentage) => panel.y(percentage / 100)}
      x={frame.left}
      y0={panel.bottom}
      y1={panel.top}
      gridTo={frame.right}
      hasLine={false}
    />
  );
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
        {stars === 1 ? 'carries' : 'carry'} half of the sensitivity
      </text>
    </g>
  );
}

function influenceSentence(props: StarInfluenceChartProps): string {
  const { stars, limit, halfCarriedBy, quantity, levelLabel } = props;
  const most = [...stars].sort((a, b) => Math.abs(Math.log(b.ratio)) - Math.abs(Math.log(a.ratio)));
  const parts = [
    `Detection probability of ${stars.length} stars against the upper limit (${levelLabel}) without each; with all, ${spokenLimit(limit, quantity)}`,
    `${halfCarriedBy} of them carry half of the sensitivity`,
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
      `<${formatRate(star.limitWithout, quantity, DIGITS)}`,
      formatSignificant(star.ratio, 4),
      star.hosts.join(', '),
    ]),
  };
}
