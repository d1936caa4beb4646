import { beforeAll, describe, expect, it } from 'vitest';
import { DELETE as removeObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/[observation]/route';
import { POST as addObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/route';
import { GET as getCandidate } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/route';
import { POST as giveVerdict } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/verdicts/route';
import { type CandidateDetail, candidateDetailSchema } from '@/lib/schemas/candidates';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { builtInMagnitude } from '@/lib/sensitivity';
import { adoptValue } from '@/lib/services/star-values';
import {
  AuditEntryRow,
  type CompanionRow,
  CompanionVerdictRow,
  JobRow,
  type SurveyRow,
  type TargetRow,
} from '@/models';
import { withDatabase } from '../support/database';
import {
  actorOf,
  addMember,
  bearer,
  call,
  createCollaborationWith,
  createPerson,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
} from '../support/people';
import { buildCompanion, buildSurvey, buildTarget, SMALL_GRID } from '../support/sample';

const { query } = withDatabase();
let collaboration: TestCollaboration;
let people: Record<Role, TestPerson>;
let lead: TestPerson;
let survey: SurveyRow;
let target: TargetRow;
let owner: Record<string, string>;

const MOTION = { pmRaMasYr: 85.2, pmDecMasYr: -61.7 };
/** Astropy 5.2.1: a source at infinity beside the star of the first sample, by day. */
const BACKGROUND = [
  ['2015-08-15', 0.842, 37.3],
  ['2019-04-20', 0.910388, 10.78535],
] as const;

beforeAll(async () => {
  ({ collaboration, people } = await createCollaborationWith(roleSchema.options));
  lead = await createPerson();
  await addMember(collaboration, lead, ['collaborator']);
  survey = await buildSurvey(collaboration.id, {
    leadId: lead.id,
    mapSettings: { ...SMALL_GRID, candidates: 'cut' },
  });
  target = await buildTarget(survey, {
    name: 'Host',
    raDeg: 309.35,
    decDeg: -8.3,
    distancePc: null,
    distanceErrorPc: null,
    parallaxMas: 21.5,
    parallaxErrorMas: 0.05,
    attributes: MOTION,
  });
  owner = bearer(await tokenOf(people.owner, collaboration));
});

let made = 0;
const candidate = (given: Partial<CompanionRow['dataValues']> = {}) =>
  buildCompanion(target, {
    name: `cc${++made}`,
    status: 'candidate',
    massMjup: null,
    semiMajorAxisAu: null,
    ...given,
  });

const paramsOf = (row: CompanionRow, more: Record<string, string> = {}) => ({
  collaboration: collaboration.slug,
  candidate: row.id,
  ...more,
});

const epochOf = (observedOn: string, separationArcsec: number, positionAngleDeg: number) => ({
  observedOn,
  separationArcsec,
  separationErrorArcsec: 0.004,
  positionAngleDeg,
  positionAngleErrorDeg: 0.3,
});

async function post(
  handler: typeof giveVerdict,
  row: CompanionRow,
  body: unknown,
  headers = owner,
): Promise<Response> {
  return call(handler, { method: 'POST', headers, params: paramsOf(row), body });
}

async function detailOf(response: Response, status = 201): Promise<CandidateDetail> {
  const body = await response.json();
  expect([response.status, body.detail]).toEqual([status, undefined]);
  return candidateDetailSchema.parse(body);
}

const read = async (row: CompanionRow) =>
  detailOf(await call(getCandidate, { headers: owner, params: paramsOf(row) }), 200);

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

describe('verdicts', () => {
  it('keep every decision, and the newest is what the candidate is', async () => {
    const row = await candidate();
    await detailOf(
      await post(giveVerdict, row, { status: 'background', reason: 'moves with the field' }),
    );
    const now = await detailOf(
      await post(giveVerdict, row, {
        status: 'confirmed',
        mass: { from: 'given', value: 8, errorLower: 1, errorUpper: 2 },
        semiMajorAxis: { from: 'given', value: 60, errorLower: 10, errorUpper: 20 },
        reason: 'a third epoch moves with the star',
      }),
    );
    expect(now).toMatchObject({
      status: 'confirmed',
      probability: 1,
      massMjup: 8,
      massErrorsMjup: [1, 2],
      semiMajorAxisAu: 60,
      isOpen: false,
    });
    expect(
      now.history.map(({ number, status, probability, massFrom, by, reason }) => ({
        number,
        status,
        probability,
        massFrom,
        by,
        reason,
      })),
    ).toEqual([
      {
        number: 1,
        status: 'background',
        probability: 0,
        massFrom: null,
        by: people.owner.name,
        reason: 'moves with the field',
      },
      {
        number: 2,
        status: 'confirmed',
        probability: 1,
        massFrom: 'given',
        by: people.owner.name,
        reason: 'a third epoch moves with the star',
      },
    ]);
    await expect(
      query(`update companion_verdict set reason = 'else' where companion_id = $1`, [row.id]),
    ).rejects.toThrow('rows of companion_verdict are not changed');
  });

  it('take the mass from photometry and the axis from the separation where asked', async () => {
    const row = await candidate();
    const modulus = 5 * Math.log10(1000 / 21.5) - 5;
    const contrastMag = builtInMagnitude(9, 45, 'H') + modulus - 6.2;
    const epoch = epochOf('2018-01-01', 1.1, 80);
    const photometry = { band: 'H', contrastMag, contrastErrorMag: 0.1 };
    const seen = await detailOf(await post(addObservation, row, { ...epoch, ...photometry }));
    expect(seen.mass?.solutionsMjup).toHaveLength(1);
    expect(seen.mass?.solutionsMjup[0]).toBeCloseTo(9, 3);
    const verdict = { status: 'confirmed', reason: 'one band', mass: { from: 'photometry' } };
    const noAxis = await post(giveVerdict, row, verdict);
    expect(noAxis.status).toBe(422);
    expect((await noAxis.json()).detail).toContain('no semi-major axis');
    const decided = await detailOf(
      await post(giveVerdict, row, { ...verdict, semiMajorAxis: { from: 'separation' } }),
    );
    expect(decided.massMjup).toBe(seen.mass?.interval?.median);
    expect(decided.semiMajorAxisAu).toBe(seen.axis?.median);
    expect(decided.history[0]).toMatchObject({
      massFrom: 'photometry',
      semiMajorAxisFrom: 'separation',
    });
    const kept = await detailOf(
      await post(giveVerdict, row, {
        status: 'ambiguous',
        probability: 0.4,
        reason: 'on reflection',
      }),
    );
    expect(kept).toMatchObject({ massMjup: decided.massMjup, probability: 0.4, isOpen: true });
    expect(kept.history[1].massFrom).toBe('photometry');
  });

  it('refuse a mass from photometry that nobody measured', async () => {
    const row = await candidate();
    const body = { status: 'candidate', reason: 'x', mass: { from: 'photometry' } };
    const response = await post(giveVerdict, row, body);
    expect(response.status).toBe(422);
    expect((await response.json()).detail).toContain('No epoch has a contrast with its band');
    expect(await CompanionVerdictRow.count({ where: { companionId: row.id } })).toBe(0);
  });

  it('need a reason', async () => {
    const row = await candidate();
    const response = await post(giveVerdict, row, { status: 'background', reason: '  ' });
    expect(response.status).toBe(422);
  });

  it('renew the map of the star where candidates cut the curves', async () => {
    await JobRow.destroy({ where: { surveyId: survey.id } });
    await target.update({ mapState: 'ready' });
    const row = await candidate({ massMjup: 5, semiMajorAxisAu: 40 });
    await detailOf(await post(giveVerdict, row, { status: 'ambiguous', reason: 'still open' }));
    expect((await target.reload()).mapState).toBe('ready');
    await detailOf(await post(giveVerdict, row, { status: 'background', reason: 'reddened star' }));
    expect((await target.reload()).mapState).toBe('waiting');
    const [job] = await JobRow.findAll({ where: { surveyId: survey.id } });
    expect(job.payload).toEqual({ surveyId: survey.id, targetIds: [target.id] });
  });

  it('of others than lead and owner are proposals, which change nothing', async () => {
    const row = await candidate();
    const body = { status: 'background', reason: 'looks like a galaxy' };
    for (const role of ['student', 'collaborator', 'statistician', 'author'] as const) {
      const headers = bearer(await tokenOf(people[role], collaboration));
      const refused = await post(giveVerdict, row, body, headers);
      expect(refused.status).toBe(403);
      expect((await refused.json()).detail).toContain('Send your verdict as a proposal');
      expect((await post(addObservation, row, epochOf('2016-01-01', 1, 1), headers)).status).toBe(
        403,
      );
    }
    const student = bearer(await tokenOf(people.student, collaboration));
    const proposed = await detailOf(
      await post(giveVerdict, row, { ...body, isProposal: true }, student),
    );
    expect(proposed).toMatchObject({ status: 'candidate', isOpen: true, proposals: 1 });
    expect(proposed.can).toEqual({ vet: false, propose: true });
    const byLead = bearer(await tokenOf(lead, collaboration));
    const decided = await detailOf(await post(giveVerdict, row, body, byLead));
    expect(decided).toMatchObject({ status: 'background', proposals: 0 });
    expect(decided.history.map(({ isProposal, by }) => [isProposal, by])).toEqual([
      [true, people.student.name],
      [false, lead.name],
    ]);
  });
});
