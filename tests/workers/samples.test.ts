import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { getAnalysis } from '@/lib/services/analyses';
import { createSample } from '@/lib/services/samples';
import { markTarget } from '@/lib/services/targets';
import type { SurveyRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith } from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

let actor: Actor;
let collaborationId: string;
let survey: SurveyRow;
let targets: TargetRow[];

/** Six stars of 10, 20 … 60 Myr; the second was chosen because a companion was known. */
beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  collaborationId = collaboration.id;
  actor = await actorOf(people.owner, collaboration);
  await startWorker({ threads: 2 });
  survey = await buildSurvey(collaborationId, { name: 'Sandbar' });
  targets = [];
  for (let i = 1; i <= 6; i++) {
    const attributes = i === 2 ? { selectedForCompanion: true } : {};
    const age = { ageMyr: 10 * i, ageLowerMyr: null, ageUpperMyr: null };
    targets.push(await buildTarget(survey, { name: `Star ${i}`, ...age, attributes }));
  }
  expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
});
afterAll(killWorkers);

async function analyse(given: Partial<AnalysisRecipe> = {}) {
  const population = await buildPopulation(collaborationId);
  const recipe = recipeOf([survey], population, given);
  const analysis = await buildAnalysis(collaborationId, recipe, actor.personId);
  const { run, job } = await runToEnd(actor, `A-${analysis.number}`);
  expect(job.fault).toBeNull();
  if (!run.inputs || !run.result) throw new Error('the run has no result');
  const { inputs, result } = run;
  return {
    key: `A-${analysis.number}`,
    inputs,
    result,
    stars: inputs.stars.map(({ name }) => name),
  };
}

describe('a run of a sample', () => {
  it('leaves out stars chosen for a known companion where no sample is named', async () => {
    const { stars, inputs } = await analyse();
    expect(stars).toEqual(['Star 1', 'Star 3', 'Star 4', 'Star 5', 'Star 6']);
    const reason = 'chosen because a companion was known';
    expect(inputs.leftOut).toEqual([{ name: 'Star 2', survey: 'Sandbar', reason }]);
    expect(inputs.sample).toBeUndefined();
  });

  it('holds just the stars of its sample, and says so', async () => {
    const young = { ageMyr: { max: 40 }, knownCompanion: 'kept', unknown: 'left-out' } as const;
    const sample = await createSample(actor, { name: 'Young', definition: young });
    const { key, stars, inputs, result } = await analyse({ sampleId: sample.id });
    expect(stars).toEqual(['Star 1', 'Star 2', 'Star 3', 'Star 4']);
    expect(inputs.leftOut).toEqual(
      ['Star 5', 'Star 6'].map((name) => ({
        name,
        survey: 'Sandbar',
        reason: 'outside the sample',
      })),
    );
    const { id, digest, words } = sample;
    expect(inputs.sample).toEqual({ id, key: 'S-1', version: 1, name: 'Young', words, digest });
    expect(result.statement.conditions).toContain(`Sample: S-1 version 1, Young: ${words}`);
    expect((await getAnalysis(actor, key)).runs[0].hasOlderInputs).toBe(false);
  });

  it('gives what the same stars give when the others are left out by hand', async () => {
    const definition = {
      ageMyr: { min: 30, max: 50 },
      knownCompanion: 'left-out',
      unknown: 'left-out',
    } as const;
    const sample = await createSample(actor, { name: 'Middle', definition });
    const selected = await analyse({ sampleId: sample.id });
    for (const i of [0, 1, 5]) await markTarget(actor, targets[i].id, { leftOutReason: 'by hand' });
    const byHand = await analyse();
    for (const i of [0, 1, 5]) await markTarget(actor, targets[i].id, { leftOutReason: null });
    expect(selected.stars).toEqual(byHand.stars);
    expect(selected.result.answer).toEqual(byHand.result.answer);
    expect(selected.result.exposure).toBe(byHand.result.exposure);
  });

  it('has older inputs once one of its stars is marked as chosen for a companion', async () => {
    const { key } = await analyse();
    expect((await getAnalysis(actor, key)).runs[0].hasOlderInputs).toBe(false);
    await markTarget(actor, targets[2].id, { selectedForCompanion: true });
    expect((await getAnalysis(actor, key)).runs[0].hasOlderInputs).toBe(true);
    await markTarget(actor, targets[2].id, { selectedForCompanion: false });
  });
});
