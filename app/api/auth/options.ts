import type { NextAuthOptions } from 'next-auth';
import CredentialsProvider from 'next-auth/providers/credentials';
import { addressOf } from '@/lib/access/attempts';
import {
  findPersonOfSession,
  SESSION_LONGEST_DAYS,
  sessionCookieName,
} from '@/lib/access/sessions';
import { config } from '@/lib/config';
import { LabError } from '@/lib/errors';
import { signOut } from '@/lib/services/sessions';
import { type SignedIn, signIn, signInByLink, type Visitor } from '@/lib/services/sign-in';

import { enterByOrcid, linkByOrcid } from './orcid-answer';
import { orcidProvider } from './orcid-provider';

/** What the answer must still say after next-auth has written it: the refusal of this sign-in. */
export interface SignInOutcome {
  refusal?: unknown;
  /** What failed on the way back from ORCID: for the log, never for the address of a page. */
  fault?: unknown;
  /** Whom ORCID let in: next-auth itself carries the iD alone. */
  signedIn?: SignedIn;
}

const NOT_POSSIBLE = 'Signing in is not possible just now. Try again in a minute.';

/** Runs one attempt; a refusal is kept for the answer, of which next-auth tells the sentence alone. */
async function attempt(
  outcome: SignInOutcome,
  given: Record<string, unknown> | undefined,
  work: (visitor: Visitor) => Promise<SignedIn>,
): Promise<SignedIn> {
  const headers = new Headers(given as Record<string, string> | undefined);
  try {
    return await work({ address: addressOf(headers), userAgent: headers.get('user-agent') });
  } catch (refusal) {
    outcome.refusal = refusal;
    throw new Error(refusal instanceof LabError ? refusal.message : NOT_POSSIBLE);
  }
}

function cookie(name: string, isSecure: boolean) {
  return {
    name,
    options: { httpOnly: true, sameSite: 'lax' as const, path: '/', secure: isSecure },
  };
}

/** Where next-auth keeps the page to go back to. */
export const callbackCookieName = () =>
  `${config().webAddress.startsWith('https://') ? '__Host-' : ''}rarebound.callback`;

/** Made for each request: nothing reads the environment while the module is loaded. */
export function authOptions(
  outcome: SignInOutcome,
  headers: Headers,
  page: string | undefined,
): NextAuthOptions {
  const { authSecret, webAddress, orcid } = config();
  const isSecure = webAddress.startsWith('https://');
  const prefix = isSecure ? '__Host-' : '';
  return {
    secret: authSecret,
    useSecureCookies: isSecure,
    session: { strategy: 'jwt', maxAge: SESSION_LONGEST_DAYS * 86_400 },
    cookies: {
      sessionToken: cookie(sessionCookieName(), isSecure),
      callbackUrl: cookie(callbackCookieName(), isSecure),
      csrfToken: cookie(`${prefix}rarebound.csrf`, isSecure),
    },
    pages: { signIn: '/sign-in', signOut: '/sign-in', error: '/sign-in' },
    providers: [
      CredentialsProvider({
        id: 'credentials',
        credentials: {
          email: { type: 'email' },
          password: { type: 'password' },
          secondFactor: { type: 'text' },
        },
        authorize: (given, request) =>
          attempt(outcome, request.headers, (visitor) =>
            signIn({
              ...visitor,
              email: String(given?.email ?? ''),
              password: String(given?.password ?? ''),
              secondFactor: given?.secondFactor,
            }),
          ),
      }),
      CredentialsProvider({
        id: 'link',
        credentials: { code: { type: 'text' }, secondFactor: { type: 'text' } },
        authorize: (given, request) =>
          attempt(outcome, request.headers, (visitor) =>
            signInByLink({
              ...visitor,
              code: String(given?.code ?? ''),
              secondFactor: given?.secondFactor,
            }),
          ),
      }),
      ...(orcid === null
        ? []
        : [orcidProvider('orcid', orcid), orcidProvider('orcid-link', orcid)]),
    ],
    callbacks: {
      async signIn({ account }) {
        if (account?.type !== 'oauth') return true;
        const given = account.providerAccountId;
        try {
          const answer =
            account.provider === 'orcid-link'
              ? await linkByOrcid(given, headers, page)
              : await enterByOrcid(given, headers);
          if ('goTo' in answer) return answer.goTo;
          outcome.signedIn = answer.signedIn;
          return true;
        } catch (fault) {
          outcome.fault = fault;
          return `${webAddress}/sign-in?error=OrcidFault`;
        }
      },
      jwt: ({ token, user }) => {
        const who = outcome.signedIn ?? user;
        return who ? { sub: who.id, sid: who.sessionId } : token;
      },
      // A session whose row is gone has ended, whatever the cookie says: next-auth clears it.
      async session({ session, token }) {
        const person = await findPersonOfSession(token);
        if (!person) throw new Error('this session has ended');
        const { personId: id, personName: name, email } = person;
        return { ...session, user: { id, name, email } };
      },
    },
    events: {
      signOut: ({ token }) => signOut(token.sub, token.sid),
    },
    // Ended sessions are no faults, and next-auth's own messages may hold what a person typed.
    logger: { error: () => undefined, warn: () => undefined, debug: () => undefined },
  };
}
