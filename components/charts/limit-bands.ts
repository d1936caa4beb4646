import { formatPlain, formatSignificant, type RateQuantity } from '@/lib/quantities/display';

/** Limits at which colours change; contours carry the round ones. */
const bandLimits = [
  0.002, 0.003, 0.005, 0.0075, 0.01, 0.015, 0.02, 0.03, 0.05, 0.075, 0.1, 0.15, 0.2, 0.3, 0.5, 0.75,
  1,
];
const contourLimits = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5];

/** Sides of the plane are read closely: a narrow span of limits takes finer steps. */
const fineSteps = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 7, 8, 9];

export interface LimitBands {
  /** Falling limits: the first is the weakest. */
  limits: number[];
  /** Index on the ramp of the area beyond each limit; deeper is a stronger limit. */
  ramp: number[];
  /** Limits that are drawn as lines with their number. */
  contours: number[];
}

/**
 * Bands for limits between two ends: round ones, and finer ones where they span less than a decade.
 *
 * @param low strongest limit drawn, > 0
 * @param high weakest limit drawn
 */
export function limitBands(low: number, high: number): LimitBands {
  const isNarrow = high / low < 8;
  const all = isNarrow ? fineLimits(low, high) : bandLimits;
  const inside = all.filter((limit) => limit > low && limit < high).reverse();
  const step = Math.min(1.9, 18 / Math.max(1, inside.length));
  return {
    limits: inside,
    ramp: inside.map((_, index) => Math.min(19, Math.round((index + 1) * step))),
    contours: isNarrow ? inside : contourLimits.filter((limit) => limit > low && limit < high),
  };
}

function fineLimits(low: number, high: number): number[] {
  const limits: number[] = [];
  const first = Math.floor(Math.log10(low));
  for (let power = first; power <= Math.ceil(Math.log10(high)); power += 1) {
    for (const digit of fineSteps) limits.push(digit * 10 ** power);
  }
  return limits;
}

/** "5 %" on a contour. */
export function contourName(limit: number, quantity: RateQuantity): string {
  const number = formatPlain(100 * limit, 3);
  return quantity === 'host_fraction' ? `${number}\u2009%` : number;
}

/** "below 5.8 per cent", spoken. */
export function spokenLimit(limit: number, quantity: RateQuantity): string {
  const number = formatSignificant(100 * limit, 2);
  return quantity === 'host_fraction'
    ? `below ${number} per cent of stars`
    : `below ${number} planets per 100 stars`;
}
