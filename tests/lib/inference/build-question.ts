import type { RateQuestion } from '@/lib/inference';
import { createRandom } from '@/lib/numerics/random';

/** Completeness of n invented stars, uniform between two ends. */
export function buildCompleteness(n: number, seed: string, low = 0, high = 0.9): Float64Array {
  const random = createRandom(seed);
  return Float64Array.from({ length: n }, () => low + (high - low) * random.uniform());
}

/** Forty stars, nothing found, host fraction, uniform prior: change what a test is about. */
export function buildQuestion(overrides: Partial<RateQuestion> = {}): RateQuestion {
  return {
    likelihood: 'host-fraction',
    completeness: buildCompleteness(40, 'forty'),
    detectedStars: [],
    prior: { law: 'uniform', max: 1 },
    ...overrides,
  };
}
