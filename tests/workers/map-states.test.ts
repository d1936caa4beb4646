import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { listSurveyMaps, readMapStore, startMaps } from '@/lib/services/maps';
import { CompletenessMapRow, ContrastCurveRow, type SurveyRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith } from '../support/people';
import { buildCurve, buildSurvey, buildTarget, SMALL_GRID } from '../support/sample';
import { untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();

let actor: Actor;
let survey: SurveyRow;
let first: TargetRow;

/** Two stars with curves, one with neither curve nor map, one whose age is not known. */
beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  actor = await actorOf(people.owner, collaboration);
  await startWorker({ threads: 2 });
  survey = await buildSurvey(collaboration.id, { name: 'Sandbar' });
  first = await buildTarget(survey, { name: 'Star 1' });
  await buildTarget(survey, { name: 'Star 2', distancePc: 31 });
  await buildTarget(survey, { name: 'Star 3', curves: [] });
  const unknown = { ageMyr: null, ageLowerMyr: null, ageUpperMyr: null };
  await buildTarget(survey, { name: 'Star 4', ...unknown });
});
beforeEach(async () => {
  await untilEnded((await startMaps(actor, survey.slug)).id);
  await query('delete from rate_limit');
});
afterAll(killWorkers);

const states = async () => (await listSurveyMaps(actor, survey.slug)).maps;
const stateOf = async (name: string) => (await states()).find(({ target }) => target === name);
const standings = async () => (await states()).map(({ standing }) => standing);

describe('maps against what they should be now', () => {
  it('are current once they are computed; the rest says what it lacks', async () => {
    expect(await standings()).toEqual(['current', 'current', 'none', 'failed']);
    expect((await stateOf('Star 4'))?.words).toBe('No age: a contrast curve needs one');
  });

  it.each([
    ['age', { ageMyr: 47 }, 'its age was 45 (40 to 52) Myr and is 47 (40 to 52) Myr'],
    ['distance', { distancePc: 27 }, 'its distance was 25 ± 0.3 pc and is 27 ± 0.3 pc'],
    [
      'magnitude',
      { magnitudes: { H: { valueMag: 6.3, errorMag: null } } },
      'the magnitude of the star has changed',
    ],
  ])('names a changed %s', async (reason, change, words) => {
    await first.reload();
    await first.update(change);
    expect(await stateOf('Star 1')).toMatchObject({ standing: 'stale', reason, words });
    expect((await stateOf('Star 2'))?.standing).toBe('current');
    await first.update({
      ageMyr: 45,
      distancePc: 25,
      magnitudes: { H: { valueMag: 6.2, errorMag: null } },
    });
  });

  it('names a replaced curve', async () => {
    await ContrastCurveRow.update({ replacedAt: new Date() }, { where: { targetId: first.id } });
    await buildCurve(first, { contrastMag: [7, 9, 11, 13, 14, 14.5] });
    expect(await stateOf('Star 1')).toMatchObject({ standing: 'stale', reason: 'curve' });
  });

  it('names changed settings, for every map of the survey', async () => {
    const before = survey.mapSettings;
    await survey.update({
      mapSettings: mapSettingsSchema.parse({ ...SMALL_GRID, threshold: 'hard' }),
    });
    expect(await stateOf('Star 2')).toMatchObject({
      standing: 'stale',
      reason: 'settings',
      words: 'map settings have changed: threshold',
    });
    const store = await readMapStore(actor);
    expect(store.surveys[0]).toMatchObject({
      slug: 'sandbar',
      standings: { current: 0, stale: 2, missing: 0, failed: 1, uploaded: 0, none: 1 },
      reasons: [{ reason: 'settings', maps: 2 }],
    });
    const coarser = { ...SMALL_GRID, massMjup: { min: 1, max: 60, count: 5 } };
    await survey.update({ mapSettings: mapSettingsSchema.parse(coarser) });
    expect(await stateOf('Star 2')).toMatchObject({ reason: 'grid' });
    await survey.update({ mapSettings: before });
  });

  it('names an older engine', async () => {
    const target = await TargetRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const map = await CompletenessMapRow.findByPk(target.mapId as string, { rejectOnEmpty: true });
    const older = await CompletenessMapRow.create({
      ...map.get({ plain: true }),
      id: crypto.randomUUID(),
      digest: 'an older one',
      inputs: { ...map.inputs, engineVersion: '0' },
    });
    await target.update({ mapId: older.id });
    expect(await stateOf('Star 2')).toMatchObject({
      standing: 'stale',
      reason: 'engine',
      words: `the engine was version 0 and is ${map.engineVersion}`,
    });
  });

  it('are refreshed alone: what is current keeps its map', async () => {
    await first.reload();
    const other = await stateOf('Star 2');
    const before = first.mapId;
    await first.update({ ageMyr: 60, ageUpperMyr: 70 });
    expect(await standings()).toEqual(['stale', 'current', 'none', 'failed']);
    await untilEnded((await startMaps(actor, survey.slug)).id);
    expect(await standings()).toEqual(['current', 'current', 'none', 'failed']);
    expect((await stateOf('Star 2'))?.mapId).toBe(other?.mapId);
    expect((await first.reload()).mapId).not.toBe(before);
  });
});
