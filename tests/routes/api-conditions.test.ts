import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  GET as readAnalysis,
  PATCH as updateAnalysis,
} from '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/route';
import { POST as inviteGuest } from '@/app/api/v1/collaborations/[collaboration]/guest-links/route';
import { GET as listJobs } from '@/app/api/v1/collaborations/[collaboration]/jobs/route';
import { POST as createPopulation } from '@/app/api/v1/collaborations/[collaboration]/populations/route';
import {
  GET as readTeam,
  PATCH as renameTeam,
} from '@/app/api/v1/collaborations/[collaboration]/route';
import {
  PATCH as changeSettings,
  GET as readSettings,
} from '@/app/api/v1/collaborations/[collaboration]/settings/route';
import { GET as listStudies } from '@/app/api/v1/collaborations/[collaboration]/studies/route';
import { collaborationRoute } from '@/app/api/v1/handler';
import { POST as signUp } from '@/app/api/v1/sign-up/route';
import { limits } from '@/lib/access/attempts';
import { Conflict } from '@/lib/errors';
import { pageSchema } from '@/lib/schemas/common';
import { withDatabase } from '../support/database';
import { bearer, type Call, call, createCollaborationWith, tokenOf } from '../support/people';

const { query } = withDatabase();
let team: Awaited<ReturnType<typeof createCollaborationWith<'owner' | 'author'>>>;
let token: string;

beforeAll(async () => {
  team = await createCollaborationWith(['owner', 'author']);
  token = await tokenOf(team.people.owner, team.collaboration);
});
beforeEach(async () => {
  await query('delete from rate_limit');
});

const ask = (handler: typeof readTeam, { headers, params, ...rest }: Call = {}) =>
  call(handler, {
    ...rest,
    params: { collaboration: team.collaboration.slug, ...params },
    headers: { ...bearer(token), ...headers },
  });
const population = (name: string) => ({
  name,
  convention: 'log',
  definition: {
    form: 'power-law',
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 10,
    semiMajorAxisMaxAu: 200,
    massIndex: 0,
    semiMajorAxisIndex: 0,
  },
});

describe('what is left of a limit', () => {
  const { points, seconds } = limits['token-requests'];

  it('stands on every answer to a token, a refusal too', async () => {
    const first = await ask(readTeam);
    const refused = await ask(readAnalysis, { params: { analysis: 'A-99' } });
    expect([first.status, refused.status]).toEqual([200, 404]);
    const policy = `"token-requests";q=${points};w=${seconds}`;
    expect(first.headers.get('ratelimit-policy')).toBe(policy);
    expect(first.headers.get('ratelimit')).toMatch(
      new RegExp(`^"token-requests";r=${points - 1};t=\\d+$`),
    );
    expect(refused.headers.get('ratelimit')).toMatch(new RegExp(`r=${points - 2};`));
  });

  it('is nothing on a 429, which says when to ask again', async () => {
    await ask(readTeam);
    await query('update rate_limit set points = $1', [points]);
    const refused = await ask(readTeam);
    expect(refused.status).toBe(429);
    const wait = Number(refused.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(0);
    expect(wait).toBeLessThanOrEqual(seconds);
    expect(refused.headers.get('ratelimit')).toBe(`"token-requests";r=0;t=${wait}`);
  });
});

describe('an ETag', () => {
  it('spares what has not changed, and only that', async () => {
    const first = await ask(readTeam);
    const etag = first.headers.get('etag') ?? '';
    expect(etag).toMatch(/^"[\w-]{27}"$/);
    expect(first.headers.get('cache-control')).toBe('no-store');
    for (const held of [etag, `W/${etag}`, `"other", ${etag}`, '*']) {
      const again = await ask(readTeam, { headers: { 'if-none-match': held } });
      expect([again.status, await again.text()], held).toEqual([304, '']);
      expect(again.headers.get('etag')).toBe(etag);
    }
    expect((await ask(readTeam, { headers: { 'if-none-match': '"other"' } })).status).toBe(200);
    await ask(renameTeam, { method: 'PATCH', body: { name: 'Renamed' } });
    const changed = await ask(readTeam, { headers: { 'if-none-match': etag } });
    expect([changed.status, (await changed.json()).name]).toEqual([200, 'Renamed']);
  });

  it('keeps a write from what changed since it was read', async () => {
    const etag = (await ask(readTeam)).headers.get('etag') ?? '';
    const rename = (name: string) =>
      ask(renameTeam, { method: 'PATCH', body: { name }, headers: { 'if-match': etag } });
    expect((await rename('First')).status).toBe(200);
    const late = await rename('Second');
    expect([late.status, (await late.json()).code]).toEqual([412, 'changed-meanwhile']);
    expect((await (await ask(readTeam)).json()).name).toBe('First');
    const absent = await ask(updateAnalysis, {
      method: 'PATCH',
      params: { analysis: 'A-99' },
      body: { name: 'x' },
      headers: { 'if-match': etag },
    });
    expect(absent.status).toBe(404);
  });

  it('lets one of two through that change the same thing at once, whichever address they use', async () => {
    const etag = (await ask(readTeam)).headers.get('etag') ?? '';
    const settings = (await ask(readSettings)).headers.get('etag') ?? '';
    const names = ['One', 'Two', 'Three', 'Four', 'Five', 'Six'];
    const answers = await Promise.all(
      names.map((name, i) =>
        ask(i % 2 === 0 ? renameTeam : changeSettings, {
          method: 'PATCH',
          body: { name },
          headers: { 'if-match': i % 2 === 0 ? etag : settings },
        }),
      ),
    );
    const statuses = answers.map(({ status }) => status);
    expect(statuses.filter((status) => status === 200)).toHaveLength(1);
    expect(statuses.filter((status) => status === 412)).toHaveLength(5);
    const won = names[statuses.indexOf(200)];
    expect((await (await ask(readTeam)).json()).name).toBe(won);
  });

  it('leaves nothing behind of a change that is refused after its comparison', async () => {
    const etag = (await ask(readSettings)).headers.get('etag') ?? '';
    const headers = { 'if-match': etag };
    const body = { name: 'Half a change', leadAnalysis: 'A-99' };
    expect((await ask(changeSettings, { method: 'PATCH', body, headers })).status).toBe(404);
    expect((await ask(readSettings)).headers.get('etag')).toBe(etag);
  });

  it('matches nowhere where none is given', async () => {
    const headers = { 'if-match': '"any"' };
    const refused = await ask(createPopulation, { method: 'POST', body: population('x'), headers });
    expect(refused.status).toBe(412);
  });
});

describe('an Idempotency-Key', () => {
  const save = (key: string, name: string, headers = {}) =>
    ask(createPopulation, {
      method: 'POST',
      body: population(name),
      headers: { 'idempotency-key': key, ...headers },
    });
  const countNamed = async (name: string) =>
    (await query('select 1 from population where name = $1', [name])).length;

  it('stores once, and gives the same answer again', async () => {
    const first = await save('a-1', 'Once');
    const again = await save('a-1', 'Once');
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(await again.text()).toBe(await first.text());
    expect(first.headers.has('idempotency-replayed')).toBe(false);
    expect(again.headers.get('idempotency-replayed')).toBe('true');
    expect(await countNamed('Once')).toBe(1);
  });

  it('is refused with another body', async () => {
    await save('a-2', 'One body');
    const other = await save('a-2', 'Another body');
    expect([other.status, (await other.json()).code]).toEqual([422, 'idempotency-key-reused']);
    expect(await countNamed('Another body')).toBe(0);
  });

  it('belongs to one person in one collaboration', async () => {
    await save('a-3', 'Of the owner');
    const author = bearer(await tokenOf(team.people.author, team.collaboration));
    const theirs = await save('a-3', 'Of the author', author);
    expect([theirs.status, theirs.headers.has('idempotency-replayed')]).toEqual([201, false]);
  });

  it('is free again after a refusal', async () => {
    const bad = { method: 'POST', headers: { 'idempotency-key': 'a-4' } };
    const refused = await ask(
      collaborationRoute({ scope: 'write' }, async () => {
        throw new Conflict('not now');
      }),
      bad,
    );
    expect(refused.status).toBe(409);
    expect((await save('a-4', 'After a refusal')).status).toBe(201);
  });

  it('makes the second of two at once wait', async () => {
    let finish = (_: unknown) => {};
    let begun = () => {};
    const isBegun = new Promise<void>((resolve) => {
      begun = resolve;
    });
    let times = 0;
    const slow = collaborationRoute({ scope: 'write', status: 201 }, () => {
      times++;
      begun();
      return new Promise((resolve) => {
        finish = resolve;
      });
    });
    const once = () => ask(slow, { method: 'POST', headers: { 'idempotency-key': 'a-5' } });
    const first = once();
    await isBegun;
    const second = await once();
    expect([second.status, (await second.json()).code]).toEqual([409, 'idempotency-key-busy']);
    await query(
      `update idempotency_key set created_at = now() - interval '1 hour' where key = 'a-5'`,
    );
    expect((await (await once()).json()).code).toBe('idempotency-key-lost');
    finish({ made: 1 });
    expect(await (await first).json()).toEqual({ made: 1 });
    expect(await (await once()).json()).toEqual({ made: 1 });
    expect(times).toBe(1);
  });

  it('is forgotten after a day', async () => {
    await save('a-6', 'Before a day');
    await query(
      `update idempotency_key set created_at = now() - interval '25 hours' where key = 'a-6'`,
    );
    expect((await save('a-6', 'After a day')).status).toBe(201);
    const kept = await query('select 1 from idempotency_key where key = $1', ['a-6']);
    expect(kept).toHaveLength(1);
  });

  it('is refused where an answer is not kept, or when it is no key', async () => {
    const headers = { 'idempotency-key': 'a-7' };
    const body = { label: 'A guest', days: 7 };
    const secret = await ask(inviteGuest, { method: 'POST', body, headers });
    expect([secret.status, (await secret.json()).code]).toEqual([400, 'idempotency-key-refused']);
    const open = await call(signUp, { method: 'POST', body: {}, headers });
    expect(open.status).toBe(400);
    expect((await save('two words', 'Of no key')).status).toBe(400);
    expect(await query('select 1 from idempotency_key where key = $1', ['a-7'])).toEqual([]);
  });
});

describe('a long list', () => {
  const numbers = Array.from({ length: 7 }, (_, i) => i);
  const list = collaborationRoute(
    { scope: 'read', query: pageSchema, paged: 'numbers', movingOrder: true },
    async ({ query: { limit, offset } }) => ({ numbers: numbers.slice(offset, offset + limit) }),
  );

  it('is read to its end by the Link of each page', async () => {
    const read: number[] = [];
    let next: string | undefined = '/numbers?limit=3';
    for (let pages = 0; next !== undefined && pages < 10; pages++) {
      const page: Response = await ask(list, { path: next });
      read.push(...(await page.json()).numbers);
      next = /^<([^>]+)>; rel="next"$/.exec(page.headers.get('link') ?? '')?.[1];
    }
    expect(read).toEqual(numbers);
  });

  it('takes no cursor that it did not give', async () => {
    for (const cursor of ['bm9uc2Vuc2U', '!', 'x'.repeat(90)]) {
      expect((await ask(list, { path: `/?cursor=${cursor}` })).status).toBe(400);
    }
    const cursor = Buffer.from('after 3').toString('base64url');
    expect((await ask(list, { path: `/?offset=2&cursor=${cursor}` })).status).toBe(400);
    for (const handler of [listJobs, listStudies]) {
      const empty = await ask(handler, { path: `/?cursor=${cursor}` });
      expect([empty.status, empty.headers.has('link')]).toEqual([200, false]);
    }
  });
});
