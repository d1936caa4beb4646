import type { RatePosterior, RateQuestion } from './contract';
import { isSetByPrior, upperLimit } from './intervals';
import { ratePosterior } from './posterior';

/** Levels of the table beside a result [fraction]. */
export const TABLE_LEVELS: readonly number[] = [0.68, 0.9, 0.95, 0.99, 0.997];

/** One row of the table of limits. */
export interface LevelLimit {
  level: number;
  limit: number;
  setByPrior: boolean;
}

/**
 * Upper limits at several credible levels.
 *
 * @param levels each 0 < level < 1 [fraction]
 * @returns one row per level, in the order given
 * @throws RangeError for a level outside (0, 1)
 */
export function limitsByLevel(
  posterior: RatePosterior,
  levels: readonly number[] = TABLE_LEVELS,
): LevelLimit[] {
  return levels.map((level) => ({
    level,
    limit: upperLimit(posterior, level),
    setByPrior: isSetByPrior(posterior, level),
  }));
}

/**
 * The limit that a floor ten times lower would give, shown beside every log-uniform limit.
 *
 * @param level scalar [fraction], 0 < level < 1
 * @returns the limit, or null where the prior is not log-uniform
 * @throws RangeError as `ratePosterior`
 * @example limitAtLowerFloor(question, 0.95) // 0.0350795157290303 for S = 25, floor 0.001
 */
export function limitAtLowerFloor(question: RateQuestion, level: number): number | null {
  const { prior } = question;
  if (prior.law !== 'log-uniform') return null;
  const lower = { ...question, prior: { ...prior, min: prior.min / 10 } };
  return upperLimit(ratePosterior(lower), level);
}
