import { gaussLegendre, integrate } from '@/lib/numerics/quadrature';
import { findRoot } from '@/lib/numerics/roots';
import {
  averageOver,
  eccentricitySpread,
  meanSquareEccentricity,
  nodeSharpness,
  singleEccentricity,
} from './eccentricity';
import { requireEccentricity } from './kepler';
import type { EccentricityLaw } from './types';

/** Below this eccentricity an orbit is circular to the last bit that matters. */
const CIRCULAR = 1e-7;
const ANOMALY_NODES = 32;

/**
 * P(ρ < x) for circular orbits, 1 - √(1 - x²).
 *
 * @param x projected separation over semi-major axis, >= 0
 */
export function circularSeparationCumulative(x: number): number {
  if (x >= 1) return 1;
  // x²/(1+√(1-x²)) keeps its digits where 1 - √(1-x²) would lose them.
  return (x * x) / (1 + Math.sqrt((1 - x) * (1 + x)));
}

/**
 * P(ρ < x) for one eccentricity: projected separation in units of the semi-major axis, isotropic
 * orientation, random time.
 *
 * P = 1 - (1/π) ∫_{E0}^π √((1 - e cos E)² - x²) dE, with E = E0 + (π - E0)s²; summed as
 * (1/π)[E0 - e sin E0 + ∫ x²/(r + √(r² - x²)) dE], which does not cancel for small x.
 *
 * @param x ρ, >= 0
 * @param eccentricity e, 0 <= e < 1
 * @returns 0 to 1
 * @throws RangeError for e outside its domain
 * Accuracy: 1e-12. Cost: 32 square roots.
 */
export function fixedSeparationCumulative(x: number, eccentricity: number): number {
  requireEccentricity(eccentricity);
  if (eccentricity < CIRCULAR) return circularSeparationCumulative(x);
  if (x >= 1 + eccentricity) return 1;
  if (x <= 0) return 0;
  const cosine = Math.min(1, (1 - x) / eccentricity);
  const start = Math.acos(Math.max(-1, cosine));
  const { nodes, weights } = gaussLegendre(ANOMALY_NODES);
  let total = 0;
  for (let i = 0; i < ANOMALY_NODES; i++) {
    const s = 0.5 * (1 + nodes[i]);
    const radius = 1 - eccentricity * Math.cos(start + (Math.PI - start) * s * s);
    const inside = Math.max(0, (radius - x) * (radius + x));
    total += (weights[i] * s) / (radius + Math.sqrt(inside));
  }
  const seen = (Math.PI - start) * x * x * total;
  return Math.min(1, (start - eccentricity * Math.sin(start) + seen) / Math.PI);
}

/**
 * P(ρ < x) under a law of eccentricities.
 *
 * The fixed-e result averaged over the law, split at e = |1 - x|.
 *
 * @param x projected separation over semi-major axis, >= 0
 * @param law eccentricity law
 * @returns 0 to 1
 * @throws RangeError for parameters outside their domain
 * Accuracy: 1e-7 (1e-12 for one eccentricity). Cost: 3 000 square roots for a law that spreads.
 * @example separationCumulative(0.5, { law: 'circular' }) // 0.1339746
 */
export function separationCumulative(x: number, law: EccentricityLaw): number {
  const single = singleEccentricity(law);
  if (single !== null) return fixedSeparationCumulative(x, single);
  const spread = eccentricitySpread(law);
  if (x <= 0) return 0;
  if (x >= 1 + spread.high) return 1;
  return averageOver(spread, [Math.abs(1 - x)], nodeSharpness(law), (e) =>
    fixedSeparationCumulative(x, e),
  );
}

/**
 * Largest projected separation that a law allows, in units of the semi-major axis.
 *
 * @returns 1 + e_max, 1 to 2
 */
export function largestSeparation(law: EccentricityLaw): number {
  return 1 + (singleEccentricity(law) ?? eccentricitySpread(law).high);
}

/**
 * Quantile of the projected separation: x with P(ρ < x) = p.
 *
 * @param p probability, 0 to 1
 * @param law eccentricity law
 * @returns ρ, in units of the semi-major axis
 * @throws RangeError for p outside 0 to 1 or parameters outside their domain
 * @example separationQuantile(0.5, { law: 'circular' }) // 0.8660254
 */
export function separationQuantile(p: number, law: EccentricityLaw): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`p must be between 0 and 1, got ${p}`);
  if (singleEccentricity(law) === 0) return Math.sqrt(p * (2 - p));
  const top = largestSeparation(law);
  if (p === 0) return 0;
  if (p === 1) return top;
  return findRoot((x) => separationCumulative(x, law) - p, 0, top, { absoluteTolerance: 1e-10 });
}

/**
 * Mean of ρ and of ρ²: <ρ> = (π/4)(1 + <e²>/2), <ρ²> = (2/3)(1 + 3<e²>/2).
 *
 * @throws RangeError for parameters outside their domain
 */
export function separationMoments(law: EccentricityLaw): { mean: number; meanSquare: number } {
  const square = meanSquareEccentricity(law);
  return { mean: (Math.PI / 4) * (1 + square / 2), meanSquare: (2 / 3) * (1 + 1.5 * square) };
}

/**
 * P(seen at least once) in two epochs of one circular orbit, whose phases are unrelated: the plane
 * is shared, so the epochs are not independent.
 *
 * For inclination i the share of phases beyond x is (2/π) arccos(√((x² - cos² i)₊)/sin i), and the
 * answer is the mean over cos i of 1 - (1 - share)².
 *
 * @param threshold x, smallest visible ρ, 0 <= x <= 1
 * @returns 0 to 1
 * @throws RangeError for x outside 0 to 1
 * Accuracy: 1e-6.
 * @example twoPhaseDetection(0.8) // 0.790147
 */
export function twoPhaseDetection(threshold: number): number {
  if (!(threshold >= 0 && threshold <= 1)) {
    throw new RangeError(`threshold must be between 0 and 1, got ${threshold}`);
  }
  // cos i = x sin w below the threshold removes the square root at cos i = x.
  const below = integrate(
    (w) => {
      const cosine = threshold * Math.sin(w);
      const sine = Math.sqrt(1 - cosine * cosine);
      const share = (2 / Math.PI) * Math.acos(Math.min(1, (threshold * Math.cos(w)) / sine));
      return (1 - (1 - share) ** 2) * threshold * Math.cos(w);
    },
    0,
    Math.PI / 2,
    8,
  );
  return below + 1 - threshold;
}
