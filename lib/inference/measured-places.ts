import { normalQuantile } from '@/lib/numerics/normal';
import { gaussHermite, gaussLegendre } from '@/lib/numerics/quadrature';
import type { PopulationBox } from '@/lib/population';
import { type EccentricityLaw, separationCumulative } from '@/lib/sensitivity';
import { largestSeparation } from '@/lib/sensitivity/orbits';
import type { Detection } from './answer';

/** A measured value with its 16 % and 84 % points, all in one unit; one point alone counts for both. */
export interface Measured {
  value: number;
  lower?: number;
  upper?: number;
}

/** What is known of a companion's mass and semi-major axis. */
export type CompanionMeasurement =
  /** Log-normal errors, each side with its own. */
  | { kind: 'values'; mass: Measured; semiMajorAxis: Measured }
  /** Only the projected separation is known [au], within a bin of `logBinWidth` in its logarithm. */
  | {
      kind: 'separation';
      mass: Measured;
      projectedSeparationAu: number;
      eccentricity: EccentricityLaw;
      logBinWidth?: number;
    }
  /**
   * Samples of a posterior, shape [sample] each, with the prior under which they were drawn: flat in
   * mass and semi-major axis, flat in their logarithms, or its density per d ln m d ln a there.
   */
  | {
      kind: 'samples';
      massMjup: Float64Array;
      semiMajorAxisAu: Float64Array;
      interimPrior: 'flat' | 'log-flat' | Float64Array;
    };

/** A companion with what is known of it; without a measurement its best values count as exact. */
export interface MeasuredDetection extends Detection {
  measurement?: CompanionMeasurement;
}

/** Weighted places on one axis, inside the ranges. */
export interface Places {
  at: Float64Array;
  weight: Float64Array;
}

/** Places whose weighted sum of a density per d ln m d ln a is its mean over the measurement. */
export type MeasuredPlaces =
  | { form: 'product'; mass: Places; semiMajorAxis: Places }
  | { form: 'joint'; massMjup: Float64Array; semiMajorAxisAu: Float64Array; weight: Float64Array };

const NODES = 7;
const LOG_BIN_WIDTH = 0.05;
/** Panels in ln a over which the kernel of the separation is summed, and nodes in each. */
const PANEL_WIDTH = 0.25;
const PANEL_NODES = 8;

/** Standard normal places: Gauss-Hermite, or Gauss-Legendre in probability where there is a kink. */
function deviates(hasKink: boolean): { nodes: Float64Array; weights: Float64Array } {
  if (!hasKink) return gaussHermite(NODES);
  const half = gaussLegendre(NODES);
  const nodes = new Float64Array(2 * NODES);
  const weights = new Float64Array(2 * NODES);
  for (let i = 0; i < NODES; i++) {
    nodes[i] = normalQuantile(0.25 * (1 + half.nodes[i]));
    nodes[2 * NODES - 1 - i] = -nodes[i];
    weights[i] = 0.25 * half.weights[i];
    weights[2 * NODES - 1 - i] = weights[i];
  }
  return { nodes, weights };
}

function requirePositive(value: number, what: string): void {
  if (!(value > 0) || !Number.isFinite(value)) {
    throw new RangeError(`${what} must be a positive number, got ${value}`);
  }
}

function keepInside(at: number[], weight: number[], min: number, max: number): Places {
  const kept = at.map((x, i) => ({ x, w: weight[i] })).filter(({ x }) => x >= min && x <= max);
  return {
    at: Float64Array.from(kept, ({ x }) => x),
    weight: Float64Array.from(kept, ({ w }) => w),
  };
}

/** Places of a log-normal law with a side of its own below and above the best value. */
function measuredAxis(measured: Measured, what: string, min: number, max: number): Places {
  const { value, lower, upper } = measured;
  requirePositive(value, what);
  if (lower !== undefined) requirePositive(lower, `lower end of the ${what}`);
  if ((lower ?? value) > value || (upper ?? value) < value) {
    throw new RangeError(`${what}: ${value} must lie between its ends, ${lower} and ${upper}`);
  }
  if (lower === undefined && upper === undefined) return keepInside([value], [1], min, max);
  const above = Math.log((upper ?? (value * value) / (lower as number)) / value);
  const below = lower === undefined ? above : Math.log(value / lower);
  const { nodes, weights } = deviates(Math.abs(above - below) > 1e-9 * (above + below));
  const at = Array.from(nodes, (z) => value * Math.exp(z * (z < 0 ? below : above)));
  return keepInside(at, [...weights], min, max);
}

/** Places in the semi-major axis that a projected separation leaves possible. */
function separatedAxis(
  measurement: Extract<CompanionMeasurement, { kind: 'separation' }>,
  min: number,
  max: number,
): Places {
  const { projectedSeparationAu: separation, eccentricity } = measurement;
  const binWidth = measurement.logBinWidth ?? LOG_BIN_WIDTH;
  requirePositive(separation, 'projected separation');
  requirePositive(binWidth, 'logBinWidth');
  const near = Math.log(separation) - 0.5 * binWidth;
  const far = near + binWidth;
  const reach = Math.log(largestSeparation(eccentricity));
  const from = Math.max(Math.log(min), near - reach);
  const to = Math.log(max);
  const cuts = [from, far - reach, near, far, to].filter((y) => y >= from && y <= to);
  const ends = [...new Set(cuts)].sort((a, b) => a - b);
  const rule = gaussLegendre(PANEL_NODES);
  const at: number[] = [];
  const weight: number[] = [];
  for (let piece = 0; piece + 1 < ends.length; piece++) {
    const width = ends[piece + 1] - ends[piece];
    const panels = Math.ceil(width / PANEL_WIDTH);
    for (let i = 0; i < panels * PANEL_NODES; i++) {
      // The kernel may start like a square root at a cut: t²(3 - 2t) makes that smooth.
      const node = i % PANEL_NODES;
      const t = (Math.floor(i / PANEL_NODES) + 0.5 * (1 + rule.nodes[node])) / panels;
      const y = ends[piece] + width * t * t * (3 - 2 * t);
      const inBin =
        separationCumulative(Math.exp(far - y), eccentricity) -
        separationCumulative(Math.exp(near - y), eccentricity);
      at.push(Math.exp(y));
      weight.push(((3 * width * t * (1 - t) * rule.weights[node]) / panels) * (inBin / binWidth));
    }
  }
  return { at: Float64Array.from(at), weight: Float64Array.from(weight) };
}

function sampledPlaces(
  { massMjup, semiMajorAxisAu, interimPrior }: Extract<CompanionMeasurement, { kind: 'samples' }>,
  ranges: PopulationBox,
): MeasuredPlaces {
  const n = massMjup.length;
  if (n === 0 || semiMajorAxisAu.length !== n) {
    throw new RangeError(
      `samples need as many masses as semi-major axes, got ${n} and ${semiMajorAxisAu.length}`,
    );
  }
  let logScale = 0;
  for (let i = 0; i < n; i++) {
    requirePositive(massMjup[i], `mass of sample ${i}`);
    requirePositive(semiMajorAxisAu[i], `semi-major axis of sample ${i}`);
    logScale += Math.log(massMjup[i] * semiMajorAxisAu[i]) / n;
  }
  const kept: number[] = [];
  for (let i = 0; i < n; i++) {
    const [m, a] = [massMjup[i], semiMajorAxisAu[i]];
    const isInMass = m >= ranges.massMinMjup && m <= ranges.massMaxMjup;
    if (isInMass && a >= ranges.semiMajorAxisMinAu && a <= ranges.semiMajorAxisMaxAu) kept.push(i);
  }
  const weightOf = (i: number) => {
    if (interimPrior === 'log-flat') return 1 / n;
    if (interimPrior === 'flat') return Math.exp(logScale) / (massMjup[i] * semiMajorAxisAu[i] * n);
    requirePositive(interimPrior[i], `interim prior of sample ${i}`);
    return 1 / (interimPrior[i] * n);
  };
  return {
    form: 'joint',
    massMjup: Float64Array.from(kept, (i) => massMjup[i]),
    semiMajorAxisAu: Float64Array.from(kept, (i) => semiMajorAxisAu[i]),
    weight: Float64Array.from(kept, weightOf),
  };
}

/**
 * Places and weights that average a population over what is known of a companion.
 *
 * Values with errors: 7 Gauss-Hermite nodes per axis in the logarithm; where the two sides differ,
 * 7 Gauss-Legendre nodes in probability on each. A projected separation s: the chance that ln ρ
 * falls into the bin around ln(s/a), per bin width, summed over a. Samples: 1/p0 each, over their
 * number. Zero outside the ranges.
 *
 * @param detection its best values are exact where it has no measurement
 * @param ranges box of the population
 * @returns nothing but empty places where the ranges hold none of them
 * @throws RangeError for values, ends or samples that are not positive or not in order
 * Edges: weights of samples are known up to a factor common to all populations.
 * @source Foreman-Mackey, Hogg & Morton 2014, ApJ 795, 64 (samples over their interim prior)
 */
export function measuredPlaces(
  detection: MeasuredDetection,
  ranges: PopulationBox,
): MeasuredPlaces {
  const measurement: CompanionMeasurement = detection.measurement ?? {
    kind: 'values',
    mass: { value: detection.massMjup },
    semiMajorAxis: { value: detection.semiMajorAxisAu },
  };
  if (measurement.kind === 'samples') return sampledPlaces(measurement, ranges);
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu: min, semiMajorAxisMaxAu: max } = ranges;
  return {
    form: 'product',
    mass: measuredAxis(measurement.mass, 'mass', massMinMjup, massMaxMjup),
    semiMajorAxis:
      measurement.kind === 'separation'
        ? separatedAxis(measurement, min, max)
        : measuredAxis(measurement.semiMajorAxis, 'semi-major axis', min, max),
  };
}
