import type { Box } from './map-contours';
import { scaleLinear } from './scales';
import { textWidth } from './text-width';

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

/** A host that moves the limit so many times further than any other star has a panel of its own. */
const FAR = 3;
const farHeight = 92;
const gap = 26;

export interface InfluencePanel {
  top: number;
  bottom: number;
  y(limit: number): number;
  span: [number, number];
}
export interface InfluencePanels {
  main: InfluencePanel;
  far: InfluencePanel | null;
  isFar(star: InfluenceStar): boolean;
}

/** Stars on one scale, and hosts of detections on another where they would flatten all the rest. */
export function influencePanels(
  stars: InfluenceStar[],
  limit: number,
  frame: Pick<Box, 'top' | 'bottom'>,
): InfluencePanels {
  const moved = ({ limitWithout }: InfluenceStar) => Math.abs(limitWithout - limit);
  const others = stars.filter(({ hosts }) => hosts.length === 0);
  const most = Math.max(0, ...others.map(moved));
  const isFar = (star: InfluenceStar) =>
    others.length > 0 && star.hosts.length > 0 && moved(star) > FAR * most;
  const far = stars.filter(isFar);
  const near = [limit, ...stars.filter((star) => !isFar(star)).map((star) => star.limitWithout)];
  if (far.length === 0) return { main: panelOf(near, limit, frame), far: null, isFar };
  const bottom = frame.bottom - farHeight - gap;
  return {
    main: panelOf(near, limit, { top: frame.top, bottom }),
    far: panelOf(
      far.map(({ limitWithout }) => limitWithout),
      limit,
      { top: bottom + gap, bottom: frame.bottom },
    ),
    isFar,
  };
}

function panelOf(
  limits: number[],
  limit: number,
  { top, bottom }: Pick<Box, 'top' | 'bottom'>,
): InfluencePanel {
  const [low, high] = [Math.min(...limits), Math.max(...limits)];
  const pad = Math.max(0.2 * (high - low), 0.004 * limit);
  const span: [number, number] = [Math.max(0, low - pad), high + pad];
  return { top, bottom, span, y: scaleLinear(span, [bottom, top]) };
}

/** A name without room to the right of its point stands to the left of it. */
export const hangsLeft = ({ x, words }: { x: number; words: string }, right: number) =>
  x + 12 + textWidth(words, 13) > right;

/**
 * Heights of names beside points, moved up where one would lie on another or on a point's ring.
 *
 * @param end right end of the drawing
 */
export function nameHeights(
  points: { x: number; y: number; words: string }[],
  end: number,
): number[] {
  // Rings of the points themselves are in the way as well.
  const placed = points.map(({ x, y }) => ({ left: x - 8, right: x + 8, y: y + 4 }));
  return points.map((point) => {
    const { x, y } = point;
    const reach = textWidth(point.words, 13) + 24;
    const [left, right] = hangsLeft(point, end) ? [x - reach, x - 9] : [x + 9, x + reach];
    let at = y + 4;
    while (
      placed.some((one) => left < one.right && right > one.left && Math.abs(one.y - at) < 17)
    ) {
      at -= 18;
    }
    placed.push({ left, right, y: at });
    return at;
  });
}
