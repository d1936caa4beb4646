import { beforeEach, describe, expect, it, vi } from 'vitest';

vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');

import { GET as authGet } from '@/app/api/auth/[...nextauth]/route';
import { POST as changePassword } from '@/app/api/v1/me/password/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { DELETE as endSession } from '@/app/api/v1/me/sessions/[session]/route';
import { DELETE as endOthers, GET as getSessions } from '@/app/api/v1/me/sessions/route';
import { Browser, newAccount, PASSWORD, signedIn } from '../support/auth-browser';
import { withDatabase } from '../support/database';
import { call, webAddress } from '../support/people';

const { query } = withDatabase();
const ours = () => ({ origin: webAddress() });

beforeEach(async () => {
  await query('delete from rate_limit');
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
    const told = await query('select kind, state from outbox_message where to_address = $1', [
      email,
    ]);
    expect(told).toEqual([{ kind: 'account-changed', state: 'waiting' }]);
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
