import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { database } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, tokenOf } from '../support/people';
import { buildWholeLab, type LabIds, type WholeLab } from '../support/whole-lab';
import { askLab, type LabRoute, labRoutes } from '../support/whole-lab-requests';

vi.stubEnv('MAIL_URL', 'smtp://127.0.0.1:1');
withDatabase();

let ours: WholeLab;
let theirs: WholeLab;
/** With the names and numbers of ours. */
let twin: WholeLab;
let owner: Record<string, string>;
/** Ids of the same form that nothing has. */
let absent: LabIds;

const keyed = /^(analysis|draft|population|exercise|release)$/;
const absentLike = (name: string, id: string) => {
  if (name === 'survey') return 'no-such-survey';
  if (name === 'file') return id;
  return keyed.test(name) ? id.replace(/\d+$/, '9999') : randomUUID();
};

beforeAll(async () => {
  [ours, theirs] = [await buildWholeLab(11), await buildWholeLab(21)];
  twin = await buildWholeLab(11);
  owner = bearer(await tokenOf(ours.people.owner, ours.collaboration));
  // Releases count by collaboration: with two of them, the second is there for one only.
  await database().query('update release set number = 77 where id = $1', {
    bind: [theirs.ids.releaseId],
  });
  theirs.ids.release = 'R-77';
  absent = Object.fromEntries(
    Object.entries(theirs.ids).map(([name, id]) => [name, absentLike(name, id)]),
  );
});
beforeEach(async () => {
  await database().query('delete from rate_limit');
});

async function told(route: LabRoute, given: { ids: LabIds; named?: LabIds }) {
  const response = await askLab(route, {
    slug: ours.collaboration.slug,
    headers: owner,
    ...given,
  });
  const text = await response.text();
  const used = [given.ids, given.named ?? given.ids].flatMap((ids) => Object.values(ids));
  const words = used.reduce((left, id) => left.replaceAll(id, 'ID'), text);
  const names = [...response.headers.keys()].sort();
  return { status: response.status, words, names };
}

const sessionless = labRoutes.filter(({ route }) => route.access !== 'session');
const byAddress = sessionless.filter(({ idNames }) => idNames.some((name) => name !== 'file'));
const usesIds = ({ permission: { body, query } }: LabRoute) => {
  const asked = new Set<string>();
  const watch = new Proxy({} as LabIds, {
    get: (_, name: string) => {
      asked.add(name);
      return 'x';
    },
  });
  body?.(watch);
  query?.(watch);
  // A sharing code is given away on purpose: whose it is, is told by the collaboration itself.
  return [...asked].some((name) => name !== 'code');
};
const inside = sessionless.filter(usesIds);
const byName = (routes: LabRoute[]) => routes.map((route) => [route.name, route] as const);

describe('an id of another collaboration in the address', () => {
  it.each(byName(byAddress))('is as one that nothing has: %s', async (_, route) => {
    const foreign = await told(route, { ids: theirs.ids, named: ours.ids });
    expect(foreign).toEqual(await told(route, { ids: absent, named: ours.ids }));
    expect(foreign.status).toBe(404);
  });

  it.each(byName(byAddress.filter(({ idNames }) => idNames.length > 1)))(
    'is so below a thing of one’s own: %s',
    async (_, route) => {
      const last = route.idNames.at(-1) as string;
      if (last === 'file') return;
      const with_ = (id: string) => ({ ids: { ...ours.ids, [last]: id } });
      const foreign = await told(route, with_(theirs.ids[last]));
      expect(foreign).toEqual(await told(route, with_(absent[last])));
      expect(foreign.status).toBe(404);
    },
  );
});

/** The same names, numbers and addresses in both; only the ids differ. */
describe('what is listed, counted, searched and exported', () => {
  const reading = sessionless.filter(({ route }) => route.method === 'get');

  it.each(byName(reading))(
    'holds nothing of a collaboration with equal names: %s',
    async (_, route) => {
      const { collaboration, people, ids } = twin;
      const given = { slug: ours.collaboration.slug, headers: owner, ids: ours.ids };
      const text = await (await askLab(route, given)).text();
      const theirIds = [
        collaboration.id,
        collaboration.slug,
        ...Object.values(people).flatMap(({ id, email }) => [id, email]),
        ...Object.values(ids).filter((id) => id.length === 36),
      ];
      for (const id of theirIds) expect(text.includes(id), id).toBe(false);
    },
  );
});

describe('an id of another collaboration in a body or a question', () => {
  it.each(byName(inside))('is as one that nothing has: %s', async (_, route) => {
    const foreign = await told(route, { ids: ours.ids, named: theirs.ids });
    expect(foreign).toEqual(await told(route, { ids: ours.ids, named: absent }));
    // A filter by what is not there finds nothing; anything else is refused.
    const isFilter = route.route.method === 'get';
    expect(isFilter ? [200, 404] : [404, 422]).toContain(foreign.status);
    if (foreign.status === 200) expect(foreign.words).not.toMatch(/"id":|"name":/);
  });

  it('has changed nothing over there', async () => {
    const { ids, collaboration } = theirs;
    const [rows] = await database().query(
      'select count(*)::int as count from audit_entry where collaboration_id = $1',
      { bind: [collaboration.id] },
    );
    expect(rows).toEqual([{ count: 0 }]);
    const [people] = await database().query('select roles from member where id = $1', {
      bind: [ids.member],
    });
    expect(people).toEqual([{ roles: ['student'] }]);
  });
});
