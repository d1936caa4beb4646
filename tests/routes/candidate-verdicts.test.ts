import { describe, expect, it } from 'vitest';
import { POST as addObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/route';
import { POST as giveVerdict } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/verdicts/route';
import { builtInMagnitude } from '@/lib/sensitivity';
import { CompanionVerdictRow, JobRow } from '@/models';
import { epochOf, openCandidates } from '../support/candidates';
import { withDatabase } from '../support/database';
import { bearer, tokenOf } from '../support/people';

const { query } = withDatabase();
const { collaboration, people, lead, survey, target, candidate, post, detailOf } =
  await openCandidates();

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
