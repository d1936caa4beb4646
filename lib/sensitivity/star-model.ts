import { distanceModulus } from '@/lib/quantities/magnitudes';
import { ageNodeEnds, ageNodes, type WeightedNodes } from './age';
import { checkContrastCurve } from './contrast';
import { coolNodes, reportWithinRelation } from './cooling';
import { distanceNodes, smoothDistanceNodes } from './distance';
import { effectiveCurve } from './effective-curve';
import { ageUnder } from './field-age';
import type {
  ContrastCurve,
  CoolingRelation,
  CoolingReport,
  SensitivitySettings,
  StarInputs,
} from './types';

/** One curve of a star with everything that does not depend on age or distance worked out. */
export interface PreparedCurve {
  /** ln θ, shape [point], [ln arcsec]. */
  logSeparation: Float64Array;
  /** Faintest apparent magnitude that is found, corrected for extinction, [mag]. */
  limitMag: Float64Array;
  coverage: Float64Array;
  nSigma: number;
  /**
   * Absolute magnitudes in the curve's band, shape [mass, age]; Infinity is never detected. May be
   * empty where the star was prepared without them.
   */
  magnitudes: Float64Array;
}

/** A star ready for integration: nodes of age and distance, curves, and magnitudes at the nodes. */
export interface PreparedStar {
  /** Worked out when first asked for: most maps need none. */
  readonly ages: WeightedNodes;
  distances: WeightedNodes;
  /** ln d and μ at each distance node. */
  logDistance: Float64Array;
  modulus: Float64Array;
  curves: PreparedCurve[];
  report: CoolingReport;
}

const NO_MAGNITUDES = new Float64Array(0);

/**
 * Checks a star's inputs and evaluates its cooling relation.
 *
 * @param star see StarInputs
 * @param cooling relation
 * @param massMjup mass nodes, [M_Jup], not modified
 * @param settings rules
 * @param needsMagnitudes whether the magnitudes at the age nodes are used
 * @throws RangeError for anything outside its domain, naming the star and the field
 */
export function prepareStar(
  star: StarInputs,
  cooling: CoolingRelation,
  massMjup: Float64Array,
  settings: SensitivitySettings,
  needsMagnitudes = true,
): PreparedStar {
  const hostMags = apparentMags(star);
  const nodeRule = [
    ageUnder(star, settings),
    settings.threshold,
    settings.ageNodesPerSide,
  ] as const;
  let nodes: WeightedNodes | null = null;
  const ages = () => {
    nodes ??= ageNodes(...nodeRule);
    return nodes;
  };
  const ends = ageNodeEnds(...nodeRule);
  const distances = nodesOfDistance(star, settings);
  const extinctionMag = star.extinctionMag ?? 0;
  if (!Number.isFinite(extinctionMag)) {
    throw new RangeError(`extinctionMag of ${star.name} must be finite, got ${extinctionMag}`);
  }
  const reports: CoolingReport[] = [];
  const curves = star.curves.map((curve, s) => {
    checkContrastCurve(curve, star.name);
    const { band } = curve;
    const within = needsMagnitudes ? null : reportWithinRelation(cooling, band, massMjup, ends);
    const cooled = within
      ? { magnitudes: NO_MAGNITUDES, report: within }
      : coolNodes(cooling, band, massMjup, ages().values, settings, star.name);
    reports.push(cooled.report);
    const effective = effectiveCurve(curve, star, settings);
    return prepareCurve(effective, hostMags[s] - extinctionMag, cooled.magnitudes);
  });
  return {
    get ages() {
      return ages();
    },
    distances,
    logDistance: distances.values.map(Math.log),
    modulus: distances.values.map(distanceModulus),
    curves,
    report: mergeReports(reports),
  };
}

/** The sharpest curve of a smooth threshold tells how many nodes are needed. */
function nodesOfDistance(
  { distance, curves }: StarInputs,
  { threshold }: SensitivitySettings,
): WeightedNodes {
  if (threshold === 'hard') return distanceNodes(distance);
  const nSigma = curves.reduce((most, curve) => Math.max(most, curve.nSigma), 0);
  return distanceNodes(distance, smoothDistanceNodes(distance, nSigma));
}

/** Apparent magnitude of the star for each curve; differing bands need one each. */
function apparentMags(star: StarInputs): number[] {
  if (star.curves.length === 0) throw new RangeError(`${star.name} must have a curve, got none`);
  const mags = star.hostMags ?? star.curves.map(() => star.hostMag);
  if (mags.length !== star.curves.length) {
    throw new RangeError(
      `hostMags of ${star.name} must have one value per curve, got ${mags.length} for ${star.curves.length}`,
    );
  }
  const bands = new Set(star.curves.map((curve) => curve.band));
  if (star.hostMags === undefined && bands.size > 1) {
    throw new RangeError(
      `hostMags of ${star.name} must be given for curves in ${[...bands].join(' and ')}, got one magnitude`,
    );
  }
  for (const mag of mags) {
    if (!Number.isFinite(mag)) {
      throw new RangeError(`hostMag of ${star.name} must be finite, got ${mag}`);
    }
  }
  return mags;
}

function prepareCurve(
  curve: ContrastCurve,
  hostMag: number,
  magnitudes: Float64Array,
): PreparedCurve {
  const points = curve.contrastMag.length;
  const logSeparation = new Float64Array(points);
  const limitMag = new Float64Array(points);
  for (let i = 0; i < points; i++) {
    logSeparation[i] = Math.log(curve.separationArcsec[i]);
    limitMag[i] = hostMag + curve.contrastMag[i];
  }
  return {
    logSeparation,
    limitMag,
    coverage: curve.coverage ?? new Float64Array(points).fill(1),
    nSigma: curve.nSigma,
    magnitudes,
  };
}

/** Several bands of one star: a mass node counts once, an age node once. */
function mergeReports(reports: CoolingReport[]): CoolingReport {
  if (reports.length === 1) return reports[0];
  const flagged = new Set(reports.flatMap((report) => report.flaggedMassNodes));
  const largest = (pick: (report: CoolingReport) => number) => Math.max(...reports.map(pick));
  return {
    massNodesOutside: largest((report) => report.massNodesOutside) && flagged.size,
    ageNodesClamped: largest((report) => report.ageNodesClamped),
    lawNodesOutsideValidity: largest((report) => report.lawNodesOutsideValidity),
    flaggedMassNodes: [...flagged].sort((a, b) => a - b),
  };
}
