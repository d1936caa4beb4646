import { describe, expect, it } from 'vitest';
import { type MethodsFacts, methodsParagraph } from '@/lib/inference/methods-text';

const facts: MethodsFacts = {
  name: 'A-1 run 4',
  surveys: [{ name: 'SANDBAR', entries: 48 }],
  stars: 48,
  leftOut: 0,
  combination: 'no star in several surveys',
  cooling: 'cooling table Harbour',
  eccentricity: 'circular orbits',
  threshold: 'hard',
  sample: null,
  population: {
    form: 'power-law',
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 20,
    semiMajorAxisMaxAu: 300,
    massIndex: -0.3,
    semiMajorAxisIndex: 0.4,
  },
  prior: { law: 'uniform', max: 1 },
  quantity: 'host_fraction',
  credibleLevel: 0.95,
  counted: ['NTY 1024+0447 b'],
  countingRule: 'confirmed companions inside the ranges',
  candidates: null,
  background: null,
  exposure: 20,
  answer: {
    limit: 0.058,
    median: 0.025,
    interval68: [0.013, 0.043],
    isConstrained: true,
    isSetByPrior: false,
  },
  zeroLimit: null,
  beside: [],
  software: 'Rarebound',
  engineVersion: '3',
  resultDigest: 'ab12',
};
const textOf = (changes: Partial<MethodsFacts>) =>
  methodsParagraph({ ...facts, ...changes })
    .filter((part) => typeof part === 'string')
    .join('');

describe('the methods paragraph', () => {
  it('quotes the interval of the plate where something counts', () => {
    const interval = 'equal-tailed 68\u2009% interval 1.3–4.3\u2009%';
    expect(textOf({})).toContain(interval);
    const entries = [{ name: 'cc1', probability: 0.35 }];
    const candidates = { treatment: 'fixed' as const, entries };
    expect(textOf({ counted: [], candidates })).toContain(interval);
  });

  it('quotes no interval of a run without detections, whose density falls from zero', () => {
    const text = textOf({ counted: [] });
    expect(text).toContain('(posterior median 2.5\u2009%).');
    expect(text).not.toContain('68\u2009%');
  });
});
