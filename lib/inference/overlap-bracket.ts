import type { RateQuestion } from './contract';
import { upperLimit } from './intervals';
import { ratePosterior } from './posterior';

/** Limits between which every rule for shared stars lies. */
export interface OverlapBracket {
  /** With the largest completeness that the surveys allow: min(1, sum of C_s). */
  lowest: number;
  /** With the smallest: max of C_s. */
  highest: number;
}

/**
 * The limit at both ends of what a star's several surveys may show together, however its epochs are
 * correlated.
 *
 * @param question likelihood, detections and prior; its completeness is not used
 * @param lower completeness of each star at the Frechet bound max_s C_s, shape [star]
 * @param upper at min(1, sum_s C_s), the maps combined before they are averaged over the population
 * @param level credible level [fraction], 0 < level < 1
 * @throws RangeError as `ratePosterior`, and where a lower value exceeds the upper one
 * @source Frechet 1935, Fundamenta Mathematicae 25, 379 (from memory)
 */
export function overlapBracket(
  question: RateQuestion,
  lower: Float64Array,
  upper: Float64Array,
  level: number,
): OverlapBracket {
  const wrong = lower.findIndex((c, star) => !(c <= upper[star] + 1e-9));
  if (lower.length !== upper.length || wrong >= 0) {
    throw new RangeError(
      `completeness must not fall from the lower to the upper bound, got ${lower[wrong]} and ` +
        `${upper[wrong]} for star ${wrong}`,
    );
  }
  const limitOf = (completeness: Float64Array) =>
    upperLimit(ratePosterior({ ...question, completeness }), level);
  return { lowest: limitOf(upper), highest: limitOf(lower) };
}
