import type { LevelRows } from './level-rows';
import type { PreparedCurve, PreparedStar } from './star-model';
import { thresholdTable } from './threshold-table';

/** A weight below this moves no cell by more than 1e-9. */
const NEGLIGIBLE = 1e-12;

/**
 * Completeness as weights times rows: C = W · H, the smooth threshold and the ages folded into W.
 *
 * With Π(q) = E p(q - M) the probability of a detection where the limit is q, C = ∫ H dΠ. H is a
 * straight line in each cell, so its mean takes Π's rise across the cell and its moment takes
 * 3 ∫ ξ dΠ, both known from Π and its antiderivative at the levels.
 *
 * @param rows see levelRows
 * @param star prepared star
 * @param curve the curve that the rows belong to
 * @param masses number of mass nodes
 * @param columns number of semi-major axes
 * @returns shape [mass, semiMajorAxis], row-major, not yet cut to 0…1
 */
export function levelProduct(
  rows: LevelRows,
  star: PreparedStar,
  curve: PreparedCurve,
  masses: number,
  columns: number,
): Float64Array {
  const { levels, mean, moment, total } = rows;
  const { addLevels, certainAt } = thresholdTable(curve.nSigma);
  const ageWeights = star.ages.weights;
  const ages = ageWeights.length;
  const chance = new Float64Array(levels.length);
  const area = new Float64Array(levels.length);
  const completeness = new Float64Array(masses * columns);
  for (let m = 0; m < masses; m++) {
    chance.fill(0);
    area.fill(0);
    let faintest = -Infinity;
    for (let k = 0; k < ages; k++) {
      const magnitude = curve.magnitudes[m * ages + k];
      if (magnitude === Infinity) continue;
      faintest = Math.max(faintest, magnitude);
      addLevels(levels, magnitude, ageWeights[k], chance, area);
    }
    if (faintest === -Infinity) continue;
    const out = m * columns;
    for (let j = 0; j < columns; j++) completeness[out + j] = chance[0] * total[j];
    for (let c = 0; c + 1 < levels.length; c++) {
      if (levels[c] - faintest > certainAt) break;
      const width = levels[c + 1] - levels[c];
      const rise = chance[c + 1] - chance[c];
      const tilt = 3 * (chance[c + 1] + chance[c] - (2 * (area[c + 1] - area[c])) / width);
      if (rise < NEGLIGIBLE && Math.abs(tilt) < NEGLIGIBLE) continue;
      const row = c * columns;
      for (let j = 0; j < columns; j++) {
        completeness[out + j] += rise * mean[row + j] + tilt * moment[row + j];
      }
    }
  }
  return completeness;
}
