import type { AddressInfo } from 'node:net';
import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { createOrcidStandIn, standInPeople } from '@/lib/local/orcid-stand-in';

vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');
const standIn = createOrcidStandIn({
  clientId: 'a-client',
  clientSecret: 'its secret',
  webAddress: 'http://127.0.0.1:3210',
});
await new Promise<void>((resolve) => standIn.listen(0, '127.0.0.1', resolve));
const issuer = `http://127.0.0.1:${(standIn.address() as AddressInfo).port}`;
vi.stubEnv('ORCID_ISSUER', issuer);
vi.stubEnv('ORCID_CLIENT_ID', 'a-client');
vi.stubEnv('ORCID_CLIENT_SECRET', 'its secret');

const { DELETE: unlink } = await import('@/app/api/v1/me/orcid/route');
const { beginFactor } = await import('@/lib/access/second-factor');
const { inTransaction } = await import('@/models');
const { Browser } = await import('../support/auth-browser');
const { withDatabase } = await import('../support/database');
const { call, createPerson, sessionCookieOf, webAddress } = await import('../support/people');

type Person = Awaited<ReturnType<typeof createPerson>>;
const { query } = withDatabase();
const [ilse, petra] = standInPeople;

beforeEach(async () => {
  await query('delete from rate_limit');
  await query('update person set orcid = null');
});
afterAll(async () => {
  vi.unstubAllEnvs();
  standIn.closeAllConnections();
  await new Promise((resolve) => standIn.close(resolve));
});

async function browserOf(person: Person) {
  const browser = new Browser();
  const [name, value] = (await sessionCookieOf(person)).cookie.split('=');
  browser.jar.set(name, value);
  return browser;
}

/** To the provider and back, as a browser goes; returns where the provider sent it. */
async function ask(
  browser: InstanceType<typeof Browser>,
  intent: 'orcid' | 'orcid-link',
  choice: Record<string, string>,
): Promise<URL> {
  const begun = await browser.post(`signin/${intent}`, { callbackUrl: `${webAddress()}/heron/me` });
  const asked = new URL(((await begun.json()) as { url: string }).url);
  expect(asked.origin).toBe(issuer);
  expect(asked.searchParams.get('scope')).toBe('/authenticate');
  const shown = await fetch(asked);
  expect(await shown.text()).toContain(ilse.orcid);
  const answered = await fetch(`${issuer}/oauth/authorize`, {
    method: 'POST',
    body: new URLSearchParams([...asked.searchParams, ...Object.entries(choice)]),
    redirect: 'manual',
  });
  expect(answered.status).toBe(302);
  return new URL(answered.headers.get('location') ?? '');
}

/** Follows the way through next-auth to the page on which it ends. */
async function comeBack(browser: InstanceType<typeof Browser>, to: URL): Promise<URL> {
  if (!to.pathname.startsWith('/api/auth/')) return to;
  const response = await browser.get(`${to.pathname.replace('/api/auth/', '')}${to.search}`);
  expect(response.status).toBe(302);
  return comeBack(browser, new URL(response.headers.get('location') ?? '', webAddress()));
}

const go = async (
  browser: InstanceType<typeof Browser>,
  intent: 'orcid' | 'orcid-link',
  orcid: string,
) => comeBack(browser, await ask(browser, intent, { orcid }));

const linked = async (person: Person) =>
  (await query<{ orcid: string | null }>('select orcid from person where id = $1', [person.id]))[0]
    .orcid;
const nobody = async (browser: InstanceType<typeof Browser>) =>
  expect((await browser.me()).status).toBe(401);

describe('an ORCID iD', () => {
  it('is linked by who is signed in, signs in from then on, and is taken off again', async () => {
    const person = await createPerson();
    const mine = await browserOf(person);
    const back = await go(mine, 'orcid-link', ilse.orcid);
    expect(back.href).toBe(`${webAddress()}/heron/me?orcid=linked`);
    expect(await linked(person)).toBe(ilse.orcid);

    const elsewhere = new Browser();
    expect((await go(elsewhere, 'orcid', ilse.orcid)).href).toBe(`${webAddress()}/heron/me`);
    const me = await (await elsewhere.me()).json();
    expect(me.person.id).toBe(person.id);

    const headers = { cookie: elsewhere.cookie, origin: webAddress() };
    expect((await call(unlink, { method: 'DELETE', headers })).status).toBe(204);
    expect(await linked(person)).toBeNull();
    expect((await elsewhere.me()).status).toBe(200);
    const next = await go(new Browser(), 'orcid', ilse.orcid);
    expect(next.searchParams.get('error')).toBe('OrcidUnknown');
    const actions = await query<{ action: string }>(
      'select action from audit_entry where person_id = $1 order by id',
      [person.id],
    );
    expect(actions.map(({ action }) => action)).toEqual(['link-orcid', 'sign-in', 'unlink-orcid']);
  });

  it('opens no account that nobody linked, whatever its address, and makes none', async () => {
    await createPerson({ name: petra.name });
    const [before] = await query<{ count: number }>('select count(*)::int as count from person');
    const browser = new Browser();
    const back = await go(browser, 'orcid', petra.orcid);
    expect(back.href).toBe(`${webAddress()}/sign-in?error=OrcidUnknown`);
    await nobody(browser);
    const [after] = await query<{ count: number }>('select count(*)::int as count from person');
    expect(after).toEqual(before);
  });

  it('belongs to one account, and to nobody when the session has ended on the way', async () => {
    const [first, second] = [await createPerson(), await createPerson()];
    await go(await browserOf(first), 'orcid-link', ilse.orcid);
    const back = await go(await browserOf(second), 'orcid-link', ilse.orcid);
    expect(back.searchParams.get('orcid')).toBe('taken');
    expect(await linked(second)).toBeNull();
    const late = await browserOf(second);
    const answer = await ask(late, 'orcid-link', { orcid: petra.orcid });
    await query('delete from session where person_id = $1', [second.id]);
    expect((await comeBack(late, answer)).searchParams.get('error')).toBe('OrcidSignedOut');
    expect(await linked(second)).toBeNull();
  });

  it('leads to the question for a code where the person has a second factor', async () => {
    const person = await createPerson();
    await go(await browserOf(person), 'orcid-link', ilse.orcid);
    await inTransaction((transaction) => beginFactor(person.id, transaction));
    await query('update second_factor set confirmed_at = now()');
    const browser = new Browser();
    const back = await go(browser, 'orcid', ilse.orcid);
    expect(back.pathname).toMatch(/^\/sign-in\/link\/[\w-]{43}$/);
    await nobody(browser);
    const code = back.pathname.split('/').at(-1) ?? '';
    expect((await browser.post('callback/link', { code })).status).toBe(401);
    await nobody(browser);
  });

  it('lets nobody in who is suspended', async () => {
    const person = await createPerson();
    await go(await browserOf(person), 'orcid-link', ilse.orcid);
    await query('update person set suspended_at = now() where id = $1', [person.id]);
    const browser = new Browser();
    expect((await go(browser, 'orcid', ilse.orcid)).searchParams.get('error')).toBe('OrcidUnknown');
    await nobody(browser);
  });
});

describe('what goes wrong on the way', () => {
  const refusedWith = async (
    code: string,
    make: (browser: InstanceType<typeof Browser>) => Promise<URL>,
  ) => {
    const person = await createPerson();
    await query('update person set orcid = $2 where id = $1', [person.id, ilse.orcid]);
    const browser = new Browser();
    const back = await comeBack(browser, await make(browser));
    expect(back.pathname).toBe('/sign-in');
    expect(back.searchParams.get('error')).toBe(code);
    await nobody(browser);
  };

  it('is refused: denied at the provider', async () => {
    await refusedWith('Callback', (browser) => ask(browser, 'orcid', { deny: 'yes' }));
  });

  it('is refused: a state of somebody else', async () => {
    await refusedWith('OAuthCallback', async (browser) => {
      const answer = await ask(browser, 'orcid', { orcid: ilse.orcid });
      answer.searchParams.set('state', 'made-up');
      return answer;
    });
  });

  it('is refused: an answer that another browser asked for', async () => {
    await refusedWith('OAuthCallback', () => ask(new Browser(), 'orcid', { orcid: ilse.orcid }));
  });

  it('is refused: an answer to signing in that is sent to linking', async () => {
    await refusedWith('OAuthCallback', async (browser) => {
      const answer = await ask(browser, 'orcid', { orcid: ilse.orcid });
      answer.pathname = '/api/auth/callback/orcid-link';
      return answer;
    });
  });

  it('is refused: a code that was used before', async () => {
    await refusedWith('OAuthCallback', async (browser) => {
      const answer = await ask(browser, 'orcid', { orcid: ilse.orcid });
      const jar = new Map(browser.jar);
      await comeBack(browser, answer);
      await browser.post('signout', {});
      for (const [name, value] of jar) browser.jar.set(name, value);
      return answer;
    });
  });

  it('is refused: an iD whose last character does not fit', async () => {
    const damaged = ilse.orcid.replace(/.$/, (last) => (last === '0' ? '1' : '0'));
    await refusedWith('OrcidDamaged', (browser) => ask(browser, 'orcid', { orcid: damaged }));
  });

  it('is told in no address when the fault is our own', async () => {
    const browser = new Browser();
    const answer = await ask(browser, 'orcid', { orcid: ilse.orcid });
    const logged = vi.spyOn(process.stderr, 'write').mockReturnValue(true);
    await query('alter table person rename column orcid to elsewhere');
    const back = await comeBack(browser, answer);
    await query('alter table person rename column elsewhere to orcid');
    expect(back.href).toBe(`${webAddress()}/sign-in?error=OrcidFault`);
    expect(logged.mock.calls.flat().join('')).toContain('orcid');
    logged.mockRestore();
  });

  it('is refused by the provider: another site to go back to, and a client without its secret', async () => {
    const address = new URL(`${issuer}/oauth/authorize`);
    address.search = new URLSearchParams({
      client_id: 'a-client',
      response_type: 'code',
      redirect_uri: 'https://elsewhere.example/',
      code_challenge_method: 'S256',
    }).toString();
    expect((await fetch(address)).status).toBe(400);
    const token = await fetch(`${issuer}/oauth/token`, {
      method: 'POST',
      body: new URLSearchParams({ client_id: 'a-client', client_secret: 'a guess', code: 'x' }),
    });
    expect([token.status, await token.json()]).toEqual([401, { error: 'invalid_client' }]);
  });
});
