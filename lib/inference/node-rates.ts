import { chebyshevNodes, coefficients, NODES } from './chebyshev';
import { logNoDetection } from './host-fraction';

/**
 * Likelihoods of the rate at many nodes (pairs of indices, or places of a map), which share the
 * detections: x^powerOfRate times the regular part of each node.
 */
export interface NodeRates {
  nodes: number;
  /** k, the number of detections that count. */
  powerOfRate: number;
  /** Rate of the slowest exponential decay [stars]; 0 where the rate ends at 1. */
  decay: number;
  /** ln of the regular part at every node, into `out`, shape [node]. */
  fill(x: number, complement: number, out: Float64Array): void;
  /** The same at one node. */
  logRegular(node: number, x: number, complement: number): number;
}

/** Regular part exp(-x S) at each node. */
export function numberRates(exposure: Float64Array, detections: number): NodeRates {
  let decay = Number.POSITIVE_INFINITY;
  for (const s of exposure) decay = Math.min(decay, s);
  return {
    nodes: exposure.length,
    powerOfRate: detections,
    decay,
    fill(x, _complement, out) {
      for (let node = 0; node < exposure.length; node++) out[node] = -x * exposure[node];
    },
    logRegular: (node, x) => -x * exposure[node],
  };
}

/** A piece of the rate on which ln of the regular part is a short Chebyshev series at each node. */
interface SeriesPanel {
  from: number;
  to: number;
  /** Requests until now: a piece that is seldom needed is not worth its series. */
  asked: number;
  /** Shape [node, NODES]; null until it is worth it. */
  series: Float64Array | null;
}

const MOST_PANELS = 9;

/** Pieces of [0, 1], each at most half of the way to 1/largest, where the logarithm is singular. */
function panelsFor(largest: number): SeriesPanel[] {
  const singular = 1 / largest;
  const panels: SeriesPanel[] = [];
  let from = 0;
  while (from < 1 && panels.length < MOST_PANELS) {
    const to = Math.min(1, 0.5 * (from + singular));
    panels.push({ from, to, asked: 0, series: null });
    from = to;
  }
  return panels;
}

/** Value of one node's series, by Clenshaw's recurrence. */
function seriesAt(series: Float64Array, node: number, panel: SeriesPanel, x: number): number {
  const base = node * NODES;
  const t = (2 * (x - panel.from)) / (panel.to - panel.from) - 1;
  let next = 0;
  let afterNext = 0;
  for (let k = NODES - 1; k > 0; k--) {
    const current = 2 * t * next - afterNext + series[base + k];
    afterNext = next;
    next = current;
  }
  return t * next - afterNext + series[base];
}

/**
 * Regular part of the host fraction at each node: the product of 1 - f C_j over the stars without a
 * counted detection.
 *
 * Its logarithm is smooth in f: where it is asked for often, it is replaced by a Chebyshev series.
 *
 * @param completeness shape [node, star], 0..1
 * @param stars number of stars
 * @param detectedStars indices of the stars with a counted detection, each once
 * Accuracy: 1e-10 of the logarithm. Cost: at most 16 multiply-adds a node and star for each of a few
 *   pieces of the range, then 16 a node and rate.
 */
export function fractionRates(
  completeness: Float64Array,
  stars: number,
  detectedStars: readonly number[],
): NodeRates {
  const nodes = completeness.length / stars;
  const isDetected = new Set(detectedStars);
  const others: number[] = [];
  for (let star = 0; star < stars; star++) if (!isDetected.has(star)) others.push(star);
  const kept = new Float64Array(nodes * others.length);
  let largest = 0;
  for (let node = 0; node < nodes; node++) {
    for (let i = 0; i < others.length; i++) {
      const c = completeness[node * stars + others[i]];
      kept[node * others.length + i] = c;
      if (c > largest) largest = c;
    }
  }
  const rows = Array.from({ length: nodes }, (_, node) =>
    kept.subarray(node * others.length, (node + 1) * others.length),
  );
  const panels = panelsFor(Math.max(largest, 1e-3));
  const values = new Float64Array(NODES);
  const buildSeries = ({ from, to }: SeriesPanel) => {
    const series = new Float64Array(nodes * NODES);
    for (let node = 0; node < nodes; node++) {
      for (let j = 0; j < NODES; j++) {
        values[j] = logNoDetection(from + 0.5 * (to - from) * (1 + chebyshevNodes[j]), rows[node]);
      }
      series.set(coefficients(values), node * NODES);
    }
    return series;
  };
  const panelAt = (x: number) => panels.find(({ to }) => x <= to);
  const seriesOf = (panel: SeriesPanel | undefined, requests: number) => {
    if (panel === undefined) return null;
    panel.asked += requests / nodes;
    if (panel.series === null && panel.asked > NODES) panel.series = buildSeries(panel);
    return panel.series;
  };
  return {
    nodes,
    powerOfRate: isDetected.size,
    decay: 0,
    fill(x, complement, out) {
      const panel = panelAt(x);
      const series = seriesOf(panel, nodes);
      for (let node = 0; node < nodes; node++) {
        out[node] =
          panel === undefined || series === null
            ? logNoDetection(x, rows[node], complement)
            : seriesAt(series, node, panel, x);
      }
    },
    logRegular(node, x, complement) {
      const panel = panelAt(x);
      const series = seriesOf(panel, 1);
      return panel === undefined || series === null
        ? logNoDetection(x, rows[node], complement)
        : seriesAt(series, node, panel, x);
    },
  };
}
