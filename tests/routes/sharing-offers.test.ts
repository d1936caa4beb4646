import { beforeAll, describe, expect, it } from 'vitest';
import { GET as getOverview } from '@/app/api/v1/collaborations/[collaboration]/overview/route';
import { POST as accept } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/accept/route';
import { POST as refresh } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/refresh/route';
import { POST as refuse } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/refuse/route';
import { POST as withdraw } from '@/app/api/v1/collaborations/[collaboration]/shares/[share]/withdraw/route';
import { POST as offer } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/shares/route';
import { may } from '@/lib/access/permissions';
import { roleSchema } from '@/lib/schemas/common';
import { overviewSchema } from '@/lib/schemas/overview';
import { shareSchema } from '@/lib/schemas/sharing';
import { SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, tokenOf } from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';
import { ask, buildSide, offerTo, post, type Side, sharesOf, terms } from '../support/sharing';

const { query } = withDatabase();
const roles = roleSchema.options;
let giver: Side;
let taker: Side;
let stranger: Side;

beforeAll(async () => {
  giver = await buildSide('Team Giver');
  taker = await buildSide('Team Taker');
  stranger = await buildSide('Team Stranger');
  const source = await buildSurvey(giver.collaboration.id, {
    name: 'Given',
    leadId: giver.people.collaborator.id,
  });
  await buildTarget(source, { name: 'Star 1' });
  await buildTarget(source, { name: 'Star 2' });
});

describe('an offer', () => {
  it('needs the right code, and leaves nothing when it is refused, taken back or expired', async () => {
    const wrong = { ...terms, code: '0123456789ab' };
    expect((await ask(giver, offer, { survey: 'given' }, wrong)).status).toBe(404);
    const self = { ...terms, code: giver.code };
    expect((await ask(giver, offer, { survey: 'given' }, self)).status).toBe(409);
    const before = await query('select count(*) from survey');

    const one = await offerTo(giver, 'given', taker);
    const again = await ask(giver, offer, { survey: 'given' }, { ...terms, code: taker.code });
    expect(again.status).toBe(409);
    const [seen] = (await sharesOf(taker)).shares;
    expect(seen).toMatchObject({
      direction: 'received',
      other: 'Team Giver',
      survey: { name: 'Given', slug: null },
      holds: { targets: 2, maps: 0, curves: 2 },
      offeredBy: giver.people.owner.name,
      state: 'offered',
      ...terms,
    });
    expect((await ask(taker, refuse, { share: one.id }, { why: 'Not now' })).status).toBe(200);
    expect((await post(taker, accept, { share: one.id })).status).toBe(409);

    const two = await offerTo(giver, 'given', taker);
    await ask(giver, withdraw, { share: two.id }, { why: 'A mistake' });
    expect((await post(taker, accept, { share: two.id })).status).toBe(409);

    const three = await offerTo(giver, 'given', taker);
    await query(`update share set expires_at = now() - interval '1 day' where id = $1`, [three.id]);
    expect((await post(taker, accept, { share: three.id })).status).toBe(409);
    const states = (await sharesOf(giver)).shares.map(({ state }) => state);
    expect(states.sort()).toEqual(['expired', 'refused', 'taken-back']);
    expect(await query('select count(*) from survey')).toEqual(before);
    const waiting = overviewSchema.parse(await (await ask(taker, getOverview)).json()).waiting;
    expect(waiting.filter(({ fact }) => fact.includes('Given'))).toEqual([]);
  });

  it('is nobody else’s to see, to accept or to withdraw', async () => {
    const share = (await offerTo(giver, 'given', taker)).id;
    expect((await sharesOf(stranger)).shares).toEqual([]);
    for (const handler of [accept, refresh]) {
      expect((await post(stranger, handler, { share })).status).toBe(404);
      expect((await post(giver, handler, { share })).status).toBe(404);
    }
    const why = { why: 'To see' };
    expect((await ask(stranger, refuse, { share }, why)).status).toBe(404);
    for (const side of [taker, stranger]) {
      expect((await ask(side, withdraw, { share }, why)).status).toBe(404);
    }
    expect((await post(taker, accept, { share: 'nonsense' })).status).toBe(404);
    // Before the answer the receiver has no row of it.
    expect(await SurveyRow.count({ where: { shareId: share } })).toBe(0);
    await ask(giver, withdraw, { share }, why);
  });

  it.each(roles)('is made and answered as the permission table says: %s', async (role) => {
    const share = (await offerTo(giver, 'given', taker)).id;
    const byTaker = bearer(await tokenOf(taker.people[role], taker.collaboration));
    const refused = await ask(taker, refuse, { share }, { why: 'No' }, { by: byTaker });
    expect(refused.status).toBe(may({ roles: [role] }, 'accept-survey') ? 200 : 403);
    if (refused.status === 403) await ask(taker, refuse, { share }, { why: 'No' });
    const by = bearer(await tokenOf(giver.people[role], giver.collaboration));
    const body = { ...terms, code: taker.code };
    const isLead = role === 'collaborator';
    const offered = await ask(giver, offer, { survey: 'given' }, body, { by });
    const mayOffer = may({ roles: [role] }, 'offer-survey', { isLead });
    expect(offered.status).toBe(mayOffer ? 201 : 403);
    if (!mayOffer) return;
    const { id } = shareSchema.parse(await offered.json());
    const back = await ask(giver, withdraw, { share: id }, { why: 'No' }, { by });
    expect(back.status).toBe(200);
  });
});
