import type { ZodType } from 'zod';
import { type Actor, actorIn, type KnownPerson, type Scope } from '@/lib/access/actor';
import { addressOf, countAttempt, type LimitName } from '@/lib/access/attempts';
import { knownPerson, requireSameOrigin } from '@/lib/access/requests';
import { AccessError, LabError, NotSignedIn } from '@/lib/errors';
import { parseInput, parseQuery } from '@/lib/schemas/input';
import { oneAfterAnother } from '@/lib/services/one-after-another';
import { answer, type Seen } from './answer';
import { answerKept, refuseKey, requireUnchanged } from './conditions';
import { fromCursor, nextLink } from './paging';
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

interface CollaborationOptions<B, Q> extends RouteOptions<B, Q> {
  scope: Scope;
  /** Key of the rows in the answer of a list that is read page by page. */
  paged?: string;
  /** Its rows change places while it is read, so that no row can be gone on from. */
  movingOrder?: boolean;
  /** What reading the same address answers: a write may ask that it has not changed (If-Match). */
  current?: (context: Omit<Asked<B, Q>, 'body'> & { actor: Actor }) => Promise<unknown>;
  /** The answer holds what is told once and stored nowhere in clear: no key keeps it. */
  tellsSecret?: boolean;
}

interface PersonOptions<B, Q> extends RouteOptions<B, Q> {
  scope: Scope;
  /** No token may. */
  sessionOnly?: boolean;
  /** As in a collaboration. */
  current?: (context: Omit<Asked<B, Q>, 'body'> & { person: KnownPerson }) => Promise<unknown>;
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
  isPaged: boolean;
  takesIfMatch: boolean;
  takesKey: boolean;
}
export type RouteHandler = ((request: Request, context: RouteContext) => Promise<Response>) & {
  readonly asks: Asks;
};

type Made = Pick<Asks, 'status' | 'body' | 'query'> &
  Partial<Omit<Asks, 'access' | 'status' | 'body' | 'query'>>;

function handler(
  access: Asks['access'],
  { status, body, query, ...features }: Made,
  work: (request: Request, context: RouteContext) => Promise<Response>,
): RouteHandler {
  const none = { isPaged: false, takesIfMatch: false, takesKey: false };
  return Object.assign(work, { asks: { access, status, body, query, ...none, ...features } });
}

const described = <B, Q>({ status, body, query }: RouteOptions<B, Q>): Made => ({
  status,
  body,
  query,
});

/** A request without a body needs no content type: its Origin was looked at. */
const hasBody = ({ headers }: Request) =>
  headers.has('transfer-encoding') || Number(headers.get('content-length') ?? 0) > 0;

const isWrite = (request: Request) => !['GET', 'HEAD', 'OPTIONS'].includes(request.method);

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
  { budgets }: Seen,
): Promise<KnownPerson | null> {
  const person = await knownPerson(request);
  const isCookieWrite = isWrite(request) && person?.via === 'session';
  if (isCookieWrite) requireSameOrigin(request);
  if (options.body || (isCookieWrite && !options.rawBody && hasBody(request))) {
    requireJsonType(request);
  }
  if (person?.tokenId) {
    const sentence = 'This token sends too many requests.';
    await countAttempt('token-requests', person.tokenId, sentence, (left) => budgets.push(left));
  }
  return person;
}

function requireScope(person: KnownPerson, scope: Scope): void {
  if (person.scopes.includes(scope)) return;
  throw new AccessError(
    `This token may not ${scope}: it was made for ${person.scopes.join(', ')}. Make a token with the scope "${scope}".`,
  );
}

async function countOwn(
  { limit }: { limit?: LimitName },
  key: string,
  { budgets }: Seen,
): Promise<void> {
  const sentence = 'That is more than the limit allows.';
  if (limit) await countAttempt(limit, key, sentence, (left) => budgets.push(left));
}

/** A handler within a collaboration: everything that is not the actor's answers "not found". */
export function collaborationRoute<B = undefined, Q = undefined>(
  options: CollaborationOptions<B, Q>,
  work: (context: Asked<B, Q> & { actor: Actor }) => Promise<unknown>,
): RouteHandler {
  const { scope, status, body, query, paged, current } = options;
  const order = options.movingOrder ? 'moving' : 'kept';
  const keepsAnswer = !options.rawBody && !options.tellsSecret;
  const features = {
    isPaged: paged !== undefined,
    takesIfMatch: current !== undefined,
    takesKey: keepsAnswer,
  };
  return handler(scope, { status, body, query, ...features }, (request, context) =>
    answer(request, options.status ?? 200, async (seen) => {
      const person = await admit(request, options, seen);
      if (!person) throw new NotSignedIn();
      seen.person = person;
      const { collaboration } = await context.params;
      const actor = await actorIn(person, collaboration);
      requireScope(person, options.scope);
      await countOwn(options, person.personId, seen);
      if (!keepsAnswer) refuseKey(request);
      const asked = { ...(await readRequest(request, context, options)), actor };
      if (paged !== undefined) asked.query = fromCursor(asked.query);
      const perform = async () => {
        await requireUnchanged(request, current && (() => current(asked)));
        return answerKept(request, asked, options.status ?? 200, () => work(asked));
      };
      const isGuarded = current !== undefined && isWrite(request);
      const result = await (isGuarded
        ? oneAfterAnother(actor.collaborationId, asked.params, perform)
        : perform());
      if (paged !== undefined) {
        seen.link = nextLink(request, asked.query, result, paged, order) ?? undefined;
      }
      return result;
    }),
  );
}

/** A handler for a signed-in person, outside of any collaboration. */
export function personRoute<B = undefined, Q = undefined>(
  options: PersonOptions<B, Q>,
  work: (context: Asked<B, Q> & { person: KnownPerson }) => Promise<unknown>,
): RouteHandler {
  return handler(
    options.sessionOnly ? 'session' : options.scope,
    { ...described(options), takesIfMatch: options.current !== undefined },
    (request, context) =>
      answer(request, options.status ?? 200, async (seen) => {
        const person = await admit(request, options, seen);
        if (!person) throw new NotSignedIn();
        seen.person = person;
        if (options.sessionOnly && person.via === 'token') {
          throw new AccessError('A token cannot do this: sign in with your password.');
        }
        requireScope(person, options.scope);
        await countOwn(options, person.personId, seen);
        refuseKey(request);
        const asked = { ...(await readRequest(request, context, options)), person };
        const { current } = options;
        const perform = async () => {
          await requireUnchanged(request, current && (() => current(asked)));
          return work(asked);
        };
        return current ? oneAfterAnother(person.personId, asked.params, perform) : perform();
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
  return handler('open', described(options), (request, context) =>
    answer(request, options.status ?? 200, async (seen) => {
      const address = addressOf(request.headers);
      refuseKey(request);
      await countAttempt('anonymous-requests', address, 'Too many requests come from here.');
      if (options.limit) await countAttempt(options.limit, address, 'Too many attempts from here.');
      const person = await admit(request, options, seen).catch((error: unknown) => {
        if (error instanceof LabError && error.status === 401) return null;
        throw error;
      });
      if (person) seen.person = person;
      return work({ ...(await readRequest(request, context, options)), person, address });
    }),
  );
}
