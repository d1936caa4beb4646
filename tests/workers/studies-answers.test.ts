import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freeIndices } from '@/lib/inference/settled-indices';
import { populationBox } from '@/lib/population';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { studySettingsSchema } from '@/lib/schemas/study-settings';
import { startStudy } from '@/lib/services/studies';
import type { PopulationRow } from '@/models';
import { answerRunQuestion, type RunQuestion } from '@/workers/answers/run-question';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { POPULATION } from '../support/population';
import { buildPopulation } from '../support/sample';
import { askToEnd, type GivenSettings, questionOfRun } from '../support/study';
import { bundleWorker, killWorkers, startWorker } from '../support/worker';

withDatabase();
let lab: FinishedLab;
let question: RunQuestion;
let steeper: PopulationRow;

beforeAll(async () => {
  await startWorker(await bundleWorker('studies-answers'), { threads: 2 });
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
