import { describe, expect, it } from 'vitest';
import {
  groupInfluence,
  overlapBracket,
  type RateQuestion,
  ratePosterior,
  starInfluence,
  surveyInfluence,
  upperLimit,
  withoutStars,
} from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const scale = buildCompleteness(40, 'scale', 0.4, 2.5);
const certain = buildCompleteness(40, 'forty');
certain.set([1, 1], 8);

const questions: [string, Partial<RateQuestion>][] = [
  ['uniform', {}],
  ['two detections', { detectedStars: [3, 9] }],
  ['Jeffreys', { prior: { law: 'jeffreys' }, detectedStars: [3] }],
  ['Jeffreys with certain stars', { prior: { law: 'jeffreys' }, completeness: certain }],
  ['beta', { prior: { law: 'beta', a: 0.6, b: 2 }, completeness: certain }],
  ['scaled rates', { rateScale: scale, detectedStars: [3] }],
  ['Jeffreys, scaled rates', { rateScale: scale, prior: { law: 'jeffreys' } }],
  [
    'candidates of fixed probability',
    {
      candidates: {
        treatment: 'fixed',
        entries: [
          { star: 3, probability: 0.4 },
          { star: 5, probability: 0.2 },
        ],
      },
    },
  ],
  [
    'candidates that follow the rate',
    {
      candidates: {
        treatment: 'rate-dependent',
        referenceRate: 0.1,
        entries: [{ star: 3, probability: 0.4 }],
      },
    },
  ],
  ['mean number', { likelihood: 'mean-number', detectedStars: [3, 3, 7] }],
  [
    'mean number, log-uniform',
    { likelihood: 'mean-number', prior: { law: 'log-uniform', min: 1e-4, max: 3 } },
  ],
  [
    'mean number, unbounded',
    { likelihood: 'mean-number', prior: { law: 'jeffreys' }, rateScale: scale },
  ],
  [
    'mean number, background',
    { likelihood: 'mean-number', detectedStars: [3, 4], background: 1.2 },
  ],
];

describe('starInfluence', () => {
  it.each(questions)('is what a separate calculation gives: %s', (_name, overrides) => {
    const question = buildQuestion(overrides);
    const { limit, without } = starInfluence(question, 0.95);
    expect(limit).toBe(upperLimit(ratePosterior(question), 0.95));
    for (let star = 0; star < 40; star++) {
      const alone = ratePosterior(withoutStars(question, [star]));
      const exact = upperLimit(alone, 0.95);
      const one = without[star];
      if (one === null) throw new Error(`no limit without star ${star}`);
      expect(Math.abs(one.limit / exact - 1)).toBeLessThan(1e-8);
      expect(one.exposure).toBeCloseTo(alone.exposure, 10);
    }
  });

  it('names the one star that the limit rests on', () => {
    const completeness = new Float64Array(10).fill(0.05);
    completeness[4] = 0.9;
    const { warning, starsForHalf } = starInfluence(buildQuestion({ completeness }), 0.9);
    expect(warning?.star).toBe(4);
    expect(warning?.relativeChange).toBeGreaterThan(0.2);
    expect(starsForHalf).toBe(1);
    expect(starInfluence(buildQuestion(), 0.95).warning).toBeNull();
  });

  it('leaves nothing where the only star goes', () => {
    const { without } = starInfluence(buildQuestion({ completeness: Float64Array.of(0.8) }), 0.9);
    expect(without).toEqual([null]);
  });
});

describe('groups and surveys', () => {
  it('go as a whole', () => {
    const question = buildQuestion({ detectedStars: [2, 30] });
    const [group] = groupInfluence(question, [{ name: 'first', stars: [0, 1, 2] }], 0.95);
    const rest = ratePosterior(withoutStars(question, [0, 1, 2]));
    expect(group.without?.limit).toBe(upperLimit(rest, 0.95));
    expect(rest.detections).toBe(1);
  });

  it('leave shared stars what the other surveys show', () => {
    const question = buildQuestion({ completeness: Float64Array.of(0.7, 0.6, 0.5) });
    const [survey] = surveyInfluence(
      question,
      [{ name: 'A', completenessWithout: Float64Array.of(0, 0.4, 0.5), detectedWithout: [] }],
      0.95,
    );
    const rest = buildQuestion({ completeness: Float64Array.of(0.4, 0.5) });
    expect(survey.without?.limit).toBeCloseTo(upperLimit(ratePosterior(rest), 0.95), 10);
    expect(survey.without?.exposure).toBeCloseTo(0.9, 12);
  });

  it('know their stars', () => {
    expect(() => withoutStars(buildQuestion(), [40])).toThrow(/no star 40 among 40/);
  });
});

describe('overlapBracket', () => {
  it('holds every rule between the Frechet bounds', () => {
    const [one, two] = [buildCompleteness(40, 'one'), buildCompleteness(40, 'two')];
    const deepest = one.map((c, j) => Math.max(c, two[j]));
    const sum = one.map((c, j) => Math.min(1, c + two[j]));
    const independent = one.map((c, j) => 1 - (1 - c) * (1 - two[j]));
    const question = buildQuestion({ detectedStars: [4] });
    const { lowest, highest } = overlapBracket(question, deepest, sum, 0.95);
    const between = upperLimit(ratePosterior({ ...question, completeness: independent }), 0.95);
    expect(lowest).toBeLessThan(between);
    expect(between).toBeLessThan(highest);
    expect(() => overlapBracket(question, sum, deepest, 0.95)).toThrow(/must not fall/);
  });
});
