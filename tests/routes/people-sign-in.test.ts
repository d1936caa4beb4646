import * as argon2 from '@node-rs/argon2';
import { beforeEach, describe, expect, it, vi } from 'vitest';

vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');
// The real thing, with its calls counted: unknown accounts must cost the same hash.
vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<typeof import('@node-rs/argon2')>();
  return { ...real, verify: vi.fn(real.verify) };
});

import { GET as authGet, POST as authPost } from '@/app/api/auth/[...nextauth]/route';
import { POST as changePassword } from '@/app/api/v1/me/password/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { DELETE as endSession } from '@/app/api/v1/me/sessions/[session]/route';
import { DELETE as endOthers, GET as getSessions } from '@/app/api/v1/me/sessions/route';
import { POST as signUp } from '@/app/api/v1/sign-up/route';
import { withDatabase } from '../support/database';
import { call, webAddress } from '../support/people';

const { query } = withDatabase();
const PASSWORD = 'violet harbour anchor mosaic';
const ours = () => ({ origin: webAddress() });

/** A browser as far as next-auth is concerned: it keeps cookies and fetches the CSRF token. */
class Browser {
  readonly jar = new Map<string, string>();

  get cookie(): string {
    return [...this.jar].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  private keep(response: Response): Response {
    for (const line of response.headers.getSetCookie()) {
      const [pair] = line.split(';');
      const at = pair.indexOf('=');
      const value = pair.slice(at + 1);
      if (value === '') this.jar.delete(pair.slice(0, at));
      else this.jar.set(pair.slice(0, at), value);
    }
    return response;
  }

  async get(action: string): Promise<Response> {
    const request = new Request(`${webAddress()}/api/auth/${action}`, {
      headers: { cookie: this.cookie },
    });
    return this.keep(
      await authGet(request, { params: Promise.resolve({ nextauth: action.split('/') }) }),
    );
  }

  async post(action: string, form: Record<string, string>): Promise<Response> {
    const { csrfToken } = (await (await this.get('csrf')).json()) as { csrfToken: string };
    const request = new Request(`${webAddress()}/api/auth/${action}`, {
      method: 'POST',
      headers: {
        cookie: this.cookie,
        'content-type': 'application/x-www-form-urlencoded',
        'user-agent': 'a browser',
      },
      body: new URLSearchParams({ csrfToken, json: 'true', ...form }),
    });
    return this.keep(
      await authPost(request, { params: Promise.resolve({ nextauth: action.split('/') }) }),
    );
  }

  signIn(email: string, password: string, callbackUrl = `${webAddress()}/`): Promise<Response> {
    return this.post('callback/credentials', { email, password, callbackUrl });
  }

  me(): Promise<Response> {
    return call(getMe, { headers: { cookie: this.cookie } });
  }
}

const sentenceOf = async (response: Response) =>
  new URL(((await response.json()) as { url: string }).url).searchParams.get('error');

let count = 0;
async function newAccount(): Promise<string> {
  count += 1;
  const email = `person-${count}@observatory.example`;
  const body = { name: 'Ruth Castellan', email, password: PASSWORD };
  expect((await call(signUp, { method: 'POST', body })).status).toBe(201);
  return email;
}

async function signedIn(email: string): Promise<Browser> {
  const browser = new Browser();
  expect((await browser.signIn(email, PASSWORD)).status).toBe(200);
  return browser;
}

beforeEach(async () => {
  await query('delete from rate_limit');
});

describe('POST /api/v1/sign-up', () => {
  it('makes a person, stores no password in clear, and answers who they are', async () => {
    const body = { name: 'Mira Okafor', email: 'Mira@Observatory.example', password: PASSWORD };
    const response = await call(signUp, { method: 'POST', body });
    expect(response.status).toBe(201);
    const answer = await response.json();
    expect(answer).toEqual({
      person: { id: answer.person.id, name: 'Mira Okafor', email: 'mira@observatory.example' },
      collaborations: [],
    });
    const [row] = await query<{ password_hash: string }>(
      "select password_hash from person where email = 'mira@observatory.example'",
    );
    expect(row.password_hash).toMatch(/^\$argon2id\$/);
    expect(JSON.stringify(await query('select * from audit_entry'))).not.toContain(PASSWORD);
  });

  it('refuses a second account for the same address in any case', async () => {
    const email = await newAccount();
    const body = { name: 'Somebody', email: email.toUpperCase(), password: PASSWORD };
    const response = await call(signUp, { method: 'POST', body });
    expect(response.status).toBe(409);
    expect(await response.json()).toMatchObject({ code: 'email-taken' });
  });

  it.each([
    ['rareboundrarebound1', 'password-name'],
    ['passwordpassword', 'password-guessable'],
    ['brief lamp', 'too-short'],
    ['x'.repeat(129), 'too-long'],
  ])('refuses the password %s', async (password, code) => {
    const body = { name: 'Mira Okafor', email: 'other@observatory.example', password };
    const response = await call(signUp, { method: 'POST', body });
    expect(response.status).toBe(422);
    const problem = await response.json();
    expect(problem.errors[0]).toMatchObject({ code, item: 'password' });
    expect(JSON.stringify(problem)).not.toContain(password.slice(0, 10));
  });

  it('takes no roles: keys that it does not know are refused', async () => {
    const body = {
      name: 'M',
      email: 'm@observatory.example',
      password: PASSWORD,
      roles: ['owner'],
    };
    const response = await call(signUp, { method: 'POST', body });
    expect(response.status).toBe(400);
    expect((await response.json()).errors[0]).toEqual({
      code: 'key-unknown',
      item: 'roles',
      message: 'The key "roles" is not known here',
    });
  });
});

describe('signing in', () => {
  it('begins a session that the API and next-auth know', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    const me = await browser.me();
    expect(me.status).toBe(200);
    expect((await me.json()).person.email).toBe(email);
    const session = await (await browser.get('session')).json();
    expect(session.user).toMatchObject({ email, name: 'Ruth Castellan' });
  });

  it('sets a cookie that no script can read and no other site can send along', async () => {
    const email = await newAccount();
    const browser = new Browser();
    const response = await browser.signIn(email, PASSWORD);
    const cookie = response.headers.getSetCookie().find((line) => line.includes('.session='));
    expect(cookie).toMatch(/HttpOnly/i);
    expect(cookie).toMatch(/SameSite=Lax/i);
    expect(cookie).toMatch(/Path=\//i);
  });

  it('gives each sign-in an id of its own', async () => {
    const email = await newAccount();
    await signedIn(email);
    await signedIn(email);
    const rows = await query(
      'select distinct s.id from session s join person p on p.id = s.person_id where p.email = $1',
      [email],
    );
    expect(rows).toHaveLength(2);
  });

  it('says the same of a wrong password and of an unknown account, and does the same work', async () => {
    const email = await newAccount();
    vi.mocked(argon2.verify).mockClear();
    const wrong = await new Browser().signIn(email, 'not the password at all');
    expect(argon2.verify).toHaveBeenCalledTimes(1);
    const unknown = await new Browser().signIn('nobody@observatory.example', PASSWORD);
    expect(argon2.verify).toHaveBeenCalledTimes(2);
    const [first, second] = vi.mocked(argon2.verify).mock.calls.map(([hash]) => String(hash));
    expect(second.split('$').slice(0, 4)).toEqual(first.split('$').slice(0, 4));
    expect(wrong.status).toBe(401);
    expect(unknown.status).toBe(401);
    const sentence = 'The address or the password is wrong.';
    expect(await sentenceOf(wrong)).toBe(sentence);
    expect(await sentenceOf(unknown)).toBe(sentence);
  });

  it.each([
    ['known', true],
    ['unknown', false],
  ])('refuses the 6th attempt on a %s account and says how long to wait', async (_, isKnown) => {
    const email = isKnown ? await newAccount() : 'stranger@observatory.example';
    for (let i = 0; i < 5; i++) {
      expect((await new Browser().signIn(email, 'wrong password here')).status).toBe(401);
    }
    // Even the right password has to wait now.
    const refused = await new Browser().signIn(email, PASSWORD);
    expect(refused.status).toBe(429);
    const wait = Number(refused.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(880);
    expect(wait).toBeLessThanOrEqual(900);
    expect(await sentenceOf(refused)).toBe('Too many wrong passwords. Try again in 15 minutes.');
    const other = await newAccount();
    expect((await new Browser().signIn(other, PASSWORD)).status).toBe(200);
  });

  it('counts attempts that are sent at once', async () => {
    const email = await newAccount();
    const answers = await Promise.all(
      Array.from({ length: 12 }, () => new Browser().signIn(email, 'wrong password here')),
    );
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses).toEqual([...Array(5).fill(401), ...Array(7).fill(429)]);
  });

  it('forgets wrong passwords after the right one', async () => {
    const email = await newAccount();
    for (let round = 0; round < 3; round++) {
      for (let i = 0; i < 4; i++) await new Browser().signIn(email, 'wrong password here');
      await signedIn(email);
    }
  });

  it('keeps no address of mail in the table of attempts', async () => {
    const email = await newAccount();
    await new Browser().signIn(email, 'wrong password here');
    const keys = JSON.stringify(await query('select key from rate_limit'));
    expect(keys).toContain('sign-in-account-address');
    expect(keys).not.toContain(email.split('@')[0]);
  });

  it('lets nobody in who is suspended', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    await query('update person set suspended_at = now() where email = $1', [email]);
    expect((await browser.me()).status).toBe(401);
    expect((await new Browser().signIn(email, PASSWORD)).status).toBe(401);
  });

  it('sends nobody on to another site', async () => {
    const email = await newAccount();
    const response = await new Browser().signIn(email, PASSWORD, 'https://elsewhere.example/');
    expect(new URL((await response.json()).url).origin).toBe(webAddress());
  });

  it('needs the CSRF token of the same browser', async () => {
    const email = await newAccount();
    const browser = new Browser();
    const response = await browser.post('callback/credentials', {
      email,
      password: PASSWORD,
      csrfToken: 'made-up',
    });
    expect((await response.json()).url).toContain('csrf=true');
    expect((await browser.me()).status).toBe(401);
  });
});

describe('a session', () => {
  it('is over at sign-out, also for a copy of its cookie', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    const copied = browser.cookie;
    expect((await browser.post('signout', {})).status).toBe(200);
    expect((await call(getMe, { headers: { cookie: copied } })).status).toBe(401);
    const asked = new Request(`${webAddress()}/api/auth/session`, { headers: { cookie: copied } });
    const session = await authGet(asked, { params: Promise.resolve({ nextauth: ['session'] }) });
    expect(await session.json()).toEqual({});
    // next-auth clears the cookie of an ended session and signs no new one.
    expect(session.headers.getSetCookie().join('\n')).not.toMatch(/\.session=[^;]/);
    expect((await browser.me()).status).toBe(401);
  });

  it.each([
    ['7 days idle', "last_seen_at = now() - interval '7 days 1 second'"],
    ['30 days old', "expires_at = now() - interval '1 second'"],
  ])('is over when it is %s', async (_, change) => {
    const email = await newAccount();
    const browser = await signedIn(email);
    await query(
      `update session set ${change} where person_id = (select id from person where email = $1)`,
      [email],
    );
    expect((await browser.me()).status).toBe(401);
  });

  it('ends 30 days after its beginning, however often it is used', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    await browser.get('session');
    await browser.me();
    const [row] = await query<{ days: number }>(
      `select extract(epoch from s.expires_at - s.created_at)::float / 86400 as days
         from session s join person p on p.id = s.person_id where p.email = $1`,
      [email],
    );
    expect(row.days).toBeCloseTo(30, 3);
  });

  it('notes when it was seen, at most once a minute', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    const seen = async () =>
      (
        await query<{ at: Date }>(
          'select last_seen_at as at from session s join person p on p.id = s.person_id where p.email = $1',
          [email],
        )
      )[0].at.getTime();
    const first = await seen();
    await browser.me();
    expect(await seen()).toBe(first);
    await query("update session set last_seen_at = last_seen_at - interval '2 minutes'");
    await browser.me();
    expect(await seen()).toBeGreaterThan(first - 1000);
  });

  it('is not made by a cookie signed with another secret, nor by one without a row', async () => {
    const { encode } = await import('next-auth/jwt');
    const email = await newAccount();
    const [{ id }] = await query<{ id: string }>('select id from person where email = $1', [email]);
    const token = { sub: id, sid: '00000000-0000-4000-8000-000000000000' };
    for (const secret of ['another-secret-0123456789', 'only-for-tests-0123456789abcdef']) {
      const cookie = `rarebound.session=${await encode({ token, secret })}`;
      expect((await call(getMe, { headers: { cookie } })).status).toBe(401);
    }
    const damaged = { cookie: 'rarebound.session=not.a.token' };
    expect((await call(getMe, { headers: damaged })).status).toBe(401);
  });

  it('can be seen and ended by its person, from another one', async () => {
    const email = await newAccount();
    const here = await signedIn(email);
    const there = await signedIn(email);
    const listed = await call(getSessions, { headers: { cookie: here.cookie } });
    const { sessions } = await listed.json();
    expect(sessions).toHaveLength(2);
    expect(sessions[0]).toMatchObject({ userAgent: 'a browser' });
    const other = sessions.find(({ isThisOne }: { isThisOne: boolean }) => !isThisOne);
    const ended = await call(endSession, {
      method: 'DELETE',
      headers: { cookie: here.cookie, ...ours() },
      params: { session: other.id },
    });
    expect(ended.status).toBe(204);
    expect((await there.me()).status).toBe(401);
    expect((await here.me()).status).toBe(200);
  });

  it('of somebody else is not found', async () => {
    const mine = await signedIn(await newAccount());
    const email = await newAccount();
    const theirs = await signedIn(email);
    const [{ id }] = await query<{ id: string }>(
      'select s.id from session s join person p on p.id = s.person_id where p.email = $1',
      [email],
    );
    const asked = { method: 'DELETE', headers: { cookie: mine.cookie, ...ours() } };
    const foreign = await call(endSession, { ...asked, params: { session: id } });
    const absent = await call(endSession, {
      ...asked,
      params: { session: '00000000-0000-4000-8000-000000000000' },
    });
    expect(foreign.status).toBe(404);
    expect(await foreign.text()).toBe(await absent.text());
    expect((await theirs.me()).status).toBe(200);
  });

  it('ends everywhere else at once', async () => {
    const email = await newAccount();
    const [here, there] = [await signedIn(email), await signedIn(email)];
    const headers = { cookie: here.cookie, ...ours() };
    expect((await call(endOthers, { method: 'DELETE', headers })).status).toBe(204);
    expect((await there.me()).status).toBe(401);
    expect((await here.me()).status).toBe(200);
  });
});

describe('POST /api/v1/me/password', () => {
  const change = (browser: Browser, currentPassword: string, newPassword: string) =>
    call(changePassword, {
      method: 'POST',
      headers: { cookie: browser.cookie, ...ours() },
      body: { currentPassword, newPassword },
    });

  it('ends every other session, and the old password opens nothing', async () => {
    const email = await newAccount();
    const [here, there] = [await signedIn(email), await signedIn(email)];
    expect((await change(here, PASSWORD, 'walnut zephyr bishop copper')).status).toBe(204);
    expect((await there.me()).status).toBe(401);
    expect((await here.me()).status).toBe(200);
    expect((await new Browser().signIn(email, PASSWORD)).status).toBe(401);
    const again = await new Browser().signIn(email, 'walnut zephyr bishop copper');
    expect(again.status).toBe(200);
  });

  it('asks for the present password, and holds the new one to the rules', async () => {
    const browser = await signedIn(await newAccount());
    const wrong = await change(browser, 'not my password', 'walnut zephyr bishop copper');
    expect(wrong.status).toBe(422);
    expect((await wrong.json()).errors[0]).toMatchObject({
      code: 'password-wrong',
      item: 'currentPassword',
    });
    const named = await change(browser, PASSWORD, 'castellan zephyr bishop copper');
    expect((await named.json()).errors[0]).toMatchObject({ code: 'password-name' });
  });

  it('refuses to go on after 10 attempts', async () => {
    const browser = await signedIn(await newAccount());
    for (let i = 0; i < 10; i++) await change(browser, `wrong ${i}`, 'walnut zephyr bishop copper');
    expect((await change(browser, PASSWORD, 'walnut zephyr bishop copper')).status).toBe(429);
  });
});

describe('the log', () => {
  it('keeps sign-ups, sign-ins, refusals and sign-outs, without address of mail or password', async () => {
    const email = await newAccount();
    await new Browser().signIn(email, 'wrong password here');
    const browser = await signedIn(email);
    await browser.post('signout', {});
    const entries = await query<{ action: string }>(
      `select a.action from audit_entry a join person p on p.id = a.person_id
        where p.email = $1 order by a.id`,
      [email],
    );
    expect(entries.map(({ action }) => action)).toEqual([
      'sign-up',
      'sign-in-refused',
      'sign-in',
      'sign-out',
    ]);
    const all = JSON.stringify(await query('select * from audit_entry'));
    expect(all).not.toContain(email);
    expect(all).not.toContain('wrong password');
  });
});
