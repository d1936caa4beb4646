import { describe, expect, it } from 'vitest';
import {
  describeLevel,
  describeLimit,
  describePopulation,
  describePrior,
  type RatePrior,
  type RateQuantity,
  type StatementInputs,
} from '@/lib/inference';
import type { PowerLawPopulation } from '@/lib/population';

const plain = (text: string) => text.replaceAll('\u2009', ' ').replaceAll('\u2212', '-');

function buildInputs(overrides: Partial<StatementInputs> = {}): StatementInputs {
  return {
    quantity: 'host_fraction',
    limit: 0.0576,
    credibleLevel: 0.95,
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
    detections: 2,
    stars: 287,
    exposure: 108.3,
    combinationRule: 'same position at all epochs',
    cooling: 'hot start, solar metallicity',
    eccentricity: 'circular',
    threshold: 'smooth, 5 σ',
    shareOutside: 0,
    constrained: true,
    setByPrior: false,
    ...overrides,
  };
}

describe('describeLimit', () => {
  it('says the host fraction with its level in brackets', () => {
    expect(plain(describeLimit(buildInputs()).sentence)).toBe(
      '<5.8 % of stars host at least one planet of 2–30 MJ at 20–300 AU (95 %)',
    );
  });

  it('says the mean number as planets per 100 stars', () => {
    const inputs = buildInputs({
      quantity: 'companions_per_star',
      limit: 0.1198,
      credibleLevel: 0.997,
    });
    expect(plain(describeLimit(inputs).sentence)).toBe(
      '<12 planets of 2–30 MJ at 20–300 AU per 100 stars (99.7 %)',
    );
  });

  it('names no number where the data constrain nothing', () => {
    const statement = describeLimit(buildInputs({ constrained: false, setByPrior: true }));
    expect(plain(statement.sentence)).toBe(
      'These data do not constrain planets of 2–30 MJ at 20–300 AU',
    );
    expect(statement.conditions.at(-1)).toBe('Limit: none: the posterior is the prior');
  });

  it('carries every condition of the statement', () => {
    const { conditions } = describeLimit(buildInputs());
    expect(conditions.map(plain)).toEqual([
      'Credible level: 95 %',
      'Prior: uniform in host fraction f, 0 to 1',
      'Population: dN/dM ∝ M^-1.3 between 2 and 30 MJ, dN/da ∝ a^-0.6 between 20 and 300 AU',
      'Likelihood: host fraction, one trial for each of 287 stars, a star counts once',
      'Detections: 2 inside the ranges',
      'Exposure: 108 of 287 stars, the sum of mean detection probabilities',
      'Stars in several surveys: same position at all epochs',
      'Cooling: hot start, solar metallicity',
      'Eccentricity: circular',
      'Threshold: smooth, 5 σ',
    ]);
  });

  it('adds the interval, the share outside and a limit set by the prior', () => {
    const { entries } = describeLimit(
      buildInputs({
        shareOutside: 0.25,
        setByPrior: true,
        interval: { kind: 'highest-density', low: 0.013, high: 0.043, level: 0.68 },
      }),
    );
    const texts = Object.fromEntries(entries.map(({ label, text }) => [label, plain(text)]));
    expect(texts.Interval).toBe(
      '1.3–4.3 % (68 %, shortest in the host fraction f, not in its logarithm)',
    );
    expect(texts.Outside).toContain('25 % of this population lies outside');
    expect(texts.Outside).toContain('a large part of the limit rests on that');
    expect(texts.Limit).toBe(
      "set by the prior, not by the data: 95 % of the prior's upper end is 95 %",
    );
  });

  it('never puts the level before the sign of the limit, and never shouts', () => {
    for (const quantity of ['host_fraction', 'companions_per_star'] satisfies RateQuantity[]) {
      const { sentence, conditions } = describeLimit(buildInputs({ quantity }));
      expect(sentence.startsWith('<')).toBe(true);
      expect([sentence, ...conditions].join(' ')).not.toMatch(/!|please|oops|successfully/i);
    }
  });
});

describe('describePrior', () => {
  it.each<[RatePrior, RateQuantity, string]>([
    [
      { law: 'uniform', max: 2 },
      'companions_per_star',
      'uniform in mean number of planets per star F, 0 to 2',
    ],
    [
      { law: 'log-uniform', min: 0.001, max: 1 },
      'host_fraction',
      'uniform in the logarithm of host fraction f, 0.001 to 1',
    ],
    [{ law: 'jeffreys' }, 'host_fraction', 'Jeffreys for host fraction f, 0 to 1'],
    [
      { law: 'jeffreys' },
      'companions_per_star',
      'Jeffreys for mean number of planets per star F, no upper end',
    ],
    [
      { law: 'gamma', shape: 2, rate: 10 },
      'companions_per_star',
      'gamma for mean number of planets per star F, shape 2, rate 10 stars',
    ],
    [{ law: 'beta', a: 0.5, b: 2 }, 'host_fraction', 'beta for host fraction f, a = 0.5, b = 2'],
  ])('%o', (prior, quantity, words) => {
    expect(plain(describePrior(prior, quantity))).toBe(words);
  });
});

describe('describePopulation and describeLevel', () => {
  it('give linear indices by name, and levels without needless zeros', () => {
    const { population } = buildInputs();
    expect(population.form).toBe('power-law');
    const flat = { ...(population as PowerLawPopulation), massIndex: 0 };
    expect(plain(describePopulation(flat))).toContain('dN/dM ∝ M^-1 ');
    expect(plain(describeLevel(0.9))).toBe('90 %');
    expect(plain(describeLevel(0.9999))).toBe('99.99 %');
  });
});
