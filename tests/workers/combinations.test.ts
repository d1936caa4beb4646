import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { POST as preview } from '@/app/api/v1/collaborations/[collaboration]/combinations/preview/route';
import { POST as create } from '@/app/api/v1/collaborations/[collaboration]/combinations/route';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import {
  type CombinationView,
  combinationPreviewSchema,
  combinationSchema,
} from '@/lib/schemas/combinations';
import { createAnalysis } from '@/lib/services/analyses';
import { StarRow, type SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();

type Role = 'owner' | 'student';
let team: Awaited<ReturnType<typeof createCollaborationWith<Role>>>;
let headers: Record<Role, Record<string, string>>;
let actor: Actor;
let surveys: SurveyRow[];

/** Three surveys; Star 3 is in all, Star 2 in two. */
beforeAll(async () => {
  team = await createCollaborationWith(['owner', 'student']);
  const of = async (role: Role) => bearer(await tokenOf(team.people[role], team.collaboration));
  headers = { owner: await of('owner'), student: await of('student') };
  actor = await actorOf(team.people.owner, team.collaboration);
  await startWorker({ threads: 2 });
  const lists = { North: [1, 2, 3], South: [2, 3, 4], East: [3, 5] };
  surveys = [];
  for (const [name, stars] of Object.entries(lists)) {
    const survey = await buildSurvey(team.collaboration.id, { name });
    for (const star of stars) {
      const depth = 0.4 * surveys.length;
      const contrastMag = [7, 9.5, 11.5, 13, 14, 14.2].map((mag) => mag + depth);
      await buildTarget(survey, {
        name: `Star ${star}`,
        distancePc: 20 + star,
        curves: [{ contrastMag }],
      });
    }
    expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
    surveys.push(survey);
  }
});
beforeEach(() => query('delete from rate_limit'));
afterAll(killWorkers);

const ids = () => surveys.map(({ id }) => id);
const post = (handler: typeof create, as: Role, body: unknown) =>
  call(handler, {
    method: 'POST',
    params: { collaboration: team.collaboration.slug },
    headers: headers[as],
    body,
  });

async function saved(definition: Record<string, unknown>): Promise<CombinationView> {
  const response = await post(create, 'owner', {
    name: 'All',
    definition: { surveyIds: ids(), ...definition },
  });
  expect(response.status).toBe(201);
  return combinationSchema.parse(await response.json());
}

async function analyse(given: Partial<AnalysisRecipe>) {
  const population = await buildPopulation(team.collaboration.id);
  const recipe = recipeOf(surveys, population, given);
  const analysis = await buildAnalysis(team.collaboration.id, recipe, actor.personId);
  const { run, job } = await runToEnd(actor, `A-${analysis.number}`);
  expect(job.fault).toBeNull();
  if (!run.inputs || !run.result) throw new Error('the run has no result');
  return { inputs: run.inputs, result: run.result };
}

const digestOfStar = ({ inputs }: Awaited<ReturnType<typeof analyse>>, name: string) =>
  inputs.stars.find((star) => star.name === name)?.mapDigest;
const starId = async (name: string) =>
  (await StarRow.findOne({ where: { name }, rejectOnEmpty: true })).id;

describe('a stored combination', () => {
  it.each(['default', 'deepest', 'independent'] as const)(
    'gives what its surveys and the rule %s give',
    async (rule) => {
      const stored = await saved({ rule });
      const by = await analyse({ combinationId: stored.id, combination: rule });
      const plain = await analyse({ combination: rule });
      expect(by.result.answer).toEqual(plain.result.answer);
      expect(by.inputs.stars).toEqual(plain.inputs.stars);
      const { id, key, version, name, words, digest } = stored;
      expect(by.inputs.storedCombination).toEqual({ id, key, version, name, words, digest });
      expect(by.result.statement.conditions).toContain(
        `Combination: ${key} version 1, All: ${words}`,
      );
    },
  );

  it('gives a star a rule of its own, and no other star', async () => {
    const starRules = [{ starId: await starId('Star 3'), rule: 'independent' }];
    const mixed = await saved({ rule: 'deepest', starRules });
    const [by, deepest, independent] = [
      await analyse({ combinationId: mixed.id, combination: 'deepest' }),
      await analyse({ combination: 'deepest' }),
      await analyse({ combination: 'independent' }),
    ];
    expect(digestOfStar(by, 'Star 2')).toBe(digestOfStar(deepest, 'Star 2'));
    expect(digestOfStar(by, 'Star 3')).toBe(digestOfStar(independent, 'Star 3'));
    expect(digestOfStar(by, 'Star 3')).not.toBe(digestOfStar(deepest, 'Star 3'));
    expect(mixed.words).toContain('1 star by a rule of its own');
  });

  it('lets its own order say whose age and distance hold', async () => {
    const turned = await saved({ surveyIds: [...ids()].reverse() });
    const { inputs } = await analyse({ combinationId: turned.id });
    expect(inputs.surveys.map(({ name }) => name)).toEqual(['East', 'South', 'North']);
  });

  it('is refused where the recipe says something else', async () => {
    const stored = await saved({ rule: 'deepest' });
    const population = await buildPopulation(team.collaboration.id);
    const recipe = recipeOf(surveys, population, { combinationId: stored.id });
    await expect(createAnalysis(actor, { name: 'x', recipe })).rejects.toMatchObject({
      faults: [expect.objectContaining({ column: 'recipe.combinationId' })],
    });
  });

  it('is saved by those who may combine surveys', async () => {
    const body = { name: 'Mine', definition: { surveyIds: ids() } };
    expect((await post(create, 'student', body)).status).toBe(403);
  });
});

describe('POST …/combinations/preview', () => {
  it('reports overlaps, and what each survey adds to the sum', async () => {
    const body = { definition: { surveyIds: ids(), rule: 'deepest' } };
    const response = await post(preview, 'student', body);
    expect(response.status).toBe(200);
    const found = combinationPreviewSchema.parse(await response.json());
    expect([found.stars, found.entries]).toEqual([5, 8]);
    expect(found.surveys.map(({ entries, newStars }) => [entries, newStars])).toEqual([
      [3, 3],
      [3, 1],
      [2, 1],
    ]);
    expect(found.shared.map(({ name, surveyIds }) => [name, surveyIds.length])).toEqual([
      ['Star 2', 2],
      ['Star 3', 3],
    ]);
    const sums = found.semiMajorAxisAu.map((_, j) =>
      found.surveys.reduce((sum, { adds }) => sum + adds[j], 0),
    );
    expect(sums.every((sum) => sum >= 0 && sum <= 5 + 1e-9)).toBe(true);
    expect(found.surveys.every(({ adds }) => adds.every((value) => value >= -1e-4))).toBe(true);
    const alone = { definition: { surveyIds: [ids()[2], ids()[0]], rule: 'deepest' } };
    const pair = combinationPreviewSchema.parse(
      await (await post(preview, 'student', alone)).json(),
    );
    expect(pair.surveys.map(({ newStars }) => newStars)).toEqual([2, 2]);
  });

  it.each([
    ['one survey', () => ({ surveyIds: [ids()[0]] }), 'at least two surveys'],
    ['a survey twice', () => ({ surveyIds: [ids()[0], ids()[0]] }), 'each survey once'],
    [
      'the grid of another survey',
      () => ({ surveyIds: ids().slice(0, 2), grid: { choice: 'survey', surveyId: ids()[2] } }),
      'one of the surveys',
    ],
  ])('refuses %s', async (_, definition, words) => {
    const response = await post(preview, 'owner', { definition: definition() });
    expect([400, 422]).toContain(response.status);
    expect(JSON.stringify(await response.json())).toContain(words);
  });
});
