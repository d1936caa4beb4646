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
import { signIn, signOut } from '@/lib/services/sessions';

/** What the answer must still say after next-auth has written it: the refusal of this sign-in. */
export interface SignInOutcome {
  refusal?: unknown;
}

const NOT_POSSIBLE = 'Signing in is not possible just now. Try again in a minute.';

function cookie(name: string, isSecure: boolean) {
  return {
    name,
    options: { httpOnly: true, sameSite: 'lax' as const, path: '/', secure: isSecure },
  };
}

/** Made for each request: nothing reads the environment while the module is loaded. */
export function authOptions(outcome: SignInOutcome): NextAuthOptions {
  const { authSecret, webAddress } = config();
  const isSecure = webAddress.startsWith('https://');
  const prefix = isSecure ? '__Host-' : '';
  return {
    secret: authSecret,
    useSecureCookies: isSecure,
    session: { strategy: 'jwt', maxAge: SESSION_LONGEST_DAYS * 86_400 },
    cookies: {
      sessionToken: cookie(sessionCookieName(), isSecure),
      callbackUrl: cookie(`${prefix}rarebound.callback`, isSecure),
      csrfToken: cookie(`${prefix}rarebound.csrf`, isSecure),
    },
    pages: { signIn: '/sign-in', signOut: '/sign-in', error: '/sign-in' },
    providers: [
      CredentialsProvider({
        id: 'credentials',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        async authorize(credentials, request) {
          const headers = new Headers(request.headers as Record<string, string> | undefined);
          try {
            return await signIn({
              email: String(credentials?.email ?? ''),
              password: String(credentials?.password ?? ''),
              address: addressOf(headers),
              userAgent: headers.get('user-agent'),
            });
          } catch (refusal) {
            outcome.refusal = refusal;
            throw new Error(refusal instanceof LabError ? refusal.message : NOT_POSSIBLE);
          }
        },
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => (user ? { sub: user.id, sid: user.sessionId } : token),
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
