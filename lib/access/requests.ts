import { config } from '@/lib/config';
import { LabError, NotSignedIn } from '@/lib/errors';
import type { KnownPerson } from './actor';
import { addressOf } from './attempts';
import { findPersonOfSession, readSessionCookie, sessionCookieName } from './sessions';
import { findPersonOfToken } from './tokens';

function cookieOf(headers: Headers, name: string): string | undefined {
  for (const part of headers.get('cookie')?.split(';') ?? []) {
    const at = part.indexOf('=');
    if (at > 0 && part.slice(0, at).trim() === name) return part.slice(at + 1).trim();
  }
  return undefined;
}

/**
 * Who sends a request. With an Authorization header cookies are not looked at.
 *
 * @returns null when the request says nothing, or its session has ended
 * @throws NotSignedIn for a bearer token that is unknown, expired or revoked
 */
export async function knownPerson(request: Request): Promise<KnownPerson | null> {
  const person = await personBehind(request);
  return person && { ...person, address: addressOf(request.headers) };
}

async function personBehind(request: Request): Promise<KnownPerson | null> {
  const authorization = request.headers.get('authorization');
  if (authorization !== null) {
    const token = /^Bearer ([\x21-\x7e]{1,200})$/i.exec(authorization)?.[1];
    const person = token === undefined ? null : await findPersonOfToken(token);
    if (!person) throw new NotSignedIn('This token is not known, has expired or was revoked');
    return person;
  }
  const claims = await readSessionCookie(cookieOf(request.headers, sessionCookieName()));
  return claims && findPersonOfSession(claims);
}

/** Refuses a write that a page of somebody else sent along with our cookie. */
export function requireSameOrigin(request: Request): void {
  const fetchSite = request.headers.get('sec-fetch-site');
  if (fetchSite === 'same-origin') return;
  const origin = request.headers.get('origin');
  const isOurs = origin !== null && origin === new URL(config().webAddress).origin;
  if (isOurs && (fetchSite === null || fetchSite === 'none')) return;
  throw new LabError('cross-site', 403, 'This request comes from another site, so it was refused');
}
