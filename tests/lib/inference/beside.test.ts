import { describe, expect, it } from 'vitest';
import {
  binomialUpperLimit,
  frequentistBeside,
  hostFractionLowerLimit,
  hostFractionUpperLimit,
  poissonBinomial,
  type RatePrior,
} from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const FLAT: RatePrior = { law: 'gamma', shape: 1, rate: 0 };
const names = (question: Parameters<typeof frequentistBeside>[0]) =>
  frequentistBeside(question, 0.95).rows.map(({ name }) => name);

describe('limits without a prior beside the credible ones', () => {
  it('agree with a flat prior of the mean number, and the sentence says so', () => {
    const question = buildQuestion({
      likelihood: 'mean-number',
      completeness: Float64Array.of(25),
      prior: FLAT,
    });
    const { rows, sentence } = frequentistBeside(question, 0.95);
    expect(rows.map(({ name }) => name)).toEqual(['Garwood', 'Feldman–Cousins']);
    expect(rows[0].upper).toBeCloseTo(0.11982929094216, 12);
    expect(rows[1].upper).toBeCloseTo(3.0925 / 25, 3);
    expect(sentence).toContain('here the two agree');
  });

  it('say by how much they differ', () => {
    const question = buildQuestion({
      likelihood: 'mean-number',
      completeness: Float64Array.of(25),
      prior: { law: 'jeffreys' },
    });
    // 0.0768291764138825 against 0.11982929094216 (R qgamma).
    expect(frequentistBeside(question, 0.95).sentence).toContain('36\u2009% lower');
  });

  it('know a background by Feldman and Cousins alone', () => {
    const question = buildQuestion({ likelihood: 'mean-number', prior: FLAT, background: 1 });
    expect(names(question)).toEqual(['Feldman–Cousins']);
  });

  it('of a fraction are exact, with the plain counts where stars are alike', () => {
    expect(names(buildQuestion())).toEqual(['exact Poisson-binomial']);
    const alike = (c: number) => buildQuestion({ completeness: new Float64Array(30).fill(c) });
    expect(names(alike(0.6))).toEqual(['exact Poisson-binomial', 'Clopper–Pearson']);
    const { rows } = frequentistBeside(alike(1), 0.95);
    expect(rows.map(({ isApproximate }) => isApproximate)).toEqual([false, false, true]);
    for (const c of [0.6, 1]) {
      const [exact, counts] = frequentistBeside(alike(c), 0.95).rows;
      expect(Math.abs(exact.upper - counts.upper)).toBeLessThan(1e-10);
      expect(counts.upper).toBeCloseTo(binomialUpperLimit(0, 30, 0.95) / c, 12);
    }
  });

  it('end where the rates of single stars end', () => {
    const completeness = new Float64Array(30).fill(0.8);
    const rateScale = new Float64Array(30).fill(2);
    const [row] = frequentistBeside(buildQuestion({ completeness, rateScale }), 0.95).rows;
    expect(row.upper).toBeCloseTo(binomialUpperLimit(0, 30, 0.95) / 1.6, 10);
  });

  it('are none where nothing could be seen', () => {
    const question = buildQuestion({ completeness: new Float64Array(4) });
    expect(frequentistBeside(question, 0.95).rows).toEqual([]);
  });
});

describe('hostFractionLowerLimit', () => {
  it('makes as many detections as rare as the level allows, below the upper limit', () => {
    const completeness = buildCompleteness(40, 'forty');
    const low = hostFractionLowerLimit(completeness, 3, 0.95);
    const counts = poissonBinomial(completeness.map((c) => low * c));
    const atLeast = counts.slice(3).reduce((a, b) => a + b, 0);
    expect(atLeast).toBeCloseTo(0.05, 10);
    expect(low).toBeLessThan(hostFractionUpperLimit(completeness, 3, 0.95));
    expect(hostFractionLowerLimit(completeness, 0, 0.95)).toBe(0);
    expect(hostFractionLowerLimit(new Float64Array(4).fill(0.01), 4, 0.95)).toBe(1);
  });
});
