import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as startRun } from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/runs/route';
import { POST as adopt } from '@/app/api/v1/collaborations/[collaboration]/stars/[star]/adopt/route';
import { GET as getStar } from '@/app/api/v1/collaborations/[collaboration]/stars/[star]/route';
import { POST as split } from '@/app/api/v1/collaborations/[collaboration]/stars/[star]/split/route';
import { POST as confirm } from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/[pair]/confirm/route';
import { POST as refuse } from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/[pair]/refuse/route';
import { POST as undo } from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/[pair]/undo/route';
import {
  GET as listOverlaps,
  POST as propose,
} from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/route';
import { GET as listStars } from '@/app/api/v1/collaborations/[collaboration]/stars/route';
import { POST as previewAdoption } from '@/app/api/v1/collaborations/[collaboration]/value-tables/preview/route';
import {
  POST as adoptMany,
  GET as listTables,
} from '@/app/api/v1/collaborations/[collaboration]/value-tables/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { type Role, roleSchema } from '@/lib/schemas/common';
import {
  adoptionPreviewSchema,
  overlapsSchema,
  starListSchema,
  starPageSchema,
  valueTablesSchema,
} from '@/lib/schemas/stars';
import {
  type AnalysisRow,
  CompletenessMapRow,
  JobRow,
  type PopulationRow,
  StarRow,
  type SurveyRow,
  TargetRow,
} from '@/models';
import { withDatabase } from '../support/database';
import {
  actorOf,
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
} from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askToEnd } from '../support/study';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { bundleWorker, killWorkers, startWorker, until } from '../support/worker';

const { query } = withDatabase();
const roles = roleSchema.options;
let collaboration: TestCollaboration;
let people: Record<Role, TestPerson>;
let owner: Actor;
let headers: Record<string, string>;
let first: SurveyRow;
let second: SurveyRow;
let population: PopulationRow;
let both: AnalysisRow;

const motion = { refEpoch: 2016, pmRaMasYr: 300, pmDecMasYr: -200 };

beforeAll(async () => {
  await startWorker(await bundleWorker('route-stars'), { threads: 1 });
  ({ collaboration, people } = await createCollaborationWith(roles));
  owner = await actorOf(people.owner, collaboration);
  headers = bearer(await tokenOf(people.owner, collaboration));
  first = await buildSurvey(collaboration.id, { name: 'First', leadId: people.collaborator.id });
  second = await buildSurvey(collaboration.id, { name: 'Second' });
  for (let i = 1; i <= 3; i++) await buildTarget(first, { name: `Star ${i}` });
  // One star by its place: 300 mas/yr over 16 years, and 1.5 arcsec beside that.
  await buildTarget(first, {
    name: 'Alpha',
    raDeg: 80,
    decDeg: -60,
    spectralType: 'K4',
    attributes: motion,
  });
  await buildTarget(second, {
    name: 'Twin of Alpha',
    raDeg: 80 - (300 * 16) / 3.6e6 / Math.cos(Math.PI / 3),
    decDeg: -60 + (200 * 16 + 1500) / 3.6e6,
    distancePc: 25.5,
    spectralType: 'K5',
    curves: [{ contrastMag: [7.5, 10, 12, 13.5, 14.4, 14.6] }],
  });
  await buildTarget(second, { name: 'Star 2', ageMyr: 24, ageLowerMyr: 21, ageUpperMyr: 27 });
  for (const survey of [first, second]) await untilEnded(await askForMaps(survey));
  population = await buildPopulation(collaboration.id);
  both = await buildAnalysis(
    collaboration.id,
    recipeOf([first, second], population),
    owner.personId,
  );
});
afterAll(killWorkers);

const ask = (
  handler: RouteHandler,
  params: Record<string, string> = {},
  body?: unknown,
  by: Record<string, string> = headers,
) =>
  call(handler, {
    method: body === undefined ? 'GET' : 'POST',
    params: { collaboration: collaboration.slug, ...params },
    headers: by,
    body,
  });
const why = { why: 'Same place, same distance' };
const overlaps = async () => overlapsSchema.parse(await (await ask(listOverlaps)).json());
const runBoth = async () => {
  const { run, job } = await runToEnd(owner, `A-${both.number}`);
  expect(job.fault).toBeNull();
  return run;
};
const mapsAreReady = () =>
  until('no map job is open', async () => {
    const open = await JobRow.count({
      where: { kind: 'compute-maps', status: ['waiting', 'running'] },
    });
    return open === 0;
  });

const list = async (search: string) => {
  const response = await call(listStars, {
    params: { collaboration: collaboration.slug },
    headers,
    path: `/?${search}`,
  });
  return starListSchema.parse(await response.json());
};

describe('pairs that may be one star', () => {
  it('are proposed by place after proper motion, once, with their evidence', async () => {
    const response = await call(propose, {
      method: 'POST',
      params: { collaboration: collaboration.slug },
      headers,
    });
    expect(await response.json()).toEqual({ proposed: 1 });
    const { open, entries, stars } = await overlaps();
    expect([open.length, entries, stars]).toEqual([1, 6, 5]);
    const [{ evidence, stars: pair }] = open;
    expect(evidence.by).toBe('position');
    expect(evidence.separationArcsec).toBeCloseTo(1.5, 3);
    expect([evidence.epochYr, evidence.motions]).toEqual([2000, 1]);
    expect(evidence.distanceRatio).toBeCloseTo(25.5 / 25, 12);
    expect(pair.map(({ name }) => name).sort()).toEqual(['Alpha', 'Twin of Alpha']);
  });

  it('hold up a run of surveys that count both, and no other', async () => {
    const refused = await ask(startRun, { analysis: `A-${both.number}` }, {});
    const problem = await refused.json();
    expect([refused.status, problem.code]).toEqual([422, 'undecided-pair']);
    expect(JSON.stringify(problem)).toContain('Alpha and Twin of Alpha');
    const alone = await buildAnalysis(
      collaboration.id,
      recipeOf([first], population),
      owner.personId,
    );
    expect((await runToEnd(owner, `A-${alone.number}`)).job.status).toBe('done');
  });

  it('may be confirmed, kept apart and undone; each way back gives the same digests', async () => {
    const [{ id }] = (await overlaps()).open;
    const decided = await ask(refuse, { pair: id }, why);
    expect(overlapsSchema.parse(await decided.json()).open).toEqual([]);
    const apart = await runBoth();
    expect(apart.result?.stars).toBe(5);
    const recipe = recipeOf([second], population);
    const one = await buildAnalysis(collaboration.id, recipe, owner.personId);
    const { run: twin } = await runToEnd(owner, `A-${one.number}`);

    expect((await ask(undo, { pair: id }, why)).status).toBe(200);
    expect((await ask(startRun, { analysis: `A-${both.number}` }, {})).status).toBe(422);

    expect((await ask(confirm, { pair: id }, why)).status).toBe(200);
    const joined = await runBoth();
    expect(joined.result?.stars).toBe(4);
    expect(joined.result?.entries).toBe(6);
    const star = joined.inputs?.stars.find(({ surveys }) => surveys.length > 1);
    expect(star?.surveys).toEqual([first.id, second.id]);
    expect((await overlaps()).decided[0].state).toBe('confirmed');
    expect((await overlaps()).decided[0].stars.map(({ entries }) => entries.length)).toEqual([
      1, 1,
    ]);

    await ask(undo, { pair: id }, why);
    await ask(refuse, { pair: id }, why);
    const again = await runBoth();
    expect(again.inputs?.stars).toEqual(apart.inputs?.stars);
    expect(again.resultDigest).toBe(apart.resultDigest);
    await ask(undo, { pair: id }, why);
    await ask(confirm, { pair: id }, why);
    expect((await runBoth()).resultDigest).toBe(joined.resultDigest);
    await apart.reload();
    expect(apart.result?.stars).toBe(5);

    // The earlier run names a star that has no targets of its own any more.
    const asked = { kind: 'influence', groupBy: 'spectral-type' } as const;
    const { result } = await askToEnd(owner, twin, asked);
    expect(result.groups.map(({ name, stars }) => [name, stars])).toEqual([['K', 1]]);
  });

  it('are not proposed again once decided, and a decision without a reason is refused', async () => {
    await call(propose, { method: 'POST', params: { collaboration: collaboration.slug }, headers });
    const { open, decided } = await overlaps();
    expect([open.length, decided.length]).toEqual([0, 1]);
    expect((await ask(undo, { pair: decided[0].id }, {})).status).toBe(422);
    expect((await ask(undo, { pair: crypto.randomUUID() }, why)).status).toBe(404);
  });

  it('of one survey cannot become one star', async () => {
    const place = { raDeg: 200, decDeg: 10 };
    const one = await buildTarget(second, { ...place, name: 'Left', curves: [] });
    const other = await buildTarget(second, { ...place, name: 'Right', curves: [] });
    await call(propose, { method: 'POST', params: { collaboration: collaboration.slug }, headers });
    const [{ id }] = (await overlaps()).open;
    const refused = await ask(confirm, { pair: id }, why);
    expect(refused.status).toBe(409);
    const { detail } = await refused.json();
    expect(detail).toMatch(/^Second lists both (Left and Right|Right and Left),/);
    await ask(refuse, { pair: id }, why);
    await TargetRow.destroy({ where: { id: [one.id, other.id] } });
  });

  it('an entry found by its name is parted from its star, and joined again', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const entry = await TargetRow.findOne({
      where: { starId: star.id, surveyId: second.id },
      rejectOnEmpty: true,
    });
    const parted = await ask(split, { star: star.id }, { targetId: entry.id, why: 'Other star' });
    const page = starPageSchema.parse(await parted.json());
    expect(page.entries).toHaveLength(1);
    expect(page.matches[0].state).toBe('refused');
    await entry.reload();
    expect(entry.starId).not.toBe(star.id);
    const [{ id }] = page.matches;
    await ask(undo, { pair: id }, why);
    await ask(confirm, { pair: id }, why);
    await entry.reload();
    expect(entry.starId).toBe(star.id);
  });
});

describe('adopted ages', () => {
  const mapDigests = async () => {
    const targets = await TargetRow.findAll({ where: { name: 'Star 2' }, order: [['id', 'ASC']] });
    const maps = await CompletenessMapRow.findAll({ attributes: ['id', 'digest'] });
    const digestOf = new Map(maps.map(({ id, digest }) => [id, digest]));
    return targets.map(({ mapId }) => digestOf.get(mapId ?? ''));
  };
  const findStar2 = () => list('q=star2');

  it('make a numbered table, new maps and other conditions; taking them back gives the old maps', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const before = starPageSchema.parse(await (await ask(getStar, { star: star.id })).json());
    // 45 - 5 and 24 + 3 facing each other: 21 / hypot(5, 3) = 3.6, by hand.
    expect(before.conflicts.age).toBeCloseTo(21 / Math.hypot(5, 3), 10);
    expect(before.age?.source).toEqual({ kind: 'survey', words: 'First', table: null });
    expect((await findStar2()).counts.ageConflicts).toBe(1);
    const own = await mapDigests();
    const older = await runBoth();
    expect(older.inputs?.adopted).toBeUndefined();

    const entry = before.entries.find(({ survey }) => survey.name === 'Second');
    const choice = { kind: 'entry', targetId: entry?.targetId };
    const body = { quantity: 'age', choice, why: 'Lithium' };
    const adopted = starPageSchema.parse(await (await ask(adopt, { star: star.id }, body)).json());
    expect(adopted.age?.value.ageMyr).toBe(24);
    expect(adopted.age?.source.words).toBe('ages table 1, from Second');
    expect((await findStar2()).counts.ageConflicts).toBe(0);
    await mapsAreReady();
    const [one, two] = await mapDigests();
    // Curve, distance and host are alike in both surveys: with one age they share one map.
    expect(new Set(own).size).toBe(2);
    expect([one, own.includes(one)]).toEqual([two, true]);
    const newer = await runBoth();
    expect(newer.inputs?.adopted).toEqual([{ quantity: 'age', table: 1, stars: 1 }]);
    expect(newer.result?.statement.conditions.join('\n')).toContain('ages table 1');
    expect(newer.resultDigest).not.toBe(older.resultDigest);
    await older.reload();
    expect(older.inputs?.adopted).toBeUndefined();

    const none = { quantity: 'age', choice: { kind: 'none' }, why: 'Lithium was another star’s' };
    expect((await ask(adopt, { star: star.id }, none)).status).toBe(200);
    await mapsAreReady();
    expect(await mapDigests()).toEqual(own);
    const { tables } = valueTablesSchema.parse(await (await ask(listTables)).json());
    expect(tables.map(({ number, stars, why: reason }) => [number, stars, reason])).toEqual([
      [2, 0, none.why],
      [1, 1, 'Lithium'],
    ]);
    await expect(query(`update adopted_value set source = 'x'`)).rejects.toThrow('not changed');
  });

  it('may be tried first: the preview gives the limit of the run that follows, and stores nothing', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const value = { ageMyr: 300, ageLowerMyr: 250, ageUpperMyr: 350 };
    const choice = { kind: 'value', value, source: 'Gyrochronology, a later paper' };
    const other = await StarRow.findOne({ where: { name: 'Star 1' }, rejectOnEmpty: true });
    const choices = [
      { starId: star.id, choice },
      { starId: other.id, choice },
    ];
    const older = await runBoth();
    const asked = await ask(previewAdoption, {}, { quantity: 'age', choices });
    const preview = adoptionPreviewSchema.parse(await asked.json());
    expect(preview).toMatchObject({ lead: { key: `A-${both.number}` }, stars: 2, missing: null });
    // Maps of the run are stored in 16 bits: 1 in 65535 a node.
    expect(preview.before).toBeCloseTo(older.result?.answer.limit ?? 0, 4);
    expect(valueTablesSchema.parse(await (await ask(listTables)).json()).tables).toHaveLength(2);

    const many = { quantity: 'age', choices, why: 'Rotation' };
    const made = await ask(adoptMany, {}, many);
    expect(made.status).toBe(201);
    const [table] = valueTablesSchema.parse(await made.json()).tables;
    expect([table.number, table.stars, table.changes.length]).toEqual([3, 2, 2]);
    await mapsAreReady();
    const newer = await runBoth();
    expect(newer.inputs?.adopted).toEqual([{ quantity: 'age', table: 3, stars: 2 }]);
    expect(preview.after).toBeCloseTo(newer.result?.answer.limit ?? 0, 4);
    expect(Math.abs((preview.after ?? 0) - (preview.before ?? 0))).toBeGreaterThan(1e-3);

    const back = choices.map(({ starId }) => ({ starId, choice: { kind: 'none' } }));
    await ask(adoptMany, {}, { quantity: 'age', choices: back, why: 'To go on' });
    const twice = [choices[0], choices[0]];
    const refused = await ask(adoptMany, {}, { quantity: 'age', choices: twice, why: 'x' });
    expect(refused.status).toBe(422);
    await mapsAreReady();
  });

  it('refuse a value with its bounds in another order, and an entry of another star', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const value = { ageMyr: 30, ageLowerMyr: 40 };
    const wrong = { quantity: 'age', choice: { kind: 'value', value, source: 'x' }, why: 'y' };
    expect((await ask(adopt, { star: star.id }, wrong)).status).toBe(422);
    const foreign = await TargetRow.findOne({ where: { name: 'Star 1' }, rejectOnEmpty: true });
    const choice = { kind: 'entry', targetId: foreign.id };
    const other = await ask(adopt, { star: star.id }, { quantity: 'age', choice, why: 'y' });
    expect(other.status).toBe(404);
  });
});

describe('the list of stars', () => {
  it('counts each star once, filters by survey and overlap, and pages', async () => {
    const { counts, total, stars } = await list('limit=2&offset=1');
    expect([counts.stars, counts.entries, counts.shared, total]).toEqual([4, 6, 2, 4]);
    expect(stars.map(({ name }) => name)).toEqual(['Star 1', 'Star 2']);
    expect((await list('only=shared')).stars.map(({ name }) => name)).toEqual(['Alpha', 'Star 2']);
    expect((await list('survey=second')).total).toBe(2);
    const [alpha] = (await list('q=TWIN')).stars;
    expect([alpha.name, alpha.otherNames]).toEqual(['Alpha', ['Twin of Alpha']]);
    expect(alpha.probability).toBe(
      Math.max(...alpha.entries.map(({ probability }) => probability ?? 0)),
    );
    expect(alpha.probability).toBeGreaterThan(0);
  });

  it('of one star shows curves, and the analyses that count it with its share', async () => {
    const [{ id }] = (await list('q=alpha')).stars;
    const page = starPageSchema.parse(await (await ask(getStar, { star: id })).json());
    expect(page.curves.map(({ survey }) => survey).sort()).toEqual(['First', 'Second']);
    expect(page.combined).toMatchObject({ surveys: ['First', 'Second'], rule: 'same-position' });
    expect(page.analyses.map(({ key }) => key).slice(0, 2)).toEqual(['A-1', 'A-2']);
    for (const { share } of page.analyses) expect(share).toBeGreaterThan(0.1);
    expect((await ask(getStar, { star: crypto.randomUUID() })).status).toBe(404);
    expect((await ask(getStar, { star: 'nonsense' })).status).toBe(404);
  });
});

describe('who may', () => {
  it.each(roles)('decide and adopt as the permission table says: %s', async (role) => {
    const by = bearer(await tokenOf(people[role], collaboration));
    const absent = crypto.randomUUID();
    const combined = await ask(confirm, { pair: absent }, why, by);
    expect(combined.status).toBe(may({ roles: [role] }, 'combine') ? 404 : 403);
    expect((await ask(listOverlaps, {}, undefined, by)).status).toBe(200);
    const body = { quantity: 'distance', choice: { kind: 'none' }, why: 'To see' };
    // Star 1 is the collaborator's own, the extra star is nobody's.
    const led = await StarRow.findOne({ where: { name: 'Star 1' }, rejectOnEmpty: true });
    const isLead = role === 'collaborator';
    expect((await ask(adopt, { star: led.id }, body, by)).status).toBe(
      may({ roles: [role] }, 'adopt-values', { isLead }) ? 200 : 403,
    );
  });
});
