'use client';

import { useMemo, useState } from 'react';
import { formatPercent, formatSignificant } from '@/lib/quantities/display';
import { BottomAxis } from './axes';
import { ChartFigure, type ChartTable } from './chart-figure';
import type { DataTable } from './data-table';
import { dotsPath } from './paths';
import { scaleLinear } from './scales';
import { seriesColour } from './series';
import { type Lasso, StarLasso } from './star-lasso';
import { textWidth } from './text-width';
import { linearTicks, withUnit } from './ticks';
import { useWidth } from './use-width';

export interface StarDot {
  name: string;
  /** Its map averaged over the population, 0 to 1. */
  probability: number;
  /** Place of its survey in the collaboration; undefined for a star in several, drawn in ink. */
  seriesIndex?: number;
  /** Hosts a counted detection: ringed, with this name beside it. */
  hosts?: string;
}

export interface StarDotsProps {
  stars: StarDot[];
  /** Names of the stars that are chosen: ringed. */
  selected?: ReadonlySet<string>;
  /** One by a press or Enter, several by a frame drawn around them. */
  onSelect?(names: string[]): void;
  height?: number;
}

const margin = { left: 14, right: 20, bottom: 48 };
const spacing = 11.8;

const noStars: ReadonlySet<string> = new Set();

interface Placed extends StarDot {
  x: number;
  row: number;
}

/** Each dot at its own place along the axis, in the lowest row where it touches no other. */
export function stackDots(stars: StarDot[], x: (value: number) => number, apart: number): Placed[] {
  const rowEnds: number[] = [];
  return [...stars]
    .sort((a, b) => a.probability - b.probability)
    .map((star) => {
      const at = x(star.probability);
      let row = rowEnds.findIndex((end) => at - end >= apart);
      if (row < 0) row = rowEnds.length;
      rowEnds[row] = at;
      return { ...star, x: at, row };
    });
}

/** Probability at which half of the sum over the stars lies to the right, and how many stars do. */
export function halfOfTheSum(stars: StarDot[]): { probability: number; stars: number } {
  const sorted = stars.map(({ probability }) => probability).sort((a, b) => b - a);
  const half = sorted.reduce((sum, value) => sum + value, 0) / 2;
  let reached = 0;
  for (let index = 0; index < sorted.length; index += 1) {
    reached += sorted[index];
    if (reached >= half) return { probability: sorted[index], stars: index + 1 };
  }
  return { probability: 0, stars: sorted.length };
}

/** One dot a star: x is its probability of detection, stacked upwards. */
export function StarDots({ stars, selected = noStars, onSelect, height = 262 }: StarDotsProps) {
  const [at, setAt] = useState<number>();
  const [lasso, setLasso] = useState<Lasso>();
  const [measure, width] = useWidth<HTMLDivElement>(880);
  const bottom = height - margin.bottom;
  const max = Math.max(0.05, ...stars.map(({ probability }) => probability));
  const half = useMemo(() => halfOfTheSum(stars), [stars]);
  const layout = useMemo(() => {
    const x = scaleLinear([0, max], [margin.left, width - margin.right]);
    let apart = spacing;
    let placed = stackDots(stars, x, apart);
    const rows = () => Math.max(1, ...placed.map(({ row }) => row + 1));
    // Smaller dots take fewer rows and less height: shrink until the tallest stack fits.
    while (rows() * apart > bottom - 40 && apart > 3) {
      apart *= 0.85;
      placed = stackDots(stars, x, apart);
    }
    return { x, placed, apart };
  }, [stars, max, width, bottom]);
  const { x, placed, apart } = layout;
  const radius = apart * 0.45;
  const y = (row: number) => bottom - radius - 2 - row * apart;
  const dots = dotsByColour(placed, y, radius);
  const points = placed.map((star) => ({ x: star.x, y: y(star.row) }));
  const ticks = withUnit(linearTicks(0, 100 * max, width - 34, 70), '\u2009%');
  const isNarrow = width < 520;
  const named = placed.filter(
    (star) => star.hosts !== undefined || (selected.size === 1 && selected.has(star.name)),
  );

  return (
    <ChartFigure
      name="stars"
      label={`Detection probability of ${stars.length} stars: ${half.stars} of them, from ${formatPercent(half.probability)} up, carry half of the sensitivity`}
      width={width}
      height={height}
      measure={measure}
      tables={() => [starTable(stars)]}
      data={() => [starColumns(stars)]}
      overlay={
        <StarLasso
          frame={{ left: 0, right: width, top: 0, bottom }}
          points={points}
          at={at}
          onAt={setAt}
          say={(index) => sayStar(placed[index])}
          lasso={lasso}
          onLasso={setLasso}
          onSelect={onSelect && ((chosen) => onSelect(chosen.map((index) => placed[index].name)))}
        />
      }
    >
      <line
        className="range-line"
        x1={x(half.probability) - radius - 1}
        x2={x(half.probability) - radius - 1}
        y1={8}
        y2={bottom}
      />
      <text
        className="bold page-halo"
        x={x(half.probability) - 9 - radius}
        y={18}
        textAnchor={x(half.probability) > 180 ? 'end' : 'start'}
      >
        {half.stars} stars to the right
      </text>
      <text
        className="page-halo"
        x={x(half.probability) - 9 - radius}
        y={35}
        textAnchor={x(half.probability) > 180 ? 'end' : 'start'}
      >
        carry half of the sensitivity
      </text>
      {dots.map(({ colour, path }) => (
        <path key={colour} className="star-dot" d={path} style={{ fill: colour }} />
      ))}
      {placed
        .filter(({ name }) => selected.has(name))
        .map((star) => (
          <circle
            key={star.name}
            className="ring"
            cx={star.x}
            cy={y(star.row)}
            r={radius + (selected.size > 12 ? 0.6 : 2.8)}
          />
        ))}
      {at !== undefined && points[at] && (
        <circle
          data-screen-only=""
          className="ring"
          cx={points[at].x}
          cy={points[at].y}
          r={radius + 2.2}
        />
      )}
      {lasso && (
        <rect
          data-screen-only=""
          className="lasso"
          x={Math.min(lasso.from.x, lasso.to.x)}
          y={Math.min(lasso.from.y, lasso.to.y)}
          width={Math.abs(lasso.to.x - lasso.from.x)}
          height={Math.abs(lasso.to.y - lasso.from.y)}
        />
      )}
      {named.map((star, index) => {
        const goesLeft = star.x > width - 150;
        const words = star.hosts === undefined ? star.name : `hosts ${star.hosts}`;
        const reach = textWidth(words, 13) + 8;
        const [left, right] = goesLeft ? [star.x - reach, star.x] : [star.x, star.x + reach];
        let row = Math.min(y(star.row) - 40, 62 + 18 * index);
        // A name gives way to the ring of another host.
        while (
          row > 18 &&
          named.some(
            (other) =>
              other !== star &&
              other.x > left - 8 &&
              other.x < right + 8 &&
              Math.abs(y(other.row) - row + 4) < 18,
          )
        ) {
          row -= 18;
        }
        return (
          <g key={star.name}>
            <circle className="ring" cx={star.x} cy={y(star.row)} r={radius + 2.8} />
            <path
              className="leader"
              d={`M${star.x},${y(star.row) - radius - 4}L${star.x + (goesLeft ? -6 : 6)},${row + 4}`}
            />
            <text
              className="page-halo"
              x={star.x + (goesLeft ? -8 : 8)}
              y={row}
              textAnchor={goesLeft ? 'end' : 'start'}
            >
              {words}
            </text>
          </g>
        );
      })}
      <BottomAxis
        ticks={ticks}
        scale={(percent) => x(percent / 100)}
        y={bottom}
        x0={margin.left}
        x1={width - margin.right}
        isFirstAtEdge
        isLastAtEdge
        name={isNarrow ? 'detection probability' : 'detection probability under the population'}
      />
    </ChartFigure>
  );
}

/** All dots of a colour in one mark: hundreds of marks of their own would cost a drag its frames. */
function dotsByColour(placed: Placed[], y: (row: number) => number, radius: number) {
  const points = new Map<string, { x: number; y: number }[]>();
  for (const { x, row, seriesIndex } of placed) {
    const colour = seriesIndex === undefined ? 'var(--ink)' : seriesColour(seriesIndex);
    const of = points.get(colour) ?? [];
    of.push({ x, y: y(row) });
    points.set(colour, of);
  }
  return [...points].map(([colour, of]) => ({ colour, path: dotsPath(of, radius) }));
}

function sayStar(star: Placed): string[] {
  return [
    star.name,
    `seen with probability ${formatPercent(star.probability)}`,
    ...(star.hosts === undefined ? [] : [`hosts ${star.hosts}`]),
  ];
}

const starColumns = (stars: StarDot[]): DataTable => ({
  name: 'stars',
  columns: ['star', 'detection_probability', 'hosts'],
  rows: stars.map(({ name, probability, hosts }) => [name, probability, hosts ?? null]),
});

function starTable(stars: StarDot[]): ChartTable {
  return {
    caption: 'Stars by detection probability, highest first',
    columns: ['star', 'detection probability, %', 'hosts'],
    rows: [...stars]
      .sort((a, b) => b.probability - a.probability)
      .map((star) => [star.name, formatSignificant(100 * star.probability, 3), star.hosts ?? '–']),
  };
}
