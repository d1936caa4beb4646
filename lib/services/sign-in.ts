import type { Transaction } from 'sequelize';
import { findLink, type LinkPerson, makeLink, takeLink } from '@/lib/access/account-links';
import { attemptKey, countAttempt, forgetAttempts, uncountAttempt } from '@/lib/access/attempts';
import { isPassword } from '@/lib/access/passwords';
import { beginSession } from '@/lib/access/sessions';
import { LabError } from '@/lib/errors';
import { signInSchema } from '@/lib/schemas/people';
import { database, inTransaction, PersonRow } from '@/models';
import { linkIsOver } from './account-links';
import { recordAudit } from './audit';
import { passSecondFactor, readSecondFactor } from './second-factor';

/** Who tries to sign in, as far as that can be believed. */
export interface Visitor {
  address: string;
  userAgent: string | null;
  /** Code of an authenticator or recovery code, where the person uses one. */
  secondFactor?: string;
}

export interface SignInAttempt extends Visitor {
  email: string;
  password: string;
}

export interface SignedIn {
  id: string;
  name: string;
  email: string;
  sessionId: string;
}

const TOO_MANY = 'Too many wrong passwords.';
const TOO_MANY_HERE = 'Too many attempts come from here.';
/** One sentence for both, so that it does not tell which accounts exist. */
const WRONG = 'The address or the password is wrong.';

async function recordSignIn(
  personId: string,
  outcome: 'sign-in' | 'sign-in-refused',
  address: string,
  transaction: Transaction,
  details: { by?: 'link' | 'orcid' } = {},
): Promise<void> {
  const summary = outcome === 'sign-in' ? 'signed in' : 'was refused at sign-in';
  const item = { kind: 'person', id: personId };
  const actor = { personId, via: 'session', address } as const;
  await recordAudit(actor, outcome, item, summary, transaction, details);
}

/** Begins the session of somebody who has shown who they are, and says so in the log. */
async function letIn(
  person: LinkPerson,
  visitor: Visitor,
  transaction: Transaction,
  by?: 'link' | 'orcid',
): Promise<SignedIn> {
  const sessionId = await beginSession(person.id, visitor.userAgent, transaction);
  const details = by === undefined ? {} : { by };
  await recordSignIn(person.id, 'sign-in', visitor.address, transaction, details);
  return { id: person.id, name: person.name, email: person.email, sessionId };
}

/** Refuses who has to show a code and has none, or a wrong one; a wrong one stands in the log. */
async function demandCode(personId: string, { secondFactor, address }: Visitor): Promise<void> {
  try {
    await passSecondFactor(personId, secondFactor);
  } catch (refusal) {
    if (secondFactor) {
      await inTransaction((t) => recordSignIn(personId, 'sign-in-refused', address, t));
    }
    throw refusal;
  }
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
  await countAttempt('sign-in-address', address, TOO_MANY_HERE);
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
  await demandCode(person.id, attempt);
  return inTransaction((transaction) => letIn(person, attempt, transaction));
}

/**
 * Begins a session for the person to whom a link was sent, and uses the link up.
 *
 * @throws LabError for a link that was used, has expired or was replaced
 */
export async function signInByLink(attempt: Visitor & { code: string }): Promise<SignedIn> {
  await countAttempt('sign-in-address', attempt.address, TOO_MANY_HERE);
  // Before the link is used up: a mistyped code does not cost it.
  const found = await findLink(attempt.code, 'sign-in');
  if (found) await demandCode(found.id, attempt);
  const signedIn = await inTransaction(async (transaction) => {
    const person = await takeLink(attempt.code, 'sign-in', transaction);
    if (!person) throw linkIsOver();
    return letIn(person, attempt, transaction, 'link');
  });
  await uncountAttempt('sign-in-address', attempt.address);
  return signedIn;
}

/**
 * Begins a session for the person whose account is linked with an iD that ORCID has confirmed.
 *
 * @returns null where no account is linked with it: an address of mail is never looked at; the code
 *   of a link where the person has to show a code of the second factor first
 */
export async function signInByOrcid(
  orcid: string,
  visitor: Visitor,
): Promise<SignedIn | { link: string } | null> {
  database();
  const person = await PersonRow.findOne({ where: { orcid, suspendedAt: null } });
  if (!person) return null;
  const { isOn } = await readSecondFactor({ personId: person.id });
  return inTransaction(async (transaction) => {
    if (!isOn) return letIn(person, visitor, transaction, 'orcid');
    const { code } = await makeLink(person.id, 'sign-in', transaction);
    return { link: code };
  });
}
