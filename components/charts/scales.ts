import type { Box } from './map-contours';

/** Places of values along an axis; straight or logarithmic between its two ends. */
export interface Scale {
  /** [px] */
  (value: number): number;
  /** The value at a place [px]. */
  invert(px: number): number;
  domain(): [number, number];
  range(): [number, number];
  /** The same, with what lies beyond an end placed on it. */
  clamp(isClamped: boolean): Scale;
}

/** Lower and upper end, or the other way round. */
type Ends = readonly number[];

interface Warp {
  to(value: number): number;
  back(warped: number): number;
}

const straight: Warp = { to: (value) => value, back: (warped) => warped };
const logarithmic: Warp = { to: Math.log, back: Math.exp };

/** Share of the way between two ends; half of it where they are the same. */
function shareOf(from: number, to: number, at: number): number {
  return to === from ? 0.5 : (at - from) / (to - from);
}

const between = (from: number, to: number, share: number) => from * (1 - share) + to * share;
const within = (share: number) => Math.min(1, Math.max(0, share));

function scaleOf(warp: Warp, domain: Ends, range: Ends, isClamped = false): Scale {
  const [low, high] = [warp.to(domain[0]), warp.to(domain[1])];
  const kept = isClamped ? within : (share: number) => share;
  const place = (value: number) =>
    between(range[0], range[1], kept(shareOf(low, high, warp.to(value))));
  return Object.assign(place, {
    invert: (px: number) => warp.back(between(low, high, kept(shareOf(range[0], range[1], px)))),
    domain: (): [number, number] => [domain[0], domain[1]],
    range: (): [number, number] => [range[0], range[1]],
    clamp: (asked: boolean) => scaleOf(warp, domain, range, asked),
  });
}

/** A straight axis: two numbers to two places, without the formats and colours of a library. */
export function scaleLinear(domain: Ends, range: Ends): Scale {
  return scaleOf(straight, domain, range);
}

/** A logarithmic axis; both ends of the domain are above zero. */
export function scaleLog(domain: Ends, range: Ends): Scale {
  return scaleOf(logarithmic, domain, range);
}

/** What is left for a drawing within its margins [px]. */
export const frameWithin = (margin: Box, width: number, height: number): Box => ({
  left: margin.left,
  right: width - margin.right,
  top: margin.top,
  bottom: height - margin.bottom,
});
