import { gammaQuantile } from '@/lib/numerics/special';
import type { Likelihood, RatePrior, RateQuestion } from './contract';
import { upperLimit } from './intervals';
import { ratePosterior } from './posterior';

/** More stars are not tried. */
export const MOST_STARS = 100_000;

export interface WantedLimit {
  likelihood: Likelihood;
  prior: RatePrior;
  /** Completeness of each star, the same for all, 0..1. */
  completeness: number;
  /** Limit that is wanted: planets per star, or fraction of stars. */
  target: number;
  /** Credible level [fraction]. */
  level: number;
  /** Detections among the stars, default 0. */
  detections?: number;
  /** What is known already: the stars are added to it. */
  known?: RateQuestion;
}

/** The limit from n stars alike, added to what is known. */
function limitOf(wanted: WantedLimit, stars: number): number {
  const { likelihood, prior, completeness, level, detections = 0, known } = wanted;
  const before = known?.completeness ?? new Float64Array(0);
  if (likelihood === 'mean-number' && prior.law === 'gamma' && known === undefined) {
    const rate = prior.rate + stars * completeness;
    return gammaQuantile(level, prior.shape + detections, rate);
  }
  // The mean number sees the sum alone.
  const added =
    likelihood === 'mean-number'
      ? Float64Array.of(stars * completeness)
      : new Float64Array(stars).fill(completeness);
  const merged = new Float64Array(before.length + added.length);
  merged.set(before);
  merged.set(added, before.length);
  const found = Array.from({ length: detections }, (_, i) =>
    likelihood === 'mean-number' ? before.length : before.length + i,
  );
  const scale = known?.rateScale;
  const rateScale = scale && Float64Array.from(merged, (_, j) => scale[j] ?? 1);
  return upperLimit(
    ratePosterior({
      ...known,
      likelihood,
      prior,
      completeness: merged,
      detectedStars: [...(known?.detectedStars ?? []), ...found],
      ...(rateScale && { rateScale }),
    }),
    level,
  );
}

/**
 * How many stars alike bring the limit down to a wanted one.
 *
 * @returns smallest number, at least the detections; null where 100 000 do not reach it
 * @throws RangeError for a target or completeness that is not positive, and as `ratePosterior`
 * Cost: about 20 posteriors.
 * @example starsNeeded({ likelihood: 'host-fraction', prior: { law: 'uniform', max: 1 },
 *   completeness: 0.6, target: 0.05, level: 0.95 }) // 98
 */
export function starsNeeded(wanted: WantedLimit): number | null {
  const { target, completeness, detections = 0, known } = wanted;
  if (!(target > 0)) throw new RangeError(`the wanted limit must be above 0, got ${target}`);
  if (!(completeness > 0 && completeness <= 1)) {
    throw new RangeError(`completeness of a star must lie above 0, at most 1, got ${completeness}`);
  }
  const least = Math.max(detections, known === undefined ? 1 : 0);
  const isEnough = (stars: number) => limitOf(wanted, stars) <= target;
  if (isEnough(least)) return least;
  let low = least;
  let high = Math.max(2, 2 * least);
  while (!isEnough(high)) {
    if (high === MOST_STARS) return null;
    low = high;
    high = Math.min(MOST_STARS, 2 * high);
  }
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (isEnough(middle)) high = middle;
    else low = middle;
  }
  return high;
}
