import { randomUUID } from 'node:crypto';
import type { ZodType } from 'zod';
import { type Actor, actorIn, type KnownPerson, type Scope } from '@/lib/access/actor';
import { addressOf, countAttempt, type LimitName } from '@/lib/access/attempts';
import { knownPerson, requireSameOrigin } from '@/lib/access/requests';
import { config } from '@/lib/config';
import { AccessError, LabError, NotSignedIn } from '@/lib/errors';
import { withinRequest } from '@/lib/queue/request-id';
import { parseInput, parseQuery } from '@/lib/schemas/input';
import { observeRequest } from '@/lib/services/metrics';
import { logRequest, problemOf } from './problem';
import { readJson, requireJsonType } from './read-body';

interface RouteOptions<B, Q> {
  body?: ZodType<B>;
  query?: ZodType<Q>;
  /** Of an answer with content; 200 unless said. */
  status?: number;
  /** The work reads `request.body` itself, whatever its content type: uploads. */
  rawBody?: boolean;
  /** An attempt of this kind is counted per person (per address on open routes). */
  limit?: LimitName;
}

interface Asked<B, Q> {
  params: Record<string, string>;
  body: B;
  query: Q;
  request: Request;
}

type RouteContext = { params: Promise<Record<string, string>> };

/** What a handler was made with, so that its description can be held against it. */
interface Asks {
  /** `open` where nobody needs to be signed in. */
  access: Scope | 'session' | 'open';
  status?: number;
  body?: ZodType;
  query?: ZodType;
}
export type RouteHandler = ((request: Request, context: RouteContext) => Promise<Response>) & {
  readonly asks: Asks;
};

function handler(
  access: Asks['access'],
  { status, body, query }: Pick<Asks, 'status' | 'body' | 'query'>,
  work: (request: Request, context: RouteContext) => Promise<Response>,
): RouteHandler {
  return Object.assign(work, { asks: { access, status, body, query } });
}

/** A request without a body needs no content type: its Origin was looked at. */
const hasBody = ({ headers }: Request) =>
  headers.has('transfer-encoding') || Number(headers.get('content-length') ?? 0) > 0;

const isWrite = (request: Request) => !['GET', 'HEAD', 'OPTIONS'].includes(request.method);

function finish(response: Response, requestId: string): Response {
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
  return new Response(response.body, { status: response.status, headers });
}

function shape(result: unknown, status: number): Response {
  if (result instanceof Response) return result;
  if (result === undefined) return new Response(null, { status: 204 });
  return Response.json(result, { status });
}

/** Runs one request: whatever happens ends in an answer, a log line and nothing of the inside. */
async function answer(
  request: Request,
  status: number,
  work: (seen: { person?: KnownPerson }) => Promise<unknown>,
): Promise<Response> {
  const requestId = randomUUID();
  const started = performance.now();
  const seen: { person?: KnownPerson } = {};
  let response: Response;
  let fault: unknown;
  try {
    response = finish(shape(await withinRequest(requestId, () => work(seen)), status), requestId);
  } catch (error) {
    fault = error;
    response = finish(problemOf(error, requestId), requestId);
  }
  const seconds = (performance.now() - started) / 1000;
  observeRequest(request, { status: response.status, seconds });
  logRequest({ request, requestId, started, status: response.status, person: seen.person, fault });
  return response;
}

async function readRequest<B, Q>(
  request: Request,
  context: RouteContext,
  options: RouteOptions<B, Q>,
): Promise<Asked<B, Q>> {
  const search = new URL(request.url).searchParams;
  return {
    request,
    params: await context.params,
    query: options.query ? parseQuery(options.query, search) : (undefined as Q),
    body: options.body ? parseInput(options.body, await readJson(request)) : (undefined as B),
  };
}

/** The signed-in person; what a cookie sends must come from our own pages. */
async function admit<B, Q>(
  request: Request,
  options: RouteOptions<B, Q>,
): Promise<KnownPerson | null> {
  const person = await knownPerson(request);
  const isCookieWrite = isWrite(request) && person?.via === 'session';
  if (isCookieWrite) requireSameOrigin(request);
  if (options.body || (isCookieWrite && !options.rawBody && hasBody(request))) {
    requireJsonType(request);
  }
  if (person?.tokenId) {
    await countAttempt('token-requests', person.tokenId, 'This token sends too many requests.');
  }
  return person;
}

function requireScope(person: KnownPerson, scope: Scope): void {
  if (person.scopes.includes(scope)) return;
  throw new AccessError(
    `This token may not ${scope}: it was made for ${person.scopes.join(', ')}. Make a token with the scope "${scope}".`,
  );
}

async function countOwn(options: RouteOptions<never, never>, key: string): Promise<void> {
  if (options.limit) await countAttempt(options.limit, key, 'That is more than the limit allows.');
}

/** A handler within a collaboration: everything that is not the actor's answers "not found". */
export function collaborationRoute<B = undefined, Q = undefined>(
  options: RouteOptions<B, Q> & { scope: Scope },
  work: (context: Asked<B, Q> & { actor: Actor }) => Promise<unknown>,
): RouteHandler {
  return handler(options.scope, options, (request, context) =>
    answer(request, options.status ?? 200, async (seen) => {
      const person = await admit(request, options);
      if (!person) throw new NotSignedIn();
      seen.person = person;
      const { collaboration } = await context.params;
      const actor = await actorIn(person, collaboration);
      requireScope(person, options.scope);
      await countOwn(options as RouteOptions<never, never>, person.personId);
      return work({ ...(await readRequest(request, context, options)), actor });
    }),
  );
}

/** A handler for a signed-in person, outside of any collaboration. */
export function personRoute<B = undefined, Q = undefined>(
  options: RouteOptions<B, Q> & { scope: Scope; sessionOnly?: boolean },
  work: (context: Asked<B, Q> & { person: KnownPerson }) => Promise<unknown>,
): RouteHandler {
  return handler(options.sessionOnly ? 'session' : options.scope, options, (request, context) =>
    answer(request, options.status ?? 200, async (seen) => {
      const person = await admit(request, options);
      if (!person) throw new NotSignedIn();
      seen.person = person;
      if (options.sessionOnly && person.via === 'token') {
        throw new AccessError('A token cannot do this: sign in with your password.');
      }
      requireScope(person, options.scope);
      await countOwn(options as RouteOptions<never, never>, person.personId);
      return work({ ...(await readRequest(request, context, options)), person });
    }),
  );
}

/** A handler for anybody; who is signed in is told to the work, if anybody is. */
export function openRoute<B = undefined, Q = undefined>(
  options: RouteOptions<B, Q>,
  work: (
    context: Asked<B, Q> & { person: KnownPerson | null; address: string },
  ) => Promise<unknown>,
): RouteHandler {
  return handler('open', options, (request, context) =>
    answer(request, options.status ?? 200, async (seen) => {
      const address = addressOf(request.headers);
      await countAttempt('anonymous-requests', address, 'Too many requests come from here.');
      if (options.limit) await countAttempt(options.limit, address, 'Too many attempts from here.');
      const person = await admit(request, options).catch((error: unknown) => {
        if (error instanceof LabError && error.status === 401) return null;
        throw error;
      });
      if (person) seen.person = person;
      return work({ ...(await readRequest(request, context, options)), person, address });
    }),
  );
}
