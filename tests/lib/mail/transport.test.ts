import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('DATABASE_URL', 'postgres://nobody@127.0.0.1:1/none');
vi.stubEnv('MAIL_URL', mailbox.url);
vi.stubEnv('NEXTAUTH_URL', 'http://127.0.0.1:3210');

type Letter = import('@/lib/mail/letter').Letter;

const { mailKinds } = await import('@/lib/mail/kinds');
const { writeLetter } = await import('@/lib/mail/letter');
const { listRoles } = await import('@/lib/mail/role-words');
const { sendMail } = await import('@/lib/mail/transport');

const invitation = {
  code: 'a-code',
  collaboration: 'Nearby Giants',
  roles: ['author', 'student'] as ('author' | 'student')[],
  invitedBy: 'Ruth Castellan',
  expiresAt: new Date('2027-05-04T10:00:00Z'),
};

const item = {
  collaboration: 'Nearby <b>Giants</b>',
  who: '<img src=x onerror=alert(1)>',
  item: 'survey "ليلى" 🪐',
  path: '/nearby/surveys/a',
};
/** One of each kind, with names that would be markup if they were not text. */
const samples = {
  invitation,
  mention: item,
  notes: { ...item, notes: [{ who: item.who, item: item.item }] },
  run: { ...item, outcome: 'failed' as const },
  'sign-off-asked': { ...item, what: 'freeze' as const },
  'sign-off-given': { ...item, what: 'agree' as const },
  'release-published': item,
  'release-withdrawn': { ...item, reason: 'A <script> in the tables' },
  'guest-link-ending': { ...item, endsAt: new Date('2027-05-04T10:00:00Z') },
  departure: { ...item, what: 'asked' as const, dueAt: new Date('2027-05-04T10:00:00Z') },
  'password-reset': { path: '/reset/x', expiresAt: new Date('2027-05-04T10:00:00Z') },
  'account-changed': { what: 'password' as const, at: new Date('2027-05-04T10:00:00Z') },
  'sign-in-link': { path: '/sign-in/x', expiresAt: new Date('2027-05-04T10:00:00Z') },
};

beforeAll(() => mailbox.received.splice(0));
afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

const letter = writeLetter(mailKinds.invitation.compose(invitation), { words: 'Nothing follows.' });
const message = { to: { name: '', address: 'mira@observatory.example' }, ...letter };

describe('a letter', () => {
  it('holds one sentence, one link, who and why, and how to stop it', () => {
    const { subject, text } = letter;
    expect(subject).toBe('Ruth Castellan invites you to Nearby Giants');
    expect(text).toContain(
      'Ruth Castellan invites you to join Nearby Giants on Rarebound as author and student.',
    );
    expect(text.match(/https?:\/\/\S+/g)).toEqual(['http://127.0.0.1:3210/join/a-code']);
    expect(text).toContain('until 4 May 2027 (UTC)');
    expect(text).toContain('You get this message because Ruth Castellan gave your address.');
    expect(text.trimEnd().endsWith('Nothing follows.')).toBe(true);
  });

  it.each(Object.keys(samples) as (keyof typeof samples)[])(
    'of kind %s says the same in text and in HTML, with names as text',
    (kind) => {
      const { schema, compose } = mailKinds[kind];
      const data = schema.parse(samples[kind]);
      const written = writeLetter((compose as (given: unknown) => Letter)(data), {
        words: 'Stop it:',
        path: '/mail/stop/x',
      });
      const html = written.html.replace(/&#(\d+);/g, (_, code) =>
        String.fromCodePoint(Number(code)),
      );
      const [sentence, link] = written.text.split('\n\n');
      expect(html).toContain(sentence);
      expect(html).toContain(link.slice(link.indexOf('http')));
      expect(written.html).not.toMatch(/<(img|script|b)\b/i);
      expect(written.text.match(/https?:\/\/\S+/g)).toHaveLength(2);
      expect(written.subject).not.toMatch(/[\r\n]/);
    },
  );

  it('has a sample of every kind above', () => {
    expect(Object.keys(samples).sort()).toEqual(Object.keys(mailKinds).sort());
  });

  it('links to this server only', () => {
    const { schema } = mailKinds.mention;
    for (const path of [
      '//elsewhere.example',
      'https://elsewhere.example',
      '/\\elsewhere.example',
    ]) {
      expect(schema.safeParse({ ...samples.mention, path }).success, path).toBe(false);
    }
  });

  it('lists roles as a sentence does', () => {
    expect(listRoles(['student'])).toBe('student');
    expect(listRoles(['owner', 'author', 'student'])).toBe('owner, author and student');
  });
});

describe('sendMail(message)', () => {
  it('reaches one mailbox, through a real server', async () => {
    await sendMail(message);
    expect(mailbox.received).toHaveLength(1);
    const [mail] = mailbox.received;
    expect(mail.to).toEqual(['mira@observatory.example']);
    expect(mail.source).toMatch(/^content-type: multipart\/alternative/im);
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
    await expect(sendMail(message)).rejects.toMatchObject({
      status: 503,
      message: 'The mail server did not take the message',
    });
    mailbox.refuse(null);
  });
});
