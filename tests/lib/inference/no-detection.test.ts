import { describe, expect, test } from 'vitest';
import { logNoDetection, ratePosterior } from '@/lib/inference';
import { noDetectionOf } from '@/lib/inference/no-detection';
import { createRandom } from '@/lib/numerics/random';

/** Kahan's sum of log1p, star by star. */
function exactly(fraction: number, completeness: Float64Array): number {
  let [sum, lost] = [0, 0];
  for (const c of completeness) {
    const next = Math.log1p(-fraction * c) - lost;
    const total = sum + next;
    lost = total - sum - next;
    sum = total;
  }
  return sum;
}

const invent = (stars: number, most: number) => {
  const { uniform } = createRandom(`${stars} stars`);
  return Float64Array.from({ length: stars }, () => most * uniform());
};

describe('noDetectionOf', () => {
  test.each([
    [64, 0.5],
    [400, 0.9999999],
    [5000, 0.99],
  ])('%i stars up to %f: as the sum over stars, from 1e-12 to 1', (stars, most) => {
    const completeness = invent(stars, most);
    completeness[0] = most;
    const logOf = noDetectionOf(completeness);
    const places = Array.from({ length: 300 }, (_, i) => (i + 0.5) / 300);
    for (const fraction of [1e-12, 1e-5, ...places, 0.5, 1]) {
      const expected = exactly(fraction, completeness);
      expect(Math.abs(logOf(fraction, 1 - fraction) / expected - 1)).toBeLessThan(1e-12);
    }
  });

  test('few stars are multiplied out', () => {
    const completeness = invent(63, 0.7);
    expect(noDetectionOf(completeness)(0.2, 0.8)).toBe(logNoDetection(0.2, completeness));
  });

  test('both sides of 1/2 meet, so that a posterior has no step there', () => {
    const logOf = noDetectionOf(invent(70, 0.02));
    const step = 1e-9;
    const rise = logOf(0.5 + step, 0.5 - step) - logOf(0.5, 0.5);
    const before = logOf(0.5, 0.5) - logOf(0.5 - step, 0.5 + step);
    expect(Math.abs(rise - before)).toBeLessThan(1e-13);
  });
});

test('the limit of equal stars is the closed form, whose sum runs over none of them', () => {
  // x = [1 - (1 - CL (1 - (1-C)^(N+1)))^(1/(N+1))] / C, uniform prior and nothing found.
  for (const [stars, c] of [
    [100, 0.02],
    [400, 0.3],
    [5000, 0.6],
  ]) {
    const completeness = new Float64Array(stars).fill(c);
    const prior = { law: 'uniform', max: 1 } as const;
    const question = {
      likelihood: 'host-fraction',
      completeness,
      detectedStars: [],
      prior,
    } as const;
    const rest = 1 - 0.95 * (1 - (1 - c) ** (stars + 1));
    const expected = (1 - rest ** (1 / (stars + 1))) / c;
    expect(
      Math.abs(ratePosterior({ ...question, detectedStars: [] }).quantile(0.95) / expected - 1),
    ).toBeLessThan(1e-10);
  }
});
