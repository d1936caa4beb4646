import { describe, expect, it } from 'vitest';
import {
  addSample,
  forecastSurvey,
  limitByStars,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  starGains,
  starsLikeThese,
  starsNeeded,
  upperLimit,
} from '@/lib/inference';
import { buildCompleteness, buildQuestion } from './build-question';

const completeness = buildCompleteness(30, 'planned', 0.1, 0.8);
const fraction = { likelihood: 'host-fraction', completeness } as const;

describe('a planned survey', () => {
  it('joins what is known: its limit is that of all stars', () => {
    const known = buildQuestion({ detectedStars: [3] });
    const forecast = forecastSurvey(known, fraction, 0.95);
    const all = { ...known, completeness: Float64Array.of(...known.completeness, ...completeness) };
    expect(forecast.limitIfNoneTogether).toBe(upperLimit(ratePosterior(all), 0.95));
    expect(forecast.limitIfNone).toBe(
      upperLimit(ratePosterior(buildQuestion({ completeness })), 0.95),
    );
    expect(forecast.chanceOfNone).toBeCloseTo(1 - forecast.yield.chanceOfAny, 12);
    expect(forecast.yield.mean).toBeCloseTo(ratePosterior(known).mean * forecast.exposure, 9);
  });

  it('at an assumed rate has the exact chance of none', () => {
    const { chanceOfNone } = forecastSurvey(buildQuestion(), fraction, 0.95, 0.1);
    expect(chanceOfNone).toBeCloseTo(
      completeness.reduce((product, c) => product * (1 - 0.1 * c), 1),
      13,
    );
  });

  it('asks for the same quantity', () => {
    const number = buildQuestion({ likelihood: 'mean-number' });
    expect(() => addSample(number, fraction)).toThrow(/other quantity/);
  });
});

describe('stars like these', () => {
  it('are the same stars when as many are wanted, and keep the mean', () => {
    const same = starsLikeThese(fraction, 30).completeness;
    expect([...same].sort()).toEqual([...completeness].sort());
    const mean = (values: Float64Array) => values.reduce((a, b) => a + b, 0) / values.length;
    expect(mean(starsLikeThese(fraction, 60).completeness)).toBeCloseTo(mean(completeness), 12);
    expect(
      Math.abs(mean(starsLikeThese(fraction, 7).completeness) / mean(completeness) - 1),
    ).toBeLessThan(0.05);
  });

  it('lower the limit with their number, within the band of what may be found', () => {
    const prior: RatePrior = { law: 'uniform', max: 1 };
    const { limitIfNone, low, high } = limitByStars(fraction, prior, [5, 20, 80], 0.05, 0.95);
    for (let i = 0; i < 3; i++) {
      if (i > 0) expect(limitIfNone[i]).toBeLessThan(limitIfNone[i - 1]);
      expect(low[i]).toBeGreaterThanOrEqual(limitIfNone[i]);
      expect(high[i]).toBeGreaterThanOrEqual(low[i]);
    }
  });
});

describe('which stars next', () => {
  it.each<[string, Partial<RateQuestion>]>([
    ['uniform', {}],
    ['Jeffreys', { prior: { law: 'jeffreys' } }],
    ['mean number', { likelihood: 'mean-number', detectedStars: [1] }],
    ['mean number, background', { likelihood: 'mean-number', detectedStars: [1], background: 1 }],
  ])('by the limit with each alone, exactly: %s', (_name, overrides) => {
    const known = buildQuestion(overrides);
    const planned = { likelihood: known.likelihood, completeness };
    const { order, limitWithItAlone, limitWithFirst } = starGains(known, planned, 0.95, 5);
    for (let star = 0; star < 30; star++) {
      const one = { ...planned, completeness: completeness.slice(star, star + 1) };
      const exact = upperLimit(ratePosterior(addSample(known, one)), 0.95);
      expect(Math.abs(limitWithItAlone[star] / exact - 1)).toBeLessThan(1e-8);
    }
    expect(limitWithItAlone[order[0]]).toBe(Math.min(...limitWithItAlone));
    expect(limitWithFirst).toHaveLength(5);
    for (let n = 1; n < 5; n++) expect(limitWithFirst[n]).toBeLessThan(limitWithFirst[n - 1]);
  });
});

describe('starsNeeded', () => {
  const wanted = {
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
    completeness: 0.5,
    target: 0.1,
    level: 0.95,
  } as const;

  it('is the first number that reaches the limit', () => {
    const stars = starsNeeded(wanted);
    if (stars === null) throw new Error('no number reaches it');
    const limit = (n: number) =>
      upperLimit(
        ratePosterior(buildQuestion({ completeness: new Float64Array(n).fill(0.5) })),
        0.95,
      );
    expect(limit(stars)).toBeLessThanOrEqual(0.1);
    expect(limit(stars - 1)).toBeGreaterThan(0.1);
  });

  it('is fewer with what is known, more with a detection, and null where nothing reaches', () => {
    const alone = starsNeeded(wanted) as number;
    expect(starsNeeded({ ...wanted, known: buildQuestion() })).toBeLessThan(alone);
    expect(starsNeeded({ ...wanted, detections: 1 })).toBeGreaterThan(alone);
    const impossible = { ...wanted, likelihood: 'mean-number', target: 1e-9 } as const;
    expect(starsNeeded(impossible)).toBeNull();
    expect(() => starsNeeded({ ...wanted, target: 0 })).toThrow(/above 0/);
    expect(() => starsNeeded({ ...wanted, completeness: 0 })).toThrow(/above 0, at most 1/);
  });
});
