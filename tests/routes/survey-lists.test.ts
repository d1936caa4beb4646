import { beforeEach, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { listAnalyses } from '@/lib/services/analyses';
import { leadOf } from '@/lib/services/lead-analysis';
import { listStars } from '@/lib/services/stars';
import { currentYardstick } from '@/lib/services/survey-depth';
import { getSurvey, listSurveys, updateSurvey } from '@/lib/services/surveys';
import { listTargets } from '@/lib/services/targets';
import { CollaborationRow, type PopulationRow, type SurveyRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildMap, buildRun } from '../support/lab-rows';
import { actorOf, createCollaborationWith } from '../support/people';
import { POPULATION } from '../support/population';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';

withDatabase();

const FIRST = { limit: 10, offset: 0 };
const RATIO = {
  form: 'mass-ratio',
  massRatioMin: 0.001,
  massRatioMax: 0.05,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 100,
  massRatioIndex: -0.5,
  semiMajorAxis: { shape: 'power-law', index: 0 },
} as const;

let actor: Actor;
let survey: SurveyRow;
let map: string;
let made: number;

beforeEach(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  actor = await actorOf(people.owner, collaboration);
  survey = await buildSurvey(collaboration.id, { name: 'Sandbar' });
  map = await buildMap(collaboration.id, await buildTarget(survey, { name: 'Star 1' }));
  made = 0;
});

/** Another mass range each time: no two populations have one digest. */
const population = () =>
  buildPopulation(actor.collaborationId, { ...POPULATION, massMinMjup: 2 + made++ });

const analysis = (of: PopulationRow) =>
  buildAnalysis(actor.collaborationId, recipeOf([survey], of), actor.personId);

const run = (of: Awaited<ReturnType<typeof analysis>>) =>
  buildRun(actor.collaborationId, of, { personId: actor.personId, map });

const named = async () => (await currentYardstick(actor.collaborationId)).view;

/** What `leadOf` says, which reads every analysis, beside the one question that lists ask. */
async function expectLead(key: string | null) {
  const { settings } = await CollaborationRow.findByPk(actor.collaborationId, {
    rejectOnEmpty: true,
  });
  const { analyses } = await listAnalyses(actor);
  expect(leadOf(analyses, settings)?.key ?? null).toBe(key);
  expect((await named()).analysis).toBe(key);
}

const choose = (leadAnalysisId: string) =>
  CollaborationRow.update(
    { settings: { leadAnalysisId } },
    { where: { id: actor.collaborationId } },
  );

describe('the yardstick of lists', () => {
  it('is flat until a population is shared, and then the newest', async () => {
    expect(await named()).toMatchObject({ population: null, key: null, massMinMjup: 2 });
    await population();
    const newest = await population();
    expect(await named()).toMatchObject({ key: `P-${newest.number}`, massMinMjup: 3 });
    await newest.update({ isShared: false });
    expect(await named()).toMatchObject({ key: 'P-1', massMinMjup: 2 });
    await expectLead(null);
  });

  it('follows the lead analysis, and no population that somebody shares', async () => {
    const asked = await population();
    const first = await analysis(asked);
    await population();
    expect(await named()).toMatchObject({ key: 'P-2', analysis: null });
    await run(first);
    await expectLead('A-1');
    await population();
    expect(await named()).toMatchObject({ key: 'P-1', analysis: 'A-1' });
    // One that is not shared yet is the lead's all the same.
    await asked.update({ isShared: false });
    expect(await named()).toMatchObject({ key: 'P-1', analysis: 'A-1' });
  });

  it('takes the analysis that an owner chose, else the one with the newest result', async () => {
    const [first, second, third] = [
      await analysis(await population()),
      await analysis(await population()),
      await analysis(await population()),
    ];
    await run(second);
    await run(first);
    await expectLead('A-1');
    await choose(third.id);
    await expectLead('A-3');
    await choose('00000000-0000-4000-8000-000000000000');
    await expectLead('A-1');
  });

  it('leaves out a lead whose population has no one box for all stars', async () => {
    const ratios = await buildPopulation(actor.collaborationId, RATIO);
    await run(await analysis(ratios));
    expect(await named()).toMatchObject({ population: null });
    await population();
    expect(await named()).toMatchObject({ key: 'P-2', analysis: null });
  });

  it('is named by every list that gives detection probabilities', async () => {
    expect((await getSurvey(actor, survey.slug)).yardstick).toBeNull();
    expect((await listTargets(actor, survey.slug, FIRST)).yardstick.population).toBeNull();
    await run(await analysis(await population()));
    const expected = await named();
    expect(expected).toMatchObject({ key: 'P-1', version: 1, analysis: 'A-1', massMaxMjup: 40 });
    const { surveys } = await listSurveys(actor);
    const targets = await listTargets(actor, survey.slug, FIRST);
    const stars = await listStars(actor, FIRST);
    expect(surveys[0].yardstick).toEqual(expected);
    expect(targets.yardstick).toEqual(expected);
    expect(stars.yardstick).toEqual(expected);
    // One star with one map: all three say the same of it.
    expect(targets.targets[0].probability).toBeGreaterThan(0);
    expect(stars.stars[0].probability).toBe(targets.targets[0].probability);
    expect(surveys[0].summedCompleteness).toBe(targets.targets[0].probability);
  });
});

describe('the sum of detection probabilities', () => {
  it('is nothing where the maps hold nothing of what the lead asks for', async () => {
    const far = { ...POPULATION, semiMajorAxisMinAu: 1000, semiMajorAxisMaxAu: 5000 };
    await run(await analysis(await buildPopulation(actor.collaborationId, far)));
    const { surveys } = await listSurveys(actor);
    expect(surveys[0]).toMatchObject({ summedCompleteness: 0, maps: { ready: 1 } });
    expect((await listTargets(actor, survey.slug, FIRST)).targets[0].probability).toBe(0);
    expect((await listStars(actor, FIRST)).stars[0].probability).toBe(0);
    expect((await getSurvey(actor, survey.slug)).alone).toBeNull();
  });

  it('leaves out a star that was chosen for its companion, as a run does', async () => {
    await run(await analysis(await population()));
    await TargetRow.update(
      { attributes: { selectedForCompanion: true } },
      { where: { surveyId: survey.id } },
    );
    const { summedCompleteness, depth, alone } = await getSurvey(actor, survey.slug);
    expect([summedCompleteness, depth, alone]).toEqual([null, null, null]);
  });
});

describe('the upper limit of a survey alone', () => {
  const alone = async () => (await getSurvey(actor, survey.slug)).alone;
  const ask = async (given: Partial<AnalysisRecipe> = {}) => {
    const recipe = recipeOf([survey], await population(), given);
    return buildAnalysis(actor.collaborationId, recipe, actor.personId);
  };

  it('follows from its stars by the question of the lead analysis', async () => {
    expect(await alone()).toBeNull();
    await run(await ask());
    const [{ probability: p }] = (await listTargets(actor, survey.slug, FIRST)).targets;
    // One star, f uniform in 0..1, L = 1 - p f: the quadratic of its cumulative posterior at 0.95.
    const limit =
      (1 - Math.sqrt(1 - 2 * (p as number) * 0.95 * (1 - (p as number) / 2))) / (p as number);
    expect(await alone()).toMatchObject({ analysis: 'A-1', level: 0.95, stars: 1, detections: 0 });
    expect((await alone())?.limit).toBeCloseTo(limit, 5);
    // L = p f: the cumulative posterior is the square of f.
    const target = await TargetRow.findOne({ where: { surveyId: survey.id }, rejectOnEmpty: true });
    const companion = await buildCompanion(target);
    expect(await alone()).toMatchObject({ detections: 1, quantity: 'host_fraction' });
    expect((await alone())?.limit).toBeCloseTo(Math.sqrt(0.95), 5);
    // Outside the ranges it does not count; without a mass a run would be refused.
    await companion.update({ semiMajorAxisAu: 250 });
    expect((await alone())?.limit).toBeCloseTo(limit, 5);
    await companion.update({ massMjup: null });
    expect(await alone()).toBeNull();
  });

  it('sets detections aside where the lead does, and leaves open candidates to a run', async () => {
    await buildCompanion(
      await TargetRow.findOne({ where: { surveyId: survey.id }, rejectOnEmpty: true }),
    );
    const first = await ask({ detections: 'none' });
    await run(first);
    expect(await alone()).toMatchObject({ analysis: 'A-1', detections: 0 });
    const second = await ask({ candidates: { treatment: 'fixed' } });
    await choose(second.id);
    expect(await alone()).toBeNull();
    await choose(first.id);
    expect(await alone()).toMatchObject({ analysis: 'A-1' });
  });
});

describe('maps that are stale', () => {
  it('are counted by the survey list as on the page of maps', async () => {
    const { surveys } = await listSurveys(actor);
    expect(surveys[0].maps).toMatchObject({ ready: 1, stale: 1 });
  });
});

describe('changing one of the years of a survey', () => {
  it('is held against the other that is stored', async () => {
    await updateSurvey(actor, survey.slug, { observedFrom: 2014 });
    await expect(updateSurvey(actor, survey.slug, { observedTo: 2010 })).rejects.toThrow(
      'observedTo: found 2014 to 2010; expected a last year that is not before the first',
    );
    expect((await getSurvey(actor, survey.slug)).observedTo).toBeNull();
    // Years that came in before they were compared stand in the way of no other change.
    await survey.update({ observedFrom: 2014, observedTo: 2010 });
    expect((await updateSurvey(actor, survey.slug, { band: 'K' })).band).toBe('K');
  });
});
