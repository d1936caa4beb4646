import { solveIncreasing } from '@/lib/numerics/increasing-root';
import {
  antiderivative,
  chebyshevNodes,
  coefficients,
  evaluateSeries,
  NODES,
  nodeWeights,
} from './chebyshev';
import {
  isResolved,
  largestShare,
  type Panel,
  resolvePanels,
  type Stretch,
  type Tolerance,
} from './density-panels';

export type { Stretch };

interface Resolved {
  stretch: number;
  start: number;
  width: number;
  density: Float64Array;
  integral: Float64Array;
  mass: number;
  before: number;
}

/** A quadrature rule for averages over a density; arrays of one length, shared, not modified. */
export interface RateNodes {
  /** Places of the rate, increasing within each piece of the support. */
  rate: Float64Array;
  /** Share of the probability at each place; together 1. */
  weight: Float64Array;
}

/** A density integrated once: mass, moments, distribution function and its inverse. */
export interface IntegratedDensity {
  /** ln of the integral of the unnormalised density. */
  logMass: number;
  mean: number;
  standardDeviation: number;
  cumulative(x: number): number;
  quantile(p: number): number;
  /** Places where the density was evaluated, with weights. */
  nodes(): RateNodes;
  /**
   * The same density times a factor, from the places that are there already.
   *
   * @param logFactor ln of the factor at each place of `nodes().rate`
   * @returns null where those places no longer resolve the product
   */
  reweigh(logFactor: ArrayLike<number>): IntegratedDensity | null;
}

/** What a changed density may lose in panels that were made for another: 1e-9 of a limit. */
const CHANGED: Tolerance = { tail: 1e-10, share: 1e-12 };

const placeOf = (panel: Pick<Panel, 'start' | 'width'>, j: number) =>
  panel.start + 0.5 * panel.width * (1 + chebyshevNodes[j]);

/** A panel's density times a factor given at its nodes. */
function multiplyPanel(panel: Panel, logFactor: ArrayLike<number>, offset: number): Panel {
  let rise = Number.NEGATIVE_INFINITY;
  for (let j = 0; j < NODES; j++) rise = Math.max(rise, logFactor[offset + j]);
  if (rise === Number.NEGATIVE_INFINITY) rise = 0;
  const values = panel.values.map((value, j) => value * Math.exp(logFactor[offset + j] - rise));
  return {
    ...panel,
    peak: panel.peak + rise,
    reach: panel.reach + rise,
    values,
    series: coefficients(values),
  };
}

/**
 * Integrates a density given piece by piece, once, so that limits and intervals are root finding.
 *
 * Each piece is halved until a 16-term Chebyshev series resolves the density to 1e-12 of its
 * panel; the series' antiderivative is the distribution function, which is inverted by Newton.
 *
 * @param stretches adjoining pieces in increasing x
 * @returns mass, moments, distribution function and quantiles of the normalised density
 * @throws RangeError where the density vanishes everywhere, is infinite or does not converge
 * Accuracy: 1e-11 of the probability; limits within 1e-9 relative. Cost: 18 evaluations a panel,
 *   some tens of panels.
 * @source antiderivative of a Chebyshev series: Clenshaw & Curtis 1960, Numer. Math. 2, 197
 */
export function integrateDensity(stretches: Stretch[]): IntegratedDensity {
  return integratePanels(stretches, resolvePanels(stretches));
}

function integratePanels(stretches: Stretch[], panels: Panel[]): IntegratedDensity {
  let peak = Number.NEGATIVE_INFINITY;
  for (const panel of panels) peak = Math.max(peak, panel.peak);
  const resolved: Resolved[] = [];
  const size = 2 * NODES + 1;
  const rows = new Float64Array(size * panels.length);
  let total = 0;
  for (const { stretch, start, width, peak: panelPeak, series } of panels) {
    const scale = Math.exp(panelPeak - peak);
    const at = size * resolved.length;
    const density = rows.subarray(at, at + NODES);
    for (let k = 0; k < NODES; k++) density[k] = series[k] * scale;
    const integral = antiderivative(density, 0.5 * width, rows.subarray(at + NODES, at + size));
    const mass = Math.max(0, evaluateSeries(integral, 1));
    resolved.push({ stretch, start, width, density, integral, mass, before: total });
    total += mass;
  }

  let known: RateNodes | undefined;
  function nodes(): RateNodes {
    if (known) return known;
    const rate = new Float64Array(panels.length * NODES);
    const weight = new Float64Array(panels.length * NODES);
    panels.forEach((panel, at) => {
      const { toX } = stretches[panel.stretch];
      const scale = (0.5 * panel.width * Math.exp(panel.peak - peak)) / total;
      for (let j = 0; j < NODES; j++) {
        rate[at * NODES + j] = toX(placeOf(panel, j));
        weight[at * NODES + j] = nodeWeights[j] * scale * panel.values[j];
      }
    });
    known = { rate, weight };
    return known;
  }

  let knownMean: number | undefined;
  function mean(): number {
    const { rate, weight } = nodes();
    if (knownMean !== undefined) return knownMean;
    let sum = 0;
    for (let i = 0; i < rate.length; i++) sum += weight[i] * rate[i];
    knownMean = sum;
    return sum;
  }

  function findPanel(isBefore: (panel: Resolved) => boolean): Resolved {
    let low = 0;
    let high = resolved.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (isBefore(resolved[middle])) low = middle;
      else high = middle - 1;
    }
    return resolved[low];
  }

  const lowest = stretches[0].from;
  const highest = stretches[stretches.length - 1].to;
  return {
    logMass: Math.log(total) + peak,
    get mean() {
      return mean();
    },
    get standardDeviation() {
      const { rate, weight } = nodes();
      const centre = mean();
      let sum = 0;
      for (let i = 0; i < rate.length; i++) sum += weight[i] * (rate[i] - centre) ** 2;
      return Math.sqrt(sum);
    },
    nodes,
    reweigh(logFactor) {
      const changed = panels.map((panel, at) => multiplyPanel(panel, logFactor, at * NODES));
      const best = largestShare(changed);
      const isWhole = changed.every((panel) => isResolved(panel, best, CHANGED));
      return isWhole ? integratePanels(stretches, changed) : null;
    },
    cumulative(x) {
      if (!(x > lowest)) return 0;
      if (x >= highest) return 1;
      let at = 0;
      while (x >= stretches[at].to) at++;
      const { isReversed, toV } = stretches[at];
      const v = Math.min(1, Math.max(0, toV(x)));
      const panel = findPanel((one) => {
        if (one.stretch !== at) return one.stretch < at;
        return isReversed ? one.start + one.width >= v : one.start <= v;
      });
      const t = Math.min(1, Math.max(-1, (2 * (v - panel.start)) / panel.width - 1));
      const inside = evaluateSeries(panel.integral, t);
      const below = panel.before + (isReversed ? panel.mass - inside : inside);
      return Math.min(1, Math.max(0, below / total));
    },
    quantile(p) {
      if (!(p >= 0 && p <= 1)) throw new RangeError(`a probability lies in 0..1, got ${p}`);
      if (p === 0) return lowest;
      if (p === 1) return highest;
      const target = p * total;
      const panel = findPanel((one) => one.before < target);
      const { isReversed, toX } = stretches[panel.stretch];
      const below = Math.min(target - panel.before, panel.mass);
      const wanted = isReversed ? panel.mass - below : below;
      const t = solveIncreasing(
        (at) => ({
          value: evaluateSeries(panel.integral, at) - wanted,
          slope: 0.5 * panel.width * evaluateSeries(panel.density, at),
        }),
        panel.mass > 0 ? (2 * wanted) / panel.mass - 1 : 0,
        -1,
        1,
      );
      return toX(panel.start + 0.5 * panel.width * (1 + t));
    },
  };
}
