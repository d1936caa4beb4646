import { afterAll, beforeEach, expect, vi } from 'vitest';
import type { DELETE as revoke } from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route';
import { POST as invite } from '@/app/api/v1/collaborations/[collaboration]/invitations/route';
import { GET as getOffer, POST as join } from '@/app/api/v1/join/[code]/route';
import { sendDue } from '@/lib/mail/post';
import type { Role } from '@/lib/schemas/common';
import { withDatabase } from './database';
import { startMailbox } from './mailbox';
import { bearer, call, createCollaborationWith, tokenOf } from './people';

/** A team that invites by mail, and the mailbox that its letters reach; both go with the test file. */
export async function openInvitations() {
  const mailbox = await startMailbox();
  vi.stubEnv('MAIL_URL', mailbox.url);
  const team = await createCollaborationWith(['owner', 'author', 'student']);
  const of = (person: { id: string }) => tokenOf(person, team.collaboration);
  const { owner, author, student } = team.people;
  const token = { owner: await of(owner), author: await of(author), student: await of(student) };
  let serial = 0;

  beforeEach(async () => {
    mailbox.refuse(null);
    await withDatabase().query('delete from rate_limit');
  });
  afterAll(async () => {
    await mailbox.stop();
    vi.unstubAllEnvs();
  });

  const newAddress = () => `guest-${++serial}@observatory.example`;

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

  return {
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
  };
}
