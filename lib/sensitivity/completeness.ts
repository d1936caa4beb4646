import { isSameAxis, logOf } from '@/lib/numerics/grid';
import type { WeightedNodes } from './age';
import { splitAge } from './age-split';
import { coolNodes } from './cooling';
import { coolingPaths } from './cooling-paths';
import { directIntegral } from './direct-integral';
import { encodeMap } from './encoding';
import { ageUnder } from './field-age';
import { encodedLevelMap, levelMap } from './level-map';
import type { SingleAges, WeightInputs } from './magnitude-weights';
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
export const ENGINE_VERSION: string = '5';

/**
 * Completeness of one star, P(detected | companion of mass m and semi-major axis a), without random
 * numbers.
 *
 * C(m, a) = E ∫ c(θ) p(θ; M(m, t) + μ(d) + A - m_star) dF(θ d / a) over age t and distance d, F
 * the projected separation's distribution. One curve takes the product of weights, exact in age, and
 * rows of cells of magnitude; several curves of one position, and single ages under a hard
 * threshold, the sum over separation. Distances are three nodes, fewer where a smooth threshold hides
 * their error.
 *
 * An age law's tails beyond the cooling relation take its nearest age; whether the star is refused
 * there is told by its age nodes, which leave out 2 % (smooth) or 0.6 % (hard) at each end.
 *
 * @param star see StarInputs
 * @param cooling built-in law or table
 * @param grid nodes, not modified
 * @param settings eccentricity law, threshold, and what lies outside the cooling relation
 * @returns the map on the grid's nodes (axes copied), and where it rests on the relation's edge
 * @throws RangeError for anything outside its domain, naming the star and the field
 * @throws AgeOutsideTableError for an age node outside the relation when ages are refused
 * Accuracy: 8e-5 root mean square and 2e-3 in the worst cell over twelve invented stars with errors
 * of age to 0.35 dex and of distance to 3 %, under either threshold, against a sum over separation
 * with many nodes of both; what is left in the worst cells is the distance nodes' own error. Several
 * curves keep age nodes, 5 or 10 a side, whose error is 7e-3 (smooth) or 1.4e-2 (hard) there.
 * Cost: see `npm run bench`; 0.1 s once per eccentricity law.
 */
export function computeCompletenessMap(
  star: StarInputs,
  cooling: CoolingRelation,
  grid: MapGrid,
  settings: SensitivitySettings,
): { map: CompletenessMap; report: CoolingReport } {
  const { prepared, parts, logAxis } = prepare(star, cooling, grid, settings);
  const completeness = valuesOf(prepared, parts, logAxis, settings);
  const removed = removeUnstableNodes(completeness, grid, star, settings);
  return {
    map: {
      massMjup: grid.massMjup.slice(),
      semiMajorAxisAu: grid.semiMajorAxisAu.slice(),
      completeness,
    },
    report: reportOf(prepared, removed),
  };
}

/**
 * The same map as it is stored: encodeMap of computeCompletenessMap, and faster than the two.
 *
 * @returns shape [mass, semiMajorAxis] of the grid, row-major, 0 to 65535; and the same report
 * @throws as computeCompletenessMap
 */
export function computeEncodedMap(
  star: StarInputs,
  cooling: CoolingRelation,
  grid: MapGrid,
  settings: SensitivitySettings,
): { encoded: Uint16Array; report: CoolingReport } {
  const { prepared, parts, logAxis } = prepare(star, cooling, grid, settings);
  const { weights, besides } = parts;
  const isPlain = weights !== null && besides === null;
  const encoded =
    (isPlain && encodedLevelMap(prepared, weights, settings.eccentricity, logAxis)) ||
    encodeMap(valuesOf(prepared, parts, logAxis, settings));
  const removed = removeUnstableNodes(encoded, grid, star, settings);
  return { encoded, report: reportOf(prepared, removed) };
}

function reportOf({ report }: PreparedStar, removed: number | null): CoolingReport {
  return { ...report, ...(removed !== null && { nodesRemovedByStellarCompanion: removed }) };
}

/** What a map is made of: a product of weights and rows, what is summed over separation, or both. */
interface Parts {
  weights: WeightInputs | null;
  /** Shape [mass, semiMajorAxis]. */
  besides: Float64Array | null;
}

function prepare(
  star: StarInputs,
  cooling: CoolingRelation,
  grid: MapGrid,
  settings: SensitivitySettings,
): { prepared: PreparedStar; parts: Parts; logAxis: Float64Array } {
  requireGrid(grid);
  const isByLevels = usesLevels(star, settings);
  const prepared = prepareStar(star, cooling, grid.massMjup, settings, !isByLevels);
  const logAxis = logAxisOf(grid);
  const parts = isByLevels
    ? partsByLevels(star, prepared, cooling, grid.massMjup, logAxis, settings)
    : { weights: null, besides: direct(prepared, grid.massMjup.length, logAxis, settings) };
  return { prepared, parts, logAxis };
}

function valuesOf(
  prepared: PreparedStar,
  { weights, besides }: Parts,
  logAxis: Float64Array,
  { eccentricity }: SensitivitySettings,
): Float64Array {
  return weights
    ? levelMap(prepared, weights, eccentricity, logAxis, besides)
    : cutToChances(besides as Float64Array);
}

let lastAxis: { axisAu: Float64Array; logAxis: Float64Array } | null = null;

/** ln a of a grid, [ln au]: the stars of a survey share one. */
function logAxisOf({ semiMajorAxisAu }: MapGrid): Float64Array {
  if (!lastAxis || !isSameAxis(lastAxis.axisAu, semiMajorAxisAu)) {
    lastAxis = { axisAu: semiMajorAxisAu.slice(), logAxis: logOf(semiMajorAxisAu) };
  }
  return lastAxis.logAxis;
}

/** Several curves of one position are multiplied place by place; asked-for nodes are summed exactly. */
function usesLevels(
  star: StarInputs,
  { threshold, ageNodesPerSide }: SensitivitySettings,
): boolean {
  return star.curves.length === 1 && (threshold === 'smooth' || ageNodesPerSide === undefined);
}

function direct(
  star: PreparedStar,
  masses: number,
  logAxis: Float64Array,
  { eccentricity, threshold }: SensitivitySettings,
): Float64Array {
  const rows = exactRows(eccentricity, logAxis);
  return directIntegral(star, rows, masses, logAxis.length, threshold);
}

function cutToChances(values: Float64Array): Float64Array {
  for (let i = 0; i < values.length; i++) {
    if (values[i] <= 0) values[i] = 0;
    else if (values[i] > 1) values[i] = 1;
  }
  return values;
}

const NO_SINGLE_AGES: SingleAges = {
  weights: new Float64Array(0),
  magnitudes: new Float64Array(0),
};

/** What is seen over stretches of age and at single ages, which a hard rule sums over separation. */
function partsByLevels(
  star: StarInputs,
  prepared: PreparedStar,
  cooling: CoolingRelation,
  massMjup: Float64Array,
  logAxis: Float64Array,
  settings: SensitivitySettings,
): Parts {
  const { threshold, massOutsideTable } = settings;
  const [curve] = prepared.curves;
  const { nSigma } = curve;
  const { band } = star.curves[0];
  const age = splitAge(ageUnder(star, settings), () => prepared.ages, settings, nSigma);
  const single = singleAges(age.single, star, cooling, massMjup, settings);
  const isHard = threshold === 'hard';
  const ofSingle =
    isHard && single.weights.length > 0
      ? direct(
          {
            ...prepared,
            ages: age.single,
            curves: [{ ...curve, magnitudes: single.magnitudes }],
          },
          massMjup.length,
          logAxis,
          settings,
        )
      : null;
  if (ofSingle && age.sides.length === 0) return { weights: null, besides: ofSingle };
  const paths = coolingPaths(cooling, band, massMjup, massOutsideTable, age.cellMag);
  const weights = { paths, sides: age.sides, single, threshold, nSigma };
  if (isHard) weights.single = NO_SINGLE_AGES;
  return { weights, besides: ofSingle };
}

function singleAges(
  { values, weights }: WeightedNodes,
  star: StarInputs,
  cooling: CoolingRelation,
  massMjup: Float64Array,
  settings: SensitivitySettings,
): SingleAges {
  if (values.length === 0) return NO_SINGLE_AGES;
  const { band } = star.curves[0];
  const { magnitudes } = coolNodes(cooling, band, massMjup, values, settings, star.name);
  return { weights, magnitudes };
}
