import { logOf } from '@/lib/numerics/grid';
import { directIntegral } from './direct-integral';
import { levelProduct } from './level-product';
import { levelRows } from './level-rows';
import { requireGrid } from './map-grid';
import { exactRows, tabulatedRows } from './separation-rows';
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
export const ENGINE_VERSION: string = '1';

/** Widest cell of limiting magnitude, in units of the smooth threshold's own width (1.09 mag / n). */
const CELL_SIGMAS = 1.3;
const WIDEST_CELL_MAG = 0.4;
/** A threshold narrower than this is followed no further: no curve is known so well. */
const NARROWEST_CELL_MAG = 0.01;

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
  const usesLevels = settings.threshold === 'smooth' && prepared.curves.length === 1;
  const completeness = usesLevels
    ? integrateByLevels(prepared, settings, grid.massMjup.length, logAxis)
    : directIntegral(
        prepared,
        exactRows(settings.eccentricity, logAxis),
        grid.massMjup.length,
        logAxis.length,
        settings.threshold,
      );
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

function integrateByLevels(
  star: PreparedStar,
  settings: SensitivitySettings,
  masses: number,
  logAxis: Float64Array,
): Float64Array {
  const [curve] = star.curves;
  const widestCell = Math.max(
    NARROWEST_CELL_MAG,
    Math.min(WIDEST_CELL_MAG, CELL_SIGMAS / curve.nSigma),
  );
  const fill = tabulatedRows(settings.eccentricity, logAxis);
  const rows = levelRows(star, curve, fill, logAxis.length, widestCell);
  return levelProduct(rows, star, curve, masses, logAxis.length);
}
