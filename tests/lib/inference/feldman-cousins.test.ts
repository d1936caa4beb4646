import { describe, expect, it } from 'vitest';
import { feldmanCousinsInterval } from '@/lib/inference';
import { logGamma } from '@/lib/numerics/special';

describe('feldmanCousinsInterval', () => {
  it('has an upper end that does not rise with the background', () => {
    const ends = Array.from({ length: 9 }, (_, i) => feldmanCousinsInterval(1, 0.35 * i, 0.9)[1]);
    for (let i = 1; i < ends.length; i++) expect(ends[i]).toBeLessThanOrEqual(ends[i - 1] + 1e-9);
  });

  it('covers at least at its level', () => {
    const background = 1.3;
    const intervals = Array.from({ length: 25 }, (_, n) =>
      feldmanCousinsInterval(n, background, 0.9),
    );
    for (const rate of [0.1, 0.7, 1.9, 3.3, 5.05]) {
      const mean = rate + background;
      const covered = intervals.reduce((sum, [low, high], n) => {
        const probability = Math.exp(n * Math.log(mean) - mean - logGamma(n + 1));
        return rate >= low && rate <= high ? sum + probability : sum;
      }, 0);
      expect(covered).toBeGreaterThan(0.9 - 1e-6);
    }
  });

  it('refuses what is no count, background or level', () => {
    expect(() => feldmanCousinsInterval(-1, 0, 0.9)).toThrow(/whole number/);
    expect(() => feldmanCousinsInterval(1, -1, 0.9)).toThrow(/background/);
    expect(() => feldmanCousinsInterval(1, 0, 90)).toThrow(/0.95, not 95/);
  });
});
