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
import { may } from '@/lib/access/permissions';
import { roleSchema } from '@/lib/schemas/common';
import { overlapsSchema, starPageSchema } from '@/lib/schemas/stars';
import { StarRow, TargetRow } from '@/models';
import { bearer, call, tokenOf } from '../support/people';
import { buildAnalysis, buildTarget, recipeOf } from '../support/sample';
import { askToEnd } from '../support/study';
import { buildTwoSurveys } from '../support/two-surveys';
import { runToEnd } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

type Lab = Awaited<ReturnType<typeof buildTwoSurveys>>;
let collaboration: Lab['collaboration'];
let people: Lab['people'];
let owner: Lab['owner'];
let headers: Lab['headers'];
let first: Lab['first'];
let second: Lab['second'];
let population: Lab['population'];
let both: Lab['both'];
let ask: Lab['ask'];
let runBoth: Lab['runBoth'];
let list: Lab['list'];

beforeAll(async () => {
  await startWorker({ threads: 1 });
  ({ collaboration, people, owner, headers, first, second, population, both, ask, runBoth, list } =
    await buildTwoSurveys());
});
afterAll(killWorkers);

const roles = roleSchema.options;
const why = { why: 'Same place, same distance' };
const overlaps = async () => overlapsSchema.parse(await (await ask(listOverlaps)).json());

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
