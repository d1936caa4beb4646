import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type ZodType, z } from 'zod';
import type { RouteHandler } from '@/app/api/v1/handler';
import { exampleRequest } from '@/lib/schemas/api-examples';
import { isPaged, takesIfMatch, takesKey } from '@/lib/schemas/api-route';
import { type ApiRoute, apiRoutes } from '@/lib/schemas/api-routes';
import { database } from '@/models';
import { withDatabase } from '../support/database';
import {
  addMember,
  bearer,
  call,
  createCollaborationWith,
  createPerson,
  sessionCookieOf,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
  webAddress,
} from '../support/people';

// What holds of every handler alike; what each role may do stands in the tests of each noun.
const modules = import.meta.glob<Record<string, RouteHandler>>('/app/api/v1/**/route.ts');
const { query } = withDatabase();

const home = '/api/v1/collaborations/{collaboration}';
const ours = apiRoutes.filter(({ path }) => path === home || path.startsWith(`${home}/`));
const isWrite = ({ method }: ApiRoute) => method !== 'get';
/** Names between braces, without the collaboration itself. */
const idsIn = ({ path }: ApiRoute) =>
  [...path.matchAll(/\{(\w+)\}/g)]
    .map(([, name]) => name)
    .filter((name) => name !== 'collaboration');

let team: { collaboration: TestCollaboration; people: { owner: TestPerson; student: TestPerson } };
type Headers = Record<string, string>;
let owner: { token: Headers; cookie: string };
let outsider: { token: Headers; cookie: string };
/** A member whose access rests in this collaboration alone. */
let absentee: { token: Headers; cookie: string };
/** Tokens and sessions that were good once, or whose person is suspended. */
let lapsed: Headers[];
const tokenWithout = new Map<string, Headers>();

async function signedIn(person: TestPerson, collaboration: TestCollaboration) {
  const { cookie } = await sessionCookieOf(person);
  return { token: bearer(await tokenOf(person, collaboration)), cookie };
}

beforeAll(async () => {
  team = await createCollaborationWith(['owner', 'student']);
  const { collaboration, people } = team;
  const other = await createCollaborationWith(['owner']);
  outsider = await signedIn(other.people.owner, other.collaboration);
  owner = await signedIn(people.owner, collaboration);
  const past = await tokenOf(people.owner, collaboration, undefined, new Date(Date.now() - 1000));
  const session = await sessionCookieOf(people.owner);
  await query('delete from session where id = $1', [session.sessionId]);
  const old = await sessionCookieOf(people.owner);
  await query("update session set expires_at = now() - interval '1 s' where id = $1", [
    old.sessionId,
  ]);
  const resting = await createPerson();
  await addMember(collaboration, resting, ['owner']);
  const rested = await signedIn(resting, collaboration);
  await query('update person set suspended_at = now() where id = $1', [resting.id]);
  const cookies = [session.cookie, old.cookie, rested.cookie];
  lapsed = [
    ...[bearer(past), bearer('not-a-token'), rested.token],
    ...cookies.map((cookie) => ({ cookie, origin: webAddress() })),
  ];
  const away = await createPerson();
  const membership = await addMember(collaboration, away, ['owner']);
  absentee = await signedIn(away, collaboration);
  await query('update member set suspended_at = now() where id = $1', [membership]);
  for (const access of ['read', 'write', 'run'] as const) {
    const scopes = (['read', 'write', 'run'] as const).filter((scope) => scope !== access);
    tokenWithout.set(access, bearer(await tokenOf(people.owner, collaboration, scopes)));
  }
});
// Past the limits of attempts, which have tests of their own; on the connection that is open.
beforeEach(async () => {
  await database().query('delete from rate_limit');
});

async function handlerOf({ path, method }: ApiRoute): Promise<RouteHandler> {
  const file = `/app${path.replace(/\{(\w+)\}/g, '[$1]')}/route.ts`;
  return (await modules[file]())[method.toUpperCase()];
}

async function ask(
  route: ApiRoute,
  headers: Record<string, string>,
  { id = () => randomUUID(), body = {} }: { id?: (name: string) => string; body?: unknown } = {},
): Promise<Response> {
  const method = route.method.toUpperCase();
  const params = Object.fromEntries(idsIn(route).map((name) => [name, id(name)]));
  return call(await handlerOf(route), {
    method,
    params: { collaboration: team.collaboration.slug, ...params },
    headers,
    body: isWrite(route) && !route.isUpload ? body : undefined,
  });
}

const statusOf = async (...asked: Parameters<typeof ask>) => (await ask(...asked)).status;

const oddIds = ['1 or 1=1', "'; drop table star", '9'.repeat(400), '..', '\u0000', '💫', '-1'];
const deep = JSON.parse(`${'['.repeat(500)}${']'.repeat(500)}`);
const keys = { 'a\u0000': 1, '\ud800': 1 };
const oddBodies = [null, [], 'text', 7, deep, keys, { constructor: 1, __proto__: { a: 1 } }];
const named = ours.map(
  (route) => [`${route.method} ${route.path.slice(home.length)}`, route] as const,
);

describe.each(named)('of a collaboration: %s', (_, route) => {
  it('is closed to nobody, and to what has ended or was made up', async () => {
    for (const headers of [{}, ...lapsed]) expect(await statusOf(route, headers)).toBe(401);
  });

  it('does not exist for an outsider or a suspended member, by token or by session', async () => {
    for (const { cookie } of [outsider, absentee]) {
      expect(await statusOf(route, { cookie, origin: webAddress() })).toBe(404);
    }
    const byToken = await ask(route, outsider.token);
    expect(byToken.status).toBe(404);
    expect(await statusOf(route, absentee.token)).toBe(401);
    const absent = await ask(route, outsider.token, { id: () => 'no-such-thing' });
    const words = ({ title, detail }: { title: string; detail: string }) => ({ title, detail });
    expect(words(await absent.json())).toEqual(words(await byToken.json()));
  });

  it('needs the scope that the description names', async () => {
    // What only a session may do is no matter of scopes: tokens are refused by the work itself.
    if (route.access === 'session') return;
    expect(await statusOf(route, tokenWithout.get(route.access) ?? {})).toBe(403);
  });

  it('takes no write that another site sends', async () => {
    if (!isWrite(route)) return;
    const { cookie } = owner;
    for (const origin of ['https://elsewhere.example', 'null', '']) {
      expect(await statusOf(route, { cookie, ...(origin ? { origin } : {}) })).toBe(403);
    }
  });

  it('answers an owner without a fault of the server, whatever ids and body are sent', async () => {
    for (const odd of oddIds) {
      const status = await statusOf(route, owner.token, { id: () => odd });
      expect(status, odd).toBeLessThan(500);
      if (idsIn(route).length > 0 && !isWrite(route)) expect([404, 422]).toContain(status);
    }
    if (!isWrite(route) || route.isUpload) return;
    for (const body of oddBodies) {
      const response = await ask(route, owner.token, { body });
      expect(response.status, JSON.stringify(body).slice(0, 40)).toBeLessThan(500);
      if (route.body) expect(response.status).toBeGreaterThanOrEqual(400);
    }
  });
});

const personal = apiRoutes
  .filter((route) => !ours.includes(route) && route.access !== 'open')
  .map((route) => [`${route.method} ${route.path}`, route] as const);

describe.each(personal)('of a person: %s', (_, route) => {
  it('is closed to nobody, and to what has ended or was made up', async () => {
    for (const headers of [{}, ...lapsed]) expect(await statusOf(route, headers)).toBe(401);
  });

  it('takes no token where a session is asked for, and no write that another site sends', async () => {
    if (route.access === 'session') expect(await statusOf(route, owner.token)).toBe(403);
    if (!isWrite(route)) return;
    const { cookie } = owner;
    for (const origin of ['https://elsewhere.example', 'null', '']) {
      expect(await statusOf(route, { cookie, ...(origin ? { origin } : {}) })).toBe(403);
    }
  });

  it('answers without a fault of the server, whatever ids and body are sent', async () => {
    if (/deletion|sessions|password$|second-factor|demonstration/.test(route.path)) return;
    const headers = { cookie: owner.cookie, origin: webAddress() };
    for (const body of oddBodies) {
      expect(await statusOf(route, headers, { body, id: () => oddIds[5] })).toBeLessThan(500);
    }
  });
});

const open = apiRoutes
  .filter(({ access }) => access === 'open')
  .map((route) => [`${route.method} ${route.path}`, route] as const);

it.each(open)('open to all, answers oddities without a fault: %s', async (_, route) => {
  for (const odd of oddIds) {
    await database().query('delete from rate_limit');
    const status = await statusOf(route, {}, { id: () => odd });
    expect(status, odd).toBeLessThan(500);
  }
  if (!route.body) return;
  for (const body of oddBodies) {
    await database().query('delete from rate_limit');
    const { status } = await ask(route, {}, { body });
    expect(status, JSON.stringify(body).slice(0, 40)).toBeLessThan(500);
    expect(status).toBeGreaterThanOrEqual(400);
  }
});

it('a person who was removed is an outsider at the next request', async () => {
  const person = await createPerson();
  const membership = await addMember(team.collaboration, person, ['author']);
  const token = bearer(await tokenOf(person, team.collaboration));
  const { cookie } = await sessionCookieOf(person);
  const reading = ours.find(({ path, method }) => path === home && method === 'get');
  if (!reading) throw new Error('the collaboration itself has no address');
  expect(await statusOf(reading, token)).toBe(200);
  await query('delete from member where id = $1', [membership]);
  expect([401, 404]).toContain(await statusOf(reading, token));
  expect(await statusOf(reading, { cookie })).toBe(404);
});

const shapeOf = (schema: ZodType) =>
  z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' });
const everyRoute = apiRoutes.map((route) => [`${route.method} ${route.path}`, route] as const);

it.each(everyRoute)('is described as it is: %s', async (_, route) => {
  const { asks } = await handlerOf(route);
  // A token that comes to a session's work is turned away by the work itself.
  if (route.access !== 'session') expect(asks.access).toBe(route.access);
  else expect(asks.access).not.toBe('open');
  expect(route.body && shapeOf(route.body)).toEqual(asks.body && shapeOf(asks.body));
  expect(route.query && shapeOf(route.query)).toEqual(asks.query && shapeOf(asks.query));
  expect(isPaged(route)).toBe(asks.isPaged);
  expect(takesIfMatch(route, apiRoutes)).toBe(asks.takesIfMatch);
  if (route.method === 'post') expect(takesKey(route)).toBe(asks.takesKey);
  if (asks.status) expect(route.status).toBe(asks.status);
  else if (route.answer ?? route.files) expect(route.status ?? 200).toBe(200);
});

const readable = apiRoutes.filter(({ method, access }) => method === 'get' && access !== 'session');

it('every example of reading is answered, if only with "not found"', async () => {
  const token = await tokenOf(team.people.owner, team.collaboration);
  const statuses: number[] = [];
  for (const route of readable) {
    const example = exampleRequest(route, webAddress());
    if (!example) throw new Error(`${route.path} has no example`);
    const { pathname, search } = new URL(example.address);
    const pattern = route.path.replace(/\{(\w+)\}/g, '(?<$1>[^/]+)');
    const params = { ...new RegExp(`^${pattern}$`).exec(pathname)?.groups };
    if (params.collaboration) params.collaboration = team.collaboration.slug;
    const headers = example.isSigned ? bearer(token) : {};
    const { status } = await call(await handlerOf(route), {
      path: `${pathname}${search}`,
      params,
      headers,
    });
    expect([200, 404], route.path).toContain(status);
    statuses.push(status);
  }
  expect(statuses.filter((status) => status === 200).length).toBeGreaterThan(15);
});
