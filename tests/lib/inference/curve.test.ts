import { describe, expect, it } from 'vitest';
import { displayRange, posteriorCurve, type RatePrior, ratePosterior } from '@/lib/inference';
import { buildQuestion } from './build-question';

const priors: RatePrior[] = [
  { law: 'uniform', max: 1 },
  { law: 'log-uniform', min: 1e-3, max: 1 },
  { law: 'jeffreys' },
];

describe('posteriorCurve', () => {
  it.each(priors)('%o gives finite, increasing arrays of one length', (prior) => {
    for (const detectedStars of [[], [1], [1, 2, 3, 4, 5]]) {
      const posterior = ratePosterior(buildQuestion({ prior, detectedStars }));
      const curve = posteriorCurve(posterior, 300);
      for (const array of [curve.value, curve.density, curve.cumulative]) {
        expect(array).toHaveLength(300);
        expect(array.every(Number.isFinite)).toBe(true);
      }
      for (let i = 1; i < 300; i++) {
        expect(curve.value[i]).toBeGreaterThan(curve.value[i - 1]);
        expect(curve.cumulative[i]).toBeGreaterThanOrEqual(curve.cumulative[i - 1]);
      }
      expect(curve.cumulative[299]).toBeGreaterThan(0.9985);
    }
  });

  it('has a density that is the slope of its cumulative', () => {
    const curve = posteriorCurve(ratePosterior(buildQuestion({ detectedStars: [1, 2] })), 2000);
    for (let i = 1; i < 1999; i += 50) {
      const slope =
        (curve.cumulative[i + 1] - curve.cumulative[i - 1]) /
        (curve.value[i + 1] - curve.value[i - 1]);
      expect(Math.abs(slope - curve.density[i])).toBeLessThan(1e-4 * Math.max(...curve.density));
    }
  });

  it('takes a shared range, and refuses one that does not increase', () => {
    const posterior = ratePosterior(buildQuestion());
    const curve = posteriorCurve(posterior, 11, [0, 1]);
    expect(curve.value[0]).toBe(0);
    expect(curve.value[10]).toBe(1);
    expect(() => posteriorCurve(posterior, 11, [1, 1])).toThrow(RangeError);
    expect(() => posteriorCurve(posterior, 1)).toThrow(RangeError);
  });
});

describe('displayRange', () => {
  it('starts at zero for a limit, and further up for a well measured rate', () => {
    expect(displayRange(ratePosterior(buildQuestion()))[0]).toBe(0);
    const measured = ratePosterior(
      buildQuestion({
        completeness: new Float64Array(400).fill(0.9),
        detectedStars: Array.from({ length: 200 }, (_, star) => star),
      }),
    );
    const [from, to] = displayRange(measured);
    expect(from).toBeGreaterThan(0.3);
    expect(from).toBeLessThan(measured.quantile(0.001));
    expect(to).toBeGreaterThan(measured.quantile(0.999));
  });

  it('stays inside the support', () => {
    const weak = ratePosterior(buildQuestion({ completeness: Float64Array.of(0.01) }));
    expect(displayRange(weak)).toEqual([0, 1]);
  });
});
