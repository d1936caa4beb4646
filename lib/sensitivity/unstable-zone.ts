import type { MapGrid, SensitivitySettings, StarInputs, StellarCompanion } from './types';

/**
 * Semi-major axes around the listed star at which a stellar companion lets no planet stay.
 *
 * Orbits around the one star last up to a fraction of the pair's semi-major axis, orbits around
 * both from a multiple of it on; between them nothing lasts. With μ = q/(1 + q):
 * inner limit/a_b = 0.464 - 0.380 μ - 0.631 e + 0.586 μe + 0.150 e² - 0.198 μe², not below 0;
 * outer limit/a_b = 1.60 + 5.10 e - 2.22 e² + 4.12 μ - 4.27 eμ - 5.09 μ² + 4.61 e²μ².
 * The listed star is taken as the heavier one, q <= 1. The fits were made for e up to 0.8 (inner)
 * and 0.7 (outer) and μ from 0.1 on; beyond that they are carried on.
 *
 * @param companion see StellarCompanion
 * @returns [inner, outer] limit, [au]
 * @throws RangeError for an axis not > 0, e outside [0, 1) or q outside (0, 1]
 * @source Holman & Wiegert 1999, AJ 117, 621, equations 1 and 3
 * @example unstableZone({ semiMajorAxisAu: 100, eccentricity: 0, massRatio: 1 }) // [27.4, 238.75]
 */
export function unstableZone(companion: StellarCompanion): [number, number] {
  const { semiMajorAxisAu: axis, eccentricity: e, massRatio } = companion;
  if (!(axis > 0 && Number.isFinite(axis))) {
    throw new RangeError(`semiMajorAxisAu of a companion must be finite and > 0, got ${axis}`);
  }
  if (!(e >= 0 && e < 1)) {
    throw new RangeError(`eccentricity of a companion must be at least 0 and below 1, got ${e}`);
  }
  if (!(massRatio > 0 && massRatio <= 1)) {
    throw new RangeError(`massRatio must be above 0 and at most 1, got ${massRatio}`);
  }
  const mu = massRatio / (1 + massRatio);
  const inner = 0.464 - 0.38 * mu - 0.631 * e + 0.586 * mu * e + 0.15 * e * e - 0.198 * mu * e * e;
  const outer =
    1.6 +
    5.1 * e -
    2.22 * e * e +
    4.12 * mu -
    4.27 * e * mu -
    5.09 * mu * mu +
    4.61 * e * e * mu * mu;
  return [axis * Math.max(0, inner), axis * outer];
}

/**
 * Whether a companion on this semi-major axis is taken out: the settings ask for it, the star has a
 * stellar companion, and the axis lies strictly between the zone's limits.
 *
 * @throws RangeError as unstableZone
 */
export function isRemoved(
  star: StarInputs,
  settings: SensitivitySettings,
  semiMajorAxisAu: number,
): boolean {
  if (settings.unstableZone !== 'remove' || !star.stellarCompanion) return false;
  const [inner, outer] = unstableZone(star.stellarCompanion);
  return semiMajorAxisAu > inner && semiMajorAxisAu < outer;
}

/**
 * Sets a map's nodes in the unstable zone to 0: a companion that cannot be there is not excluded by
 * not being seen. Nodes are judged one by one; between a removed node and a kept one the map falls
 * on a straight line in ln a, so the zone's edge is as sharp as the grid.
 *
 * @param completeness shape [mass, semiMajorAxis], row-major, plain or encoded, changed in place
 * @param grid its nodes
 * @param star see StarInputs
 * @param settings see SensitivitySettings
 * @returns number of nodes set to 0, or null where the option is off or no stellar companion known
 * @throws RangeError as unstableZone
 */
export function removeUnstableNodes(
  completeness: Float64Array | Uint16Array,
  grid: MapGrid,
  star: StarInputs,
  settings: SensitivitySettings,
): number | null {
  if (settings.unstableZone !== 'remove' || !star.stellarCompanion) return null;
  const columns = grid.semiMajorAxisAu.length;
  const masses = grid.massMjup.length;
  let removed = 0;
  for (let j = 0; j < columns; j++) {
    if (!isRemoved(star, settings, grid.semiMajorAxisAu[j])) continue;
    for (let m = 0; m < masses; m++) completeness[m * columns + j] = 0;
    removed += masses;
  }
  return removed;
}
