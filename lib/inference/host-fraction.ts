import { noDetectionOf } from './no-detection';
import type { RateLikelihood } from './poisson';

/**
 * Bernoulli likelihood of the host fraction: f for each star with a counted detection, 1 - f C_j
 * for each of the others. The detected stars' own C_j is a constant and drops out.
 *
 * @param completeness shape [star], 0..1
 * @param detectedStars indices of the stars with a counted detection, each once
 * @source Lafreniere et al. 2007, ApJ 670, 1367
 */
export function hostFractionLikelihood(
  completeness: Float64Array,
  detectedStars: readonly number[],
): RateLikelihood {
  const isDetected = new Uint8Array(completeness.length);
  for (const star of detectedStars) isDetected[star] = 1;
  const others = new Float64Array(completeness.length);
  let [kept, certain] = [0, 0];
  for (let star = 0; star < completeness.length; star++) {
    const c = completeness[star];
    if (isDetected[star]) continue;
    if (c === 1) certain++;
    else if (c > 0) others[kept++] = c;
  }
  return {
    powerOfRate: detectedStars.length,
    powerOfComplement: certain,
    logRegular: noDetectionOf(others.subarray(0, kept)),
    decay: 0,
  };
}
