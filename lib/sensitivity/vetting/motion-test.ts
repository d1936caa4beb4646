import { gammaQ } from '@/lib/numerics/special';
import { backgroundShift, factorChange, type HostMotion } from './background-track';
import { covarianceOf, type MeasuredOffset, type Offset, offsetOf } from './offsets';

export type MotionHypothesis = 'common-proper-motion' | 'background';

/** One hypothesis against all epochs. */
export interface HypothesisFit {
  chiSquared: number;
  /** Two coordinates for each epoch after the first. */
  degreesOfFreedom: number;
  /** Probability of a chi-squared at least as large where the hypothesis holds. */
  probability: number;
  /** Shape [epoch]: predicted offsets, [arcsec]; the first is the measured reference. */
  predicted: Offset[];
  /**
   * Shape [epoch]: distance of measured from predicted in units of their joint error, the square
   * root of a chi-squared of 2; 0 for the reference.
   */
  sigmas: number[];
}

const MAS = 1e-3;

/**
 * Tests whether a source moves with its star, or stands still behind it.
 *
 * The earliest epoch is the reference, and its error counts at every other one: the differences
 * share it, and the parallax error where the source stands still, in one covariance matrix. Orbital
 * motion is not modelled: of a companion that moves by more than its errors, chi-squared grows. The
 * error of the proper motion is not in the test.
 *
 * @param host motion of the star
 * @param measured at least 2 epochs, in any order
 * @param hypothesis constant offset, or a source without proper motion and parallax
 * @returns the fit, epochs in order of time
 * @throws RangeError for fewer than 2 epochs, two at one moment, or errors that are not > 0
 */
export function testMotion(
  host: HostMotion,
  measured: readonly MeasuredOffset[],
  hypothesis: MotionHypothesis,
): HypothesisFit {
  const epochs = inOrder(measured);
  const [reference, ...later] = epochs;
  const start = offsetOf(reference);
  const startCovariance = covarianceOf(reference);
  const isMoving = hypothesis === 'background';
  const parallaxError = isMoving ? host.parallaxErrorMas * MAS : 0;
  const predicted: Offset[] = [start];
  const residuals: number[] = [];
  const perParallax: number[] = [];
  for (const { julianYear, ...place } of later) {
    const from = reference.julianYear;
    const shift = isMoving ? backgroundShift(host, from, julianYear) : NO_SHIFT;
    const change = isMoving ? factorChange(host, from, julianYear) : { east: 0, north: 0 };
    const expected = {
      eastArcsec: start.eastArcsec + shift.eastArcsec,
      northArcsec: start.northArcsec + shift.northArcsec,
    };
    const seen = offsetOf(place);
    predicted.push(expected);
    residuals.push(seen.eastArcsec - expected.eastArcsec, seen.northArcsec - expected.northArcsec);
    perParallax.push(change.east * parallaxError, change.north * parallaxError);
  }
  const size = residuals.length;
  const matrix = Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (_, column) => {
      const shared = entryOf(startCovariance, row % 2, column % 2);
      const isSameEpoch = row >> 1 === column >> 1;
      const own = isSameEpoch ? entryOf(covarianceOf(later[row >> 1]), row % 2, column % 2) : 0;
      return own + shared + perParallax[row] * perParallax[column];
    }),
  );
  const chiSquared = mahalanobisSquared(matrix, residuals);
  const sigmas = later.map((_, epoch) => {
    const at = [2 * epoch, 2 * epoch + 1];
    const block = at.map((row) => at.map((column) => matrix[row][column]));
    return Math.sqrt(
      mahalanobisSquared(
        block,
        at.map((row) => residuals[row]),
      ),
    );
  });
  return {
    chiSquared,
    degreesOfFreedom: size,
    probability: gammaQ(size / 2, chiSquared / 2),
    predicted,
    sigmas: [0, ...sigmas],
  };
}

const NO_SHIFT: Offset = { eastArcsec: 0, northArcsec: 0 };

function inOrder(measured: readonly MeasuredOffset[]): MeasuredOffset[] {
  if (measured.length < 2) {
    throw new RangeError(`a test of motion needs at least 2 epochs, got ${measured.length}`);
  }
  return [...measured].sort((a, b) => a.julianYear - b.julianYear);
}

const entryOf = (
  { east, north, both }: { east: number; north: number; both: number },
  row: number,
  column: number,
): number => (row !== column ? both : row === 0 ? east : north);

/** rᵀ C⁻¹ r of a positive definite matrix, by its Cholesky factor. */
function mahalanobisSquared(matrix: readonly number[][], residuals: readonly number[]): number {
  const size = residuals.length;
  const factor = matrix.map(() => new Float64Array(size));
  const whitened = new Float64Array(size);
  let total = 0;
  for (let row = 0; row < size; row++) {
    let residual = residuals[row];
    for (let column = 0; column <= row; column++) {
      let sum = matrix[row][column];
      for (let k = 0; k < column; k++) sum -= factor[row][k] * factor[column][k];
      if (column < row) {
        factor[row][column] = sum / factor[column][column];
        residual -= factor[row][column] * whitened[column];
      } else {
        if (!(sum > 0)) throw new RangeError('covariance of the epochs is not positive definite');
        factor[row][row] = Math.sqrt(sum);
      }
    }
    whitened[row] = residual / factor[row][row];
    total += whitened[row] ** 2;
  }
  return total;
}
