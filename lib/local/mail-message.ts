export interface ReadableMail {
  from: string;
  to: string;
  subject: string;
  date: string;
  text: string;
}

interface Part {
  headers: Map<string, string>;
  body: string;
}

/** Header lines end at the first empty line; a line that begins with a space continues the last. */
function splitPart(raw: string): Part {
  const end = raw.search(/\r?\n\r?\n/);
  const head = end < 0 ? raw : raw.slice(0, end);
  const headers = new Map<string, string>();
  for (const line of head.replace(/\r?\n[ \t]+/g, ' ').split(/\r?\n/)) {
    const colon = line.indexOf(':');
    if (colon > 0)
      headers.set(line.slice(0, colon).trim().toLowerCase(), line.slice(colon + 1).trim());
  }
  return { headers, body: end < 0 ? '' : raw.slice(end).replace(/^\r?\n\r?\n/, '') };
}

function decodeBytes(bytes: Uint8Array, charset: string): string {
  try {
    return new TextDecoder(charset).decode(bytes);
  } catch {
    return new TextDecoder('utf-8').decode(bytes);
  }
}

function bytesOfQuotedPrintable(text: string): Uint8Array {
  const joined = text.replace(/[ \t]*=[ \t]*\r?\n/g, '');
  const binary = joined.replace(/=([0-9A-Fa-f]{2})/g, (_, hex: string) =>
    String.fromCharCode(Number.parseInt(hex, 16)),
  );
  return Buffer.from(binary, 'latin1');
}

/** Encoded words of a header (RFC 2047); the space between two of them belongs to the encoding. */
function decodeHeader(value: string): string {
  return value
    .replace(/(\?=)\s+(?==\?)/g, '$1')
    .replace(/=\?([^?*]+)(?:\*[^?]*)?\?([BbQq])\?([^?]*)\?=/g, (_, charset, kind, text) => {
      const bytes =
        kind.toUpperCase() === 'B'
          ? Buffer.from(text, 'base64')
          : bytesOfQuotedPrintable(text.replace(/_/g, ' '));
      return decodeBytes(bytes, charset);
    });
}

function parameterOf(header: string, name: string): string | undefined {
  const match = header.match(new RegExp(`;\\s*${name}\\s*=\\s*("([^"]*)"|[^\\s;]+)`, 'i'));
  return match?.[2] ?? match?.[1];
}

function decodeBody({ headers, body }: Part): string {
  const charset = parameterOf(headers.get('content-type') ?? '', 'charset') ?? 'utf-8';
  const encoding = (headers.get('content-transfer-encoding') ?? '7bit').toLowerCase();
  if (encoding === 'base64') return decodeBytes(Buffer.from(body, 'base64'), charset);
  if (encoding === 'quoted-printable') return decodeBytes(bytesOfQuotedPrintable(body), charset);
  return decodeBytes(Buffer.from(body, 'latin1'), charset);
}

/** The first plain text among the parts of a message, however deep it lies. */
function findText(part: Part): string | null {
  const type = part.headers.get('content-type') ?? 'text/plain';
  if (/^text\/plain/i.test(type)) return decodeBody(part);
  const boundary = /^multipart\//i.test(type) ? parameterOf(type, 'boundary') : undefined;
  if (boundary === undefined) return null;
  for (const piece of part.body.split(`--${boundary}`).slice(1)) {
    if (piece.startsWith('--')) break;
    const text = findText(splitPart(piece.replace(/^\r?\n/, '')));
    if (text !== null) return text;
  }
  return null;
}

/**
 * What a person reads of a message: some headers and its plain text.
 *
 * @param raw the message as it came over SMTP, one byte a character (latin1)
 */
export function readMail(raw: string): ReadableMail {
  const part = splitPart(raw);
  const header = (name: string) => decodeHeader(part.headers.get(name) ?? '');
  return {
    from: header('from'),
    to: header('to'),
    subject: header('subject'),
    date: header('date'),
    text: (findText(part) ?? 'This message has no plain text.').replace(/\r\n/g, '\n').trimEnd(),
  };
}
