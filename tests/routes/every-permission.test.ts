import { beforeAll, describe, expect, it, vi } from 'vitest';
import { may } from '@/lib/access/permissions';
import type { Role } from '@/lib/schemas/common';
import { withDatabase } from '../support/database';
import { bearer, sessionCookieOf, tokenOf, webAddress } from '../support/people';
import { type RoutePermission, routePermissions } from '../support/route-permissions';
import { buildWholeLab, type WholeLab } from '../support/whole-lab';
import { askLab, type LabRoute, labRoutes } from '../support/whole-lab-requests';

// Invitations are refused where no mail server is set up; nothing is sent here.
vi.stubEnv('MAIL_URL', 'smtp://127.0.0.1:1');
const { query } = withDatabase();

const people = ['student', 'collaborator', 'lead', 'statistician', 'author', 'owner'] as const;
type Person = (typeof people)[number];

/** One's own tokens and notes are removed; else the order is that things are read before. */
const ORDER = ['get', 'patch', 'put', 'post', 'delete'];
const removesMuch = ({ name }: LabRoute) =>
  Number(/withdraw|deletion|members|delete .releases/.test(name));
const depth = ({ route }: LabRoute) => route.path.split('/').length;
const inOrder = [...labRoutes].sort(
  (a, b) =>
    ORDER.indexOf(a.route.method) - ORDER.indexOf(b.route.method) ||
    removesMuch(a) - removesMuch(b) ||
    depth(b) - depth(a),
);

function isAllowed(person: Person, { action, whose }: RoutePermission): boolean {
  const roles: Role[] = person === 'lead' ? ['collaborator', 'student'] : [person];
  const isLead = whose === 'lead' && person === 'lead';
  const isOwn = whose === 'own' || (whose === 'maker' && person === 'owner');
  return may({ roles }, action, { isLead, isOwn });
}

/** Changes nothing, or what only a later decision makes true: a file that is read, pairs proposed. */
const isUnlogged = ({ name, route }: LabRoute) =>
  route.method === 'get' ||
  /preview|figures|seen$|unfinished-files|patch .uploads|post .(uploads|stars.overlaps)$/.test(
    name,
  );

async function countEntries({ collaboration }: WholeLab): Promise<number> {
  const [row] = await query<{ count: number }>(
    'select count(*)::int as count from audit_entry where collaboration_id = $1',
    [collaboration.id],
  );
  return row.count;
}

it('the table has a row for every route, and no other', () => {
  expect(Object.keys(routePermissions).sort()).toEqual(labRoutes.map(({ name }) => name).sort());
});

// A collaboration for each, so that what one may remove is there for the next.
describe.each(people)('everything that has an address, for the %s', (person) => {
  let lab: WholeLab;
  let token: Record<string, string>;
  let session: Record<string, string>;

  beforeAll(async () => {
    lab = await buildWholeLab(people.indexOf(person) * 10 + 1, person);
    token = bearer(await tokenOf(lab.people[person], lab.collaboration));
    const { cookie } = await sessionCookieOf(lab.people[person]);
    session = { cookie, origin: webAddress() };
  });

  it.each(inOrder.map((route) => [route.name, route] as const))('%s', async (_, route) => {
    const isSessions = route.route.access === 'session';
    const ask = (headers: Record<string, string>) =>
      askLab(route, { slug: lab.collaboration.slug, ids: lab.ids, headers });
    if (isSessions) expect((await ask(token)).status).toBe(403);
    const before = person === 'owner' ? await countEntries(lab) : 0;
    const response = await ask(isSessions ? session : token);
    const text = await response.clone().text();
    if (!isAllowed(person, route.permission)) {
      expect(response.status, text).toBe(403);
      expect(text).toContain('"code":"not-allowed"');
      return;
    }
    expect([401, 403, 404], text).not.toContain(response.status);
    expect(response.status, text).toBeLessThan(500);
    if (person !== 'owner' || response.status >= 300 || isUnlogged(route)) return;
    expect(await countEntries(lab), 'entries of the log').toBe(before + 1);
  });
});
