import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import path from 'node:path';
import { SMTPServer } from 'smtp-server';
import { listPage, messagePage } from './mail-page';
import { MailStore } from './mail-store';

const largestMessageBytes = 10_000_000;

function requiredAddress(name: string): URL {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set`);
  return new URL(value);
}

function answer(response: ServerResponse, status: number, html: string): void {
  response.writeHead(status, {
    'content-type': 'text/html; charset=utf-8',
    'content-security-policy':
      "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'none'",
    'cache-control': 'no-store',
    'referrer-policy': 'no-referrer',
    'x-content-type-options': 'nosniff',
  });
  response.end(html);
}

/** Pages of the mailbox; `host` is what a browser on this machine names, so that no other site can read them. */
export function createMailboxPages(store: MailStore, host: string) {
  return createServer((request: IncomingMessage, response: ServerResponse) => {
    const port = host.split(':')[1];
    if (request.headers.host !== host && request.headers.host !== `localhost:${port}`) {
      return answer(response, 403, 'This mailbox answers on this machine only.');
    }
    const { pathname } = new URL(request.url ?? '/', `http://${host}`);
    if (request.method !== 'GET') return answer(response, 405, 'This mailbox can only be read.');
    if (pathname === '/') return answer(response, 200, listPage(store.list()));
    const mail = pathname.startsWith('/messages/') ? store.find(pathname.slice(10)) : null;
    if (mail === null) return answer(response, 404, 'There is no such message.');
    return answer(response, 200, messagePage(mail));
  });
}

/** A mail server that keeps what it is given and sends nothing on. */
export function createMailReceiver(store: MailStore): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: largestMessageBytes,
    onData(stream, _session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => {
        chunks.push(chunk);
      });
      stream.on('end', () => {
        if (stream.sizeExceeded) return done(new Error('The message is too large'));
        store.add(Buffer.concat(chunks));
        done();
      });
    },
  });
}

function main(): void {
  const folder = path.resolve(process.env.RAREBOUND_DATA_DIR ?? '.data', 'mailbox');
  const store = new MailStore(folder);
  const mail = requiredAddress('MAIL_URL');
  const pages = requiredAddress('MAILBOX_URL');
  const receiver = createMailReceiver(store);
  receiver.on('error', (error) => process.stderr.write(`${error.message}\n`));
  receiver.listen(Number(mail.port), '127.0.0.1');
  const server = createMailboxPages(store, pages.host);
  server.listen(Number(pages.port), '127.0.0.1');
  process.on('SIGTERM', () => {
    receiver.close(() => process.exit(0));
    server.closeAllConnections();
    server.close();
  });
}

if (process.argv[1] && /mailbox\.js$/.test(process.argv[1])) main();
