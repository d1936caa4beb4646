import { describe, expect, it } from 'vitest';
import { consequencesInSteps, finishSteps } from '@/components/runs/consequences';
import { settingFromQuery } from '@/components/runs/live-address';
import { liveAnswer } from '@/components/runs/live-answer';
import {
  isSameSetting,
  type LiveSetting,
  settingToQuery,
  withLikelihood,
} from '@/components/runs/live-setting';
import { poissonUpperLimit, ratePosterior, upperLimit, viewPopulation } from '@/lib/inference';
import { buildSample, definition } from './sample';

const place = { massMjup: 9, semiMajorAxisAu: 50 };
const sample = {
  ...buildSample(),
  open: [
    { star: 30, name: 'cc1', probability: 0.3, ...place },
    { star: 31, name: 'cc2', probability: 0.8, ...place },
    { star: 32, name: 'far', probability: null, ...place, semiMajorAxisAu: 900 },
  ],
};
const setting: LiveSetting = {
  definition,
  credibleLevel: 0.95,
  detections: 'counted',
  likelihood: 'mean-number',
  prior: { law: 'uniform', max: 1 },
  candidates: { treatment: 'fixed' },
  background: 0.4,
};
const view = viewPopulation(sample.maps, sample.grid, definition);

describe('a live answer with candidates and a background', () => {
  it('is the posterior of the same question', () => {
    const { full, answer, zero, missingColumn, levels } = liveAnswer(sample, view, setting);
    const direct = ratePosterior({
      likelihood: 'mean-number',
      completeness: view.completenessPerStar as Float64Array,
      prior: setting.prior,
      detectedStars: [39],
      background: 0.4,
      candidates: {
        treatment: 'fixed',
        entries: [
          { star: 30, probability: 0.3 },
          { star: 31, probability: 0.8 },
        ],
      },
    });
    expect(answer.limit).toBe(upperLimit(direct, 0.95));
    expect(full.undecided.map(({ name }) => name)).toEqual(['cc1', 'cc2']);
    expect(zero.limit).toBeLessThan(answer.limit);
    expect(missingColumn).toContain('known background');
    expect(levels().map(({ hostFraction }) => hostFraction)).toEqual(levels().map(() => null));
  });

  it('carries limits without a prior', () => {
    const { background: _none, ...plain } = setting;
    const { beside, full } = liveAnswer(sample, view, plain);
    expect(beside().rows[0]).toMatchObject({
      name: 'Garwood',
      lower: null,
      upper: poissonUpperLimit(1, full.exposure, 0.95),
    });
  });

  it('names a candidate without a probability, and what to do', () => {
    const vague = {
      ...sample,
      open: [{ star: 30, name: 'Vague cc1', probability: null, ...place }],
    };
    expect(() => liveAnswer(vague, view, setting)).toThrow(
      /Vague cc1 lies in the ranges and has no probability.*set candidates aside/,
    );
  });

  it('shows what each treatment would give', () => {
    const given = finishSteps(consequencesInSteps(sample, setting, setting))?.switches;
    const aside = liveAnswer(sample, view, { ...setting, candidates: undefined });
    expect(given?.candidates.none).toBe(aside.answer.limit);
    expect(given?.candidates.fixed).toBe(liveAnswer(sample, view, setting).answer.limit);
    expect(given?.candidates['rate-dependent']).toBeUndefined();
  });
});

describe('a setting with candidates and a background', () => {
  it('goes to the address and back', () => {
    const moved: LiveSetting = {
      ...setting,
      candidates: { treatment: 'rate-dependent', referenceRate: 0.2 },
    };
    const query = settingToQuery(moved, setting);
    expect(query).toEqual({ cand: 'rate:0.2' });
    expect(isSameSetting(settingFromQuery(query, setting), moved)).toBe(true);
    const { candidates: _aside, ...without } = setting;
    expect(settingFromQuery(settingToQuery(without, setting), setting)).toEqual(without);
  });

  it('leaves the background where a fraction of stars is asked for, and gets it back', () => {
    const fraction = withLikelihood(setting, 'host-fraction', setting);
    expect(fraction.background).toBeUndefined();
    expect(
      isSameSetting(settingFromQuery({ likelihood: 'host-fraction' }, setting), fraction),
    ).toBe(true);
    expect(withLikelihood(fraction, 'mean-number', setting)).toEqual(setting);
  });

  it("takes another run's posterior for no other quantity", () => {
    const table: LiveSetting = {
      ...setting,
      prior: { law: 'tabulated', value: [0, 1], density: [1, 1], source: 'A-31 run 18' },
    };
    const fraction = withLikelihood(table, 'host-fraction', table);
    expect(fraction.prior).toEqual({ law: 'uniform', max: 1 });
    expect(withLikelihood(fraction, 'mean-number', table).prior).toEqual(table.prior);
  });
});
