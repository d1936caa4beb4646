import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  equalTailedInterval,
  highestDensityInterval,
  isSetByPrior,
  limitsByLevel,
  type RatePosterior,
  ratePosterior,
  upperLimit,
} from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

function withDetections(k: number, n = 40): RatePosterior {
  return ratePosterior(
    buildQuestion({
      completeness: buildCompleteness(n, 'hdi', 0.2, 0.9),
      detectedStars: Array.from({ length: k }, (_, star) => star),
    }),
  );
}

describe('highestDensityInterval', () => {
  it('holds the level and is never longer than the equal-tailed interval', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 12 }),
        fc.double({ min: 0.05, max: 0.99, noNaN: true }),
        (k, level) => {
          const posterior = withDetections(k);
          const [low, high] = highestDensityInterval(posterior, level);
          const [left, right] = equalTailedInterval(posterior, level);
          expect(posterior.cumulative(high) - posterior.cumulative(low)).toBeCloseTo(level, 9);
          expect(high - low).toBeLessThanOrEqual((right - left) * (1 + 1e-9));
        },
      ),
      { numRuns: 60 },
    );
  });

  it('starts at the lower edge after zero detections, where the density only falls', () => {
    const posterior = withDetections(0);
    const [low, high] = highestDensityInterval(posterior, 0.68);
    expect(low).toBe(0);
    expect(high).toBe(upperLimit(posterior, 0.68));
  });

  it('starts at an infinite density and ends at a rising one', () => {
    const jeffreys = ratePosterior(buildQuestion({ prior: { law: 'jeffreys' } }));
    expect(highestDensityInterval(jeffreys, 0.9)[0]).toBe(0);
    const rising = ratePosterior(
      buildQuestion({ completeness: Float64Array.of(0.3, 0.4), detectedStars: [0, 1] }),
    );
    expect(highestDensityInterval(rising, 0.68)[1]).toBe(1);
  });

  it('has one density at both ends when it lies inside', () => {
    const posterior = withDetections(8);
    const [low, high] = highestDensityInterval(posterior, 0.9);
    expect(low).toBeGreaterThan(0);
    expect(posterior.density(low) / posterior.density(high)).toBeCloseTo(1, 6);
  });
});

describe('levels', () => {
  it.each([0, 1, 95, Number.NaN])('%d is refused', (level) => {
    const posterior = withDetections(1);
    expect(() => upperLimit(posterior, level)).toThrow(/0\.95, not 95/);
    expect(() => equalTailedInterval(posterior, level)).toThrow(RangeError);
    expect(() => highestDensityInterval(posterior, level)).toThrow(RangeError);
  });

  it('make a table with rising limits', () => {
    const rows = limitsByLevel(withDetections(2));
    expect(rows.map(({ level }) => level)).toEqual([0.68, 0.9, 0.95, 0.99, 0.997]);
    for (let i = 1; i < rows.length; i++) expect(rows[i].limit).toBeGreaterThan(rows[i - 1].limit);
  });
});

describe('isSetByPrior', () => {
  it('is true where the limit is not 10 % below level times the upper end', () => {
    const weak = ratePosterior(buildQuestion({ completeness: Float64Array.of(0.05) }));
    expect(weak.constrained).toBe(true);
    expect(isSetByPrior(weak, 0.95)).toBe(true);
    expect(isSetByPrior(withDetections(1), 0.95)).toBe(false);
  });

  it('is true where the data constrain nothing', () => {
    const nothing = ratePosterior(buildQuestion({ completeness: new Float64Array(4) }));
    expect(isSetByPrior(nothing, 0.95)).toBe(true);
  });

  it('is false for a prior without an upper end once the data speak', () => {
    const question = buildQuestion({ likelihood: 'mean-number', prior: { law: 'jeffreys' } });
    expect(isSetByPrior(ratePosterior(question), 0.95)).toBe(false);
  });
});
