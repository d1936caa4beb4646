import { logOf } from '@/lib/numerics/grid';
import { splitAge } from './age-split';
import { coolNodes } from './cooling';
import { coolingPaths } from './cooling-paths';
import { directIntegral } from './direct-integral';
import { ageUnder } from './field-age';
import { levelMap } from './level-map';
import { fillMagnitudeWeights, type SingleAges } from './magnitude-weights';
import { requireGrid } from './map-grid';
import { exactRows } from './separation-rows';
import { type PreparedStar, prepareStar } from './star-model';
import type {
  CompletenessMap,
  CoolingRelation,
  CoolingReport,
  MapGrid,
  SensitivitySettings,
  StarInputs,
} from './types';
import { removeUnstableNodes } from './unstable-zone';

/** Changes whenever the same inputs would give other numbers, so that stored maps are not reused. */
export const ENGINE_VERSION: string = '2';

/**
 * Completeness of one star, P(detected | companion of mass m and semi-major axis a), without random
 * numbers.
 *
 * C(m, a) = Σ_k Σ_l w_k w_l ∫ c(θ) p(θ; M(m, t_k) + μ(d_l) + A - m_star) dF(θ d_l / a), F the
 * projected separation's distribution. One curve under the smooth threshold takes the product of
 * weights and level rows; a hard threshold, or several curves of one position, the direct integral.
 *
 * @param star see StarInputs
 * @param cooling built-in law or table
 * @param grid nodes, not modified
 * @param settings eccentricity law, threshold, and what lies outside the cooling relation
 * @returns the map on the grid's nodes (axes copied), and where it rests on the relation's edge
 * @throws RangeError for anything outside its domain, naming the star and the field
 * @throws AgeOutsideTableError for an age node outside the relation when ages are refused
 * Accuracy: 1e-4 in any cell and 1e-5 root mean square on the twelve-star check survey, 1e-3 for any
 * curve, against summation over separation with the same nodes; the nodes' own error is larger
 * (smooth 7e-3, hard 1.4e-2 in the worst cell of that survey; root mean square 6e-4 and 7e-4).
 * Cost: about 0.5 ms a star on the default grid, 3 ms under a hard threshold with an uncertain age;
 * 0.1 s once per eccentricity law.
 */
export function computeCompletenessMap(
  star: StarInputs,
  cooling: CoolingRelation,
  grid: MapGrid,
  settings: SensitivitySettings,
): { map: CompletenessMap; report: CoolingReport } {
  requireGrid(grid);
  const prepared = prepareStar(star, cooling, grid.massMjup, settings);
  const logAxis = logOf(grid.semiMajorAxisAu);
  const completeness = integrateStar(star, prepared, cooling, grid.massMjup, logAxis, settings);
  for (let i = 0; i < completeness.length; i++) {
    completeness[i] = Math.min(1, Math.max(0, completeness[i]));
  }
  const removed = removeUnstableNodes(completeness, grid, star, settings);
  return {
    map: {
      massMjup: Float64Array.from(grid.massMjup),
      semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
      completeness,
    },
    report: {
      ...prepared.report,
      ...(removed !== null && { nodesRemovedByStellarCompanion: removed }),
    },
  };
}

/** Adds up what is seen at single ages and what is seen over stretches of age. */
function integrateStar(
  star: StarInputs,
  prepared: PreparedStar,
  cooling: CoolingRelation,
  massMjup: Float64Array,
  logAxis: Float64Array,
  settings: SensitivitySettings,
): Float64Array {
  const { eccentricity, threshold, massOutsideTable } = settings;
  const direct = (of: PreparedStar) =>
    directIntegral(
      of,
      exactRows(eccentricity, logAxis),
      massMjup.length,
      logAxis.length,
      threshold,
    );
  const [curve] = prepared.curves;
  const isHard = threshold === 'hard';
  if (prepared.curves.length > 1 || (isHard && settings.ageNodesPerSide !== undefined)) {
    return direct(prepared);
  }
  const age = splitAge(ageUnder(star, settings), prepared.ages, settings, curve.nSigma);
  const { band } = star.curves[0];
  const { magnitudes } = coolNodes(cooling, band, massMjup, age.single.values, settings, star.name);
  const single = { weights: age.single.weights, magnitudes };
  const paths = coolingPaths(cooling, band, massMjup, massOutsideTable, age.cellMag);
  const byLevels = (ages: SingleAges) =>
    levelMap(
      prepared,
      (range, memory, at) =>
        fillMagnitudeWeights(paths, age.sides, ages, threshold, curve.nSigma, range, memory, at),
      massMjup.length,
      age.cellMag,
      eccentricity,
      logAxis,
    );
  if (!isHard) return byLevels(single);
  const none = { weights: new Float64Array(0), magnitudes: new Float64Array(0) };
  const ofSingle =
    single.weights.length > 0
      ? direct({ ...prepared, ages: age.single, curves: [{ ...curve, magnitudes }] })
      : null;
  if (age.sides.length === 0 && ofSingle) return ofSingle;
  const completeness = byLevels(none);
  if (ofSingle) for (let i = 0; i < ofSingle.length; i++) completeness[i] += ofSingle[i];
  return completeness;
}
