import type { KnownPerson } from '@/lib/access/actor';
import { config } from '@/lib/config';
import { AccessError, InputError, LabError, TooMany } from '@/lib/errors';
import type { Problem } from '@/lib/schemas/problem';
import { databaseFault } from './database-fault';

const TITLES: Record<number, string> = {
  400: 'The request cannot be read',
  401: 'Not signed in',
  403: 'Not allowed',
  404: 'Not found',
  409: 'Not possible as things stand',
  412: 'Changed meanwhile',
  413: 'Too large',
  415: 'Another content type is needed',
  422: 'The content was refused',
  429: 'Too many requests',
  500: 'Something failed here',
  503: 'Not available just now',
  507: 'No space left',
};

const RETRY_AFTER_S = 5;

/** RFC 9457 problem document: the one place where errors become status codes. */
export function problemOf(error: unknown, requestId: string): Response {
  const fault = databaseFault(error);
  const isOurs = fault instanceof LabError;
  const status = isOurs ? fault.status : 500;
  const problem: Problem = {
    type: 'about:blank',
    title: TITLES[status] ?? 'Refused',
    status,
    code: isOurs ? fault.code : 'unknown',
    detail: isOurs ? fault.message : `Tell an owner this number: ${requestId}`,
  };
  if (fault instanceof InputError) {
    problem.errors = fault.faults;
    problem.errorCount = fault.count;
    problem.refused = fault.refused;
  }
  if (fault instanceof AccessError && fault.needed.length > 0) problem.needed = [...fault.needed];
  const headers = new Headers({ 'Content-Type': 'application/problem+json' });
  if (status === 401) headers.set('WWW-Authenticate', 'Bearer realm="rarebound"');
  if (fault instanceof TooMany) headers.set('Retry-After', String(fault.retryAfterS));
  if (status === 503) headers.set('Retry-After', String(RETRY_AFTER_S));
  return new Response(JSON.stringify(problem), { status, headers });
}

interface Seen {
  request: Request;
  requestId: string;
  started: number;
  status: number;
  person: KnownPerson | undefined;
  fault: unknown;
}

/** The code of an invitation stands in its address: it must not reach the log. */
function loggedPath(address: string): string {
  return new URL(address).pathname.replace(/(\/join\/)[^/]+/, '$1…');
}

/** One JSON line a request to stderr; outside production only what failed here. */
export function logRequest({ request, requestId, started, status, person, fault }: Seen): void {
  const isUnknown = fault !== undefined && !(fault instanceof LabError);
  if (!config().isProduction && !isUnknown) return;
  const line = {
    at: new Date().toISOString(),
    request: requestId,
    method: request.method,
    path: loggedPath(request.url),
    status,
    ms: Math.round(performance.now() - started),
    person: person?.personId,
    via: person?.via,
    token: person?.tokenId,
    code: fault instanceof LabError ? fault.code : undefined,
    fault: isUnknown && fault instanceof Error ? (fault.stack ?? fault.message) : undefined,
  };
  process.stderr.write(`${JSON.stringify(line)}\n`);
}
