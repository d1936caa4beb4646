import { beforeAll, describe, expect, it } from 'vitest';
import { POST as copy } from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/copy/route';
import {
  GET as get,
  DELETE as remove,
  PATCH as update,
} from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/route';
import { POST as startRun } from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/runs/route';
import {
  POST as create,
  GET as list,
} from '@/app/api/v1/collaborations/[collaboration]/analyses/route';
import { type AnalysisRecipe, analysisSchema } from '@/lib/schemas/analyses';
import type { PopulationRow, SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildMap, buildRun } from '../support/lab-rows';
import {
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  tokenOf,
} from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';

const { query } = withDatabase();
let collaboration: TestCollaboration;
let survey: SurveyRow;
let population: PopulationRow;
let recipe: AnalysisRecipe;
let owner: Record<string, string>;
let ownerId: string;
let student: Record<string, string>;
let foreign: { headers: Record<string, string>; slug: string; survey: SurveyRow };

beforeAll(async () => {
  const made = await createCollaborationWith(['owner', 'student']);
  collaboration = made.collaboration;
  survey = await buildSurvey(collaboration.id);
  await buildTarget(survey);
  population = await buildPopulation(collaboration.id);
  recipe = recipeOf([survey], population);
  ownerId = made.people.owner.id;
  owner = bearer(await tokenOf(made.people.owner, collaboration));
  student = bearer(await tokenOf(made.people.student, collaboration));
  const other = await createCollaborationWith(['owner']);
  foreign = {
    headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
    slug: other.collaboration.slug,
    survey: await buildSurvey(other.collaboration.id),
  };
});

const at = (analysis?: string) => ({
  collaboration: collaboration.slug,
  ...(analysis && { analysis }),
});

async function begin(headers = owner, body: unknown = { name: 'How many giants', recipe }) {
  return call(create, { method: 'POST', headers, params: at(), body });
}

describe('POST analyses', () => {
  it('begins a draft with the next number', async () => {
    const first = analysisSchema.parse(await (await begin()).json());
    const second = analysisSchema.parse(await (await begin()).json());
    expect(second.number).toBe(first.number + 1);
    expect(first.state).toBe('draft');
    expect(first.surveys.map(({ id }) => id)).toEqual([survey.id]);
    expect(first.population.id).toBe(population.id);
    expect(first.can).toEqual({ run: true, change: true, remove: true, copy: true });
    const answer = await call(list, { headers: student, params: at() });
    const { analyses } = (await answer.json()) as { analyses: { key: string }[] };
    expect(analyses[0].key).toBe(second.key);
  });

  it('gives numbers without a gap or a double to all who ask at once', async () => {
    const answers = await Promise.all(Array.from({ length: 6 }, () => begin(student)));
    const numbers = await Promise.all(answers.map(async (one) => (await one.json()).number));
    const sorted = [...numbers].sort((a, b) => a - b);
    expect(sorted).toEqual(sorted.map((_, i) => sorted[0] + i));
  });

  it.each([
    ['a level of 95', { credibleLevel: 95 }, 'credibleLevel'],
    ['a prior beyond 1 for a fraction', { prior: { law: 'uniform', max: 2 } }, 'prior.max'],
    ['no survey', { surveyIds: [] }, 'surveyIds'],
    ['an unknown field', { colour: 'red' }, 'colour'],
  ])('refuses %s and names the field', async (_, change, field) => {
    const body = { name: 'x', recipe: { ...recipe, ...change } };
    const response = await begin(owner, body);
    expect([400, 422]).toContain(response.status);
    expect(JSON.stringify((await response.json()).errors)).toContain(field.split('.').at(-1));
  });

  it('does not know what another collaboration has', async () => {
    const body = { name: 'x', recipe: { ...recipe, surveyIds: [foreign.survey.id] } };
    expect((await begin(owner, body)).status).toBe(404);
    const unknown = { name: 'x', recipe: { ...recipe, populationId: crypto.randomUUID() } };
    expect((await begin(owner, unknown)).status).toBe(404);
    const twice = { name: 'x', recipe: { ...recipe, surveyIds: [survey.id, survey.id] } };
    expect((await begin(owner, twice)).status).toBe(422);
  });
});

describe('analyses/{key}', () => {
  it('is changed by those who may, and copied by everybody', async () => {
    const { key } = await (await begin()).json();
    const body = { name: 'Renamed', recipe: { ...recipe, credibleLevel: 0.9 } };
    const patch = (headers: Record<string, string>, analysis: string) =>
      call(update, { method: 'PATCH', headers, params: at(analysis), body });
    expect((await patch(student, key)).status).toBe(403);
    const changed = analysisSchema.parse(await (await patch(owner, key)).json());
    expect([changed.name, changed.recipe.credibleLevel]).toEqual(['Renamed', 0.9]);

    const copied = await call(copy, {
      method: 'POST',
      headers: student,
      params: at(key),
      body: { detections: 'none' },
    });
    expect(copied.status).toBe(201);
    const own = analysisSchema.parse(await copied.json());
    expect(own.parent).toBe(key);
    expect(own.name).toBe('Renamed, zero detections');
    expect(own.recipe).toEqual({ ...changed.recipe, detections: 'none' });
    expect(own.can).toMatchObject({ run: true, change: true });
    expect((await patch(student, own.key)).status).toBe(200);
    const run = await call(startRun, { method: 'POST', headers: student, params: at(own.key) });
    expect(run.status).toBe(201);
    const running = await (await call(get, { headers: student, params: at(own.key) })).json();
    expect(running.state).toBe('running');
  });

  it('keeps its name once a run of it is frozen', async () => {
    const target = await buildTarget(survey);
    const map = await buildMap(collaboration.id, target);
    const analysis = await buildAnalysis(collaboration.id, recipe);
    await buildRun(collaboration.id, analysis, { personId: ownerId, map });
    const key = `A-${analysis.number}`;
    const patch = (body: unknown) =>
      call(update, { method: 'PATCH', headers: owner, params: at(key), body });
    const refused = await patch({ name: 'Another name' });
    expect(refused.status).toBe(409);
    expect((await refused.json()).detail).toBe(
      `${key} has a frozen run, which keeps its name; copy it to name it anew`,
    );
    const kept = await patch({ name: analysis.name, recipe: { ...recipe, credibleLevel: 0.9 } });
    expect((await kept.json()).name).toBe(analysis.name);
  });

  it('is deleted as a draft only', async () => {
    const { key } = await (await begin()).json();
    const erase = () => call(remove, { method: 'DELETE', headers: owner, params: at(key) });
    await call(startRun, { method: 'POST', headers: owner, params: at(key) });
    expect((await erase()).status).toBe(409);
    const draft = await (await begin()).json();
    const params = at(draft.key);
    expect((await call(remove, { method: 'DELETE', headers: owner, params })).status).toBe(204);
    expect((await call(get, { headers: owner, params })).status).toBe(404);
    const log = await query(`select action from audit_entry where summary = $1`, [
      `deleted ${draft.key}`,
    ]);
    expect(log).toEqual([{ action: 'remove-analysis' }]);
  });

  it('is "not found" for a stranger and under a strange key', async () => {
    const { key } = await (await begin()).json();
    const elsewhere = { collaboration: foreign.slug, analysis: key };
    const asked = { headers: foreign.headers, params: elsewhere };
    expect((await call(get, asked)).status).toBe(404);
    expect((await call(copy, { ...asked, method: 'POST', body: {} })).status).toBe(404);
    for (const strange of ['A-0', 'A-99999', 'P-1', "A-1'; drop table run"]) {
      expect((await call(get, { headers: owner, params: at(strange) })).status).toBe(404);
    }
    expect((await call(get, { params: at(key) })).status).toBe(401);
  });
});
