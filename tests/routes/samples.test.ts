import { beforeAll, describe, expect, it } from 'vitest';
import { POST as preview } from '@/app/api/v1/collaborations/[collaboration]/samples/preview/route';
import {
  POST as create,
  GET as list,
} from '@/app/api/v1/collaborations/[collaboration]/samples/route';
import { PATCH as mark } from '@/app/api/v1/collaborations/[collaboration]/targets/[target]/route';
import { samplePreviewSchema, sampleSchema } from '@/lib/schemas/samples';
import { SampleRow, type SurveyRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';

const { query } = withDatabase();

type Member = 'statistician' | 'student' | 'owner';
let team: Awaited<ReturnType<typeof createCollaborationWith<Member>>>;
let headers: Record<Member, Record<string, string>>;
let survey: SurveyRow;
let second: SurveyRow;

beforeAll(async () => {
  team = await createCollaborationWith(['statistician', 'student', 'owner']);
  const of = async (member: Member) =>
    bearer(await tokenOf(team.people[member], team.collaboration));
  headers = {
    statistician: await of('statistician'),
    student: await of('student'),
    owner: await of('owner'),
  };
  const { id } = team.collaboration;
  survey = await buildSurvey(id, { name: 'Sandbar' });
  second = await buildSurvey(id, { name: 'Halyard' });
  const quiet = { curves: [] };
  await buildTarget(survey, {
    ...quiet,
    name: 'A',
    ageMyr: 12,
    ageLowerMyr: null,
    spectralType: 'A5V',
    distancePc: 20,
  });
  await buildTarget(survey, {
    ...quiet,
    name: 'G',
    ageMyr: 45,
    spectralType: 'G2',
    distancePc: 40,
  });
  await buildTarget(survey, {
    ...quiet,
    name: 'K',
    ageMyr: 45,
    spectralType: 'K7V',
    movingGroup: 'Halcyon',
  });
  await buildTarget(survey, {
    ...quiet,
    name: 'M',
    ageMyr: 45,
    spectralType: 'dM4',
    attributes: { multiplicity: 'binary' },
  });
  await buildTarget(survey, {
    ...quiet,
    name: 'N',
    ageMyr: null,
    ageLowerMyr: null,
    ageUpperMyr: null,
  });
  await buildTarget(second, {
    ...quiet,
    name: 'A',
    ageMyr: 300,
    ageLowerMyr: null,
    ageUpperMyr: null,
  });
  await buildTarget(second, {
    ...quiet,
    name: 'Host',
    ageMyr: 20,
    ageLowerMyr: null,
    ageUpperMyr: null,
    attributes: { selectedForCompanion: true },
  });
  await buildTarget(second, { ...quiet, name: 'Poor', leftOutReason: 'clouds' });
});

const at = (params: Record<string, string> = {}) => ({
  collaboration: team.collaboration.slug,
  ...params,
});

async function previewed(definition: Record<string, unknown>, rest: Record<string, unknown> = {}) {
  const response = await call(preview, {
    method: 'POST',
    params: at(),
    headers: headers.student,
    body: { definition, ...rest },
  });
  expect(response.status).toBe(200);
  return samplePreviewSchema.parse(await response.json());
}

async function save(as: Member, body: Record<string, unknown>) {
  return call(create, { method: 'POST', params: at(), headers: headers[as], body });
}

describe('POST …/samples/preview', () => {
  it('counts all stars, without those chosen for a companion or left out of their survey', async () => {
    const all = await previewed({});
    expect(all.stars).toEqual({ all: 7, selected: 5 });
    expect(all.entries).toEqual({ all: 8, selected: 6 });
    expect(all.leftOut).toEqual([
      { reason: 'chosen because a companion was known', entries: 1 },
      { reason: 'left out of its survey', entries: 1 },
    ]);
    expect(all.words).toBe('All stars; those chosen because a companion was known are left out');
    expect((await previewed({ knownCompanion: 'kept' })).stars.selected).toBe(6);
  });

  it.each([
    [{ spectralType: { from: 'G', to: 'K' } }, 2],
    [{ spectralType: { from: 'M', to: 'M' } }, 1],
    // The age of a star in two surveys is that of the survey listed first: A is 12 Myr old.
    [{ ageMyr: { max: 12 } }, 1],
    [{ ageMyr: { min: 45, max: 45 } }, 3],
    [{ ageMyr: { min: 45 }, unknown: 'kept' }, 4],
    [{ distancePc: { max: 25 } }, 4],
    [{ movingGroups: ['halcyon'] }, 1],
    [{ multiplicity: 'multiple' }, 1],
    [{ ageMyr: { max: 100 }, spectralType: { from: 'A', to: 'G' } }, 2],
  ])('selects by %j', async (definition, stars) => {
    expect((await previewed(definition)).stars.selected).toBe(stars);
  });

  it('selects by survey, and looks only at the surveys that are asked about', async () => {
    expect((await previewed({ surveyIds: [second.id] })).stars.selected).toBe(1);
    const alone = await previewed({ ageMyr: { max: 12 } }, { surveyIds: [second.id] });
    expect(alone.stars).toEqual({ all: 3, selected: 0 });
  });

  it('counts each star in one bin', async () => {
    const found = await previewed({ ageMyr: { max: 45 } });
    const sum = (counts: number[] = []) => counts.reduce((total, count) => total + count, 0);
    expect(sum(found.ageMyr?.all)).toBe(6);
    expect(sum(found.ageMyr?.selected)).toBe(4);
    expect(found.ageMyr?.unknown).toEqual({ all: 1, selected: 0 });
    expect(found.spectralTypes.find(({ type }) => type === 'K')).toEqual({
      type: 'K',
      all: 1,
      selected: 1,
    });
    expect(sum(found.spectralTypes.map(({ all }) => all))).toBe(7);
  });

  it.each([
    [{ ageMyr: {} }, 'ageMyr'],
    [{ ageMyr: { min: 50, max: 20 } }, 'ageMyr.max'],
    [{ spectralType: { from: 'K', to: 'A' } }, 'spectralType.to'],
    [{ colour: 'red' }, 'colour'],
  ])('refuses %j and names the field', async (definition, column) => {
    const response = await call(preview, {
      method: 'POST',
      params: at(),
      headers: headers.student,
      body: { definition },
    });
    expect([400, 422]).toContain(response.status);
    expect(JSON.stringify((await response.json()).errors)).toContain(column);
  });
});

describe('…/samples', () => {
  it('saves versions that do not change, and reads them back in words', async () => {
    const body = {
      name: 'Young',
      definition: { ageMyr: { max: 50 }, surveyIds: [survey.id, second.id] },
    };
    const first = sampleSchema.parse(await (await save('student', body)).json());
    expect(first).toMatchObject({ key: 'S-1', version: 1, isLatest: true });
    expect(first.words).toBe(
      'Stars that Sandbar or Halyard lists, aged at most 50 Myr; those chosen because a companion was known are left out',
    );
    const next = { ...body, versionOf: 1, definition: { ageMyr: { max: 30 } } };
    const later = sampleSchema.parse(await (await save('student', next)).json());
    expect(later).toMatchObject({ key: 'S-1', version: 2 });
    expect(later.digest).not.toBe(first.digest);
    const answer = await call(list, { params: at(), headers: headers.student });
    const { samples } = (await answer.json()) as { samples: { version: number }[] };
    expect(samples.map(({ version }) => version)).toEqual([2, 1]);
    await expect(SampleRow.update({ name: 'Old' }, { where: { id: first.id } })).rejects.toThrow(
      'rows of sample are not changed',
    );
  });

  it('lets a student save versions of their own samples only', async () => {
    const own = { name: 'Of the statistician', definition: {} };
    const made = sampleSchema.parse(await (await save('statistician', own)).json());
    const refused = await save('student', { ...own, versionOf: made.number });
    expect(refused.status).toBe(403);
    expect((await save('owner', { ...own, versionOf: made.number })).status).toBe(201);
  });

  it('does not find a survey of another collaboration', async () => {
    const other = await createCollaborationWith(['owner']);
    const foreign = await buildSurvey(other.collaboration.id);
    const body = { name: 'x', definition: { surveyIds: [foreign.id] } };
    expect((await save('owner', body)).status).toBe(404);
    await query('delete from rate_limit');
  });
});

describe('PATCH …/targets/[target]', () => {
  it('marks a target as chosen for a companion, and keeps its other facts', async () => {
    const target = await TargetRow.findOne({ where: { name: 'M' }, rejectOnEmpty: true });
    const ask = (body: Record<string, unknown>) =>
      call(mark, {
        method: 'PATCH',
        params: at({ target: target.id }),
        headers: headers.owner,
        body,
      });
    const marked = await (await ask({ selectedForCompanion: true })).json();
    expect(marked).toMatchObject({ selectedForCompanion: true, leftOutReason: null });
    expect((await target.reload()).attributes).toEqual({
      multiplicity: 'binary',
      selectedForCompanion: true,
    });
    expect((await previewed({})).stars.selected).toBe(4);
    expect((await ask({})).status).toBe(422);
    await ask({ selectedForCompanion: false });
    expect((await previewed({})).stars.selected).toBe(5);
  });
});
