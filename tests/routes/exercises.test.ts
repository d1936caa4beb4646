import { parse } from 'csv-parse/sync';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  PATCH as change,
  GET as getOne,
} from '@/app/api/v1/collaborations/[collaboration]/exercises/[exercise]/route';
import { POST as start } from '@/app/api/v1/collaborations/[collaboration]/exercises/[exercise]/start/route';
import { PATCH as comment } from '@/app/api/v1/collaborations/[collaboration]/exercises/[exercise]/submissions/[submission]/route';
import { POST as submit } from '@/app/api/v1/collaborations/[collaboration]/exercises/[exercise]/submissions/route';
import { GET as table } from '@/app/api/v1/collaborations/[collaboration]/exercises/[exercise]/table/route';
import {
  POST as create,
  GET as list,
} from '@/app/api/v1/collaborations/[collaboration]/exercises/route';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { exerciseDetailSchema, exerciseSchema, submissionSchema } from '@/lib/schemas/exercises';
import { AnalysisRow, ExerciseRow, JobRow, type RunRow, RunRow as Runs } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildAnalysis, buildPopulation, buildSurvey, recipeOf } from '../support/sample';

withDatabase();

const members = ['statistician', 'student', 'student+student', 'collaborator'] as const;
type Member = (typeof members)[number];
let team: Awaited<ReturnType<typeof createCollaborationWith<Member>>>;
let headers: Record<Member, Record<string, string>>;
let reference: RunRow;
let recipe: AnalysisRecipe;

/** A finished run as far as an exercise reads it; the limit is given, not computed. */
async function buildRun(analysisId: string, given: AnalysisRecipe, limit: number): Promise<RunRow> {
  const collaborationId = team.collaboration.id;
  const job = await JobRow.create({ collaborationId, kind: 'compute-run', status: 'done' });
  const number = (await Runs.count({ where: { analysisId } })) + 1;
  return Runs.create({
    collaborationId,
    analysisId,
    number,
    jobId: job.id,
    recipe: given,
    seed: '0',
    engineVersion: '1',
    result: {
      quantity: 'host_fraction',
      credibleLevel: given.credibleLevel,
      answer: { limit, isConstrained: true },
      statement: { sentence: `<${100 * limit} % of stars (95 %)`, conditions: ['Prior: stated'] },
    } as never,
    resultDigest: 'digest',
    finishedAt: new Date(),
  });
}

beforeAll(async () => {
  team = await createCollaborationWith(members);
  headers = {} as typeof headers;
  for (const member of members) {
    headers[member] = bearer(await tokenOf(team.people[member], team.collaboration));
  }
  const survey = await buildSurvey(team.collaboration.id);
  recipe = recipeOf([survey], await buildPopulation(team.collaboration.id));
  const analysis = await buildAnalysis(team.collaboration.id, recipe);
  reference = await buildRun(analysis.id, recipe, 0.058);
});
beforeEach(() => ExerciseRow.destroy({ where: { collaborationId: team.collaboration.id } }));

const ask = (
  handler: Parameters<typeof call>[0],
  as: Member,
  method = 'GET',
  params: Record<string, string> = {},
  body?: unknown,
) =>
  call(handler, {
    method,
    headers: headers[as],
    params: { collaboration: team.collaboration.slug, ...params },
    body,
  });

const task = {
  title: 'What do the detections do?',
  task: 'Set the detections aside and say why the limit moves.',
  mayChange: ['detections', 'prior'],
};

async function setExercise(given: Record<string, unknown> = {}) {
  const body = { ...task, runId: reference.id, ...given };
  const response = await ask(create, 'statistician', 'POST', {}, body);
  expect(response.status).toBe(201);
  return exerciseSchema.parse(await response.json()).key;
}

async function begin(exercise: string, as: Member = 'student') {
  const response = await ask(start, as, 'POST', { exercise });
  expect(response.status).toBe(201);
  const { analysis } = (await response.json()) as { analysis: string };
  return AnalysisRow.findOne({
    where: { collaborationId: team.collaboration.id, number: Number(analysis.slice(2)) },
    rejectOnEmpty: true,
  });
}

const handIn = (exercise: string, run: RunRow, as: Member = 'student', remark = '') =>
  ask(submit, as, 'POST', { exercise }, { runId: run.id, remark });

const detail = async (exercise: string, as: Member) =>
  exerciseDetailSchema.parse(await (await ask(getOne, as, 'GET', { exercise })).json());

const NONE = { detections: 'none' as const };

describe('setting an exercise', () => {
  it('is for statisticians, authors and owners, and needs a finished run', async () => {
    const body = { ...task, runId: reference.id };
    expect((await ask(create, 'student', 'POST', {}, body)).status).toBe(403);
    expect((await ask(create, 'collaborator', 'POST', {}, body)).status).toBe(403);
    const nowhere = { ...body, runId: '2f6bd7d2-6f6e-4b5b-8a3c-1d6c2f5f8f11' };
    expect((await ask(create, 'statistician', 'POST', {}, nowhere)).status).toBe(404);
  });

  it('shows students only what is shared', async () => {
    const key = await setExercise({ isShared: false });
    expect((await ask(getOne, 'student', 'GET', { exercise: key })).status).toBe(404);
    expect(await (await ask(list, 'student')).json()).toEqual({ exercises: [] });
    expect((await ask(start, 'statistician', 'POST', { exercise: key })).status).toBe(409);
    const shared = await ask(
      change,
      'statistician',
      'PATCH',
      { exercise: key },
      { isShared: true },
    );
    expect(shared.status).toBe(200);
    const seen = await detail(key, 'student');
    expect(seen).toMatchObject({ counts: null, own: null, participants: [], isOpen: true });
    expect(seen.reference.stated.limit).toBe(0.058);
    expect((await ask(change, 'student', 'PATCH', { exercise: key }, { title: 'x' })).status).toBe(
      403,
    );
  });
});

describe('doing an exercise', () => {
  it('begins with a draft of one’s own, once', async () => {
    const key = await setExercise();
    const draft = await begin(key);
    expect(draft.createdBy).toBe(team.people.student.id);
    expect(draft.recipe).toEqual(recipe);
    expect((await ask(start, 'student', 'POST', { exercise: key })).status).toBe(409);
  });

  it('takes a run of the draft with what changed and how far the limit moved', async () => {
    const key = await setExercise();
    const draft = await begin(key);
    const run = await buildRun(draft.id, { ...recipe, ...NONE }, 0.028);
    expect((await detail(key, 'student')).ready.map(({ number }) => number)).toEqual([1]);
    const response = await handIn(key, run, 'student', 'They raise it.');
    expect(response.status).toBe(201);
    expect(submissionSchema.parse(await response.json())).toMatchObject({
      number: 1,
      differences: ['all detections set aside'],
      difference: '−3.0 points',
      remark: 'They raise it.',
    });
    expect((await detail(key, 'student')).ready).toEqual([]);
  });

  it('refuses the same run twice, and takes another one as a new submission', async () => {
    const key = await setExercise();
    const draft = await begin(key);
    const first = await buildRun(draft.id, { ...recipe, ...NONE }, 0.028);
    await handIn(key, first);
    expect((await handIn(key, first)).status).toBe(409);
    const second = await buildRun(
      draft.id,
      { ...recipe, ...NONE, prior: { law: 'jeffreys' } },
      0.02,
    );
    expect((await handIn(key, second)).status).toBe(201);
    const [participant] = (await detail(key, 'student')).participants;
    expect(participant.submissions.map(({ number }) => number)).toEqual([2, 1]);
    expect(participant.submissions[0].differences).toContain(
      'prior: Jeffreys for host fraction f, 0 to 1 instead of uniform in host fraction f, 0 to 1',
    );
  });

  it('refuses what may not be changed, in words, and runs that are not of the draft', async () => {
    const key = await setExercise();
    const draft = await begin(key);
    const other = await buildRun(draft.id, { ...recipe, credibleLevel: 0.9 }, 0.05);
    const refused = await handIn(key, other);
    expect(refused.status).toBe(422);
    expect(await refused.text()).toContain('level: 90');
    expect((await handIn(key, reference)).status).toBe(404);
    expect((await handIn(key, other, 'collaborator')).status).toBe(409);
  });

  it('ends with its last day, which may be moved', async () => {
    const key = await setExercise();
    const draft = await begin(key);
    const run = await buildRun(draft.id, { ...recipe, ...NONE }, 0.028);
    const until = (dueOn: string | null) =>
      ask(change, 'statistician', 'PATCH', { exercise: key }, { dueOn });
    await until('2020-02-01');
    const late = await handIn(key, run);
    expect(late.status).toBe(409);
    expect(await late.text()).toContain('due on 2020-02-01');
    expect((await ask(start, 'collaborator', 'POST', { exercise: key })).status).toBe(409);
    await until(new Date().toISOString().slice(0, 10));
    expect((await handIn(key, run)).status).toBe(201);
  });
});

describe('reading what was handed in', () => {
  async function twoStudents() {
    const key = await setExercise();
    for (const [as, limit] of [
      ['student', 0.028],
      ['student+student', 0.03],
    ] as const) {
      const draft = await begin(key, as);
      const run = await buildRun(draft.id, { ...recipe, ...NONE }, limit);
      await handIn(key, run, as, '=1+1');
    }
    return key;
  }

  it('shows a student their own submissions and nobody else’s', async () => {
    const key = await twoStudents();
    const own = await detail(key, 'student');
    expect(own.participants.map(({ person }) => person.id)).toEqual([team.people.student.id]);
    expect(own.counts).toBeNull();
    expect((await ask(table, 'student', 'GET', { exercise: key })).status).toBe(403);
  });

  it('shows whoever set it one table, also as CSV that no spreadsheet runs', async () => {
    const key = await twoStudents();
    const all = await detail(key, 'statistician');
    expect(all.counts).toEqual({ started: 2, submissions: 2 });
    expect(all.participants.map(({ state }) => state)).toEqual(['handed-in', 'handed-in']);
    const response = await ask(table, 'statistician', 'GET', { exercise: key });
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8');
    const rows = parse(await response.text(), { columns: true }) as Record<string, string>[];
    expect(rows).toHaveLength(2);
    expect(rows[0]).toMatchObject({ reference_limit: '0.058', remark: "'=1+1" });
    expect(rows.map(({ upper_limit }) => upper_limit).sort()).toEqual(['0.028', '0.03']);
  });

  it('lets whoever sets exercises comment, and the student read it', async () => {
    const key = await twoStudents();
    const [{ submissions }] = (await detail(key, 'student')).participants;
    const params = { exercise: key, submission: submissions[0].id };
    const words = { comment: 'Say what would happen with a log-uniform prior.' };
    expect((await ask(comment, 'student', 'PATCH', params, words)).status).toBe(403);
    expect((await ask(comment, 'statistician', 'PATCH', params, words)).status).toBe(200);
    const [after] = (await detail(key, 'student')).participants;
    expect(after.submissions[0]).toMatchObject({
      ...words,
      commentedBy: team.people.statistician.name,
    });
    const other = await setExercise();
    const elsewhere = { ...params, exercise: other };
    expect((await ask(comment, 'statistician', 'PATCH', elsewhere, words)).status).toBe(404);
  });
});
