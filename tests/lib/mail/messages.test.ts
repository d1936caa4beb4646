import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('DATABASE_URL', 'postgres://nobody@127.0.0.1:1/none');
vi.stubEnv('MAIL_URL', mailbox.url);
vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');

const { invitationMessage, listRoles } = await import('@/lib/mail/messages');
const { sendMail } = await import('@/lib/mail/transport');

const letter = {
  email: 'mira@observatory.example',
  code: 'a-code',
  collaboration: 'Nearby Giants',
  roles: ['author', 'student'] as const,
  invitedBy: 'Ruth Castellan',
  expiresAt: new Date('2027-05-04T10:00:00Z'),
};

beforeAll(() => mailbox.received.splice(0));
afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

describe('invitationMessage(letter)', () => {
  it('holds one sentence, one link, who and why, and how to stop it', () => {
    const { to, subject, text } = invitationMessage(letter);
    expect(to.address).toBe('mira@observatory.example');
    expect(subject).toBe('Ruth Castellan invites you to Nearby Giants');
    expect(text).toContain(
      'Ruth Castellan invites you to join Nearby Giants on Rarebound as author and student.',
    );
    expect(text.match(/https?:\/\/\S+/g)).toEqual(['http://127.0.0.1:3210/join/a-code']);
    expect(text).toContain('until 4 May 2027 (UTC)');
    expect(text).toContain('You get this message because Ruth Castellan gave your address.');
  });

  it('lists roles as a sentence does', () => {
    expect(listRoles(['student'])).toBe('student');
    expect(listRoles(['owner', 'author', 'student'])).toBe('owner, author and student');
  });
});

describe('sendMail(message)', () => {
  it('reaches one mailbox, through a real server', async () => {
    await sendMail(invitationMessage(letter));
    expect(mailbox.received).toHaveLength(1);
    const [mail] = mailbox.received;
    expect(mail.to).toEqual(['mira@observatory.example']);
    expect(mail.source).toContain('From: Rarebound <rarebound@localhost>');
    expect(mail.text).toContain('http://127.0.0.1:3210/join/a-code');
  });

  it.each([
    'a@b.example\r\nBcc: c@d.example',
    'a@b.example, c@d.example',
    'a@b.example;c@d.example',
    '"a@c.example"@b.example',
    'a@c.example@b.example',
    'a＠c.example@b.example',
    '<a@b.example>',
    'a b@c.example',
    '@b.example',
    'a@',
    'nobody',
  ])('refuses the address %j, and sends nothing', async (address) => {
    const before = mailbox.received.length;
    await expect(sendMail({ to: { name: '', address }, subject: 's', text: 't' })).rejects.toThrow(
      'expected one address without quotes or breaks',
    );
    expect(mailbox.received).toHaveLength(before);
  });

  it('keeps a line break in a subject or a name from becoming a header', async () => {
    await sendMail({
      to: { name: 'Mira "x" <c@d.example>\r\nBcc: c@d.example', address: 'mira@b.example' },
      subject: 'Hello\r\nBcc: c@d.example',
      text: 't',
    });
    const mail = mailbox.received[mailbox.received.length - 1];
    expect(mail.to).toEqual(['mira@b.example']);
    expect(mail.source).not.toMatch(/^bcc:/im);
    expect(mail.source).toMatch(/^subject: Hello Bcc: c@d\.example/im);
  });

  it('says so when the server does not take the message', async () => {
    mailbox.refuse('452 no room');
    await expect(sendMail(invitationMessage(letter))).rejects.toMatchObject({
      status: 503,
      message: 'The mail server did not take the message',
    });
    mailbox.refuse(null);
  });
});
