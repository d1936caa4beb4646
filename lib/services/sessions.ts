import { QueryTypes, type Transaction } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { attemptKey, countAttempt, forgetAttempts, uncountAttempt } from '@/lib/access/attempts';
import { isPassword } from '@/lib/access/passwords';
import { beginSession, endSessions, SESSION_IDLE_DAYS } from '@/lib/access/sessions';
import { LabError, NotFound } from '@/lib/errors';
import { type SessionView, sessionSchema } from '@/lib/schemas/account';
import { idSchema } from '@/lib/schemas/common';
import { signInSchema } from '@/lib/schemas/people';
import { database, inTransaction, PersonRow } from '@/models';
import { recordAudit } from './audit';

export interface SignInAttempt {
  email: string;
  password: string;
  /** Where it came from, as far as that can be believed. */
  address: string;
  userAgent: string | null;
}

export interface SignedIn {
  id: string;
  name: string;
  email: string;
  sessionId: string;
}

const TOO_MANY = 'Too many wrong passwords.';
/** One sentence for both, so that it does not tell which accounts exist. */
const WRONG = 'The address or the password is wrong.';

async function recordSignIn(
  personId: string,
  outcome: 'sign-in' | 'sign-in-refused',
  address: string,
  transaction: Transaction,
): Promise<void> {
  const summary = outcome === 'sign-in' ? 'signed in' : 'was refused at sign-in';
  const item = { kind: 'person', id: personId };
  await recordAudit({ personId, via: 'session', address }, outcome, item, summary, transaction);
}

/**
 * Begins a session for the person whose password this is.
 *
 * Each attempt is counted before the password is looked at, so that attempts sent at once do not
 * slip through; a right password clears the counts. Unknown accounts cost the same hash.
 *
 * @throws TooMany after 5 wrong passwords for an account from one address in 15 minutes
 */
export async function signIn(attempt: SignInAttempt): Promise<SignedIn> {
  const { address } = attempt;
  const given = signInSchema.safeParse({ email: attempt.email, password: attempt.password });
  const email = given.success ? given.data.email : '';
  const account = attemptKey(email);
  await countAttempt('sign-in-account-address', `${account}:${address}`, TOO_MANY);
  await countAttempt('sign-in-address', address, 'Too many attempts come from here.');
  await countAttempt('sign-in-account', account, TOO_MANY);
  database();
  const person = given.success ? await PersonRow.findOne({ where: { email } }) : null;
  const isRight = await isPassword(given.data?.password ?? '', person?.passwordHash ?? null);
  if (!person || !isRight || person.suspendedAt) {
    if (person) {
      await inTransaction((t) => recordSignIn(person.id, 'sign-in-refused', address, t));
    }
    throw new LabError('sign-in', 401, WRONG);
  }
  await forgetAttempts('sign-in-account-address', `${account}:${address}`);
  await forgetAttempts('sign-in-account', account);
  await uncountAttempt('sign-in-address', address);
  const sessionId = await inTransaction(async (transaction) => {
    const id = await beginSession(person.id, attempt.userAgent, transaction);
    await recordSignIn(person.id, 'sign-in', address, transaction);
    return id;
  });
  return { id: person.id, name: person.name, email: person.email, sessionId };
}

/** Ends the session of a cookie; one that has ended already is no fault. */
export async function signOut(personId: string, sessionId: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const ended = await database().query(
      'delete from session where id = $1 and person_id = $2 returning id',
      { bind: [sessionId, personId], type: QueryTypes.SELECT, transaction },
    );
    if (ended.length === 0) return;
    const item = { kind: 'person', id: personId };
    await recordAudit({ personId, via: 'session' }, 'sign-out', item, 'signed out', transaction);
  });
}

/** The person's open sessions, the one seen last first. */
export async function listSessions(person: KnownPerson): Promise<{ sessions: SessionView[] }> {
  const rows = await database().query<Record<string, unknown>>(
    `select id, user_agent as "userAgent", created_at as "createdAt",
            last_seen_at as "lastSeenAt", expires_at as "expiresAt"
       from session
      where person_id = $1 and expires_at > now()
        and last_seen_at > now() - make_interval(days => $2)
      order by last_seen_at desc`,
    { bind: [person.personId, SESSION_IDLE_DAYS], type: QueryTypes.SELECT },
  );
  const iso = (value: unknown) => (value as Date).toISOString();
  return {
    sessions: rows.map((row) =>
      sessionSchema.parse({
        ...row,
        createdAt: iso(row.createdAt),
        lastSeenAt: iso(row.lastSeenAt),
        expiresAt: iso(row.expiresAt),
        isThisOne: row.id === person.sessionId,
      }),
    ),
  };
}

/** Ends one of the person's own sessions. */
export async function removeSession(person: KnownPerson, sessionId: string): Promise<void> {
  if (!idSchema.safeParse(sessionId).success) throw new NotFound('session');
  await inTransaction(async (transaction) => {
    const ended = await database().query(
      'delete from session where id = $1 and person_id = $2 returning id',
      { bind: [sessionId, person.personId], type: QueryTypes.SELECT, transaction },
    );
    if (ended.length === 0) throw new NotFound('session');
    const item = { kind: 'session', id: sessionId };
    await recordAudit(person, 'session-end', item, 'ended a session', transaction);
  });
}

/** Ends all sessions of the person but the one that asks. */
export async function removeOtherSessions(person: KnownPerson): Promise<void> {
  await inTransaction(async (transaction) => {
    await endSessions(person.personId, transaction, person.sessionId ?? null);
    const item = { kind: 'person', id: person.personId };
    await recordAudit(person, 'session-end', item, 'ended all other sessions', transaction);
  });
}
