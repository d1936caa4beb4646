import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { GET as listAudit } from '@/app/api/v1/collaborations/[collaboration]/audit/route';
import { POST as createPopulation } from '@/app/api/v1/collaborations/[collaboration]/populations/route';
import { PATCH as rename } from '@/app/api/v1/collaborations/[collaboration]/route';
import { collaborationRoute, openRoute } from '@/app/api/v1/handler';
import { PATCH as updateMe } from '@/app/api/v1/me/route';
import { levelSchema } from '@/lib/schemas/common';
import { withDatabase } from '../support/database';
import {
  bearer,
  call,
  createCollaborationWith,
  sessionCookieOf,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
  webAddress,
} from '../support/people';

const { query } = withDatabase();
let collaboration: TestCollaboration;
let owner: TestPerson;
let cookie: string;
let token: string;

beforeAll(async () => {
  const team = await createCollaborationWith(['owner']);
  collaboration = team.collaboration;
  owner = team.people.owner;
  cookie = (await sessionCookieOf(owner)).cookie;
  token = await tokenOf(owner, collaboration);
});
beforeEach(async () => {
  await query('delete from rate_limit');
});

const params = () => ({ collaboration: collaboration.slug });
const renameWith = (headers: Record<string, string>, body: unknown = { name: 'New name' }) =>
  call(rename, { method: 'PATCH', params: params(), headers, body });
const auditOf = (search: string, headers = bearer(token)) =>
  call(listAudit, { path: `/${search}`, params: params(), headers });

describe('a write with a session cookie', () => {
  it.each([
    ['our own origin', () => ({ origin: webAddress() })],
    ['a page of ours, as the browser says', () => ({ 'sec-fetch-site': 'same-origin' })],
  ])('is taken from %s', async (_, headers) => {
    expect((await renameWith({ cookie, ...headers() })).status).toBe(200);
  });

  it.each([
    ['another origin', { origin: 'https://elsewhere.example' }],
    ['an opaque origin', { origin: 'null' }],
    ['our host on another port', { origin: 'http://127.0.0.1:1' }],
    ['nowhere known', {}],
    ['another site, whatever Origin says', { 'sec-fetch-site': 'cross-site', origin: 'ours' }],
    ['a sister site', { 'sec-fetch-site': 'same-site', origin: 'ours' }],
  ])('is refused from %s', async (_, headers: Record<string, string>) => {
    const sent = headers.origin === 'ours' ? { ...headers, origin: webAddress() } : headers;
    const response = await renameWith({ cookie, ...sent });
    expect(response.status).toBe(403);
    expect(await response.json()).toMatchObject({ code: 'cross-site' });
  });

  it('needs a JSON content type', async () => {
    for (const type of ['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data']) {
      const response = await renameWith({ cookie, origin: webAddress(), 'content-type': type });
      expect(response.status).toBe(415);
      expect((await response.json()).errors[0]).toEqual({
        code: 'content-type',
        item: 'header',
        found: `"${type}"`,
        expected: 'application/json',
      });
    }
  });

  it('is not looked at when a token comes with it', async () => {
    const foreign = { cookie, origin: 'https://elsewhere.example' };
    expect((await renameWith({ ...foreign, ...bearer(token) })).status).toBe(200);
    expect((await renameWith({ ...foreign, ...bearer('rb_unknown') })).status).toBe(401);
    const basic = { cookie, origin: webAddress(), authorization: 'Basic dXNlcjpwYXNz' };
    expect((await renameWith(basic)).status).toBe(401);
  });
});

describe('the body of a request', () => {
  const send = (body: string, headers: Record<string, string> = {}) =>
    rename(
      new Request(webAddress(), {
        method: 'PATCH',
        headers: { ...bearer(token), 'content-type': 'application/json', ...headers },
        body,
      }),
      { params: Promise.resolve(params()) },
    );

  it('of a token needs a JSON content type as well', async () => {
    expect((await send('{"name":"x"}', { 'content-type': 'text/plain' })).status).toBe(415);
    expect(
      (await send('{"name":"x"}', { 'content-type': 'application/json; charset=utf-8' })).status,
    ).toBe(200);
  });

  it('gives nobody what a form does not offer', async () => {
    const response = await call(updateMe, {
      method: 'PATCH',
      headers: { cookie, origin: webAddress() },
      body: { role: 'owner' },
    });
    expect(response.status).toBe(400);
    const problem = await response.json();
    expect(problem.errors.map(({ code }: { code: string }) => code)).toContain('key-unknown');
    expect(problem.detail).toContain('The key "role" is not known here');
  });

  it.each([
    ['{"name": ', 400, 'json-invalid'],
    ['', 400, 'json-invalid'],
    ['{"name": NaN}', 400, 'json-invalid'],
    ['[]', 422, 'schema'],
    ['null', 422, 'schema'],
    ['"name"', 422, 'schema'],
    ['{}', 422, 'value-missing'],
    ['{"name": null}', 422, 'schema'],
    ['{"name": 3}', 422, 'schema'],
    ['{"name": ["a"]}', 422, 'schema'],
    ['{"name": ""}', 422, 'too-short'],
    [`{"name": "${'x'.repeat(101)}"}`, 422, 'too-long'],
    ['{"name": "a\\u0000b"}', 422, 'control-character'],
    ['{"name": "a\\u202eb"}', 422, 'format-mismatch'],
    ['{"name": "a", "__proto__": {"name": "b"}}', 400, 'key-unknown'],
    ['{"name": "a", "constructor": 1}', 400, 'key-unknown'],
  ])('%j answers %i %s, naming the field', async (body, status, code) => {
    const response = await send(body);
    expect(response.status).toBe(status);
    expect(response.headers.get('content-type')).toBe('application/problem+json');
    const problem = await response.json();
    expect(problem.errors[0].code).toBe(code);
    expect(problem.errors[0].item).toMatch(/^(body|name|__proto__|constructor)$/);
    expect(problem.detail).not.toMatch(/zod|undefined|invalid|\bat \w+ \(/i);
  });

  it('longer than a megabyte is not read to its end', async () => {
    const response = await send(`{"name": "${'x'.repeat(1_100_000)}"}`);
    expect(response.status).toBe(413);
  });

  it('shorter than its header promises is refused', async () => {
    const response = await send('{"name":"x"}', { 'content-length': '100' });
    expect(response.status).toBe(400);
    expect((await response.json()).errors[0].code).toBe('truncated');
  });

  it('names both ends of a range that is upside down', async () => {
    const response = await call(createPopulation, {
      method: 'POST',
      params: params(),
      headers: bearer(token),
      body: {
        name: 'Upside down',
        convention: 'log',
        definition: {
          form: 'power-law',
          massMinMjup: 20,
          massMaxMjup: 1,
          semiMajorAxisMinAu: 20,
          semiMajorAxisMaxAu: 300,
          massIndex: 0,
          semiMajorAxisIndex: 0,
        },
      },
    });
    expect(response.status).toBe(422);
    expect((await response.json()).errors).toEqual([
      {
        code: 'range-order',
        item: 'definition.massMinMjup, definition.massMaxMjup',
        found: '20 and 1',
        expected: 'massMinMjup below massMaxMjup',
      },
    ]);
  });

  it('asks whether a level of 95 is per cent', async () => {
    const route = collaborationRoute(
      { scope: 'read', body: z.strictObject({ credibleLevel: levelSchema }) },
      async () => ({}),
    );
    const response = await call(route, {
      method: 'POST',
      params: params(),
      headers: bearer(token),
      body: { credibleLevel: 95 },
    });
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0]).toEqual({
      code: 'out-of-range',
      item: 'credibleLevel',
      found: '95',
      expected: 'more than 0 and less than 1',
      hint: 'Is this per cent?',
    });
  });
});

describe('the query of a request', () => {
  it('is held to its range, said with both ends', async () => {
    const response = await auditOf('?limit=1000000');
    expect(response.status).toBe(400);
    expect((await response.json()).errors).toEqual([
      { code: 'out-of-range', item: 'query "limit"', found: '1000000', expected: '1 to 500' },
    ]);
    expect((await auditOf('?limit=0')).status).toBe(400);
    expect((await auditOf('?offset=-1')).status).toBe(400);
    expect((await auditOf('?limit=ten')).status).toBe(400);
    expect((await auditOf('?limit=500')).status).toBe(200);
  });

  it('takes each key once', async () => {
    const response = await auditOf('?limit=1&limit=2');
    expect(response.status).toBe(400);
    expect((await response.json()).errors).toEqual([
      { code: 'both-given', item: 'query "limit"', found: '"limit" twice', expected: 'it once' },
    ]);
  });

  it('takes no key that it does not know', async () => {
    const response = await auditOf('?limt=1');
    expect(response.status).toBe(400);
    expect((await response.json()).errors[0]).toMatchObject({ code: 'key-unknown' });
  });
});

describe('every answer', () => {
  it('carries its headers, refused or not', async () => {
    for (const response of [
      await auditOf(''),
      await auditOf('?limit=0'),
      await auditOf('', {} as never),
    ]) {
      expect(response.headers.get('cache-control')).toBe('no-store');
      expect(response.headers.get('x-content-type-options')).toBe('nosniff');
      expect(response.headers.get('referrer-policy')).toBe('same-origin');
      expect(response.headers.get('content-security-policy')).toContain("default-src 'none'");
      expect(response.headers.get('x-request-id')).toMatch(/^[0-9a-f-]{36}$/);
    }
  });

  it('to a fault of ours says a number, and nothing of the inside', async () => {
    const written: string[] = [];
    const spy = vi.spyOn(process.stderr, 'write').mockImplementation((line) => {
      written.push(String(line));
      return true;
    });
    const route = openRoute({}, async () => {
      throw new Error('select * from secret_table');
    });
    const response = await call(route, { path: '/api/v1/join/the-code' });
    spy.mockRestore();
    expect(response.status).toBe(500);
    const requestId = response.headers.get('x-request-id');
    expect(await response.json()).toEqual({
      type: 'about:blank',
      title: 'Something failed here',
      status: 500,
      code: 'unknown',
      detail: `Tell an owner this number: ${requestId}`,
    });
    const line = JSON.parse(written[0]);
    expect(line).toMatchObject({ request: requestId, status: 500, path: '/api/v1/join/…' });
    expect(line.fault).toContain('secret_table');
  });

  it('passes the answers of the work through as they are', async () => {
    const route = collaborationRoute(
      { scope: 'read' },
      async () => new Response('a,b', { headers: { 'content-type': 'text/csv' } }),
    );
    const response = await call(route, { params: params(), headers: bearer(token) });
    expect(await response.text()).toBe('a,b');
    expect(response.headers.get('content-type')).toBe('text/csv');
    expect(response.headers.get('content-security-policy')).toContain('sandbox');
  });
});

describe('limits of requests', () => {
  it('let a token send 600 a minute, and say how long to wait', async () => {
    const busy = await tokenOf(owner, collaboration);
    const [{ id }] = await query<{ id: string }>(
      'select id from access_token where ending = $1 order by created_at desc limit 1',
      [busy.slice(-4)],
    );
    await auditOf('', bearer(busy));
    await query('update rate_limit set points = 599 where key = $1', [`token-requests:${id}`]);
    expect((await auditOf('', bearer(busy))).status).toBe(200);
    const refused = await auditOf('', bearer(busy));
    expect(refused.status).toBe(429);
    const wait = Number(refused.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(50);
    expect(wait).toBeLessThanOrEqual(60);
    expect((await auditOf('')).status).toBe(200);
  });

  it('go on counting in memory when the table is gone', async () => {
    await query('alter table rate_limit rename to rate_limit_away');
    try {
      expect((await auditOf('')).status).toBe(200);
    } finally {
      await query('alter table rate_limit_away rename to rate_limit');
    }
  });
});
