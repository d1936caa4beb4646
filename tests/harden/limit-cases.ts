import { TOTP } from 'otpauth';
import type { LimitName } from '@/lib/access/attempts';
import type { Visitor } from './limit-visitor';

export interface LimitCase {
  /** Files below `app/api` whose handlers count against it by an option. */
  routes: Record<string, (who: Visitor) => Promise<Response>>;
  /** One attempt; `n` is its number. The routes in turn where it is left out. */
  attempt?(who: Visitor, n: number): Promise<Response>;
  prepare?(who: Visitor): Promise<void>;
}

const team = (rest: string) => `v1/collaborations/[collaboration]/${rest}/route.ts`;
const NOTHING = crypto.randomUUID();
const wrongPassword = { password: 'not the password at all' };
const nobody = () => `${crypto.randomUUID()}@nowhere.example`;

/** Accounts are counted for a day, so attempts come from where they are not counted otherwise. */
const TRIES_PER_PLACE = 4;

async function turnOnSecondFactor(who: Visitor): Promise<void> {
  const cookied = await who.bySession('GET', '/api/v1/me');
  if (cookied.status !== 200) throw new Error(`no session: ${cookied.status}`);
  const factor = '/api/v1/me/second-factor';
  const { key } = await who.readBySession<{ key: string }>(factor, { password: who.password });
  const code = new TOTP({ secret: key }).generate();
  await who.readBySession(`${factor}/confirm`, { code });
}

/** How each limit is used up: a limit without a case does not compile. */
export const limitCases: Record<LimitName, LimitCase> = {
  'sign-in-account-address': {
    routes: {},
    attempt: (who) => who.signIn(wrongPassword),
  },
  'sign-in-address': {
    routes: {},
    attempt: (who) => who.signIn({ ...wrongPassword, email: nobody() }),
  },
  'sign-in-account': {
    routes: {},
    attempt: (who, n) => who.signIn(wrongPassword, 1 + Math.floor(n / TRIES_PER_PLACE)),
  },
  'sign-up-address': {
    routes: {
      'v1/sign-up/route.ts': (who) => who.openly('POST', '/api/v1/sign-up', {}),
      'v1/join/[code]/route.ts': (who) => who.openly('POST', '/api/v1/join/none', { name: 1 }),
    },
  },
  'token-requests': {
    routes: {},
    attempt: (who) => who.byToken('GET', 'tokens'),
  },
  'anonymous-requests': {
    routes: {},
    attempt: (who) => who.openly('GET', '/api/v1/join/none'),
  },
  uploads: {
    routes: {
      [team('uploads')]: (who) => who.byToken('POST', 'uploads'),
      [team('unfinished-files')]: (who) => who.byToken('POST', 'unfinished-files'),
      [team('bundles')]: (who) => who.byToken('POST', 'bundles'),
    },
  },
  figures: { routes: { [team('figures')]: (who) => who.byToken('POST', 'figures', {}) } },
  'link-address': {
    routes: {},
    attempt: (who) =>
      who.openly('POST', '/api/v1/account-links', { email: nobody(), purpose: 'sign-in' }),
  },
  'link-account': {
    routes: {},
    attempt: (who, n) =>
      who.openly(
        'POST',
        '/api/v1/account-links',
        { email: `of-${who.account.email}`, purpose: 'sign-in' },
        n,
      ),
  },
  'reset-address': {
    routes: {
      'v1/password-reset/route.ts': (who) => who.openly('POST', '/api/v1/password-reset', {}),
    },
  },
  'second-factor': {
    routes: {},
    prepare: turnOnSecondFactor,
    attempt: (who, n) => who.signIn({ secondFactor: String(100_000 + n) }, n),
  },
  'password-changes': {
    routes: {
      'v1/me/password/route.ts': (who) => who.bySession('POST', '/api/v1/me/password', {}),
      'v1/me/second-factor/route.ts': (who) =>
        who.bySession('POST', '/api/v1/me/second-factor', {}),
      'v1/me/second-factor/remove/route.ts': (who) =>
        who.bySession('POST', '/api/v1/me/second-factor/remove', {}),
    },
  },
  notes: {
    routes: {
      [team('notes')]: (who) => who.byToken('POST', 'notes', {}),
      [team('notes/[note]')]: (who) => who.byToken('PATCH', `notes/${NOTHING}`, {}),
    },
  },
  invitations: {
    routes: {
      [team('invitations')]: (who) => who.byToken('POST', 'invitations', {}),
      [team('invitations/[invitation]/resend')]: (who) =>
        who.byToken('POST', `invitations/${NOTHING}/resend`),
    },
  },
};

/** What a case asks, attempt after attempt: every route of the limit in turn. */
export function attemptOf({ routes, attempt }: LimitCase): NonNullable<LimitCase['attempt']> {
  const all = Object.values(routes);
  return attempt ?? ((who, n) => all[n % all.length](who));
}
