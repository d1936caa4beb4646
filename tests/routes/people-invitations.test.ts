import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('MAIL_URL', mailbox.url);

const { GET: list, POST: invite } = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/route'
);
const { DELETE: revoke } = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route'
);
const { POST: resend } = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/resend/route'
);
const { GET: getOffer, POST: join } = await import('@/app/api/v1/join/[code]/route');
const { GET: getMe } = await import('@/app/api/v1/me/route');
const { sendDue } = await import('@/lib/mail/post');
const { withDatabase } = await import('../support/database');
const people = await import('../support/people');
const { bearer, call, createPerson, sessionCookieOf, tokenOf, webAddress } = people;

type Role = import('@/lib/schemas/common').Role;

const { query } = withDatabase();
const PASSWORD = 'violet harbour anchor mosaic';

let team: Awaited<
  ReturnType<typeof people.createCollaborationWith<'owner' | 'author' | 'student'>>
>;
let token: Record<'owner' | 'author' | 'student', string>;
let serial = 0;
const newAddress = () => `guest-${++serial}@observatory.example`;

beforeAll(async () => {
  team = await people.createCollaborationWith(['owner', 'author', 'student']);
  const { owner, author, student } = team.people;
  const of = (person: { id: string }) => tokenOf(person, team.collaboration);
  token = { owner: await of(owner), author: await of(author), student: await of(student) };
});

beforeEach(async () => {
  mailbox.refuse(null);
  await query('delete from rate_limit');
});

afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

const params = () => ({ collaboration: team.collaboration.slug });

const inviteAs = (role: 'owner' | 'author' | 'student', email: string, roles: Role[]) =>
  call(invite, {
    method: 'POST',
    params: params(),
    headers: bearer(token[role]),
    body: { email, roles },
  });

const onInvitation = (handler: typeof revoke, method: string, invitation: string) =>
  call(handler, {
    method,
    params: { ...params(), invitation },
    headers: bearer(token.owner),
  });

/** The code in the newest message to an address, once what waits has been sent. */
async function codeFor(email: string): Promise<string> {
  await sendDue();
  const mail = mailbox.received.filter(({ to }) => to.includes(email)).at(-1);
  const code = /\/join\/([A-Za-z0-9_-]+)/.exec(mail?.text ?? '')?.[1];
  if (code === undefined) throw new Error(`no code was sent to ${email}`);
  return code;
}

async function invited(roles: Role[] = ['student']): Promise<{ email: string; code: string }> {
  const email = newAddress();
  expect((await inviteAs('owner', email, roles)).status).toBe(201);
  return { email, code: await codeFor(email) };
}

const offerOf = (code: string) => call(getOffer, { params: { code } });
const joinWith = (
  code: string,
  body: Record<string, unknown>,
  headers: Record<string, string> = {},
): Promise<Response> => call(join, { method: 'POST', params: { code }, body, headers });

describe('POST …/invitations', () => {
  it('sends one message with a link that opens once, and stores no code', async () => {
    const email = newAddress();
    const response = await inviteAs('owner', email, ['statistician', 'author']);
    expect(response.status).toBe(201);
    expect(await response.json()).toMatchObject({
      email,
      roles: ['statistician', 'author'],
      state: 'pending',
      invitedBy: team.people.owner.name,
    });
    const code = await codeFor(email);
    const mail = mailbox.received.at(-1);
    expect(mail?.to).toEqual([email]);
    expect(mail?.text).toContain(
      `${team.people.owner.name} invites you to join ${team.collaboration.name} on Rarebound as statistician and author.`,
    );
    expect(Buffer.from(code, 'base64url')).toHaveLength(32);
    for (const table of ['invitation', 'audit_entry', 'outbox_message']) {
      expect(JSON.stringify(await query(`select * from ${table}`))).not.toContain(code);
    }
  });

  it('lasts 14 days', async () => {
    const { email } = await invited();
    const [row] = await query<{ days: number }>(
      `select extract(epoch from expires_at - created_at)::float / 86400 as days
         from invitation where email = $1`,
      [email],
    );
    expect(row.days).toBeCloseTo(14, 3);
  });

  it.each<[Role[], number]>([
    [['student'], 201],
    [['author'], 403],
    [['student', 'collaborator'], 403],
    [['owner'], 403],
  ])('lets an author invite students only: %j answers %i', async (roles, status) => {
    await sendDue();
    const before = mailbox.received.length;
    const response = await inviteAs('author', newAddress(), roles);
    expect(response.status).toBe(status);
    await sendDue();
    expect(mailbox.received.length - before).toBe(status === 201 ? 1 : 0);
    if (status === 403) expect((await response.json()).needed).toEqual(['owner']);
  });

  it('refuses a student, with the roles that may', async () => {
    const response = await inviteAs('student', newAddress(), ['student']);
    expect(response.status).toBe(403);
    expect(await response.json()).toMatchObject({ needed: ['owner', 'author'] });
  });

  it('does not invite a member, nor the same address twice', async () => {
    const member = await inviteAs('owner', team.people.student.email.toUpperCase(), ['author']);
    expect(member.status).toBe(409);
    expect(await member.json()).toMatchObject({ code: 'already-member' });
    const { email } = await invited();
    const again = await inviteAs('owner', email, ['student']);
    expect(await again.json()).toMatchObject({ status: 409, code: 'already-invited' });
  });

  it('sends one message when the button is pressed twice at once', async () => {
    const email = newAddress();
    const answers = await Promise.all([
      inviteAs('owner', email, ['student']),
      inviteAs('owner', email, ['student']),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    await sendDue();
    expect(mailbox.received.filter(({ to }) => to.includes(email))).toHaveLength(1);
  });

  it('refuses an address that smuggles a header in', async () => {
    const before = mailbox.received.length;
    const response = await inviteAs('owner', 'a@b.example\r\nBcc: c@d.example', ['student']);
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0]).toMatchObject({
      code: 'control-character',
      item: 'email',
      found: 'a line break',
    });
    expect(mailbox.received).toHaveLength(before);
  });

  it('keeps the message while the mail server is down, and says so', async () => {
    mailbox.refuse('452 no room');
    const email = newAddress();
    expect((await inviteAs('owner', email, ['student'])).status).toBe(201);
    await sendDue();
    const state = async () => {
      const answer = await call(list, { params: params(), headers: bearer(token.owner) });
      const { invitations } = await answer.json();
      return invitations.find((one: { email: string }) => one.email === email).mail;
    };
    expect(await state()).toBe('waiting');
    mailbox.refuse(null);
    await query('update outbox_message set due_at = now()');
    expect(await codeFor(email)).toMatch(/^[A-Za-z0-9_-]{43}$/);
    expect(await state()).toBe('sent');
  });

  it('sends nothing of an invitation that was revoked meanwhile', async () => {
    await sendDue();
    const email = newAddress();
    const { id } = await (await inviteAs('owner', email, ['student'])).json();
    expect((await onInvitation(revoke, 'DELETE', id)).status).toBe(204);
    await sendDue();
    expect(mailbox.received.filter(({ to }) => to.includes(email))).toEqual([]);
  });
});

describe('GET /api/v1/join/{code}', () => {
  it('says who invites, to what, as what', async () => {
    const { email, code } = await invited(['author']);
    expect(await (await offerOf(code)).json()).toEqual({
      collaboration: team.collaboration.name,
      slug: team.collaboration.slug,
      email,
      roles: ['author'],
      invitedBy: team.people.owner.name,
      hasAccount: false,
    });
  });

  it('does not tell a made-up code from one that was used, revoked or has expired', async () => {
    const used = await invited();
    await joinWith(used.code, { name: 'Mira Okafor', password: PASSWORD });
    const expired = await invited();
    await query('update invitation set expires_at = now() where email = $1', [expired.email]);
    const revoked = await invited();
    const [{ id }] = await query<{ id: string }>('select id from invitation where email = $1', [
      revoked.email,
    ]);
    expect((await onInvitation(revoke, 'DELETE', id)).status).toBe(204);
    const bodies = new Set<string>();
    for (const code of [used.code, expired.code, revoked.code, 'made-up']) {
      const offer = await offerOf(code);
      const joined = await joinWith(code, { name: 'Mira Okafor', password: PASSWORD });
      expect([offer.status, joined.status]).toEqual([404, 404]);
      bodies.add(await offer.text()).add(await joined.text());
    }
    expect(bodies.size).toBe(1);
  });
});

describe('POST /api/v1/join/{code}', () => {
  it('makes an account for the invited address and a member with the roles', async () => {
    const { email, code } = await invited(['author', 'student']);
    const response = await joinWith(code, { name: 'Mira Okafor', password: PASSWORD });
    expect(response.status).toBe(201);
    expect(await response.json()).toEqual({
      slug: team.collaboration.slug,
      email,
      isNewAccount: true,
    });
    const rows = await query(
      `select m.roles, p.name from member m join person p on p.id = m.person_id
        where p.email = $1 and m.collaboration_id = $2`,
      [email, team.collaboration.id],
    );
    expect(rows).toEqual([{ roles: ['author', 'student'], name: 'Mira Okafor' }]);
  });

  it('asks a new person for name and password', async () => {
    const { code } = await invited();
    const response = await joinWith(code, {});
    expect(response.status).toBe(422);
    expect((await response.json()).errors).toMatchObject([
      { code: 'value-missing', item: 'name' },
      { code: 'value-missing', item: 'password' },
    ]);
    const weak = await joinWith(code, { name: 'Mira Okafor', password: 'passwordpassword' });
    expect((await weak.json()).errors[0].code).toBe('password-guessable');
    expect((await offerOf(code)).status).toBe(200);
  });

  it('lets no caller choose roles or address', async () => {
    const { code } = await invited();
    const body = { name: 'M', password: PASSWORD, roles: ['owner'], email: 'x@y.example' };
    const response = await joinWith(code, body);
    expect(response.status).toBe(400);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('takes the person who is signed in with the invited address', async () => {
    const { email, code } = await invited(['collaborator']);
    const person = await createPerson({ email });
    expect((await (await offerOf(code)).json()).hasAccount).toBe(true);
    const { cookie } = await sessionCookieOf(person);
    const headers = { cookie, origin: webAddress() };
    expect((await joinWith(code, {}, headers)).status).toBe(201);
    const me = await (await call(getMe, { headers: { cookie } })).json();
    expect(me.collaborations).toEqual([
      { slug: team.collaboration.slug, name: team.collaboration.name, roles: ['collaborator'] },
    ]);
  });

  it('refuses a person who is signed in with another address', async () => {
    const { code } = await invited();
    const { cookie } = await sessionCookieOf(await createPerson());
    const response = await joinWith(code, {}, { cookie, origin: webAddress() });
    expect(response.status).toBe(403);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('takes over no account: who has one signs in first', async () => {
    const { email, code } = await invited();
    await createPerson({ email });
    const response = await joinWith(code, { name: 'Thief', password: PASSWORD });
    expect(response.status).toBe(401);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('refuses a page of another site that uses our cookie', async () => {
    const { email, code } = await invited();
    const { cookie } = await sessionCookieOf(await createPerson({ email }));
    const response = await joinWith(code, {}, { cookie, origin: 'https://elsewhere.example' });
    expect(response.status).toBe(403);
    expect(await response.json()).toMatchObject({ code: 'cross-site' });
  });

  it('works once, also when it is sent twice at the same moment', async () => {
    const { email, code } = await invited();
    const answers = await Promise.all([
      joinWith(code, { name: 'Mira Okafor', password: PASSWORD }),
      joinWith(code, { name: 'Mira Okafor', password: PASSWORD }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 404]);
    expect(await query('select 1 as n from person where email = $1', [email])).toHaveLength(1);
  });
});

describe('POST …/invitations/{id}/resend', () => {
  it('sends a new code, and the old one opens nothing', async () => {
    const { email, code } = await invited();
    const [{ id }] = await query<{ id: string }>('select id from invitation where email = $1', [
      email,
    ]);
    expect((await onInvitation(resend, 'POST', id)).status).toBe(200);
    const renewed = await codeFor(email);
    expect(renewed).not.toBe(code);
    expect((await offerOf(code)).status).toBe(404);
    expect((await offerOf(renewed)).status).toBe(200);
  });

  it('does nothing for an invitation that was accepted or revoked', async () => {
    const { email, code } = await invited();
    await joinWith(code, { name: 'Mira Okafor', password: PASSWORD });
    const [{ id }] = await query<{ id: string }>('select id from invitation where email = $1', [
      email,
    ]);
    expect((await onInvitation(resend, 'POST', id)).status).toBe(409);
    expect((await onInvitation(revoke, 'DELETE', id)).status).toBe(409);
  });
});

describe('GET …/invitations', () => {
  it('shows each invitation with its state, and never another collaboration', async () => {
    const other = await people.createCollaborationWith(['owner']);
    const theirs = await tokenOf(other.people.owner, other.collaboration);
    await query('delete from invitation');
    await invited();
    const mine = await call(list, { params: params(), headers: bearer(token.owner) });
    expect((await mine.json()).invitations.map(({ state }: { state: string }) => state)).toEqual([
      'pending',
    ]);
    const foreign = await call(list, {
      params: { collaboration: other.collaboration.slug },
      headers: bearer(theirs),
    });
    expect(await foreign.json()).toEqual({ invitations: [] });
  });
});
