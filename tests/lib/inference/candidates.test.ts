import { describe, expect, it } from 'vitest';
import { type RatePrior, type RateQuestion, ratePosterior, upperLimit } from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const questions: [string, RateQuestion][] = [
  ['host fraction', buildQuestion()],
  [
    'mean number',
    buildQuestion({ likelihood: 'mean-number', prior: { law: 'log-uniform', min: 1e-3, max: 2 } }),
  ],
  ['mean number with background', buildQuestion({ likelihood: 'mean-number', background: 0.7 })],
  ['Jeffreys', buildQuestion({ prior: { law: 'jeffreys' } })],
];
const treatments = [
  { treatment: 'fixed' },
  { treatment: 'rate-dependent', referenceRate: 0.1 },
] as const;
const cases = questions.flatMap(([name, question]) =>
  treatments.map((treatment) => [name, treatment.treatment, question, treatment] as const),
);

function limitWith(
  question: RateQuestion,
  treatment: (typeof treatments)[number],
  entries: { star: number; probability: number }[],
): number {
  return upperLimit(ratePosterior({ ...question, candidates: { ...treatment, entries } }), 0.95);
}

describe('candidates without an answer', () => {
  it.each(cases)(
    'of probability 0 are ignored, of 1 confirmed: %s, %s',
    (_n, _t, question, how) => {
      const none = upperLimit(ratePosterior(question), 0.95);
      const one = upperLimit(ratePosterior({ ...question, detectedStars: [3] }), 0.95);
      expect(limitWith(question, how, [{ star: 3, probability: 0 }])).toBe(none);
      expect(limitWith(question, how, [{ star: 3, probability: 1 }])).toBe(one);
      const nearlyNone = limitWith(question, how, [{ star: 3, probability: 1e-12 }]);
      const nearlyOne = limitWith(question, how, [{ star: 3, probability: 1 - 1e-12 }]);
      expect(Math.abs(nearlyNone / none - 1)).toBeLessThan(1e-8);
      expect(Math.abs(nearlyOne / one - 1)).toBeLessThan(1e-8);
    },
  );

  it.each(cases)('raise the limit with their probability: %s, %s', (_n, _t, question, how) => {
    const limits = [0, 0.1, 0.5, 0.9, 1].map((probability) =>
      limitWith(question, how, [
        { star: 3, probability },
        { star: 7, probability: 0.3 },
      ]),
    );
    for (let i = 1; i < limits.length; i++) expect(limits[i]).toBeGreaterThan(limits[i - 1]);
  });

  it('of the fraction are the mean over every way that they may turn out', () => {
    const completeness = Float64Array.of(0.9, 0.4, 1, 0.2, 0.7, 1);
    const prior: RatePrior = { law: 'beta', a: 0.7, b: 0.6 };
    const entries = [
      { star: 1, probability: 0.3 },
      { star: 2, probability: 0.8 },
      { star: 4, probability: 0.5 },
    ];
    const question: RateQuestion = {
      likelihood: 'host-fraction',
      completeness,
      detectedStars: [0],
      prior,
    };
    const mixed = ratePosterior({ ...question, candidates: { treatment: 'fixed', entries } });
    for (const f of [0.05, 0.3, 0.6, 0.9, 0.99]) {
      let cumulative = 0;
      for (let subset = 0; subset < 8; subset++) {
        const real = entries.filter((_, i) => (subset >> i) & 1);
        let weight = 1;
        entries.forEach(({ probability }, i) => {
          weight *= (subset >> i) & 1 ? probability : 1 - probability;
        });
        const detectedStars = [0, ...real.map(({ star }) => star)];
        cumulative += weight * ratePosterior({ ...question, detectedStars }).cumulative(f);
      }
      expect(Math.abs(mixed.cumulative(f) - cumulative)).toBeLessThan(1e-9);
    }
  });

  it('weighs twelve of four hundred stars, and refuses thirteen', () => {
    const completeness = buildCompleteness(400, 'many', 0.05, 0.95);
    const ask = (count: number) =>
      ratePosterior({
        likelihood: 'host-fraction',
        completeness,
        detectedStars: [399],
        prior: { law: 'uniform', max: 1 },
        candidates: {
          treatment: 'fixed',
          entries: Array.from({ length: count }, (_, star) => ({ star, probability: 0.2 })),
        },
      });
    const settled = (detected: number) =>
      ratePosterior({
        likelihood: 'host-fraction',
        completeness,
        detectedStars: Array.from({ length: detected }, (_, star) => star),
        prior: { law: 'uniform', max: 1 },
      }).mean;
    const { mean } = ask(12);
    expect(mean).toBeGreaterThan(settled(3));
    expect(mean).toBeLessThan(settled(4));
    expect(() => ask(13)).toThrow(/at most 12 undecided candidates.*got 13/);
  });

  it('two of one star count as one that is real when either is (host fraction)', () => {
    const how = treatments[0];
    const two = limitWith(buildQuestion(), how, [
      { star: 3, probability: 0.5 },
      { star: 3, probability: 0.4 },
    ]);
    expect(two).toBe(limitWith(buildQuestion(), how, [{ star: 3, probability: 1 - 0.5 * 0.6 }]));
    const beside = buildQuestion({ detectedStars: [3] });
    expect(limitWith(beside, how, [{ star: 3, probability: 0.5 }])).toBe(
      upperLimit(ratePosterior(beside), 0.95),
    );
  });

  it('says what cannot be used', () => {
    const ask = (candidates: RateQuestion['candidates']) => () =>
      ratePosterior(buildQuestion({ candidates }));
    const entries = [{ star: 3, probability: 0.5 }];
    expect(ask({ treatment: 'fixed', entries: [{ star: 3, probability: 1.1 }] })).toThrow(/0\.\.1/);
    expect(ask({ treatment: 'fixed', entries: [{ star: 40, probability: 0.5 }] })).toThrow(
      /star 40, but there are 40 stars/,
    );
    expect(ask({ treatment: 'rate-dependent', referenceRate: 0, entries })).toThrow(
      /need the positive rate/,
    );
    expect(ask({ treatment: 'rate-dependent', referenceRate: 1.5, entries })).toThrow(/below 1/);
  });

  it('leave no evidence where their probabilities are fixed', () => {
    const entries = [{ star: 3, probability: 0.5 }];
    const fixed = ratePosterior(buildQuestion({ candidates: { treatment: 'fixed', entries } }));
    expect(fixed.logEvidence).toBeNaN();
    expect(fixed.undecided).toBe(1);
    expect(fixed.detections).toBe(0);
  });
});
