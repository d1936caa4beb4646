import { beforeAll, describe, expect, it } from 'vitest';
import { PATCH as update } from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/route';
import { POST as create } from '@/app/api/v1/collaborations/[collaboration]/analyses/route';
import { type AnalysisRecipe, analysisSchema } from '@/lib/schemas/analyses';
import { withDatabase } from '../support/database';
import {
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  tokenOf,
} from '../support/people';
import { buildPopulation, buildSurvey, recipeOf } from '../support/sample';

withDatabase();
let collaboration: TestCollaboration;
let headers: Record<string, string>;
let recipe: AnalysisRecipe;

beforeAll(async () => {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  headers = bearer(await tokenOf(made.people.owner, collaboration));
  const survey = await buildSurvey(collaboration.id);
  recipe = recipeOf([survey], await buildPopulation(collaboration.id));
});

const post = (given: Partial<AnalysisRecipe>) =>
  call(create, {
    ...{ method: 'POST', headers, params: { collaboration: collaboration.slug } },
    body: { name: 'Options', recipe: { ...recipe, ...given } },
  });

const options: Partial<AnalysisRecipe> = {
  likelihood: 'mean-number',
  combination: 'independent',
  candidates: { treatment: 'rate-dependent', referenceRate: 0.2 },
  background: 0.5,
  prior: { law: 'tabulated', value: [0, 1, 2], density: [1, 2, 0], source: 'A-31 run 18' },
};

describe('a recipe with candidates, a background and a table as prior', () => {
  it('is kept as it was sent, and takes them out again', async () => {
    const analysis = analysisSchema.parse(await (await post(options)).json());
    expect(analysis.recipe).toMatchObject(options);
    const params = { collaboration: collaboration.slug, analysis: analysis.key };
    const body = { recipe: { ...recipe, candidates: { treatment: 'fixed' } } };
    const answer = await call(update, { method: 'PATCH', headers, params, body });
    const changed = analysisSchema.parse(await answer.json());
    expect(changed.recipe.candidates).toEqual({ treatment: 'fixed' });
    expect(changed.recipe.background).toBeUndefined();
  });

  it.each<[string, Partial<AnalysisRecipe>, RegExp]>([
    ['a background of a fraction', { background: 0.5 }, /background belongs to the mean number/],
    [
      'a table beyond 1 of a fraction',
      { prior: { law: 'tabulated', value: [0, 2], density: [1, 1], source: 'x' } },
      /at most 1 for a fraction/,
    ],
    [
      'a table whose values fall',
      { prior: { law: 'tabulated', value: [0.5, 0.2], density: [1, 1], source: 'x' } },
      /increasing values/,
    ],
    [
      'candidates without their rate',
      { candidates: { treatment: 'rate-dependent' } as AnalysisRecipe['candidates'] },
      /referenceRate/,
    ],
  ])('is refused with %s', async (_what, given, words) => {
    const answer = await post(given);
    expect(answer.status).toBe(422);
    expect(JSON.stringify(await answer.json())).toMatch(words);
  });
});
