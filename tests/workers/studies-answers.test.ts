import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { forecastSurvey, ratePosterior, starsLikeThese } from '@/lib/inference';
import { freeIndices } from '@/lib/inference/settled-indices';
import { populationBox } from '@/lib/population';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { studySettingsSchema } from '@/lib/schemas/study-settings';
import { startStudy } from '@/lib/services/studies';
import { CompletenessMapRow, type PopulationRow, TargetRow } from '@/models';
import {
  answerRunQuestion,
  type RunQuestion,
  rateQuestionOf,
} from '@/workers/answers/run-question';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { POPULATION } from '../support/population';
import { buildPopulation } from '../support/sample';
import { askToEnd, type GivenSettings, questionOfRun } from '../support/study';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();
let lab: FinishedLab;
let question: RunQuestion;
let steeper: PopulationRow;

beforeAll(async () => {
  await startWorker({ threads: 2 });
  lab = await buildFinishedLab();
  question = await questionOfRun(lab.run);
  steeper = await buildPopulation(lab.collaboration.id, { ...POPULATION, massIndex: -1.31 });
});
afterAll(killWorkers);

const ask = <Kind extends StudyKind>(settings: GivenSettings<Kind>) =>
  askToEnd<Kind>(lab.owner, lab.run, settings);

const limit = () => lab.run.result?.answer.limit as number;

it('starts from the numbers of the run', () => {
  expect(answerRunQuestion(question).limit).toBe(limit());
});

describe('free indices', () => {
  it('equal the pure function, whose fixed counterpart is the run', async () => {
    const massIndex = { min: -1, max: 0.5 };
    const semiMajorAxisIndex = { min: -0.5, max: 1 };
    const { result, inputs } = await ask<'free-indices'>({
      kind: 'free-indices',
      massIndex,
      semiMajorAxisIndex,
    });
    const direct = freeIndices(
      {
        ...question,
        box: populationBox(question.population),
        indices: { massIndex, semiMajorAxisIndex },
      },
      question.level,
    );
    expect(result.limit).toBe(direct.limit);
    expect(result.limitFixed).toBe(limit());
    expect(result.levels.find(({ level }) => level === 0.95)?.limit).toBe(direct.limit);
    expect(result.rateByMassIndex.density).toHaveLength(result.rateByMassIndex.y.length);
    expect(result.rateByMassIndex.density[0]).toHaveLength(result.rateByMassIndex.x.length);
    expect(result.movedBy).toBeLessThan(1e-3);
    expect(inputs).toMatchObject({
      runId: lab.run.id,
      runInputsDigest: lab.run.inputsDigest,
      runResultDigest: lab.run.resultDigest,
      further: [],
    });
  });
});

describe('populations compared', () => {
  it('give the limit under each, and the factor that the evidences make', async () => {
    const wide = await buildPopulation(lab.collaboration.id, {
      ...POPULATION,
      massMinMjup: 20,
    });
    const { result, inputs } = await ask<'population-comparison'>({
      kind: 'population-comparison',
      populationIds: [steeper.id, wide.id],
    });
    const [own, other, without] = result.rows;
    expect(own).toMatchObject({ isOwn: true, limit: limit(), logBayesFactor: 0 });
    const under = answerRunQuestion({ ...question, population: steeper.definition });
    expect(other.limit).toBe(under.limit);
    expect(other.logBayesFactor).toBeCloseTo(
      (other.logEvidence as number) - (own.logEvidence as number),
      12,
    );
    expect(other.logBayesFactor).not.toBe(0);
    expect(without.logEvidence).toBeNull();
    expect(without.fault).toContain('outside the ranges');
    expect(inputs.further.map(({ digest }) => digest).sort()).toEqual(
      [lab.run.inputs?.population.digest, steeper.digest, wide.digest].sort(),
    );
  });

  it('take host masses from the targets where the run had no need of them', async () => {
    const ratio = await buildPopulation(lab.collaboration.id, {
      form: 'mass-ratio',
      massRatioMin: 0.003,
      massRatioMax: 0.04,
      massRatioIndex: -0.3,
      semiMajorAxisMinAu: 10,
      semiMajorAxisMaxAu: 200,
      semiMajorAxis: { shape: 'power-law', index: 0.39 },
    });
    const settings = { kind: 'population-comparison' as const, populationIds: [ratio.id] };
    const without = await ask<'population-comparison'>(settings);
    expect(without.result.rows[1].fault).toContain('mass');
    await TargetRow.update({ hostMassMsun: 0.9 }, { where: { surveyId: lab.survey.id } });
    const { result, inputs } = await ask<'population-comparison'>({
      ...settings,
      populationIds: [ratio.id, steeper.id],
    });
    await TargetRow.update({ hostMassMsun: null }, { where: { surveyId: lab.survey.id } });
    const direct = answerRunQuestion({
      ...question,
      population: ratio.definition,
      hostMassMsun: question.hostMassMsun.map(() => 0.9),
    });
    expect(result.rows[1].limit).toBe(direct.limit);
    expect(inputs.further.map(({ what }) => what)).toContain('host masses');
  });

  it('are refused for a population that is not there', async () => {
    const settings = studySettingsSchema.parse({
      kind: 'population-comparison',
      populationIds: [steeper.id, crypto.randomUUID()],
    });
    await expect(startStudy(lab.owner, lab.run.id, settings)).rejects.toMatchObject({
      faults: [{ item: 'populationIds.1' }],
    });
  });
});

describe('how many detections', () => {
  it('are counted exactly at a rate, and predicted over the posterior', async () => {
    const { result } = await ask<'counts'>({ kind: 'counts', rate: 0.2 });
    const { completeness, posterior } = answerRunQuestion(question);
    const none = completeness.reduce((product, c) => product * (1 - 0.2 * c), 1);
    const one = completeness.reduce((sum, c) => sum + (0.2 * c) / (1 - 0.2 * c), 0) * none;
    expect(result.atRate[0]).toBeCloseTo(none, 12);
    expect(result.atRate[1]).toBeCloseTo(one, 12);
    expect(result.atRate.reduce((sum, p) => sum + p, 0)).toBeCloseTo(1, 9);
    expect(result.counted).toBe(1);
    expect(result.atLeastCounted).toBeCloseTo(1 - none, 12);
    const expected = result.predictive.reduce((sum, p, k) => sum + k * p, 0);
    const exposure = completeness.reduce((sum, c) => sum + c, 0);
    expect(expected / (posterior.mean * exposure)).toBeCloseTo(1, 6);
  });
});

describe('limit map', () => {
  it('holds the limit with all companions at a node, and beyond it', async () => {
    const { result } = await ask<'limit-map'>({ kind: 'limit-map', tailCumulative: true });
    const { grid } = question;
    const columns = grid.semiMajorAxisAu.length;
    const size = grid.massMjup.length * columns;
    const [row, column] = [3, 2];
    const node = row * columns + column;
    const completeness = Float64Array.from(
      { length: question.maps.length / size },
      (_, star) => question.maps[star * size + node] / 65_535,
    );
    const none = ratePosterior({
      likelihood: question.likelihood,
      prior: question.prior,
      completeness,
      detectedStars: [],
    });
    expect(result.limit[row][column] / none.quantile(0.95)).toBeCloseTo(1, 8);
    expect(result.summed[row][column]).toBeCloseTo(
      completeness.reduce((sum, c) => sum + c, 0),
      12,
    );
    const tail = answerRunQuestion({
      ...question,
      population: {
        ...POPULATION,
        massMinMjup: grid.massMjup[row],
        semiMajorAxisMinAu: grid.semiMajorAxisAu[column],
      } as typeof question.population,
    });
    expect((result.tail?.[row][column] as number) / tail.limit).toBeCloseTo(1, 8);
    expect(result.tail?.[0][0]).toBeNull();
  });
});

describe('limit against a parameter', () => {
  it('equals runs with that value, for a cutoff', async () => {
    const { result } = await ask<'sweep'>({
      kind: 'sweep',
      over: 'semi-major-axis-max',
      from: 40,
      to: 200,
      count: 5,
    });
    expect(result.value).toHaveLength(5);
    result.value.forEach((semiMajorAxisMaxAu, i) => {
      const population = { ...POPULATION, semiMajorAxisMaxAu } as typeof question.population;
      const direct = answerRunQuestion({ ...question, population });
      expect(result.limit[i] / direct.limit).toBeCloseTo(1, 8);
      expect(result.exposure[i]).toBeCloseTo(direct.exposure, 10);
      expect(result.detections[i]).toBe(semiMajorAxisMaxAu >= 45 ? 1 : 0);
    });
    expect(result.limit[4] / limit()).toBeCloseTo(1, 8);
    expect(result.limitZero[4] / (lab.run.result?.zero.limit as number)).toBeCloseTo(1, 8);
  });

  it('has a plane for both indices, whose diagonal is the curve', async () => {
    const { result } = await ask<'sweep'>({
      kind: 'sweep',
      over: 'both-indices',
      from: -1,
      to: 1,
      count: 3,
    });
    expect(result.plane?.limit).toHaveLength(3);
    result.value.forEach((_, i) => {
      expect((result.plane?.limit[i][i] as number) / result.limit[i]).toBeCloseTo(1, 8);
    });
  });

  it('is refused where the values leave no range', async () => {
    const settings = studySettingsSchema.parse({
      kind: 'sweep',
      over: 'mass-min',
      from: 2,
      to: 50,
      count: 5,
    });
    await expect(startStudy(lab.owner, lab.run.id, settings)).rejects.toMatchObject({
      faults: [{ item: 'to', code: 'range-order' }],
    });
  });
});

describe('forecast', () => {
  it('of stars like these equals the pure functions, at an assumed rate', async () => {
    const { result } = await ask<'forecast'>({
      kind: 'forecast',
      name: 'Twice as many',
      planned: { kind: 'stars-like-these', count: 16 },
      assumedRate: 0.1,
    });
    const known = rateQuestionOf(question).rateQuestion;
    const sample = starsLikeThese(known, 16);
    const direct = forecastSurvey(
      known,
      { likelihood: known.likelihood, completeness: sample.completeness },
      question.level,
      0.1,
    );
    expect(result.stars).toBe(16);
    expect(result.limitIfNone).toBe(direct.limitIfNone);
    expect(result.limitIfNoneTogether).toBe(direct.limitIfNoneTogether);
    const none = sample.completeness.reduce((product, c) => product * (1 - 0.1 * c), 1);
    expect(result.chanceOfNone).toBeCloseTo(none, 12);
    const expected = 0.1 * sample.completeness.reduce((sum, c) => sum + c, 0);
    expect(result.yield.mean).toBeCloseTo(expected, 9);
    expect(result.limitIfNoneTogether).toBeLessThan(limit());
    expect(result.against.stars.at(-1)).toBe(16);
    expect(result.against.limitIfNone.at(-1)).toBeCloseTo(result.limitIfNone, 9);
    expect(result.gain).toHaveLength(8);
    expect(result.gain[0].limitWithItAlone).toBeLessThan(limit());
    expect(result.wantedLimit).toBe(0.5 * limit());
    const needed = result.starsNeeded as number;
    const limitOf = (stars: number) =>
      ratePosterior({
        ...starsLikeThese(known, stars),
        prior: known.prior,
        detectedStars: [],
      }).quantile(question.level);
    expect(limitOf(needed)).toBeLessThanOrEqual(result.wantedLimit);
    expect(limitOf(needed - 1)).toBeGreaterThan(result.wantedLimit);
  });

  it('of deeper curves sees more, and makes its maps once', async () => {
    const planned = { kind: 'stars-like-these' as const, count: 8 };
    const same = await ask<'forecast'>({ kind: 'forecast', name: 'As deep', planned });
    const deeper = { ...planned, deeperByMag: 1.5 };
    const { result, inputs } = await ask<'forecast'>({
      kind: 'forecast',
      name: 'Deeper',
      planned: deeper,
    });
    expect(same.result.exposure).toBeCloseTo(lab.run.result?.exposure as number, 12);
    expect(result.exposure).toBeGreaterThan(same.result.exposure);
    expect(inputs.further).toHaveLength(1);
    const maps = await CompletenessMapRow.count();
    const again = await ask<'forecast'>({ kind: 'forecast', name: 'Once more', planned: deeper });
    expect(again.result).toEqual(result);
    expect(await CompletenessMapRow.count()).toBe(maps);
  });

  it('of targets with a curve makes one map for equal stars', async () => {
    const before = await CompletenessMapRow.count();
    const target = {
      distancePc: 20,
      distanceErrorPc: 0.3,
      ageMyr: 45,
      ageLowerMyr: 40,
      ageUpperMyr: 52,
      hostMag: 6.2,
    };
    const names = ['Plan 1', 'Plan 2', 'Plan 3'];
    const { result } = await ask<'forecast'>({
      kind: 'forecast',
      name: 'Targets',
      planned: {
        kind: 'targets',
        targets: names.map((name, i) => ({ name, ...target, ageMyr: i === 2 ? 41 : 45 })),
        curve: {
          band: 'H',
          nSigma: 5,
          separationArcsec: [0.15, 0.3, 0.6, 1.2, 2.5, 5],
          contrastMag: [7, 9.5, 11.5, 13, 14, 14.2],
        },
      },
    });
    expect(await CompletenessMapRow.count()).toBe(before + 2);
    const seen = new Map(result.gain.map(({ name, probability }) => [name, probability]));
    expect(seen.get('Plan 1')).toBe(seen.get('Plan 2'));
    expect(seen.get('Plan 3')).toBeGreaterThan(seen.get('Plan 1') as number);
    expect(result.exposure).toBeCloseTo(
      [...seen.values()].reduce((sum, c) => sum + c, 0),
      12,
    );
  });
});
