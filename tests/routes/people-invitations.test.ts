import { describe, expect, it } from 'vitest';
import { POST as resend } from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/resend/route';
import { DELETE as revoke } from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route';
import { GET as list } from '@/app/api/v1/collaborations/[collaboration]/invitations/route';
import { sendDue } from '@/lib/mail/post';
import type { Role } from '@/lib/schemas/common';
import { withDatabase } from '../support/database';
import { openInvitations } from '../support/invitations';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';

const { query } = withDatabase();
const PASSWORD = 'violet harbour anchor mosaic';
const {
  mailbox,
  team,
  token,
  newAddress,
  params,
  inviteAs,
  codeFor,
  invited,
  onInvitation,
  offerOf,
  joinWith,
} = await openInvitations();

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
    const other = await createCollaborationWith(['owner']);
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
