import { linearAxis } from '@/lib/numerics/grid';
import { interpolateLinear } from '@/lib/numerics/interpolate';
import { gaussLegendre } from '@/lib/numerics/quadrature';
import { requireEccentricity } from './kepler';
import type { EccentricityLaw } from './types';

/** A law of eccentricity that spreads over a range, made ready for integration. */
export interface EccentricitySpread {
  /** Where the law has weight, [low, high] within [0, 1]. */
  low: number;
  high: number;
  /** Where a peaked density is cut in two, so that the nodes crowd at its peak. */
  peak?: number;
  /** Relative density at e, not normalised, finite for low < e < high. */
  density(e: number): number;
}

export interface NamedEccentricityLaw {
  name: string;
  law: EccentricityLaw;
  source: string;
}

/** Laws offered by name; none is a guess made in silence. */
export const ECCENTRICITY_PRESETS: readonly NamedEccentricityLaw[] = [
  { name: 'circular', law: { law: 'circular' }, source: 'e = 0' },
  {
    name: 'radial-velocity planets',
    law: { law: 'beta', alpha: 0.867, beta: 3.03 },
    source: 'Kipping 2013, MNRAS 434, L51',
  },
  {
    name: 'imaged planets',
    law: { law: 'beta', alpha: 30, beta: 200 },
    source: 'Bowler et al. 2020, AJ 159, 63',
  },
  { name: 'uniform to 0.95', law: { law: 'uniform', max: 0.95 }, source: 'uniform on [0, 0.95]' },
];

/** Eccentricity beyond which a Rayleigh law of this many σ has no weight that a double could show. */
const RAYLEIGH_SIGMAS = 8.5;
/** Share of the largest density below which a Beta law is cut. */
const NEGLIGIBLE = 1e-15;
const SCAN_POINTS = 4096;
const DRAW_POINTS = 4096;

/**
 * Refuses a law whose parameters are outside their domain.
 *
 * @throws RangeError naming the parameter, what it must be and what it is
 */
export function requireEccentricityLaw(law: EccentricityLaw): void {
  if (law.law === 'fixed') requireEccentricity(law.eccentricity);
  if (law.law === 'uniform' && !(law.max > 0 && law.max < 1)) {
    throw new RangeError(`max must be above 0 and below 1, got ${law.max}`);
  }
  if (law.law === 'beta') {
    requirePositive(law.alpha, 'alpha');
    requirePositive(law.beta, 'beta');
  }
  if (law.law === 'rayleigh') requirePositive(law.sigma, 'sigma');
}

/**
 * The one eccentricity of a law that has only one, else null.
 *
 * @throws RangeError for parameters outside their domain
 */
export function singleEccentricity(law: EccentricityLaw): number | null {
  requireEccentricityLaw(law);
  if (law.law === 'circular') return 0;
  return law.law === 'fixed' ? law.eccentricity : null;
}

/**
 * Density and range of a law that spreads over eccentricities.
 *
 * @throws RangeError for parameters outside their domain, and for a law with a single eccentricity
 */
export function eccentricitySpread(law: EccentricityLaw): EccentricitySpread {
  requireEccentricityLaw(law);
  switch (law.law) {
    case 'uniform':
      return { low: 0, high: law.max, density: () => 1 };
    case 'rayleigh': {
      const { sigma } = law;
      const density = (e: number) => e * Math.exp((-e * e) / (2 * sigma * sigma));
      return { low: 0, high: Math.min(1, RAYLEIGH_SIGMAS * sigma), density };
    }
    case 'beta':
      return betaSpread(law.alpha, law.beta);
    default:
      throw new RangeError(`a ${law.law} law has a single eccentricity`);
  }
}

function betaSpread(alpha: number, beta: number): EccentricitySpread {
  const logDensity = (e: number) => (alpha - 1) * Math.log(e) + (beta - 1) * Math.log1p(-e);
  const centre = alpha > 1 && beta > 1 ? (alpha - 1) / (alpha + beta - 2) : 0.5;
  const peak = logDensity(centre);
  const floor = peak + Math.log(NEGLIGIBLE);
  let low = 0;
  let high = 1;
  const step = 1 / SCAN_POINTS;
  if (alpha > 1) while (low + step < centre && logDensity(low + step) < floor) low += step;
  if (beta > 1) while (high - step > centre && logDensity(high - step) < floor) high -= step;
  const density = (e: number) => Math.exp(logDensity(e) - peak);
  return alpha > 1 && beta > 1 ? { low, high, peak: centre, density } : { low, high, density };
}

/** Nodes in eccentricity with weights that hold the density; shape [n] each. */
interface EccentricityNodes {
  eccentricity: Float64Array;
  weight: Float64Array;
}

const NODES_PER_PIECE = 48;
const STEPS = new Map<number, { share: Float64Array; weight: Float64Array }>();

/**
 * Nodes for an integral over [from, to], crowded towards both ends so that a power of e or 1 - e in
 * the density, and the logarithm at e = |1 - x|, lose their edge.
 *
 * @param spread law, see eccentricitySpread
 * @param from lower end, within the law's range
 * @param to upper end, within the law's range
 * @param sharpness order k of the map s^k / (s^k + (1 - s)^k), 3 for a bounded density
 * @returns weights not normalised: they sum to the law's relative weight between from and to
 */
function eccentricityNodes(
  spread: EccentricitySpread,
  from: number,
  to: number,
  sharpness: number,
): EccentricityNodes {
  const steps = crowdedSteps(sharpness);
  const eccentricity = new Float64Array(NODES_PER_PIECE);
  const weight = new Float64Array(NODES_PER_PIECE);
  for (let i = 0; i < NODES_PER_PIECE; i++) {
    const e = from + (to - from) * steps.share[i];
    eccentricity[i] = Math.min(e, 1 - 1e-15);
    const inside = e > 0 && e < 1;
    weight[i] = inside ? (to - from) * steps.weight[i] * spread.density(e) : 0;
  }
  return { eccentricity, weight };
}

function crowdedSteps(k: number) {
  const known = STEPS.get(k);
  if (known) return known;
  const { nodes, weights } = gaussLegendre(NODES_PER_PIECE);
  const share = new Float64Array(NODES_PER_PIECE);
  const weight = new Float64Array(NODES_PER_PIECE);
  for (let i = 0; i < NODES_PER_PIECE; i++) {
    const s = 0.5 * (1 + nodes[i]);
    const up = s ** k;
    const down = (1 - s) ** k;
    share[i] = up / (up + down);
    weight[i] = (0.5 * weights[i] * k * (s * (1 - s)) ** (k - 1)) / ((up + down) * (up + down));
  }
  const steps = { share, weight };
  STEPS.set(k, steps);
  return steps;
}

/** How far the nodes must crowd towards the ends for this law. */
export function nodeSharpness(law: EccentricityLaw): number {
  if (law.law !== 'beta') return 3;
  const weakest = Math.min(law.alpha, law.beta, 1);
  return Math.min(12, Math.max(3, Math.ceil(3 / weakest)));
}

/**
 * Mean of e² under a law, which sets the moments of the projected separation.
 *
 * @throws RangeError for parameters outside their domain
 * @example meanSquareEccentricity({ law: 'uniform', max: 0.95 }) // 0.300833
 */
export function meanSquareEccentricity(law: EccentricityLaw): number {
  const single = singleEccentricity(law);
  if (single !== null) return single * single;
  const spread = eccentricitySpread(law);
  return averageOver(spread, [], nodeSharpness(law), (e) => e * e);
}

/**
 * Average of a function over a law, cut at the given places and at the law's own peak.
 *
 * @param spread law, see eccentricitySpread
 * @param splits eccentricities at which f has an edge; those outside the law's range are ignored
 * @param sharpness see nodeSharpness
 * @param f function of e
 */
export function averageOver(
  spread: EccentricitySpread,
  splits: readonly number[],
  sharpness: number,
  f: (e: number) => number,
): number {
  const inside = [...splits, ...(spread.peak === undefined ? [] : [spread.peak])].filter(
    (e) => e > spread.low && e < spread.high,
  );
  const ends = [spread.low, ...inside.sort((a, b) => a - b), spread.high];
  let total = 0;
  let sum = 0;
  for (let piece = 0; piece + 1 < ends.length; piece++) {
    const nodes = eccentricityNodes(spread, ends[piece], ends[piece + 1], sharpness);
    for (let i = 0; i < NODES_PER_PIECE; i++) {
      if (nodes.weight[i] === 0) continue;
      total += nodes.weight[i];
      sum += nodes.weight[i] * f(nodes.eccentricity[i]);
    }
  }
  return sum / total;
}

/**
 * Quantile function of a law, for drawing by inversion.
 *
 * @returns function of a probability 0 to 1 to an eccentricity 0 <= e < 1
 * @throws RangeError for parameters outside their domain
 * Accuracy: closed form, except Beta (a table of 4096 crowded nodes, 1e-6 in probability).
 */
export function eccentricityQuantile(law: EccentricityLaw): (p: number) => number {
  const single = singleEccentricity(law);
  if (single !== null) return () => single;
  if (law.law === 'uniform') return (p) => law.max * p;
  if (law.law === 'rayleigh') {
    const total = -Math.expm1(-1 / (2 * law.sigma * law.sigma));
    return (p) => Math.min(1 - 1e-15, law.sigma * Math.sqrt(-2 * Math.log1p(-p * total)));
  }
  return tabulatedQuantile(law);
}

function tabulatedQuantile(law: EccentricityLaw): (p: number) => number {
  const spread = eccentricitySpread(law);
  const k = nodeSharpness(law);
  const width = spread.high - spread.low;
  const edges = linearAxis(0, 1, DRAW_POINTS + 1).map((s) => {
    const up = s ** k;
    return spread.low + (width * up) / (up + (1 - s) ** k);
  });
  const { nodes, weights } = gaussLegendre(6);
  const cumulative = new Float64Array(DRAW_POINTS + 1);
  for (let i = 0; i < DRAW_POINTS; i++) {
    const half = 0.5 * (edges[i + 1] - edges[i]);
    let piece = 0;
    for (let j = 0; j < 6; j++) {
      const e = edges[i] + half * (1 + nodes[j]);
      if (e > 0 && e < 1) piece += weights[j] * half * spread.density(e);
    }
    cumulative[i + 1] = cumulative[i] + piece;
  }
  const total = cumulative[DRAW_POINTS];
  return (p) => Math.min(1 - 1e-15, interpolateLinear(p * total, cumulative, edges));
}

function requirePositive(value: number, name: string): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be finite and > 0, got ${value}`);
  }
}
