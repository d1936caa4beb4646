import { TOTP } from 'otpauth';
import { beforeEach, describe, expect, it, vi } from 'vitest';

vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');

import { POST as changePassword } from '@/app/api/v1/me/password/route';
import { POST as confirm } from '@/app/api/v1/me/second-factor/confirm/route';
import { POST as renew } from '@/app/api/v1/me/second-factor/recovery-codes/route';
import { POST as remove } from '@/app/api/v1/me/second-factor/remove/route';
import { POST as begin, GET as read } from '@/app/api/v1/me/second-factor/route';
import { makeLink } from '@/lib/access/account-links';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';
import { inTransaction } from '@/models';
import { Browser, newAccount, PASSWORD, signedIn } from '../support/auth-browser';
import { withDatabase } from '../support/database';
import { call, webAddress } from '../support/people';

const { query } = withDatabase();
type Handler = typeof begin;

beforeEach(async () => {
  await query('delete from rate_limit');
});

const ask = (browser: Browser, handler: Handler, body: unknown) =>
  call(handler, {
    method: 'POST',
    headers: { cookie: browser.cookie, origin: webAddress() },
    body,
  });
const state = async (browser: Browser) =>
  (await call(read, { headers: { cookie: browser.cookie } })).json();

/** The code for now, or so many steps later; a code of an earlier step than the last is refused. */
const codeOf = (key: string, stepsLater = 0) =>
  new TOTP({ secret: key }).generate({ timestamp: Date.now() + stepsLater * 30_000 });
/** Lets codes of this moment be used again, as if the last one had been typed long ago. */
const forgetStep = () => query('update second_factor set last_step = 0');

async function enrolled() {
  const email = await newAccount();
  const browser = await signedIn(email);
  const { key } = await (await ask(browser, begin, { password: PASSWORD })).json();
  const answer = await ask(browser, confirm, { code: codeOf(key) });
  expect(answer.status).toBe(200);
  const { recoveryCodes } = (await answer.json()) as { recoveryCodes: string[] };
  await forgetStep();
  return { email, browser, key: key as string, recoveryCodes };
}

async function signInWith(email: string, secondFactor?: string) {
  const browser = new Browser();
  const response = await browser.post('callback/credentials', {
    email,
    password: PASSWORD,
    ...(secondFactor === undefined ? {} : { secondFactor }),
  });
  const { url } = (await response.json()) as { url: string };
  return { browser, status: response.status, words: new URL(url).searchParams.get('error') };
}

describe('setting a second factor up', () => {
  it('asks for the password, then for a code of the key, and shows ten recovery codes once', async () => {
    const email = await newAccount();
    const [browser, elsewhere] = [await signedIn(email), await signedIn(email)];
    const wrong = await ask(browser, begin, { password: 'not my password' });
    expect((await wrong.json()).errors[0]).toMatchObject({ code: 'password-wrong' });
    const begun = await (await ask(browser, begin, { password: PASSWORD })).json();
    expect(begun.address).toContain(`secret=${begun.key}`);
    expect(await state(browser)).toEqual({ isOn: false, codesLeft: 0 });
    // Nothing is asked for until it is confirmed.
    expect((await signInWith(email)).status).toBe(200);

    const refused = await ask(browser, confirm, { code: codeOf(begun.key, 40) });
    expect((await refused.json()).errors[0]).toMatchObject({ code: 'code-wrong', item: 'code' });
    const { recoveryCodes } = await (
      await ask(browser, confirm, { code: codeOf(begun.key) })
    ).json();
    expect(new Set(recoveryCodes).size).toBe(10);
    expect(await state(browser)).toEqual({ isOn: true, codesLeft: 10 });
    expect((await browser.me()).status).toBe(200);
    expect((await elsewhere.me()).status).toBe(401);
    expect((await ask(browser, begin, { password: PASSWORD })).status).toBe(409);

    const stored = JSON.stringify([
      await query("select *, encode(sealed_key, 'escape') as text from second_factor"),
      await query('select * from recovery_code'),
      await query('select * from audit_entry'),
    ]);
    expect(stored).not.toContain(begun.key);
    for (const code of recoveryCodes) expect(stored).not.toContain(code);
  });
});

describe('signing in with a second factor', () => {
  it('asks for the code after the right password only, and takes each code once', async () => {
    const { email, key } = await enrolled();
    const asked = await signInWith(email);
    expect([asked.status, asked.words]).toEqual([401, CODE_IS_ASKED]);
    expect((await asked.browser.me()).status).toBe(401);
    const guess = await new Browser().signIn(email, 'wrong password here');
    expect(new URL((await guess.json()).url).searchParams.get('error')).toBe(
      'The address or the password is wrong.',
    );

    const code = codeOf(key);
    const both = await Promise.all([signInWith(email, code), signInWith(email, code)]);
    expect(both.map(({ status }) => status).sort()).toEqual([200, 401]);
    const again = await signInWith(email, code);
    expect([again.status, again.words]).toEqual([401, 'This code is wrong or was used before.']);
    // An earlier code than the last one is as used as that.
    expect((await signInWith(email, codeOf(key, -1))).status).toBe(401);
    expect((await signInWith(email, codeOf(key, 1))).status).toBe(200);
  });

  it('takes each recovery code once, however it is written', async () => {
    const { email, browser, recoveryCodes } = await enrolled();
    const [first, second] = recoveryCodes;
    expect((await signInWith(email, first.toUpperCase().replace(/-/g, ' '))).status).toBe(200);
    expect((await signInWith(email, first)).status).toBe(401);
    expect(await state(browser)).toEqual({ isOn: true, codesLeft: 9 });
    const renewed = await (await ask(browser, renew, { code: second })).json();
    expect((await signInWith(email, recoveryCodes[2])).status).toBe(401);
    expect((await signInWith(email, renewed.recoveryCodes[2])).status).toBe(200);
  });

  it('refuses the 6th wrong code, also at once, and then the right one', async () => {
    const { email, browser, key } = await enrolled();
    const answers = await Promise.all(
      Array.from({ length: 7 }, () => ask(browser, renew, { code: '000000' })),
    );
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses).toEqual([...Array(5).fill(422), 429, 429]);
    const refused = await signInWith(email, codeOf(key));
    expect([refused.status, refused.words]).toEqual([
      429,
      'Too many wrong codes. Try again in 15 minutes.',
    ]);
  });

  it('is asked for by a link from the mail too, which a wrong code does not use up', async () => {
    const { email, key } = await enrolled();
    const [{ id }] = await query<{ id: string }>('select id from person where email = $1', [email]);
    const { code } = await inTransaction((transaction) => makeLink(id, 'sign-in', transaction));
    const enter = async (secondFactor: string) => {
      const browser = new Browser();
      return (await browser.post('callback/link', { code, secondFactor })).status;
    };
    expect(await enter('')).toBe(401);
    expect(await enter('123')).toBe(401);
    expect(await enter(codeOf(key))).toBe(200);
    expect(await enter(codeOf(key, 1))).toBe(401);
  });
});

describe('the password beside a second factor', () => {
  it('may have 8 characters, and is made longer before the factor is turned off', async () => {
    const { email, browser, key } = await enrolled();
    const change = (currentPassword: string, newPassword: string) =>
      ask(browser, changePassword, { currentPassword, newPassword });
    expect((await (await change(PASSWORD, 'Kq8-moo')).json()).errors[0].code).toBe('too-short');
    expect((await change(PASSWORD, 'Kq8-mo3z')).status).toBe(204);
    const off = (password: string, code: string) => ask(browser, remove, { password, code });
    expect(await (await off('Kq8-mo3z', codeOf(key))).json()).toMatchObject({
      code: 'password-short',
    });
    expect((await change('Kq8-mo3z', PASSWORD)).status).toBe(204);
    expect((await off(PASSWORD, '000000')).status).toBe(422);
    expect((await off(PASSWORD, codeOf(key))).status).toBe(204);
    expect(await state(browser)).toEqual({ isOn: false, codesLeft: 0 });
    expect((await signInWith(email)).status).toBe(200);
    const short = await change(PASSWORD, 'Kq8-mo3z');
    expect((await short.json()).errors[0].code).toBe('too-short');
  });
});
