import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';

export interface ReceivedMail {
  from: string;
  to: string[];
  /** The message as it came, headers first. */
  source: string;
  /** The text, decoded. */
  text: string;
}

/** The plain part of a message that says the same in two forms. */
function plainPart(source: string): string {
  const boundary = /content-type: multipart\/alternative;\s+boundary="([^"]+)"/i.exec(source)?.[1];
  if (boundary === undefined) return source;
  const part = source.split(`--${boundary}`).find((one) => /content-type: text\/plain/i.test(one));
  return part?.replace(/^\r\n/, '') ?? source;
}

/** Soft line ends and =XX of quoted-printable; other encodings come as they are. */
function decodeText(whole: string): string {
  const source = plainPart(whole);
  const [head, ...rest] = source.split('\r\n\r\n');
  const body = rest.join('\r\n\r\n');
  if (!/content-transfer-encoding: quoted-printable/i.test(head)) return body;
  const bytes = body
    .replace(/=\r\n/g, '')
    .replace(/=([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16)));
  return Buffer.from(bytes, 'latin1').toString('utf8');
}

/** A mail server on loopback that keeps what it is given. */
export async function startMailbox() {
  const received: ReceivedMail[] = [];
  let refusal: Error | null = null;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    logger: false,
    onData(stream, session, done) {
      const parts: Buffer[] = [];
      stream.on('data', (part: Buffer) => parts.push(part));
      stream.on('end', () => {
        const source = Buffer.concat(parts).toString('utf8');
        const { mailFrom, rcptTo } = session.envelope;
        if (refusal === null) {
          received.push({
            from: mailFrom === false ? '' : mailFrom.address,
            to: rcptTo.map(({ address }) => address),
            source,
            text: decodeText(source),
          });
        }
        done(refusal);
      });
    },
  });
  const listening = await new Promise<import('node:net').Server>((resolve) => {
    const net = server.listen(0, '127.0.0.1', () => resolve(net));
  });
  const { port } = listening.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    received,
    /** From now on every message is refused with this reason; null takes them again. */
    refuse: (reason: string | null) => {
      refusal = reason === null ? null : new Error(reason);
    },
    stop: () => new Promise<void>((resolve) => server.close(resolve)),
  };
}
