import { chebyshevNodes, coefficients, NODES } from './chebyshev';

/**
 * A piece of the support in a coordinate v, 0..1, in which the density is smooth.
 *
 * Singular ends (x^-1/2 and the like) and wide ranges (log-uniform) become harmless there.
 */
export interface Stretch {
  /** Ends of the piece in x. */
  from: number;
  to: number;
  /** True where x falls as v rises: v is then counted from a singular upper end. */
  isReversed: boolean;
  toX(v: number): number;
  toV(x: number): number;
  /** ln of the unnormalised density per dv at v, 0 < v < 1; -Infinity where it vanishes. */
  logDensity(v: number): number;
}

/** A piece of a stretch with the series of its density, relative to the density's peak there. */
export interface Panel {
  stretch: number;
  start: number;
  width: number;
  /** ln density at its largest node. */
  peak: number;
  /**
   * The same with the panel's ends. For a density with one peak the panel that holds it then has
   * the largest value of all, however narrow the peak: it is never taken for negligible.
   */
  reach: number;
  values: Float64Array;
  series: Float64Array;
}

/** When a panel is good enough. */
export interface Tolerance {
  /** The last coefficients may have this share of the panel's largest. */
  tail: number;
  /** Panels and tails of a smaller share of the whole do not count. */
  share: number;
}

const STRICT: Tolerance = { tail: 1e-12, share: 1e-17 };
/** Sixteen units in the last place. */
const ROUNDING = 16 * Number.EPSILON;
/** Most panels beside those that the pieces themselves are. */
const MAX_PANELS = 3000;

const PANELS_AT_ONCE = 48;

/** Hands out rows of zeros from large arrays: small ones of their own cost more than what they hold. */
function newRows(): () => Float64Array {
  let many: Float64Array = new Float64Array(0);
  let used = 0;
  return () => {
    if (used === many.length) [many, used] = [new Float64Array(2 * PANELS_AT_ONCE * NODES), 0];
    used += NODES;
    return many.subarray(used - NODES, used);
  };
}

function evaluatePanel(
  stretches: Stretch[],
  stretch: number,
  start: number,
  width: number,
  nextRow: () => Float64Array,
): Panel {
  const values = nextRow();
  let peak = Number.NEGATIVE_INFINITY;
  for (let j = 0; j < NODES; j++) {
    const value = stretches[stretch].logDensity(start + 0.5 * width * (1 + chebyshevNodes[j]));
    if (Number.isNaN(value)) throw new RangeError('the density is not a number inside its support');
    values[j] = value;
    if (value > peak) peak = value;
  }
  for (let j = 0; j < NODES; j++) {
    values[j] = values[j] === Number.NEGATIVE_INFINITY ? 0 : Math.exp(values[j] - peak);
  }
  let reach = peak;
  for (const end of [start, start + width]) {
    const value = stretches[stretch].logDensity(end);
    if (Number.isFinite(value) && value > reach) reach = value;
  }
  const series = coefficients(values, nextRow());
  return { stretch, start, width, peak, reach, values, series };
}

/**
 * Whether a panel's series has run out, or the panel carries nothing of the whole.
 *
 * @param logBest largest ln of reach times width over all panels
 */
export function isResolved(
  { start, reach, width, series }: Panel,
  logBest: number,
  { share, tail: allowed }: Tolerance = STRICT,
): boolean {
  const logShare = reach + Math.log(width) - logBest;
  const negligible = Math.log(share);
  if (!(logShare >= negligible)) return true;
  let largest = 0;
  for (let k = 0; k < NODES; k++) largest = Math.max(largest, Math.abs(series[k]));
  const tail = Math.max(
    Math.abs(series[NODES - 1]),
    Math.abs(series[NODES - 2]),
    Math.abs(series[NODES - 3]),
  );
  // A short panel far from v = 0 has nodes rounded by this much of its width: no series beats that.
  const rounding = (ROUNDING * (start + width)) / width;
  const isExhausted = tail <= Math.max(allowed, rounding) * largest;
  return isExhausted || Math.log(tail) + logShare < negligible;
}

/** ln of reach times width of the panel that could carry most. */
export function largestShare(panels: readonly Panel[]): number {
  let best = Number.NEGATIVE_INFINITY;
  for (const { reach, width } of panels) best = Math.max(best, reach + Math.log(width));
  return best;
}

/**
 * Halves panels, breadth first, until each one's Chebyshev series has run out.
 *
 * @returns panels by increasing x
 * @throws RangeError where the density vanishes everywhere, is infinite or does not converge
 */
export function resolvePanels(stretches: Stretch[]): Panel[] {
  const nextRow = newRows();
  let queue = stretches.map((_, index) => evaluatePanel(stretches, index, 0, 1, nextRow));
  const done: Panel[] = [];
  while (queue.length > 0) {
    // Only the panels of now: a parent may have had a point nearer to the peak than its halves do.
    const logBest = largestShare([...done, ...queue]);
    if (logBest === Number.NEGATIVE_INFINITY) {
      throw new RangeError('the density vanishes everywhere');
    }
    if (!Number.isFinite(logBest)) {
      throw new RangeError('the density is infinite inside its support');
    }
    const next: Panel[] = [];
    for (const panel of queue) {
      const half = 0.5 * panel.width;
      const canSplit = panel.start + 0.25 * half > panel.start;
      if (!canSplit || isResolved(panel, logBest)) {
        done.push(panel);
      } else {
        next.push(evaluatePanel(stretches, panel.stretch, panel.start, half, nextRow));
        next.push(evaluatePanel(stretches, panel.stretch, panel.start + half, half, nextRow));
      }
    }
    if (done.length + next.length > MAX_PANELS + stretches.length) {
      throw new RangeError(`the density was not resolved by ${MAX_PANELS} panels`);
    }
    queue = next;
  }
  done.sort(
    (a, b) =>
      a.stretch - b.stretch ||
      (stretches[a.stretch].isReversed ? b.start - a.start : a.start - b.start),
  );
  return done;
}
