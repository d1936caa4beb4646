import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import nodemailer from 'nodemailer';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { linkText } from '@/lib/local/mail-page';
import { MailStore } from '@/lib/local/mail-store';
import { createMailboxPages, createMailReceiver } from '@/lib/local/mailbox';

const folder = mkdtempSync(path.join(os.tmpdir(), 'mailbox-'));
const store = new MailStore(folder);
const receiver = createMailReceiver(store);
const pages = createMailboxPages(store, '127.0.0.1:1');
let smtpPort = 0;
let pageAddress = '';

beforeAll(async () => {
  const server = receiver.listen(0, '127.0.0.1');
  await new Promise((resolve) => server.once('listening', resolve));
  smtpPort = (server.address() as AddressInfo).port;
  await new Promise<void>((resolve) => pages.listen(0, '127.0.0.1', resolve));
  pageAddress = `http://127.0.0.1:${(pages.address() as AddressInfo).port}`;
});

afterAll(async () => {
  await new Promise<void>((resolve) => receiver.close(resolve));
  await new Promise((resolve) => pages.close(resolve));
  rmSync(folder, { recursive: true });
});

async function send(subject: string, text: string, html?: string): Promise<void> {
  const transport = nodemailer.createTransport({
    host: '127.0.0.1',
    port: smtpPort,
    secure: false,
  });
  await transport.sendMail({
    from: { name: 'Lab', address: 'lab@localhost' },
    to: { name: 'Zoë Ångström', address: 'zoe@example.org' },
    subject,
    text,
    html,
  });
  transport.close();
}

/** Node's fetch sets the Host header itself; a plain request may claim any. */
async function get(pathname: string, host: string): Promise<{ status: number; body: string }> {
  const http = await import('node:http');
  return new Promise((resolve, reject) => {
    http
      .get(pageAddress + pathname, { headers: { host } }, (response) => {
        let body = '';
        response.setEncoding('utf8').on('data', (chunk) => {
          body += chunk;
        });
        response.on('end', () => resolve({ status: response.statusCode ?? 0, body }));
      })
      .on('error', reject);
  });
}

describe('the local mailbox', () => {
  it('keeps a message that came over SMTP, with long lines and letters beyond ASCII intact', async () => {
    const address = `http://127.0.0.1:3210/invitations/${'a1b2'.repeat(40)}?from=mail&role=author`;
    const text = `Grüße from the survey – open\n\n${address}\n\nσ = 5`;
    await send('Einladung für β Pic: “join”', text, '<p>Not shown</p>');
    const [mail] = store.list();
    expect(mail.subject).toBe('Einladung für β Pic: “join”');
    expect(mail.to).toBe('Zoë Ångström <zoe@example.org>');
    expect(mail.text).toBe(text);
  });

  it('lists the newest first', async () => {
    await send('second', 'b');
    await send('third', 'c');
    expect(
      store
        .list()
        .map(({ subject }) => subject)
        .slice(0, 2),
    ).toEqual(['third', 'second']);
    const { body } = await get('/', '127.0.0.1:1');
    expect(body.indexOf('third')).toBeLessThan(body.indexOf('second'));
  });

  it('shows markup in a message as text and makes its addresses clickable', async () => {
    await send(
      '<b>bold</b>',
      'see <img src=x onerror=alert(1)> and https://example.org/a?b=1&c=2.',
    );
    const { status, body } = await get(`/messages/${store.list()[0].id}`, 'localhost:1');
    expect(status).toBe(200);
    expect(body).toContain('&lt;b&gt;bold&lt;/b&gt;');
    expect(body).not.toContain('<img');
    expect(body).toContain(
      '<a href="https://example.org/a?b=1&amp;c=2">https://example.org/a?b=1&amp;c=2</a>.',
    );
  });

  it('refuses another host name, other methods and paths out of its folder', async () => {
    expect((await get('/', 'evil.example:1')).status).toBe(403);
    expect((await get('/messages/..%2f..%2fsecrets', '127.0.0.1:1')).status).toBe(404);
    expect((await get('/messages/../../secrets', '127.0.0.1:1')).status).toBe(404);
  });

  it('leaves an address with a script scheme as text', () => {
    expect(linkText('javascript:alert(1) "x"')).toBe('javascript:alert(1) &quot;x&quot;');
  });
});
