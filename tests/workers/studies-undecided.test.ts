import { afterAll, beforeAll, expect, it } from 'vitest';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { type RunRow, TargetRow } from '@/models';
import { answerRunQuestion } from '@/workers/answers/run-question';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { buildAnalysis, buildCompanion } from '../support/sample';
import { askToEnd, questionOfRun } from '../support/study';
import { runToEnd } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();
let lab: FinishedLab;

beforeAll(async () => {
  await startWorker({ threads: 2 });
  lab = await buildFinishedLab();
  const target = await TargetRow.findOne({
    where: { surveyId: lab.survey.id, name: 'Star 5' },
    rejectOnEmpty: true,
  });
  await buildCompanion(target, { name: 'cc1', status: 'candidate', probability: 0.4 });
});
afterAll(killWorkers);

async function runWith(given: Partial<AnalysisRecipe>): Promise<RunRow> {
  const recipe = { ...lab.run.recipe, ...given };
  const analysis = await buildAnalysis(lab.collaboration.id, recipe, lab.owner.personId);
  const { run, job } = await runToEnd(lab.owner, `A-${analysis.number}`);
  expect(job.fault).toBeNull();
  return run;
}

it.each<[string, Partial<AnalysisRecipe>]>([
  ['candidates of a fixed probability', { candidates: { treatment: 'fixed' } }],
  [
    'candidates whose probability follows the rate',
    { candidates: { treatment: 'rate-dependent', referenceRate: 0.2 } },
  ],
  [
    'a background',
    { likelihood: 'mean-number', prior: { law: 'uniform', max: 2 }, background: 0.3 },
  ],
])('a question starts from the limit of a run with %s', async (_, given) => {
  const run = await runWith(given);
  const limit = run.result?.answer.limit as number;
  expect(Math.abs(limit / (lab.run.result?.answer.limit as number) - 1)).toBeGreaterThan(1e-4);
  expect(answerRunQuestion(await questionOfRun(run)).limit).toBe(limit);
  const { result: influence } = await askToEnd<'influence'>(lab.owner, run, { kind: 'influence' });
  expect(influence.limit / limit).toBeCloseTo(1, 8);
  const { result: sweep } = await askToEnd<'sweep'>(lab.owner, run, {
    kind: 'sweep',
    over: 'semi-major-axis-max',
    from: 100,
    to: 200,
    count: 3,
  });
  expect((sweep.limit.at(-1) as number) / limit).toBeCloseTo(1, 8);
  const { result: counts } = await askToEnd<'counts'>(lab.owner, run, { kind: 'counts' });
  expect(counts.rate).toBe(run.result?.answer.median);
});
