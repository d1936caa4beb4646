import type { NextApiRequest, NextApiResponse } from 'next';
import NextAuth from 'next-auth';
import { LabError, TooMany } from '@/lib/errors';
import { CollectedAnswer } from '../collected-answer';
import { authOptions, callbackCookieName, type SignInOutcome } from '../options';

/** A password, an address and a token or two. */
const LONGEST_FORM_BYTES = 10_000;

function cookiesOf(headers: Headers): Record<string, string> {
  const cookies: Record<string, string> = {};
  for (const part of headers.get('cookie')?.split(';') ?? []) {
    const at = part.indexOf('=');
    if (at > 0) cookies[part.slice(0, at).trim()] = decodeCookie(part.slice(at + 1).trim());
  }
  return cookies;
}

function decodeCookie(value: string): string {
  try {
    return decodeURIComponent(value);
  } catch {
    return value;
  }
}

async function formOf(request: Request): Promise<Record<string, string>> {
  if (request.method !== 'POST') return {};
  const type = request.headers.get('content-type') ?? '';
  if (!type.startsWith('application/x-www-form-urlencoded')) return {};
  const text = await request.text();
  return text.length > LONGEST_FORM_BYTES ? {} : Object.fromEntries(new URLSearchParams(text));
}

function logFault(error: unknown): void {
  const fault = error instanceof Error ? error.stack : String(error);
  process.stderr.write(
    `${JSON.stringify({ at: new Date().toISOString(), path: '/api/auth', fault })}\n`,
  );
}

/**
 * Every address of next-auth: sign-in, sign-out, session and their CSRF token.
 *
 * next-auth is given the request in the form that it takes from pages, so that its answer is in our
 * hands: a wait after too many attempts is 429 with its length, which it would answer with 401.
 */
async function handle(
  request: Request,
  context: { params: Promise<{ nextauth: string[] }> },
): Promise<Response> {
  const { nextauth } = await context.params;
  // Browsers may send their faults there; we keep no log that anybody can write to.
  if (nextauth[0] === '_log') return new Response(null, { status: 204 });
  const outcome: SignInOutcome = {};
  const answer = new CollectedAnswer();
  const cookies = cookiesOf(request.headers);
  const asked = {
    method: request.method,
    headers: Object.fromEntries(request.headers),
    cookies,
    query: { ...Object.fromEntries(new URL(request.url).searchParams), nextauth },
    body: await formOf(request),
  };
  await NextAuth(
    asked as unknown as NextApiRequest,
    answer as unknown as NextApiResponse,
    authOptions(outcome, request.headers, cookies[callbackCookieName()]),
  );
  const { refusal, fault } = outcome;
  if (fault !== undefined) logFault(fault);
  if (refusal instanceof TooMany) {
    answer.status(refusal.status).setHeader('Retry-After', String(refusal.retryAfterS));
  } else if (refusal !== undefined && !(refusal instanceof LabError)) {
    logFault(refusal);
    answer.status(503).setHeader('Retry-After', '5');
  }
  return answer.toResponse();
}

export { handle as GET, handle as POST };
