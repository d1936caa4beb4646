import { beforeAll, describe, expect, it } from 'vitest';
import { POST as confirmSeveral } from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/confirm/route';
import {
  GET as listOverlaps,
  POST as propose,
} from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/route';
import { may } from '@/lib/access/permissions';
import { roleSchema } from '@/lib/schemas/common';
import { overlapsSchema } from '@/lib/schemas/stars';
import { StarRow, type SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';

const { query } = withDatabase();
const roles = roleSchema.options;
const ARCSEC = 1 / 3600;

let team: Awaited<ReturnType<typeof createCollaborationWith>>;
let owner: Record<string, string>;
let surveys: SurveyRow[];

/** The same sky place in both surveys, so far apart, each time a star of its own. */
async function listTwice(name: string, raDeg: number, apartArcsec: number) {
  const same = { raDeg, distancePc: 20, curves: [] };
  await buildTarget(surveys[0], { ...same, name, decDeg: 0 });
  await buildTarget(surveys[1], { ...same, name: `${name} again`, decDeg: apartArcsec * ARCSEC });
}

const params = () => ({ collaboration: team.collaboration.slug });
const overlaps = async () =>
  overlapsSchema.parse(
    await (await call(listOverlaps, { params: params(), headers: owner })).json(),
  );
const confirm = (pairs: string[], headers = owner, why = 'Same place and distance') =>
  call(confirmSeveral, { method: 'POST', params: params(), headers, body: { pairs, why } });
const look = () => call(propose, { method: 'POST', params: params(), headers: owner });
const joinedStars = () =>
  StarRow.count({ where: { collaborationId: team.collaboration.id, mergedInto: null } });

beforeAll(async () => {
  team = await createCollaborationWith(roles);
  owner = bearer(await tokenOf(team.people.owner, team.collaboration));
  surveys = [
    await buildSurvey(team.collaboration.id, { name: 'First' }),
    await buildSurvey(team.collaboration.id, { name: 'Second' }),
  ];
  for (const [i, apart] of [0.2, 0.4, 0.8, 3].entries()) await listTwice(`S ${i}`, 10 * i, apart);
  // Two neighbours in one survey: which of them the other survey means is no plain case.
  await listTwice('Close', 100, 0.3);
  const near = { raDeg: 100, decDeg: -0.5 * ARCSEC, distancePc: 20, curves: [] };
  await buildTarget(surveys[0], { ...near, name: 'Neighbour' });
  await look();
});

describe('several pairs at once', () => {
  it('are offered where they are near the middle of the rule and the only pair of their stars', async () => {
    const { open } = await overlaps();
    const plain = open.filter(({ isPlain }) => isPlain);
    expect(plain.map(({ stars }) => stars[0].name.slice(0, 3)).sort()).toEqual([
      'S 0',
      'S 1',
      'S 2',
    ]);
    expect(open.length).toBeGreaterThan(plain.length);
  });

  it('are joined all or, where one cannot be, not one of them', async () => {
    const { open } = await overlaps();
    const before = await joinedStars();
    const ofOneSurvey = open.find(({ stars }) =>
      stars.every(({ entries }) => entries.every(({ survey }) => survey.name === 'First')),
    );
    const plain = open.filter(({ isPlain }) => isPlain).map(({ id }) => id);
    const refused = await confirm([...plain, ofOneSurvey?.id ?? '']);
    expect(refused.status).toBe(409);
    expect((await refused.json()).detail).toMatch(/^First lists both/);
    expect(await joinedStars()).toBe(before);
    expect((await confirm([...plain, crypto.randomUUID()])).status).toBe(404);
    expect(await joinedStars()).toBe(before);

    const answered = overlapsSchema.parse(await (await confirm(plain)).json());
    expect(answered.open.filter(({ id }) => plain.includes(id))).toEqual([]);
    expect(answered.decided.map(({ state, why }) => [state, why])).toEqual(
      plain.map(() => ['confirmed', 'Same place and distance']),
    );
    expect(await joinedStars()).toBe(before - plain.length);
    const entries = await query<{ count: number }>(
      `select count(*)::int as count from audit_entry where item_kind = 'star-match'`,
    );
    expect(entries[0].count).toBe(plain.length);

    expect((await confirm(plain)).status).toBe(200);
    expect(await joinedStars()).toBe(before - plain.length);
  });

  it('want a reason and at least one pair', async () => {
    const [{ id }] = (await overlaps()).open;
    expect((await confirm([])).status).toBe(422);
    expect((await confirm([id], owner, ' ')).status).toBe(422);
  });

  it.each(roles)('are confirmed as the permission table says: %s', async (role) => {
    const by = bearer(await tokenOf(team.people[role], team.collaboration));
    const expected = may({ roles: [role] }, 'combine') ? 404 : 403;
    expect((await confirm([crypto.randomUUID()], by)).status).toBe(expected);
  });
});
