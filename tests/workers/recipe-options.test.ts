import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import {
  poissonUpperLimit,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import { gammaP, gammaQ } from '@/lib/numerics/special';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunResult } from '@/lib/schemas/runs';
import type { RunRow, SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith, type TestCollaboration } from '../support/people';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { questionOfRun } from '../support/study';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

const LEVEL = 0.95;
const R = [0.3, 0.8];
let actor: Actor;
let collaboration: TestCollaboration;
let survey: SurveyRow;
let second: SurveyRow;

/** Eight stars; the third hosts a confirmed companion, the fifth and sixth a candidate each. */
async function buildSample(): Promise<void> {
  survey = await buildSurvey(collaboration.id);
  for (let i = 1; i <= 8; i++) {
    const target = await buildTarget(survey, { name: `Star ${i}`, distancePc: 15 + 3 * i });
    if (i === 3) await buildCompanion(target);
    if (i === 5) await buildCompanion(target, { status: 'candidate', probability: R[0] });
    if (i === 6) await buildCompanion(target, { status: 'ambiguous', probability: R[1] });
    // Outside the ranges nobody has to say how likely it is.
    const far = { name: 'cc1', status: 'candidate' as const, semiMajorAxisAu: 280 };
    if (i === 7) await buildCompanion(target, far);
  }
  second = await buildSurvey(collaboration.id);
  const deeper = [7.5, 9, 12, 13.5, 13.6, 14.5];
  await buildTarget(second, { name: 'Star 1', distancePc: 18, curves: [{ contrastMag: deeper }] });
  for (const one of [survey, second]) {
    expect((await untilEnded(await askForMaps(one))).status).toBe('done');
  }
}

beforeAll(async () => {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  actor = await actorOf(made.people.owner, collaboration);
  await startWorker({ threads: 2 });
  await buildSample();
});
afterAll(killWorkers);

async function answer(given: Partial<AnalysisRecipe>, surveys = [survey]) {
  const population = await buildPopulation(collaboration.id);
  const recipe = recipeOf(surveys, population, given);
  const analysis = await buildAnalysis(collaboration.id, recipe, actor.personId);
  return runToEnd(actor, `A-${analysis.number}`);
}

async function finished(given: Partial<AnalysisRecipe>, surveys = [survey]) {
  const { run, job } = await answer(given, surveys);
  expect(job.fault).toBeNull();
  if (!run.result || !run.inputs) throw new Error('the run has no result');
  return { run, result: run.result, conditions: run.result.statement.conditions };
}

/** The pure function on the run's own maps, its detections named by hand. */
async function direct(run: RunRow, given: Partial<RateQuestion>) {
  const { maps, grid, population } = await questionOfRun(run);
  const { completenessPerStar } = viewPopulation(maps, grid, population);
  const question: RateQuestion = {
    likelihood: 'mean-number',
    prior: { law: 'uniform', max: 1 },
    completeness: completenessPerStar as Float64Array,
    detectedStars: [2],
    ...given,
  };
  return upperLimit(ratePosterior(question), LEVEL);
}

const entries = [
  { star: 4, probability: R[0] },
  { star: 5, probability: R[1] },
];

const condition = (conditions: string[], label: string) =>
  conditions.find((one) => one.startsWith(`${label}: `));

/** Integral of F^power exp(-F S) from 0 to x, over the factorial that all terms do not share. */
function gammaIntegral(power: number, exposure: number, x: number): number {
  let factorial = 1;
  for (let i = 2; i <= power; i++) factorial *= i;
  return (factorial * gammaP(power + 1, exposure * x)) / exposure ** (power + 1);
}

describe('candidates of fixed probability', () => {
  it('give the mixture over how many are real (mean number)', async () => {
    const candidates = { treatment: 'fixed' as const };
    const { run, result } = await finished({ likelihood: 'mean-number', candidates });
    const { limit } = result.answer;
    expect(limit).toBe(await direct(run, { candidates: { ...candidates, entries } }));
    const weights = [0.7 * 0.2, 0.3 * 0.2 + 0.7 * 0.8, 0.3 * 0.8];
    const below = weights.reduce((sum, weight, real) => {
      const shape = 1 + real + 1;
      const inside = gammaP(shape, result.exposure * limit) / gammaP(shape, result.exposure);
      return sum + weight * inside;
    }, 0);
    expect(below).toBeCloseTo(LEVEL, 8);
  });

  it('enter the host fraction and the words, and the one outside the ranges does not', async () => {
    const candidates = { treatment: 'fixed' as const };
    const { run, result, conditions } = await finished({ candidates });
    const asked = { likelihood: 'host-fraction' as const };
    expect(result.answer.limit).toBe(
      await direct(run, { ...asked, candidates: { ...candidates, entries } }),
    );
    expect(result.zero.limit).toBe(await direct(run, { ...asked, detectedStars: [] }));
    expect(result.candidates).toEqual({
      treatment: 'fixed',
      referenceRate: null,
      entries: [
        { name: 'Star 5 b', star: 'Star 5', probability: 0.3 },
        { name: 'Star 6 b', star: 'Star 6', probability: 0.8 },
      ],
    });
    expect(condition(conditions, 'Candidates')).toBe(
      'Candidates: 2 count with the probability of being real, held fixed: Star 5 b (0.3), Star 6 b (0.8)',
    );
    expect(result.levels.every(({ meanNumber }) => meanNumber !== null)).toBe(true);
  });
});

describe('candidates whose probability follows the rate', () => {
  it('multiply the likelihood by (1 - r) + r F/F0 each', async () => {
    const candidates = { treatment: 'rate-dependent' as const, referenceRate: 0.2 };
    const { run, result, conditions } = await finished({ likelihood: 'mean-number', candidates });
    const { limit } = result.answer;
    expect(limit).toBe(await direct(run, { candidates: { ...candidates, entries } }));
    const [r, q] = R;
    const factor = [(1 - r) * (1 - q), (r * (1 - q) + q * (1 - r)) / 0.2, (r * q) / 0.2 ** 2];
    const upTo = (x: number) =>
      factor.reduce((sum, c, power) => sum + c * gammaIntegral(1 + power, result.exposure, x), 0);
    expect(upTo(limit) / upTo(1)).toBeCloseTo(LEVEL, 8);
    expect(condition(conditions, 'Candidates')).toContain('quoted for a rate of 0.2');
  });
});

describe('candidates set aside', () => {
  it('leave the limit and are named', async () => {
    const { run, result, conditions } = await finished({ likelihood: 'mean-number' });
    expect(result.answer.limit).toBe(await direct(run, {}));
    expect(result.candidates).toBeNull();
    expect(condition(conditions, 'Candidates')).toBe(
      'Candidates: set aside, though not settled: Star 5 b (probability 0.3), Star 6 b (probability 0.8)',
    );
  });

  it('are so where all detections are', async () => {
    const { result } = await finished({ detections: 'none', candidates: { treatment: 'fixed' } });
    expect(result.candidates).toBeNull();
    expect(result.answer.limit).toBe(result.zero.limit);
  });
});

describe('a known background', () => {
  it('gives the closed form, and no fraction of stars beside it', async () => {
    const background = 0.7;
    const prior: RatePrior = { law: 'uniform', max: 1000 };
    const { result, conditions } = await finished({
      likelihood: 'mean-number',
      prior,
      background,
    });
    const expected = result.exposure * result.answer.limit + background;
    expect(gammaQ(2, expected) / gammaQ(2, background)).toBeCloseTo(1 - LEVEL, 8);
    expect(result.background).toBe(background);
    expect(result.levels.map(({ hostFraction }) => hostFraction)).toEqual(
      result.levels.map(() => null),
    );
    expect(condition(conditions, 'Background')).toContain('0.7 false detections');
    expect(condition(conditions, 'Table of limits')).toContain('known background');
    expect(result.beside?.rows.map(({ name }) => name)).toEqual(['Feldman–Cousins']);
  });
});

describe('a tabulated prior', () => {
  it('that is flat gives the limit of the uniform one, and names its source', async () => {
    const flat: AnalysisRecipe['prior'] = {
      law: 'tabulated',
      value: [0, 0.4, 1],
      density: [2, 2, 2],
      source: 'A-31 run 18',
    };
    const uniform = await finished({});
    const table = await finished({ prior: flat });
    expect(table.result.answer.limit / uniform.result.answer.limit).toBeCloseTo(1, 8);
    expect(condition(table.conditions, 'Prior')).toContain('(A-31 run 18)');
  });
});

describe('limits without a prior', () => {
  it('stand beside the credible one, of the counted detections', async () => {
    const { result } = await finished({ likelihood: 'mean-number' });
    const [garwood, interval] = (result.beside as NonNullable<RunResult['beside']>).rows;
    expect(garwood).toMatchObject({ name: 'Garwood', lower: null, level: LEVEL });
    expect(garwood.upper).toBe(poissonUpperLimit(1, result.exposure, LEVEL));
    expect(interval.lower).toBeLessThan(interval.upper);
    expect(result.beside?.sentence).toContain('Garwood');
  });
});

describe('the rule for a star in two surveys', () => {
  it('is that of the analysis', async () => {
    const both = [survey, second];
    const of = async (combination: AnalysisRecipe['combination']) =>
      (await finished({ combination }, both)).result;
    const deepest = await of('deepest');
    const independent = await of('independent');
    expect(independent.exposure).toBeGreaterThan(deepest.exposure);
    expect(independent.answer.limit).toBeLessThan(deepest.answer.limit);
    expect(condition(independent.statement.conditions, 'Stars in several surveys')).toContain(
      'independent epochs, optimistic',
    );
    const refused = await answer({ combination: 'refuse' }, both);
    expect(refused.job.status).toBe('failed');
    expect(refused.job.fault).toContain('Star 1');
  });
});

describe('a candidate of which something is missing', () => {
  it('is refused by name, with what to do, and set aside by choice', async () => {
    const other = await buildSurvey(collaboration.id);
    const target = await buildTarget(other, { name: 'Vague' });
    await buildCompanion(target, { name: 'cc1', status: 'candidate' });
    expect((await untilEnded(await askForMaps(other))).status).toBe('done');
    const { job } = await answer({ candidates: { treatment: 'fixed' } }, [other]);
    expect(job.status).toBe('failed');
    expect(job.fault).toContain('Vague cc1 lies in the ranges and has no probability');
    expect(job.fault).toContain('set candidates aside');
    expect((await answer({}, [other])).job.status).toBe('done');
  });

  it('and a survey that cuts its maps at candidates is warned of', async () => {
    const cutting = await buildSurvey(collaboration.id, {
      mapSettings: {
        ...{ massMjup: { min: 1, max: 60, count: 6 } },
        semiMajorAxisAu: { min: 3, max: 300, count: 6 },
        candidates: 'cut',
      },
    });
    const target = await buildTarget(cutting, { name: 'Cut' });
    await buildCompanion(target, {
      ...{ name: 'cc1', status: 'candidate', probability: 0.5 },
      attributes: { separationArcsec: 1.8 },
    });
    expect((await untilEnded(await askForMaps(cutting))).status).toBe('done');
    const { conditions } = await finished({ candidates: { treatment: 'fixed' } }, [cutting]);
    expect(condition(conditions, 'Candidates cut and counted')).toContain(cutting.name);
  });
});
