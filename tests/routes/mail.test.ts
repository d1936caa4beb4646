import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('MAIL_URL', mailbox.url);

const me = await import('@/app/api/v1/me/mail/route');
const { POST: stop } = await import('@/app/api/v1/mail/stop/route');
const failed = await import('@/app/api/v1/collaborations/[collaboration]/mail/route');
const again = await import(
  '@/app/api/v1/collaborations/[collaboration]/mail/[message]/retry/route'
);
const { claimNext, MAX_ATTEMPTS, pauseAfter } = await import('@/lib/mail/claims');
const { queueMessage } = await import('@/lib/mail/outbox');
const { sendDue } = await import('@/lib/mail/post');
const { inTransaction } = await import('@/models');
const { withDatabase } = await import('../support/database');
const people = await import('../support/people');
const { bearer, call, createCollaborationWith, sessionCookieOf, tokenOf, webAddress } = people;

const { query } = withDatabase();
const team = await createCollaborationWith(['owner', 'student']);
const { owner, student } = team.people;
const collaborationId = team.collaboration.id;
const item = {
  collaboration: 'Heron',
  who: 'R. Castellan',
  item: 'A-31',
  path: '/heron/analyses/A-31',
};

beforeEach(async () => {
  mailbox.refuse(null);
  mailbox.received.splice(0);
  await query('delete from rate_limit');
  await query('delete from outbox_message');
  await query('delete from mail_preference');
});
afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

const mention = (personId = student.id) =>
  inTransaction((transaction) =>
    queueMessage(transaction, 'mention', { personId }, item, { collaborationId }),
  );
interface Row {
  state: string;
  attempts: number;
  sealed: Buffer | null;
  wait: number;
  fault: string | null;
}
const row = async (): Promise<Row> =>
  (
    await query<Row & Record<string, unknown>>(
      `select state, attempts, sealed, fault, extract(epoch from due_at - now())::float as wait
       from outbox_message`,
    )
  )[0];
const makeDue = () => query('update outbox_message set due_at = now()');
const asOwner = async () => bearer(await tokenOf(owner, team.collaboration));

describe('the outbox', () => {
  it('keeps no message whose cause was not stored', async () => {
    const failing = inTransaction(async (transaction) => {
      await queueMessage(transaction, 'mention', { personId: student.id }, item);
      throw new Error('something later failed');
    });
    await expect(failing).rejects.toThrow('something later failed');
    await sendDue();
    expect(mailbox.received).toEqual([]);
  });

  it('goes on after a server that fails twice, with growing pauses and one Message-ID', async () => {
    const id = await mention();
    mailbox.refuse('451 try later');
    await sendDue();
    const first = await row();
    expect(first).toMatchObject({ state: 'waiting', attempts: 1 });
    expect(first.wait).toBeCloseTo(pauseAfter(1), -1);
    expect(await sendDue()).toEqual([]);
    await makeDue();
    await sendDue();
    const second = await row();
    expect(second).toMatchObject({ state: 'waiting', attempts: 2 });
    expect(second.wait).toBeGreaterThan(1.5 * first.wait);
    mailbox.refuse(null);
    await makeDue();
    expect(await sendDue()).toMatchObject([{ outcome: 'sent' }]);
    expect(mailbox.received).toHaveLength(1);
    expect(mailbox.received[0].to).toEqual([student.email]);
    expect(mailbox.received[0].source).toMatch(
      new RegExp(`^message-id: <${id}@127\\.0\\.0\\.1>`, 'im'),
    );
    expect(await row()).toMatchObject({ state: 'sent', sealed: null });
    await makeDue();
    await sendDue();
    expect(mailbox.received).toHaveLength(1);
  });

  it('a message that a dead worker held is sent by the next one, and marking it late changes nothing', async () => {
    const id = await mention();
    const claimed = await claimNext();
    expect(claimed?.id).toBe(id);
    expect(await sendDue()).toEqual([]);
    await query(`update outbox_message set claimed_until = now() - interval '1 second'`);
    expect(await sendDue()).toMatchObject([{ id, outcome: 'sent' }]);
    const { markFailed } = await import('@/lib/mail/claims');
    if (claimed) await markFailed(claimed, 'late', true);
    expect(await row()).toMatchObject({ state: 'sent', attempts: 2 });
  });

  it('several workers at once send each message once', async () => {
    for (let i = 0; i < 6; i++) await mention();
    await Promise.all([sendDue(), sendDue(), sendDue()]);
    expect(mailbox.received).toHaveLength(6);
    const ids = mailbox.received.map(({ source }) => /^message-id: (\S+)/im.exec(source)?.[1]);
    expect(new Set(ids).size).toBe(6);
  });

  it('gives up in the end; owners see why and may try again', async () => {
    const id = await mention();
    await query('update outbox_message set attempts = $1', [MAX_ATTEMPTS - 1]);
    mailbox.refuse('451 try later');
    await sendDue();
    expect(await row()).toMatchObject({ state: 'failed', attempts: MAX_ATTEMPTS });
    const params = { collaboration: team.collaboration.slug };
    const headers = await asOwner();
    const list = await (await call(failed.GET, { params, headers })).json();
    expect(list.messages).toMatchObject([
      { id, kind: 'mention', to: student.name, fault: 'The mail server did not take the message' },
    ]);
    const theirs = bearer(await tokenOf(student, team.collaboration));
    expect((await call(failed.GET, { params, headers: theirs })).status).toBe(403);
    mailbox.refuse(null);
    const retried = await call(again.POST, {
      method: 'POST',
      params: { ...params, message: String(id) },
      headers,
    });
    expect(retried.status).toBe(204);
    await sendDue();
    expect(mailbox.received).toHaveLength(1);
  });

  it('gathers notes of an hour in one message', async () => {
    const note = (who: string) =>
      inTransaction((transaction) =>
        queueMessage(
          transaction,
          'notes',
          { personId: student.id },
          {
            collaboration: 'Heron',
            path: '/heron/activity?for=me',
            notes: [{ who, item: 'A-31' }],
          },
          { collaborationId },
        ),
      );
    const ids = [await note('Ruth'), await note('Omar')];
    expect(new Set(ids).size).toBe(1);
    expect((await row()).wait).toBeGreaterThan(3500);
    await makeDue();
    await sendDue();
    expect(mailbox.received).toHaveLength(1);
    expect(mailbox.received[0].text).toContain('Ruth, Omar wrote 2 notes on A-31 in Heron.');
  });

  it('holds no words in clear, and none at all for who has left', async () => {
    await mention();
    expect(JSON.stringify(await query('select * from outbox_message'))).not.toMatch(
      /A-31|Castellan/,
    );
    const { sealed } = await row();
    expect(sealed?.toString('latin1')).not.toContain('A-31');
    await query('update person set suspended_at = now() where id = $1', [student.id]);
    expect(await sendDue()).toMatchObject([{ outcome: 'withdrawn' }]);
    await query('update person set suspended_at = null where id = $1', [student.id]);
    expect(mailbox.received).toEqual([]);
  });
});

describe('stopping mail', () => {
  const linkIn = (text: string) => /\/mail\/stop\/(\S+)/.exec(text)?.[1] ?? '';
  const preferencesOf = async (person: { id: string }) => {
    const { cookie } = await sessionCookieOf(person);
    const { preferences } = await (await call(me.GET, { headers: { cookie } })).json();
    return preferences.filter((one: { isWanted: boolean }) => !one.isWanted);
  };

  it('works by the link in the message, for that person and kind, and for nothing else', async () => {
    await mention();
    await sendDue();
    const token = linkIn(mailbox.received[0].text);
    const press = (text: string) => call(stop, { method: 'POST', body: { token: text } });
    const [personId, kind, signature] = token.split('.');
    const forged = [
      `${owner.id}.${kind}.${signature}`,
      `${personId}.notes.${signature}`,
      `${personId}.${kind}.${signature[0] === 'A' ? 'B' : 'A'}${signature.slice(1)}`,
      'nonsense',
    ];
    for (const text of forged) expect((await press(text)).status).toBe(404);
    expect(await query('select 1 from mail_preference')).toEqual([]);
    expect(await (await press(token)).json()).toEqual({ kind: 'mention' });
    expect(await preferencesOf(student)).toEqual([{ kind: 'mention', isWanted: false }]);
    expect(await mention()).toBeNull();
    expect(await mention(owner.id)).not.toBeNull();
  });

  it('also holds for what was waiting already', async () => {
    await mention();
    const { cookie } = await sessionCookieOf(student);
    const headers = { cookie, origin: webAddress() };
    const body = { kind: 'mention', isWanted: false };
    expect((await call(me.PATCH, { method: 'PATCH', headers, body })).status).toBe(200);
    expect(await sendDue()).toMatchObject([{ outcome: 'withdrawn' }]);
    expect(mailbox.received).toEqual([]);
    const account = { ...body, kind: 'password-reset' };
    expect((await call(me.PATCH, { method: 'PATCH', headers, body: account })).status).toBe(422);
  });
});
