import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('MAIL_URL', mailbox.url);
vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');

const { POST: askLink } = await import('@/app/api/v1/account-links/route');
const { POST: resetPassword } = await import('@/app/api/v1/password-reset/route');
const { sendDue } = await import('@/lib/mail/post');
const { Browser, newAccount, PASSWORD, signedIn } = await import('../support/auth-browser');
const { withDatabase } = await import('../support/database');
const { call, createPerson } = await import('../support/people');

const { query } = withDatabase();
const NEW_PASSWORD = 'walnut zephyr bishop copper';

beforeEach(async () => {
  mailbox.received.splice(0);
  await query('delete from rate_limit');
  await query('delete from outbox_message');
});
afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

const ask = (email: string, purpose = 'password-reset') =>
  call(askLink, { method: 'POST', body: { email, purpose } });
const reset = (code: string, password = NEW_PASSWORD) =>
  call(resetPassword, { method: 'POST', body: { code, password } });

/** Asks for a link and takes its code out of the message that arrives. */
async function linkFor(email: string, purpose = 'password-reset'): Promise<string> {
  expect((await ask(email, purpose)).status).toBe(204);
  await sendDue();
  const mail = mailbox.received.filter(({ to }) => to.includes(email)).at(-1);
  const code = /\/(?:reset|sign-in\/link)\/([\w-]+)/.exec(mail?.text ?? '')?.[1];
  if (!code) throw new Error('no link in the message');
  return code;
}

describe('a link to set a new password', () => {
  it('sets it once, ends every session and opens a locked account again', async () => {
    const email = await newAccount();
    const browser = await signedIn(email);
    const code = await linkFor(email);
    // 256 bits, and the database holds none of them in clear.
    expect(Buffer.from(code, 'base64url')).toHaveLength(32);
    const stored = JSON.stringify([
      await query('select * from account_link'),
      await query("select *, encode(sealed, 'escape') from outbox_message"),
    ]);
    expect(stored).not.toContain(code);
    for (let i = 0; i < 5; i++) await new Browser().signIn(email, '');
    expect((await new Browser().signIn(email, PASSWORD)).status).toBe(429);

    expect((await reset(code)).status).toBe(204);
    expect((await browser.me()).status).toBe(401);
    expect((await new Browser().signIn(email, PASSWORD)).status).toBe(401);
    expect((await new Browser().signIn(email, NEW_PASSWORD)).status).toBe(200);
    const second = await reset(code, 'another walnut zephyr bishop');
    expect(second.status).toBe(422);
    expect(await second.json()).toMatchObject({ code: 'link-over' });
    const [entry] = await query<{ details: object }>(
      "select details from audit_entry where action = 'reset-password'",
    );
    expect(entry.details).toEqual({ via: 'link' });
  });

  it('stays as it was when the password is against the rules, and works for one of two at once', async () => {
    const person = await createPerson({ name: 'Ruth Castellan' });
    const code = await linkFor(person.email);
    const refused = await reset(code, 'castellan zephyr bishop copper');
    expect(refused.status).toBe(422);
    expect((await refused.json()).errors[0]).toMatchObject({
      code: 'password-name',
      item: 'password',
    });
    expect((await (await reset(code, 'brief lamp')).json()).errors[0].code).toBe('too-short');
    const both = await Promise.all([reset(code), reset(code)]);
    expect(both.map(({ status }) => status).sort()).toEqual([204, 422]);
  });

  it('is over after 30 minutes, after a newer one, and for somebody suspended', async () => {
    const { email, id } = await createPerson();
    const first = await linkFor(email);
    const [row] = await query<{ minutes: number }>(
      `select extract(epoch from expires_at - created_at)::float / 60 as minutes
         from account_link where person_id = $1`,
      [id],
    );
    expect(row.minutes).toBeCloseTo(30, 6);
    const second = await linkFor(email);
    expect((await reset(first)).status).toBe(422);
    await query('update account_link set expires_at = now() where person_id = $1', [id]);
    expect((await reset(second)).status).toBe(422);
    const third = await linkFor(email);
    await query('update person set suspended_at = now() where id = $1', [id]);
    expect((await reset(third)).status).toBe(422);
    expect((await reset('x'.repeat(43))).status).toBe(422);
  });

  it('is asked for with one answer and one time, whether there is an account or not', async () => {
    const { email } = await createPerson();
    const suspended = await createPerson();
    await query('update person set suspended_at = now() where id = $1', [suspended.id]);
    const answers: unknown[] = [];
    for (const one of [email, 'nobody@observatory.example', suspended.email]) {
      const began = performance.now();
      const response = await ask(one);
      // A timer may fire up to a millisecond early.
      expect(performance.now() - began).toBeGreaterThan(198);
      const headers = [...response.headers].filter(([name]) => name !== 'x-request-id');
      answers.push([response.status, await response.text(), headers]);
    }
    expect(answers[1]).toEqual(answers[0]);
    expect(answers[2]).toEqual(answers[0]);
    await sendDue();
    expect(mailbox.received.map(({ to }) => to)).toEqual([[email]]);
  });

  it('is asked for at most 3 times in 15 minutes, known or not', async () => {
    const { email } = await createPerson();
    for (const one of [email, 'stranger@observatory.example']) {
      const answers = await Promise.all(Array.from({ length: 4 }, () => ask(one)));
      expect(answers.map(({ status }) => status).sort()).toEqual([204, 204, 204, 429]);
      const refused = answers.find(({ status }) => status === 429);
      expect(Number(refused?.headers.get('retry-after'))).toBeGreaterThan(880);
    }
    expect(JSON.stringify(await query('select key from rate_limit'))).not.toContain('stranger');
  });
});

describe('a link to sign in', () => {
  const signInBy = async (code: string) => {
    const browser = new Browser();
    return { browser, response: await browser.post('callback/link', { code }) };
  };

  it('begins one session, once, and does nothing but that', async () => {
    const person = await createPerson();
    const code = await linkFor(person.email, 'sign-in');
    expect((await reset(code)).status).toBe(422);
    const both = await Promise.all([signInBy(code), signInBy(code)]);
    expect(both.map(({ response }) => response.status).sort()).toEqual([200, 401]);
    const winner = both.find(({ response }) => response.status === 200);
    if (!winner) throw new Error('nobody was signed in');
    const me = await (await winner.browser.me()).json();
    expect(me.person).toMatchObject({ id: person.id, email: person.email });
    const sessions = await query('select 1 from session where person_id = $1', [person.id]);
    expect(sessions).toHaveLength(1);
    const [entry] = await query<{ details: object }>(
      "select details from audit_entry where action = 'sign-in' and person_id = $1",
      [person.id],
    );
    expect(entry.details).toMatchObject({ by: 'link' });
  });

  it('is over after 15 minutes and after a newer one, for somebody suspended, and by a new password', async () => {
    const { email, id } = await createPerson();
    const first = await linkFor(email, 'sign-in');
    const [row] = await query<{ minutes: number }>(
      `select extract(epoch from expires_at - created_at)::float / 60 as minutes
         from account_link where person_id = $1`,
      [id],
    );
    expect(row.minutes).toBeCloseTo(15, 6);
    const second = await linkFor(email, 'sign-in');
    expect((await signInBy(first)).response.status).toBe(401);
    await query('update account_link set expires_at = now() where person_id = $1', [id]);
    expect((await signInBy(second)).response.status).toBe(401);
    const third = await linkFor(email, 'sign-in');
    await reset(await linkFor(email));
    expect((await signInBy(third)).response.status).toBe(401);
    await query('delete from rate_limit');
    const fourth = await linkFor(email, 'sign-in');
    await query('update person set suspended_at = now() where id = $1', [id]);
    const refused = await signInBy(fourth);
    expect(refused.response.status).toBe(401);
    expect(new URL((await refused.response.json()).url).searchParams.get('error')).toBe(
      'This link was used, has expired or was replaced by a newer one: ask for another.',
    );
    expect((await refused.browser.me()).status).toBe(401);
  });
});
