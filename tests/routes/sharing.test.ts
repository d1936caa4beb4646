import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as createAnalysis } from '@/app/api/v1/collaborations/[collaboration]/analyses/route';
import { POST as vet } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/verdicts/route';
import { GET as getMap } from '@/app/api/v1/collaborations/[collaboration]/maps/[map]/route';
import { GET as getOverview } from '@/app/api/v1/collaborations/[collaboration]/overview/route';
import { GET as getRun } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/route';
import { POST as accept } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/accept/route';
import { POST as refresh } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/refresh/route';
import { POST as withdraw } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/withdraw/route';
import {
  PATCH as changeSurvey,
  GET as getSurvey,
} from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/route';
import { POST as offer } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/shares/route';
import { GET as listTargets } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/targets/route';
import { GET as listSurveys } from '@/app/api/v1/collaborations/[collaboration]/surveys/route';
import { PATCH as markTarget } from '@/app/api/v1/collaborations/[collaboration]/targets/[target]/route';
import { POST as upload } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import { overviewSchema } from '@/lib/schemas/overview';
import { runSchema } from '@/lib/schemas/runs';
import { surveyListSchema, surveySchema, targetListSchema } from '@/lib/schemas/surveys';
import {
  CompanionRow,
  CompletenessMapRow,
  ContrastCurveRow,
  JobRow,
  ShareRow,
  StarRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { withDatabase } from '../support/database';
import { actorOf } from '../support/people';
import {
  buildAnalysis,
  buildCompanion,
  buildCurve,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { ask, buildSide, offerTo, post, type Side, sharesOf, terms } from '../support/sharing';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker, until } from '../support/worker';

const { query } = withDatabase();
let giver: Side;
let taker: Side;
let stranger: Side;
let source: SurveyRow;
let own: SurveyRow;

const surveyOf = async (side: Side, slug: string) =>
  surveySchema.parse(await (await ask(side, getSurvey, { survey: slug })).json());
async function acceptAt(side: Side, share: string): Promise<SurveyRow> {
  const response = await post(side, accept, { share });
  expect(response.status).toBe(200);
  return SurveyRow.findOne({ where: { shareId: share }, rejectOnEmpty: true });
}
const noOpenMaps = () =>
  until('no map job is open', async () => {
    const status = ['waiting', 'running'];
    return (await JobRow.count({ where: { kind: 'compute-maps', status } })) === 0;
  });

beforeAll(async () => {
  await startWorker({ threads: 1 });
  giver = await buildSide('Team Giver');
  taker = await buildSide('Team Taker');
  stranger = await buildSide('Team Stranger');
  source = await buildSurvey(giver.collaboration.id, {
    name: 'Given',
    leadId: giver.people.collaborator.id,
  });
  await buildTarget(source, { name: 'Star 1', attributes: { notes: 'our secret' } });
  const host = await buildTarget(source, {
    name: 'Star 2',
    ageMyr: 24,
    ageLowerMyr: 20,
    ageUpperMyr: 30,
  });
  await buildCompanion(host, { attributes: { separationArcsec: 1.5 } });
  await untilEnded(await askForMaps(source));
  // Something of the giver that is never offered.
  const hidden = await buildSurvey(giver.collaboration.id, { name: 'Hidden' });
  await buildTarget(hidden, { name: 'Hidden star' });
  own = await buildSurvey(taker.collaboration.id, { name: 'Own' });
  await buildTarget(own, { name: 'Star 2', distancePc: 26 });
  await untilEnded(await askForMaps(own));
});
afterAll(killWorkers);

describe('a whole survey', () => {
  let share: string;
  let copy: SurveyRow;
  let runId: string;

  it('comes with its curves and companions, and its maps are the same without computing', async () => {
    const maps = await CompletenessMapRow.count();
    share = (await offerTo(giver, 'given', taker)).id;
    copy = await acceptAt(taker, share);
    await noOpenMaps();
    const targets = await TargetRow.findAll({
      where: { surveyId: copy.id },
      order: [['name', 'ASC']],
    });
    const sources = await TargetRow.findAll({
      where: { surveyId: source.id },
      order: [['name', 'ASC']],
    });
    expect(targets.map(({ name, ageMyr, mapState }) => [name, ageMyr, mapState])).toEqual([
      ['Star 1', 45, 'ready'],
      ['Star 2', 24, 'ready'],
    ]);
    // Two rows more, and none of them computed anew.
    expect(await CompletenessMapRow.count()).toBe(maps + 2);
    const digest = async (rows: TargetRow[]) =>
      (await CompletenessMapRow.findAll({ where: { id: rows.map(({ mapId }) => mapId ?? '') } }))
        .map((map) => `${map.digest} ${map.checksum}`)
        .sort();
    expect(await digest(targets)).toEqual(await digest(sources));
    expect(await ContrastCurveRow.count({ where: { targetId: targets.map(({ id }) => id) } })).toBe(
      2,
    );
    // The star that the taker lists itself is one star here.
    const star = await StarRow.findOne({
      where: { collaborationId: taker.collaboration.id, name: 'Star 2' },
      rejectOnEmpty: true,
    });
    expect(await TargetRow.count({ where: { starId: star.id } })).toBe(2);
    const view = await surveyOf(taker, 'given');
    expect(view.shared).toMatchObject({ owner: 'Team Giver', hasNewer: false, isWithdrawn: false });
    expect(view.can).toEqual({ change: false, import: false, offer: false });
    expect(view.companions.confirmed).toBe(1);
    const names = await query<{ name: string }>(
      'select name from target where collaboration_id = $1',
      [taker.collaboration.id],
    );
    expect(names.map(({ name }) => name)).not.toContain('Hidden star');
  });

  it('is read only: every way to change it says whose it is', async () => {
    const [target] = await TargetRow.findAll({ where: { surveyId: copy.id } });
    const companion = await CompanionRow.findOne({
      where: { collaborationId: taker.collaboration.id },
      rejectOnEmpty: true,
    });
    const verdict = {
      status: 'background',
      reason: 'Moves with the background',
      isProposal: false,
    };
    const answers = await Promise.all([
      ask(taker, changeSurvey, { survey: 'given' }, { name: 'Mine' }, { method: 'PATCH' }),
      ask(taker, markTarget, { target: target.id }, { leftOutReason: 'x' }, { method: 'PATCH' }),
      ask(taker, vet, { candidate: companion.id }, verdict),
      ask(taker, upload, {}, {}, { path: '/?kind=targets&survey=given&name=more.csv' }),
      ask(taker, offer, { survey: 'given' }, { ...terms, code: stranger.code }),
    ]);
    for (const answer of answers) {
      expect(answer.status).toBe(409);
      expect((await answer.json()).detail).toMatch(/shared (by|with)/);
    }
  });

  it('counts in runs, which keep its attribution', async () => {
    const population = await buildPopulation(taker.collaboration.id);
    const { personId } = await actorOf(taker.people.owner, taker.collaboration);
    const recipe = recipeOf([own, copy], population);
    const analysis = await buildAnalysis(taker.collaboration.id, recipe, personId);
    const actor = await actorOf(taker.people.owner, taker.collaboration);
    const { run, job } = await runToEnd(actor, `A-${analysis.number}`);
    expect(job.fault).toBeNull();
    runId = run.id;
    expect([run.result?.stars, run.result?.entries]).toEqual([2, 3]);
    const { version } = (await surveyOf(taker, 'given')).shared as { version: string };
    expect(run.inputs?.shared).toEqual([
      {
        surveyId: copy.id,
        survey: 'Given',
        owner: 'Team Giver',
        scope: 'whole',
        attribution: terms.attribution,
        version,
      },
    ]);
    expect(run.result?.statement.conditions.join('\n')).toContain(
      `Shared: Given by Team Giver, version ${version.slice(0, 8)}: ${terms.attribution}`,
    );
  });

  it('is brought to a newer version on request, and not before', async () => {
    const [changed] = await TargetRow.findAll({ where: { surveyId: source.id, name: 'Star 1' } });
    await changed.update({ ageMyr: 50, leftOutReason: 'a binary' });
    const added = await buildTarget(source, { name: 'Star 3', curves: [] });
    await buildCurve(added);
    await untilEnded(await askForMaps(source));
    expect((await surveyOf(taker, 'given')).shared?.hasNewer).toBe(true);
    const rows = () =>
      TargetRow.findAll({ where: { surveyId: copy.id }, order: [['name', 'ASC']] });
    expect((await rows()).map(({ ageMyr }) => ageMyr)).toEqual([45, 24]);
    const ids = (await rows()).map(({ id }) => id);
    expect((await post(taker, refresh, { share })).status).toBe(200);
    await noOpenMaps();
    const after = await rows();
    expect(after.map(({ name, ageMyr, mapState }) => [name, ageMyr, mapState])).toEqual([
      ['Star 1', 50, 'ready'],
      ['Star 2', 24, 'ready'],
      ['Star 3', 45, 'ready'],
    ]);
    expect(after.slice(0, 2).map(({ id }) => id)).toEqual(ids);
    expect(after[0].leftOutReason).toBe('a binary');
    expect((await surveyOf(taker, 'given')).shared?.hasNewer).toBe(false);
    // What the owner no longer lists stays as a row of earlier runs and counts no more.
    await added.destroy();
    await post(taker, refresh, { share });
    expect((await rows())[2].leftOutReason).toBe('no longer in the survey that is shared');
  });

  it('may be withdrawn from a day ahead: until then it is used, and everybody is told', async () => {
    const from = new Date(Date.now() + 20 * 86_400_000).toISOString().slice(0, 10);
    const body = { why: 'New reduction', from };
    expect((await ask(giver, withdraw, { share }, { ...body, from: '2026-01-01' })).status).toBe(
      409,
    );
    expect((await ask(giver, withdraw, { share }, body)).status).toBe(200);
    const [received] = (await sharesOf(taker)).shares.filter(({ id }) => id === share);
    expect([received.state, received.withdrawnWhy]).toEqual(['ending', body.why]);
    const { waiting } = overviewSchema.parse(await (await ask(taker, getOverview)).json());
    expect(waiting.map(({ fact }) => fact)).toContain(`Team Giver takes Given back on ${from}`);
    const view = await surveyOf(taker, 'given');
    expect([view.isArchived, view.shared?.isWithdrawn]).toEqual([false, false]);
    const actor = await actorOf(taker.people.owner, taker.collaboration);
    expect((await runToEnd(actor, 'A-1')).job.status).toBe('done');
  });

  it('after that nothing new may use it; runs stand with their attribution and are marked', async () => {
    expect((await ask(giver, withdraw, { share }, { why: 'An error' })).status).toBe(200);
    const actor = await actorOf(taker.people.owner, taker.collaboration);
    await expect(runToEnd(actor, 'A-1')).rejects.toThrow(
      /Team Giver took Given back on .*An error/,
    );
    const { recipe } = runSchema.parse(await (await ask(taker, getRun, { run: runId })).json());
    const made = await ask(taker, createAnalysis, {}, { name: 'Another', recipe });
    expect([made.status, (await made.json()).code]).toEqual([422, 'survey-withdrawn']);
    expect((await post(taker, refresh, { share })).status).toBe(409);

    const run = runSchema.parse(await (await ask(taker, getRun, { run: runId })).json());
    expect(run.result?.stars).toBe(2);
    expect(run.inputs?.shared?.[0].attribution).toBe(terms.attribution);
    expect(run.withdrawn).toMatchObject([
      { survey: 'Given', owner: 'Team Giver', why: 'An error' },
    ]);

    const list = surveyListSchema.parse(await (await ask(taker, listSurveys)).json());
    expect(list.surveys.map(({ slug, isArchived }) => [slug, isArchived])).toEqual([
      ['own', false],
      ['given', true],
    ]);
    expect([list.stars, list.entries]).toEqual([1, 1]);
    const { targets } = targetListSchema.parse(
      await (await ask(taker, listTargets, { survey: 'given' })).json(),
    );
    expect(targets.flatMap(({ curves }) => curves)).toEqual([]);
    const log = await query<{ collaboration_id: string; summary: string }>(
      `select collaboration_id, summary from audit_entry where item_kind = 'share' and item_id = $1
       order by id`,
      [share],
    );
    const at = (side: Side) =>
      log.filter((one) => one.collaboration_id === side.collaboration.id).map((one) => one.summary);
    expect(at(giver)[1]).toBe('of Team Taker accepted Given, whole, shared by Team Giver');
    expect(at(taker).at(-1)).toBe('of Team Giver withdrew Given: An error');
    expect(at(stranger)).toEqual([]);
  });
});

describe('maps only', () => {
  it('come without curves, ages, magnitudes, notes, epochs or what a map was made from', async () => {
    const share = (await offerTo(giver, 'given', stranger, { scope: 'maps', note: '' })).id;
    const copy = await acceptAt(stranger, share);
    await noOpenMaps();
    const rows = await TargetRow.findAll({
      where: { surveyId: copy.id },
      order: [['name', 'ASC']],
    });
    for (const row of rows) {
      const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = row;
      expect([ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr]).toEqual(Array(5).fill(null));
      expect([row.magnitudes, row.attributes, row.mapState]).toEqual([{}, {}, 'ready']);
      const response = await ask(stranger, getMap, { map: row.mapId ?? '' });
      const map = await response.json();
      expect(map.inputs).toEqual({ kind: 'shared' });
      const before = await TargetRow.findOne({
        where: { surveyId: source.id, name: row.name },
        rejectOnEmpty: true,
      });
      const original = await CompletenessMapRow.findByPk(before.mapId ?? '', {
        rejectOnEmpty: true,
      });
      expect(map.checksum).toBe(original.checksum);
      expect(map.digest).not.toBe(original.digest);
      // The owner's own rows are as foreign as ever.
      expect((await ask(stranger, getMap, { map: original.id })).status).toBe(404);
    }
    expect(
      await ContrastCurveRow.count({ where: { collaborationId: stranger.collaboration.id } }),
    ).toBe(0);
    const [companion] = await CompanionRow.findAll({
      where: { collaborationId: stranger.collaboration.id },
    });
    expect([companion.status, companion.massMjup, companion.attributes]).toEqual([
      'confirmed',
      12,
      {},
    ]);
    expect((await ShareRow.findByPk(share))?.scope).toBe('maps');

    const population = await buildPopulation(stranger.collaboration.id);
    const actor = await actorOf(stranger.people.owner, stranger.collaboration);
    const analysis = await buildAnalysis(
      stranger.collaboration.id,
      recipeOf([copy], population),
      actor.personId,
    );
    const { run, job } = await runToEnd(actor, `A-${analysis.number}`);
    expect(job.fault).toBeNull();
    expect(run.result?.counted).toHaveLength(1);
    expect(run.result?.statement.conditions.join('\n')).toContain('its maps only, version');
  });
});

describe('when the owner is no more', () => {
  it('the copies stay with their names and attribution, and cannot be refreshed', async () => {
    const { id } = await offerTo(giver, 'given', taker);
    await acceptAt(taker, id);
    await noOpenMaps();
    await query('delete from collaboration where id = $1', [giver.collaboration.id]);
    const { shared, targets } = await surveyOf(taker, 'given-shared-2');
    expect(targets).toBe(2);
    expect(shared).toMatchObject({ owner: 'Team Giver', hasNewer: false, isWithdrawn: false });
    expect(shared?.attribution).toBe(terms.attribution);
    expect((await post(taker, refresh, { share: id })).status).toBe(409);
    await query('delete from collaboration where id = $1', [stranger.collaboration.id]);
    expect(await ShareRow.count({ where: { receiverId: stranger.collaboration.id } })).toBe(0);
  });
});
