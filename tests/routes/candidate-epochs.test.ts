import { describe, expect, it } from 'vitest';
import { DELETE as removeObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/[observation]/route';
import { POST as addObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/route';
import { adoptValue } from '@/lib/services/star-values';
import { AuditEntryRow } from '@/models';
import { epochOf, openCandidates } from '../support/candidates';
import { withDatabase } from '../support/database';
import { actorOf, call } from '../support/people';
import { buildCompanion, buildSurvey, buildTarget } from '../support/sample';

const { query } = withDatabase();
const { collaboration, people, survey, target, owner, candidate, paramsOf, post, detailOf, read } =
  await openCandidates();

/** Astropy 5.2.1: a source at infinity beside the star of the first sample, by day. */
const BACKGROUND = [
  ['2015-08-15', 0.842, 37.3],
  ['2019-04-20', 0.910388, 10.78535],
] as const;

describe('epochs of a candidate', () => {
  it('are tested against both hypotheses once there are two', async () => {
    const row = await candidate();
    const [first, second] = BACKGROUND;
    const one = await detailOf(await post(addObservation, row, epochOf(...first)));
    expect(one.hypotheses).toBeNull();
    const two = await detailOf(await post(addObservation, row, epochOf(...second)));
    expect(two.seen.map(({ observedOn, by }) => [observedOn, by])).toEqual([
      ['2015-08-15', people.owner.name],
      ['2019-04-20', people.owner.name],
    ]);
    expect(two.hypotheses?.observationIds).toEqual(two.seen.map(({ id }) => id));
    expect(two.hypotheses?.background.probability).toBeGreaterThan(0.5);
    expect(two.hypotheses?.commonProperMotion.probability).toBeLessThan(1e-9);
    expect(two.axis?.projectedSeparationAu).toBeCloseTo((0.910388 * 1000) / 21.5, 6);
  });

  it('of two surveys stand together, and the adopted distance of the star counts', async () => {
    const row = await candidate({ name: 'shared' });
    const elsewhere = await buildSurvey(collaboration.id, { name: 'Elsewhere' });
    const twin = await buildTarget(elsewhere, { name: 'Host', curves: [] });
    const same = await buildCompanion(twin, { name: 'Shared', status: 'candidate' });
    const [first, second] = BACKGROUND;
    await post(addObservation, row, epochOf(...first));
    await post(addObservation, same, epochOf(...second));
    const { starId } = target;
    const before = await read(row);
    expect(before.seen.map(({ survey: name }) => name)).toEqual([undefined, 'Elsewhere']);
    expect(before.hypotheses?.background.probability).toBeGreaterThan(0.5);
    expect(before.target.adopted).toEqual([]);
    const choice = {
      kind: 'value' as const,
      value: {
        distancePc: 50,
        distanceErrorPc: 1,
        parallaxMas: null,
        parallaxErrorMas: null,
      },
      source: 'A catalogue',
    };
    const actor = await actorOf(people.owner, collaboration);
    await adoptValue(actor, starId, { quantity: 'distance', choice, why: 'Newer' });
    const after = await read(row);
    expect(after.target).toMatchObject({ distancePc: 50 });
    expect(after.target.adopted).toEqual(['distance of distances table 1, A catalogue']);
    // Separation times distance, by hand: 0.842 arcsec at 50 pc.
    expect(after.axis?.projectedSeparationAu).toBeCloseTo(0.842 * 50, 6);
    await target.reload();
    expect(target.parallaxMas).toBe(21.5);
    await adoptValue(actor, starId, {
      quantity: 'distance',
      choice: { kind: 'none' },
      why: 'To go on',
    });
    await query('delete from survey where id = $1', [elsewhere.id]);
    await target.update({ mapState: 'none' });
    await query('delete from job');
  });

  it('say what is missing where the star has no proper motion', async () => {
    const bare = await buildTarget(survey, { name: 'Bare', raDeg: 10, decDeg: 5 });
    const row = await buildCompanion(bare, { status: 'candidate' });
    const detail = await read(row);
    expect(detail.motion).toBeNull();
    expect(detail.motionMissing).toContain('no proper motion of Bare');
    expect(detail.axisMissing).toBe('There is no epoch yet');
  });

  it('are refused twice for one day and band, and out of their ranges', async () => {
    const row = await candidate();
    const body = epochOf('2016-01-01', 0.8, 30);
    await detailOf(await post(addObservation, row, body));
    const again = await post(addObservation, row, body);
    expect(again.status).toBe(409);
    expect((await again.json()).detail).toContain('epoch of 2016-01-01 without a band');
    await detailOf(await post(addObservation, row, { ...body, band: 'H' }));
    for (const wrong of [
      { positionAngleDeg: 360 },
      { separationErrorArcsec: 0 },
      { observedOn: '1890-05-01' },
      { observedOn: '2016-02-30' },
      { contrastMag: -1 },
    ]) {
      expect((await post(addObservation, row, { ...body, ...wrong })).status).toBe(422);
    }
  });

  it('go by their own verb, and the log keeps what they said', async () => {
    const row = await candidate();
    const added = await detailOf(await post(addObservation, row, epochOf('2016-01-01', 0.8, 30)));
    const params = paramsOf(row, { observation: added.seen[0].id });
    const ask = () => call(removeObservation, { method: 'DELETE', headers: owner, params });
    expect((await ask()).status).toBe(204);
    expect((await ask()).status).toBe(404);
    expect((await read(row)).seen).toEqual([]);
    const entry = await AuditEntryRow.findOne({
      where: { itemId: row.id, summary: `deleted the epoch 2016-01-01 of Host ${row.name}` },
      rejectOnEmpty: true,
    });
    expect(entry.details).toMatchObject({ separationArcsec: 0.8 });
  });
});
