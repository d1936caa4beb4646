import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import { viewPopulation } from '@/lib/inference';
import type { Population } from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs } from '@/lib/schemas/runs';
import { CompletenessMapRow, type SurveyRow, TargetRow } from '@/models';
import { unpackMap } from '@/models/map-values';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith, type TestCollaboration } from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildStars,
  buildSurvey,
  recipeOf,
} from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

const box = {
  massMinMjup: 3,
  massMaxMjup: 40,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 200,
};
const broken: Population = {
  form: 'shaped',
  ...box,
  mass: { shape: 'broken-power-law', breakAt: 12, innerIndex: -0.4, outerIndex: -1.5 },
  semiMajorAxis: { shape: 'log-normal', median: 45, sigmaDex: 0.6 },
};
const ratio: Population = {
  form: 'mass-ratio',
  massRatioMin: 0.004,
  massRatioMax: 0.03,
  massRatioIndex: -0.5,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 200,
  semiMajorAxis: { shape: 'power-law', index: 0.3 },
};
const scaled: Population = {
  form: 'power-law',
  ...box,
  massIndex: -0.31,
  semiMajorAxisIndex: 0.39,
  hostScaling: { index: 1, referenceMsun: 1 },
};
const systems: Population = {
  form: 'systems',
  weight: [2, 1, 1],
  companionSystem: [1, 1, 2],
  massMjup: [5, 12, 30],
  semiMajorAxisAu: [20, 60, 150],
};

const STARS = 5;
const HOSTS = [0.6, 0.9, 1, 1.4, 2];
let actor: Actor;
let collaboration: TestCollaboration;
let survey: SurveyRow;

async function giveMasses(masses: (number | null)[]): Promise<void> {
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id }, order: ['name'] });
  for (const [i, target] of targets.entries()) await target.update({ hostMassMsun: masses[i] });
}

beforeAll(async () => {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  actor = await actorOf(made.people.owner, collaboration);
  await startWorker({ threads: 2 });
  survey = await buildSurvey(collaboration.id);
  await buildStars(survey, STARS);
  await giveMasses(HOSTS);
  expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
});
afterAll(killWorkers);

async function answer(population: Population, given: Partial<AnalysisRecipe> = {}) {
  const row = await buildPopulation(collaboration.id, population);
  const recipe = recipeOf([survey], row, given);
  const analysis = await buildAnalysis(collaboration.id, recipe, actor.personId);
  return runToEnd(actor, `A-${analysis.number}`);
}

async function finished(population: Population, given: Partial<AnalysisRecipe> = {}) {
  const { run, job } = await answer(population, given);
  expect(job.fault).toBeNull();
  if (!run.result || !run.inputs) throw new Error('the run has no result');
  return { result: run.result, inputs: run.inputs, words: run.result.statement };
}

/** The same view from the stored maps, without the worker. */
async function viewOf(population: Population, inputs: RunInputs) {
  const maps: number[] = [];
  for (const { mapId } of inputs.stars) {
    const row = await CompletenessMapRow.findByPk(mapId, { rejectOnEmpty: true });
    maps.push(...unpackMap(row.nodeValues));
  }
  const { grid } = inputs;
  return viewPopulation(
    Float64Array.from(maps),
    {
      massMjup: Float64Array.from(grid.massMjup),
      semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
    },
    population,
    Float64Array.from(HOSTS),
  );
}

describe('a run on', () => {
  it('a broken law and a log-normal one', async () => {
    const { result, inputs, words } = await finished(broken);
    const view = await viewOf(broken, inputs);
    expect(result.exposure).toBeCloseTo(view.exposure, 10);
    expect(inputs.stars[0].hostMassMsun).toBeUndefined();
    expect(words.conditions.find((one) => one.startsWith('Population: '))).toContain('log-normal');
    expect(result.priorCutAt).toBeNull();
  });

  it('the mass ratio, each star with masses of its own', async () => {
    const { result, inputs, words } = await finished(ratio, { zeroOutsideMaps: true });
    const view = await viewOf(ratio, inputs);
    expect(inputs.stars.map(({ hostMassMsun }) => hostMassMsun)).toEqual(HOSTS);
    const found = inputs.stars.map(
      ({ starId }) => result.starTable.find((star) => star.starId === starId)?.probability,
    );
    found.forEach((probability, star) => {
      expect(probability).toBeCloseTo((view.completenessPerStar as Float64Array)[star], 10);
    });
    expect(words.sentence).toContain("times the star's mass");
  });

  it('the mass ratio, refused by name where a star has no mass', async () => {
    await giveMasses([0.6, 0.9, null, 1.4, 2]);
    const { job } = await answer(ratio, { zeroOutsideMaps: true });
    await giveMasses(HOSTS);
    expect(job.status).toBe('failed');
    expect(job.fault).toContain('1 star has no mass, which this population needs: Star 0003');
  });

  it('a rate that scales with the host, its prior cut where a fraction would exceed 1', async () => {
    const { result, inputs, words } = await finished(scaled);
    const view = await viewOf(scaled, inputs);
    expect(result.exposure).toBeCloseTo(view.exposure, 10);
    expect(result.priorCutAt).toBeCloseTo(0.5, 12);
    expect(result.answer.limit).toBeLessThan(0.5);
    expect(words.sentence).toContain('stars of 1 solar mass');
    expect(words.conditions.find((one) => one.startsWith('Largest rate: '))).toContain('0.5');
  });

  it('tabulated systems, as hosts and by the number of companions seen', async () => {
    const hosts = await finished(systems);
    const view = await viewOf(systems, hosts.inputs);
    expect(hosts.result.exposure).toBeCloseTo(view.exposure, 10);
    expect(hosts.words.sentence).toContain('host one tabulated system');
    const number = await finished(systems, { likelihood: 'mean-number' });
    const seen = (view.numberSeenPerStar as Float64Array).reduce((a, b) => a + b, 0);
    expect(number.result.exposure).toBeCloseTo(seen, 10);
    expect(seen).toBeGreaterThan(view.exposure);
    expect(number.words.conditions.some((one) => one.includes('wider than Poisson'))).toBe(true);
  });
});
