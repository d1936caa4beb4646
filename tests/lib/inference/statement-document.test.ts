import { describe, expect, it } from 'vitest';
import { type RunToState, stateRun } from '@/lib/inference/run-statement';
import { type DocumentInputs, limitDocument } from '@/lib/inference/statement-document';
import { limitAsJson, limitAsLatex, limitAsText } from '@/lib/inference/statement-forms';
import { limitStatementSchema } from '@/lib/schemas/statement';

const answer = (limit: number) => ({
  limit,
  interval68: [0.013, 0.043] as [number, number],
  isSetByPrior: false,
  isConstrained: true,
});

function buildRun(overrides: Partial<RunToState['result']> = {}): RunToState {
  return {
    run: {
      id: '2f6bd7d2-6f6e-4b5b-8a3c-1d6c2f5f8f11',
      analysis: 'A-31',
      number: 18,
      engineVersion: '3',
      resultDigest: 'ab12',
      population: { key: 'P-4', version: 2, digest: 'cd34' },
    },
    population: {
      form: 'power-law',
      massMinMjup: 2,
      massMaxMjup: 30,
      semiMajorAxisMinAu: 20,
      semiMajorAxisMaxAu: 300,
      massIndex: -0.3,
      semiMajorAxisIndex: 0.4,
    },
    recipe: { prior: { law: 'uniform', max: 1 }, detections: 'counted' },
    inputs: {
      combination: 'same position at all epochs',
      cooling: 'Harbour, high-entropy start',
      eccentricity: 'circular',
      threshold: 'smooth, 5 σ',
      surveys: [{ name: 'Reef_50% & more' }],
      undecided: [],
    },
    result: {
      quantity: 'host_fraction',
      credibleLevel: 0.95,
      stars: 287,
      entries: 340,
      exposure: 108.3,
      answer: answer(0.0576),
      zero: answer(0.0276),
      counted: [{ starId: 'one' }, { starId: 'two' }, { starId: 'two' }],
      candidates: null,
      background: null,
      priorCutAt: null,
      shareOutsideMaps: 0.02,
      levels: [
        {
          level: 0.68,
          hostFraction: 0.031,
          meanNumber: 0.04,
          hostFractionZero: 0.011,
          meanNumberZero: 0.012,
        },
      ],
      statement: { conditions: ['Sample: S-1 version 2, young', 'Cooling limits: 3 % of this'] },
      ...overrides,
    },
  };
}

const stated = (run: RunToState, choice = {}): DocumentInputs => {
  const inputs = stateRun(run, choice);
  if (inputs === null) throw new Error('the run recorded no such limit');
  return inputs;
};
const plain = (text: string) => text.replaceAll('\u2009', ' ');

describe('a limit as a document', () => {
  const document = limitDocument(stated(buildRun()));

  it('passes its schema, with levels and rates as fractions and indices in both conventions', () => {
    expect(limitStatementSchema.parse(JSON.parse(limitAsJson(document)))).toEqual(document);
    expect(document.credibleLevel).toBe(0.95);
    expect(document.upperLimit).toBe(0.0576);
    expect(document.population.massIndex).toEqual({ linear: -1.3, perLogarithm: -0.3 });
    expect(document.ranges).toEqual({ massMjup: [2, 30], semiMajorAxisAu: [20, 300] });
    expect(document.counts).toEqual({
      stars: 287,
      entries: 340,
      detections: 2,
      countingRule: 'confirmed companions inside the ranges, one per star',
    });
  });

  it('says level, prior, population, sample and counting rule in its text', () => {
    const text = plain(limitAsText(document));
    expect(text.split('\n')[0]).toBe(
      '<5.8 % of stars host at least one planet of 2–30 MJ at 20–300 AU (95 %).',
    );
    expect(text).toContain('Credible level: 95 %.');
    expect(text).toContain('Prior: uniform in host fraction f, 0 to 1.');
    expect(text).toContain('dN/dM ∝ M^−1.3 between 2 and 30 MJ');
    expect(text).toContain('Sample: Reef_50% & more: 287 stars of 340 entries.');
    expect(text).toContain('Counting: confirmed companions inside the ranges, one per star.');
    expect(text).toContain('Cooling limits: 3 % of this.');
    expect(text).toContain('A-31, run 18, engine 3, SHA-256 ab12.');
  });

  it('escapes names in LaTeX and sets laws as mathematics', () => {
    const latex = limitAsLatex(document);
    expect(latex).toContain('Reef\\_50\\% \\& more');
    expect(latex).toContain('$dN/dM \\propto M^{-1.3}$');
    expect(latex).toContain('2--30\\,$M_{\\mathrm{J}}$');
    expect(latex).toMatch(/^\$<\$5\.8\\,\\% of stars/);
    expect(latex).not.toMatch(/(?<!\\)[%&_]50/);
  });

  it('marks a live limit and names no run for it', () => {
    const live = limitDocument({ ...stated(buildRun()), state: 'live', run: null });
    expect(limitAsText(live)).toContain('no run records it');
    expect(limitAsText(live)).not.toContain('SHA-256');
    expect(limitStatementSchema.parse(live).state).toBe('live');
  });
});

describe('stateRun', () => {
  it('states another recorded level, quantity and rule, and no other', () => {
    const run = buildRun();
    const other = stated(run, { level: 0.68, quantity: 'companions_per_star', detections: 'none' });
    expect(other).toMatchObject({ limit: 0.012, detections: 0, credibleLevel: 0.68 });
    expect(limitDocument(other).sentence).toContain('per 100 stars');
    expect(other.countingRule).toBe('all detections set aside');
    expect(stated(run, { level: 0.68, quantity: 'companions_per_star' }).detections).toBe(3);
    expect(stateRun(run, { level: 0.9 })).toBeNull();
  });

  it('names the candidates that it sets aside, as every other statement of the run does', () => {
    const run = buildRun();
    run.inputs.undecided = [
      { name: 'RB 0003 cc1', probability: 0.35, insideRanges: true },
      { name: 'RB 0004 cc1', probability: 0.2, insideRanges: false },
    ];
    const words = 'Candidates: set aside, though not settled: RB 0003 cc1 (probability 0.35).';
    const document = limitDocument(stated(run));
    expect(limitAsText(document)).toContain(words);
    expect(limitAsLatex(document)).toContain('RB 0003 cc1 (probability 0.35)');
    expect(document.conditions).toContainEqual({
      label: 'Candidates',
      text: 'set aside, though not settled: RB 0003 cc1 (probability 0.35)',
    });
    const entries = [{ name: 'RB 0003 cc1', probability: 0.35 }];
    const counting = { ...run.result, candidates: { treatment: 'fixed' as const, entries } };
    const counted = limitDocument(stated({ ...run, result: counting }));
    expect(limitAsText(counted)).toContain('1 counts with the probability of being real');
    const none = limitDocument(stated({ ...run, result: counting }, { detections: 'none' }));
    expect(limitAsText(none)).toContain(words);
  });

  it('has no limit of a quantity that the prior does not speak of', () => {
    const run = buildRun();
    run.recipe.prior = { law: 'beta', a: 1, b: 2 };
    expect(stateRun(run, { level: 0.68, quantity: 'companions_per_star' })).toBeNull();
  });

  it('has a sentence without a number where the data constrain nothing', () => {
    const none = buildRun({ answer: { ...answer(0.95), isConstrained: false } });
    const document = limitDocument(stated(none));
    expect(document.upperLimit).toBeNull();
    expect(document.sentence).toMatch(/^These data do not constrain/);
    expect(limitStatementSchema.parse(document).interval).toBeNull();
  });

  it('says so where the limit at another level is set by the prior', () => {
    const wide = buildRun();
    wide.result.levels = [{ ...wide.result.levels[0], hostFraction: 0.65 }];
    const document = limitDocument(stated(wide, { level: 0.68 }));
    expect(document.isSetByPrior).toBe(true);
    expect(limitAsText(document)).toContain('set by the prior');
  });
});
