import * as argon2 from '@node-rs/argon2';
import { beforeEach, describe, expect, it, vi } from 'vitest';

vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');
// The real thing, with its calls counted: unknown accounts must cost the same hash.
vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<typeof import('@node-rs/argon2')>();
  return { ...real, verify: vi.fn(real.verify) };
});

import { POST as signUp } from '@/app/api/v1/sign-up/route';
import { Browser, newAccount, PASSWORD, signedIn } from '../support/auth-browser';
import { withDatabase } from '../support/database';
import { call, webAddress } from '../support/people';

const { query } = withDatabase();

const sentenceOf = async (response: Response) =>
  new URL(((await response.json()) as { url: string }).url).searchParams.get('error');

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
