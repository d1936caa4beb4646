import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { POPULATION } from '../support/population';
import { buildPopulation } from '../support/sample';
import { askToEnd, type GivenSettings } from '../support/study';
import { killWorkers, startWorker } from '../support/worker';

let lab: FinishedLab;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
});
afterAll(killWorkers);

const ask = (settings: Omit<GivenSettings<'calibration'>, 'kind'>) =>
  askToEnd<'calibration'>(lab.owner, lab.run, { kind: 'calibration', ...settings });

describe('calibration', () => {
  it('finds that limits hold as often as they say, and where theory puts them', async () => {
    const { result, study } = await ask({ surveys: 2000, truths: [0.1, 0.6], seed: '5eed' });
    expect(result.passes).toBe(true);
    expect(result.verdict).toContain('hold as often as they say');
    expect(result.seed).toBe(study.seed);
    expect(result.ranks.bins.reduce((sum, n) => sum + n, 0)).toBe(2000);
    expect(result.coverage.map(({ level }) => level)).toEqual([0.5, 0.68, 0.9, 0.95, 0.99]);
    for (const { level, observed } of result.coverage) {
      // Four standard errors of a binomial share, for a prior that the truth was drawn from.
      expect(Math.abs(observed - level)).toBeLessThan(4 * Math.sqrt((level * (1 - level)) / 2000));
    }
    expect(result.atTruth.map(({ rate }) => rate)).toEqual([0.1, 0.6]);
    expect(result.otherTruth).toBeNull();
  });

  it('draws other surveys from another seed', async () => {
    const [one, two] = [
      await ask({ surveys: 300, seed: 'a1' }),
      await ask({ surveys: 300, seed: 'b2' }),
    ];
    expect(one.result.seed).toBe('a1');
    expect(one.result.ranks.bins).not.toEqual(two.result.ranks.bins);
  });

  it('shows that limits fail where the truth is another population', async () => {
    const narrow = await buildPopulation(lab.collaboration.id, {
      ...POPULATION,
      massMinMjup: 3,
      massMaxMjup: 5,
      semiMajorAxisMaxAu: 14,
    });
    const { result, inputs } = await ask({
      surveys: 1000,
      truthPopulationId: narrow.id,
      seed: '5eed',
    });
    expect(result.passes).toBe(true);
    const [half] = result.otherTruth?.coverage ?? [];
    expect(half.observed).toBeLessThan(0.4);
    expect(result.otherTruth?.verdict).toContain('do not hold');
    expect(inputs.further.map(({ digest }) => digest)).toEqual([narrow.digest]);
  });
});
