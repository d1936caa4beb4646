import { createHash, randomBytes } from 'node:crypto';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';

/** Reserved for trials: no resolver knows what begins with it. */
export const PRACTICE_PREFIX = '10.5072';
const LARGEST_JSON_BYTES = 1 << 20;

interface KeptFile {
  name: string;
  byteLength: number;
  sha256: string;
}
interface KeptDeposit {
  id: string;
  identifier: string;
  metadata: Record<string, unknown>;
  state: 'draft' | 'published';
  doi: string | null;
  address: string | null;
  files: Map<string, KeptFile>;
}

/** What may go wrong with the next request of a kind, once each. */
export type StandInFault =
  | { at: 'create' | 'doi' | 'upload' | 'publish' | 'read'; kind: 'busy'; retryAfterS: number }
  | { at: 'create' | 'doi' | 'upload' | 'publish' | 'read'; kind: 'fault' }
  /** The connection breaks: in the middle of a body, or after the work is done. */
  | { at: 'upload'; kind: 'cut'; afterBytes: number }
  | { at: 'create' | 'doi' | 'upload' | 'publish'; kind: 'no-answer' }
  /** The file arrives with one bit of difference. */
  | { at: 'upload'; kind: 'damage' };

export interface StandIn {
  /** Its API: what REPOSITORY_URL names. */
  url: string;
  deposits: Map<string, KeptDeposit>;
  /** Faults that wait, in order; tests push what they want to see survived. */
  faults: StandInFault[];
  /** "POST /deposits", in order of arrival. */
  seen: string[];
  close(): Promise<void>;
}

const viewOf = ({ files, metadata: _metadata, identifier: _identifier, ...rest }: KeptDeposit) => ({
  ...rest,
  files: [...files.values()],
});

function send(response: ServerResponse, status: number, body: unknown, headers = {}): void {
  response.writeHead(status, { 'content-type': 'application/json', ...headers });
  response.end(JSON.stringify(body));
}

async function readJson(request: IncomingMessage): Promise<Record<string, unknown> | null> {
  const parts: Buffer[] = [];
  let length = 0;
  for await (const part of request) {
    length += (part as Buffer).length;
    if (length > LARGEST_JSON_BYTES) return null;
    parts.push(part as Buffer);
  }
  try {
    return JSON.parse(Buffer.concat(parts).toString('utf8'));
  } catch {
    return null;
  }
}

/** Bytes are counted and hashed and not kept: this is no archive. */
async function takeFile(
  request: IncomingMessage,
  deposit: KeptDeposit,
  name: string,
  fault: StandInFault | undefined,
): Promise<{ status: number; body: unknown } | null> {
  const hash = createHash('sha256');
  let byteLength = 0;
  for await (const part of request) {
    byteLength += (part as Buffer).length;
    hash.update(part as Buffer);
    if (fault?.kind === 'cut' && byteLength >= fault.afterBytes) return null;
  }
  if (fault?.kind === 'damage') hash.update('\u0001');
  const sha256 = hash.digest('hex');
  const stated = /sha-256=:([A-Za-z0-9+/=]+):/.exec(String(request.headers['repr-digest'] ?? ''));
  const expected = stated && Buffer.from(stated[1], 'base64').toString('hex');
  if (expected !== null && expected !== sha256) {
    return { status: 422, body: { detail: `the digest of ${name} is another one` } };
  }
  const file = { name, byteLength, sha256 };
  deposit.files.set(name, file);
  return { status: 201, body: file };
}

/** What stands where a real repository has the page of a record. */
function showRecord(response: ServerResponse, deposit: KeptDeposit | undefined): void {
  const isThere = deposit?.state === 'published';
  response.writeHead(isThere ? 200 : 404, { 'content-type': 'text/plain; charset=utf-8' });
  if (!isThere) return void response.end('There is no such record.\n');
  const names = [...deposit.files.values()].map(({ name, sha256 }) => `${sha256}  ${name}`);
  const lines = [String(deposit.metadata.title), `doi:${deposit.doi}`, ...names];
  response.end(`${lines.join('\n')}\n\nPractice: nothing was sent anywhere.\n`);
}

/**
 * A repository for open data on this machine: it takes drafts, reserves identifiers, compares the
 * digests of files and publishes, with the faults that a real one has when they are asked for.
 */
export function startRepository({
  token,
  port = 0,
  doiPrefix = PRACTICE_PREFIX,
}: {
  token: string;
  port?: number;
  doiPrefix?: string;
}): Promise<StandIn> {
  const deposits = new Map<string, KeptDeposit>();
  const faults: StandInFault[] = [];
  const seen: string[] = [];
  let origin = '';

  const takeFault = (at: StandInFault['at']) => (faults[0]?.at === at ? faults.shift() : undefined);

  function create(metadata: Record<string, unknown> | null): { status: number; body: unknown } {
    const { title, identifier, creators, licence } = metadata ?? {};
    const isComplete = Array.isArray(creators) && creators.length > 0 && Boolean(licence);
    if (!metadata || typeof title !== 'string' || typeof identifier !== 'string' || !isComplete) {
      return {
        status: 400,
        body: { detail: 'title, identifier, creators and licence are needed' },
      };
    }
    const id = randomBytes(5).toString('hex');
    const kept = { id, identifier, metadata, doi: null, address: null, files: new Map() };
    deposits.set(id, { ...kept, state: 'draft' });
    return { status: 201, body: viewOf(deposits.get(id) as KeptDeposit) };
  }

  function publish(deposit: KeptDeposit): { status: number; body: unknown } {
    if (deposit.state === 'published') {
      return { status: 409, body: { detail: 'this deposit is published already' } };
    }
    if (deposit.files.size === 0) return { status: 400, body: { detail: 'there are no files' } };
    deposit.state = 'published';
    deposit.doi ??= `${doiPrefix}/practice.${deposit.id}`;
    deposit.address = `${origin}/records/${deposit.id}`;
    return { status: 202, body: viewOf(deposit) };
  }

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    // Reading a body half lets go of the connection, which is what a cut needs.
    const { socket } = request;
    const url = new URL(request.url ?? '/', origin);
    seen.push(`${request.method} ${url.pathname}`);
    if (url.pathname === '/health') return send(response, 200, { ok: true });
    const record = /^\/records\/([0-9a-f]{10})$/.exec(url.pathname)?.[1];
    if (record !== undefined) return showRecord(response, deposits.get(record));
    if (request.headers.authorization !== `Bearer ${token}`) {
      return send(response, 401, { detail: 'the token is not known' });
    }
    const [, , id, part, name] = url.pathname.split('/').map(decodeURIComponent);
    const deposit = deposits.get(id);
    const at =
      request.method === 'GET'
        ? 'read'
        : part === 'files'
          ? 'upload'
          : part === 'doi' || part === 'publish'
            ? part
            : 'create';
    const fault = takeFault(at);
    if (fault?.kind === 'busy') {
      const headers = { 'retry-after': String(fault.retryAfterS) };
      return send(response, 429, { detail: 'too many requests' }, headers);
    }
    if (fault?.kind === 'fault') return send(response, 500, { detail: 'something broke' });
    const given = await work(request, url, deposit, { id, part, name, fault });
    if (given === null || fault?.kind === 'no-answer') socket.destroy();
    else send(response, given.status, given.body);
  }

  async function work(
    request: IncomingMessage,
    url: URL,
    deposit: KeptDeposit | undefined,
    { id, part, name, fault }: { id?: string; part?: string; name?: string; fault?: StandInFault },
  ): Promise<{ status: number; body: unknown } | null> {
    if (id === undefined && request.method === 'POST') return create(await readJson(request));
    if (id === undefined) {
      const identifier = url.searchParams.get('identifier');
      const found = [...deposits.values()].filter((one) => one.identifier === identifier);
      return { status: 200, body: { deposits: found.map(viewOf) } };
    }
    if (!deposit) return { status: 404, body: { detail: 'no such deposit' } };
    if (part === undefined) return { status: 200, body: viewOf(deposit) };
    if (part === 'publish') return publish(deposit);
    if (deposit.state === 'published') return { status: 409, body: { detail: 'it is published' } };
    if (part === 'files' && name !== undefined) return takeFile(request, deposit, name, fault);
    if (part !== 'doi') return { status: 404, body: { detail: 'no such address' } };
    deposit.doi ??= `${doiPrefix}/practice.${deposit.id}`;
    return { status: 200, body: { doi: deposit.doi } };
  }

  const server = createServer((request, response) => {
    answer(request, response).catch(() => response.destroy());
  });
  return new Promise((resolve, reject) => {
    server.on('error', reject);
    server.listen(port, '127.0.0.1', () => {
      const bound = server.address();
      origin = `http://127.0.0.1:${typeof bound === 'object' ? bound?.port : port}`;
      const close = () =>
        new Promise<void>((done) => {
          server.close(() => done());
          server.closeAllConnections();
        });
      resolve({ url: origin, deposits, faults, seen, close });
    });
  });
}

async function main(): Promise<void> {
  const { REPOSITORY_URL, REPOSITORY_TOKEN: token } = process.env;
  if (!REPOSITORY_URL || !token) throw new Error('REPOSITORY_URL and REPOSITORY_TOKEN are not set');
  const standIn = await startRepository({ token, port: Number(new URL(REPOSITORY_URL).port) });
  process.on('SIGTERM', () => void standIn.close().then(() => process.exit(0)));
}

if (process.argv[1] && /repository-stand-in\.js$/.test(process.argv[1])) {
  main().catch((error: unknown) => {
    process.stderr.write(`${String(error)}\n`);
    process.exit(1);
  });
}
