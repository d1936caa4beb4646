import { chebyshevNodes, coefficients, NODES } from './chebyshev';
import { logNoDetection } from './no-detection';

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
/** Requests after which a piece's series costs less than going on without it. */
const WORTH_IT = 4;

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

/** Factors taken together before one logarithm where none is below 0.1. */
const FACTORS = 64;
const LEAST_FACTOR = 0.1;

/** ln of the product of 1 - x C_j, for factors of at least 0.1: four products side by side. */
function logOfProduct(x: number, row: Float64Array): number {
  const n = row.length;
  let log = 0;
  let j = 0;
  for (; j + FACTORS <= n; j += FACTORS) {
    let p0 = 1;
    let p1 = 1;
    let p2 = 1;
    let p3 = 1;
    for (let i = j; i < j + FACTORS; i += 4) {
      p0 *= 1 - x * row[i];
      p1 *= 1 - x * row[i + 1];
      p2 *= 1 - x * row[i + 2];
      p3 *= 1 - x * row[i + 3];
    }
    log += Math.log(p0 * p1 * p2 * p3);
  }
  let rest = 1;
  for (; j < n; j++) rest *= 1 - x * row[j];
  return log + Math.log(rest);
}

/** Values of the polynomials T_0 to T_15 at t, -1..1. */
function chebyshevValues(t: number, out: Float64Array): void {
  out[0] = 1;
  out[1] = t;
  for (let k = 2; k < NODES; k++) out[k] = 2 * t * out[k - 1] - out[k - 2];
}

/** One node's series at the place of the polynomials' values: four sums side by side. */
function seriesAt(series: Float64Array, node: number, at: Float64Array): number {
  const base = node * NODES;
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  for (let k = 0; k < NODES; k += 4) {
    s0 += series[base + k] * at[k];
    s1 += series[base + k + 1] * at[k + 1];
    s2 += series[base + k + 2] * at[k + 2];
    s3 += series[base + k + 3] * at[k + 3];
  }
  return s0 + s1 + (s2 + s3);
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
  const width = stars - isDetected.size;
  const kept = new Float64Array(nodes * width);
  const edges = [-1, ...[...isDetected].sort((x, y) => x - y), stars];
  for (let node = 0; node < nodes; node++) {
    let at = node * width;
    for (let i = 0; i + 1 < edges.length; i++) {
      const [from, to] = [node * stars + edges[i] + 1, node * stars + edges[i + 1]];
      kept.set(completeness.subarray(from, to), at);
      at += to - from;
    }
  }
  let largest = 0;
  for (let at = 0; at < kept.length; at++) if (kept[at] > largest) largest = kept[at];
  const rows = Array.from({ length: nodes }, (_, node) =>
    kept.subarray(node * width, (node + 1) * width),
  );
  const panels = panelsFor(Math.max(largest, 1e-3));
  const values = new Float64Array(NODES);
  const polynomials = new Float64Array(NODES);
  const logAt = (node: number, x: number, complement: number) =>
    1 - x * largest > LEAST_FACTOR
      ? logOfProduct(x, rows[node])
      : logNoDetection(x, rows[node], complement);
  const buildSeries = ({ from, to }: SeriesPanel) => {
    const series = new Float64Array(nodes * NODES);
    for (let node = 0; node < nodes; node++) {
      for (let j = 0; j < NODES; j++) {
        const x = from + 0.5 * (to - from) * (1 + chebyshevNodes[j]);
        values[j] = logAt(node, x, 1 - x);
      }
      series.set(coefficients(values), node * NODES);
    }
    return series;
  };
  /** Series of the piece around x, with the polynomials' values there; null: not worth it. */
  const seriesAround = (x: number, requests: number) => {
    const panel = panels.find(({ to }) => x <= to);
    if (panel === undefined) return null;
    panel.asked += requests / nodes;
    if (panel.series === null && panel.asked > WORTH_IT) panel.series = buildSeries(panel);
    if (panel.series === null) return null;
    chebyshevValues((2 * (x - panel.from)) / (panel.to - panel.from) - 1, polynomials);
    return panel.series;
  };
  return {
    nodes,
    powerOfRate: isDetected.size,
    decay: 0,
    fill(x, complement, out) {
      const series = seriesAround(x, nodes);
      for (let node = 0; node < nodes; node++) {
        out[node] =
          series === null ? logAt(node, x, complement) : seriesAt(series, node, polynomials);
      }
    },
    logRegular(node, x, complement) {
      const series = seriesAround(x, 1);
      return series === null ? logAt(node, x, complement) : seriesAt(series, node, polynomials);
    },
  };
}
