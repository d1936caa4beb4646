import { createHash, randomUUID } from 'node:crypto';
import type { KnownPerson } from '@/lib/access/actor';
import { type Budget, limits } from '@/lib/access/attempts';
import { withinRequest } from '@/lib/access/request-id';
import { config } from '@/lib/config';
import { observeRequest } from '@/lib/services/metrics';
import { isDatabaseAway } from './database-fault';
import { logRequest, problemOf } from './problem';

/** What becomes known of a request while it is worked on. */
export interface Seen {
  person?: KnownPerson;
  /** What is left of the limits that it counted against. */
  budgets: Budget[];
  /** To the next page of a list. */
  link?: string;
}

/** JSON that is written already, because it is kept as it goes out. */
export class WrittenJson {
  readonly text: string | null;
  readonly headers: Record<string, string>;
  readonly status: number;
  constructor(text: string | null, status: number, headers: Record<string, string> = {}) {
    this.text = text;
    this.status = status;
    this.headers = headers;
  }
}

const ETAG_LENGTH = 27;

/** The strong tag of an answer: a digest of its bytes (RFC 9110, 8.8.3). */
export const etagOf = (json: string): string =>
  `"${createHash('sha256').update(json).digest('base64url').slice(0, ETAG_LENGTH)}"`;

/** Whether a list of tags names this one; a proxy that packs an answer may weaken its tag. */
export function namesTag(list: string, etag: string): boolean {
  return list.split(',').some((given) => {
    const tag = given.trim().replace(/^W\//, '');
    return tag === '*' || tag === etag;
  });
}

/** After draft-ietf-httpapi-ratelimit-headers: each limit by name, with what is left and for how long. */
function tellBudgets(headers: Headers, budgets: readonly Budget[]): void {
  if (budgets.length === 0) return;
  const policies = budgets.map(({ name }) => {
    const { points, seconds } = limits[name];
    return `"${name}";q=${points};w=${seconds}`;
  });
  const states = budgets.map(
    ({ name, remaining, resetS }) => `"${name}";r=${remaining};t=${resetS}`,
  );
  headers.set('RateLimit-Policy', policies.join(', '));
  headers.set('RateLimit', states.join(', '));
}

function finish(response: Response, requestId: string, { budgets, link }: Seen): Response {
  const headers = new Headers(response.headers);
  headers.set('X-Content-Type-Options', 'nosniff');
  headers.set('X-Request-Id', requestId);
  headers.set('Referrer-Policy', 'same-origin');
  if (config().webAddress.startsWith('https://')) {
    headers.set('Strict-Transport-Security', 'max-age=31536000; includeSubDomains');
  }
  if (!headers.has('Cache-Control')) headers.set('Cache-Control', 'no-store');
  if (!headers.has('Content-Security-Policy')) {
    headers.set('Content-Security-Policy', "default-src 'none'; frame-ancestors 'none'; sandbox");
  }
  tellBudgets(headers, budgets);
  if (link) headers.set('Link', link);
  return new Response(response.body, { status: response.status, headers });
}

const JSON_TYPE = { 'Content-Type': 'application/json' };

/** What was read carries a tag, and is not sent again to who holds it. */
function tagged(request: Request, json: string): Response {
  const etag = etagOf(json);
  const held = request.headers.get('if-none-match');
  if (held !== null && namesTag(held, etag)) {
    return new Response(null, { status: 304, headers: { ETag: etag } });
  }
  return new Response(json, { headers: { ...JSON_TYPE, ETag: etag } });
}

function shape(request: Request, result: unknown, status: number): Response {
  if (result instanceof Response) return result;
  if (result instanceof WrittenJson) {
    const type = result.text === null ? {} : JSON_TYPE;
    return new Response(result.text, {
      status: result.status,
      headers: { ...type, ...result.headers },
    });
  }
  if (result === undefined) return new Response(null, { status: 204 });
  const isRead = request.method === 'GET' || request.method === 'HEAD';
  if (isRead && status === 200) return tagged(request, JSON.stringify(result));
  return Response.json(result, { status });
}

/** What was only read may be asked once more where the connection was lost. */
async function againIfLost(request: Request, seen: Seen, work: (seen: Seen) => Promise<unknown>) {
  try {
    return await work(seen);
  } catch (error) {
    const isRead = request.method === 'GET' || request.method === 'HEAD';
    if (!isRead || !isDatabaseAway(error)) throw error;
    return work(seen);
  }
}

/** Runs one request: whatever happens ends in an answer, a log line and nothing of the inside. */
export async function answer(
  request: Request,
  status: number,
  work: (seen: Seen) => Promise<unknown>,
): Promise<Response> {
  const requestId = randomUUID();
  const started = performance.now();
  const seen: Seen = { budgets: [] };
  let response: Response;
  let fault: unknown;
  try {
    const result = await withinRequest(requestId, () => againIfLost(request, seen, work));
    response = finish(shape(request, result, status), requestId, seen);
  } catch (error) {
    fault = error;
    response = finish(problemOf(error, requestId), requestId, seen);
  }
  const seconds = (performance.now() - started) / 1000;
  observeRequest(request, { status: response.status, seconds });
  logRequest({ request, requestId, started, status: response.status, person: seen.person, fault });
  return response;
}
