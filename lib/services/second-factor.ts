import type { Transaction } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { countAttempt, forgetAttempts } from '@/lib/access/attempts';
import { isLongAlone, isPassword } from '@/lib/access/passwords';
import {
  beginFactor,
  dropFactor,
  renewRecoveryCodes,
  secondFactorOf,
  takeRecoveryCode,
  takeTimeCode,
} from '@/lib/access/second-factor';
import { endSessions } from '@/lib/access/sessions';
import { addressOfKey } from '@/lib/access/totp';
import { Conflict, InputError, LabError } from '@/lib/errors';
import {
  type NewKey,
  newKeySchema,
  type RecoveryCodes,
  type SecondFactorView,
} from '@/lib/schemas/account-access';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';
import { inTransaction, PersonRow } from '@/models';
import { tellOfChange } from './account-notice';
import { recordAudit } from './audit';

const IS_ON = 'A code is asked for already when you sign in: turn that off first';
const WRONG = 'This code is wrong or was used before.';

type Owner = Pick<KnownPerson, 'personId'>;

export const readSecondFactor = ({ personId }: Owner): Promise<SecondFactorView> =>
  secondFactorOf(personId);

async function record(person: KnownPerson, action: string, words: string, t: Transaction) {
  await recordAudit(person, action, { kind: 'person', id: person.personId }, words, t);
}

async function demandPassword(person: KnownPerson, password: string): Promise<void> {
  const row = await PersonRow.findByPk(person.personId, { rejectOnEmpty: true });
  if (await isPassword(password, row.passwordHash)) return;
  const message = 'this is not your password';
  throw new InputError({ code: 'password-wrong', item: 'password', message });
}

/**
 * Uses a code up and does the work in one transaction. Each try is counted before the code is looked
 * at, so that guesses sent at once do not slip through.
 *
 * @returns null for a wrong code
 */
async function withCode<Result>(
  personId: string,
  code: string,
  kinds: 'authenticator' | 'both',
  work: (transaction: Transaction) => Promise<Result>,
): Promise<Result | null> {
  await countAttempt('second-factor', personId, 'Too many wrong codes.');
  const result = await inTransaction(async (transaction) => {
    const isRight =
      (await takeTimeCode(personId, code, transaction)) ||
      (kinds === 'both' && (await takeRecoveryCode(personId, code, transaction)));
    return isRight ? work(transaction) : null;
  });
  if (result !== null) await forgetAttempts('second-factor', personId);
  return result;
}

const wrongCode = () => new InputError({ code: 'code-wrong', item: 'code', message: WRONG });

/**
 * Lets a person who signs in pass, if no code is asked of them or theirs is right.
 *
 * @throws LabError with CODE_IS_ASKED without a code, TooMany after 5 wrong ones in 15 minutes
 */
export async function passSecondFactor(personId: string, code: string | undefined): Promise<void> {
  if (!(await secondFactorOf(personId)).isOn) return;
  if (!code) throw new LabError('second-factor', 401, CODE_IS_ASKED);
  const isRight = await withCode(personId, code, 'both', async () => true);
  if (isRight === null) throw new LabError('second-factor-wrong', 401, WRONG);
}

/** A key for the person's authenticator; nothing is asked for until a code of it was typed. */
export async function beginSecondFactor(person: KnownPerson, password: string): Promise<NewKey> {
  await demandPassword(person, password);
  return inTransaction(async (transaction) => {
    const key = await beginFactor(person.personId, transaction);
    if (key === null) throw new Conflict(IS_ON, 'second-factor-on');
    await record(person, 'begin-second-factor', 'began to set a second factor up', transaction);
    return newKeySchema.parse({ key, address: addressOfKey(key, person.email) });
  });
}

/** The first right code turns it on: other sessions end, and recovery codes are shown this once. */
export async function confirmSecondFactor(
  person: KnownPerson,
  code: string,
): Promise<RecoveryCodes> {
  const { personId } = person;
  if ((await secondFactorOf(personId)).isOn) throw new Conflict(IS_ON, 'second-factor-on');
  const done = await withCode(personId, code, 'authenticator', async (transaction) => {
    const recoveryCodes = await renewRecoveryCodes(personId, transaction);
    await endSessions(personId, transaction, person.sessionId ?? null);
    await record(person, 'set-second-factor', 'set a second factor up', transaction);
    await tellOfChange(personId, 'second-factor-on', transaction);
    return { recoveryCodes };
  });
  if (done === null) throw wrongCode();
  return done;
}

/** New recovery codes; the earlier ones open nothing any more. */
export async function changeRecoveryCodes(
  person: KnownPerson,
  code: string,
): Promise<RecoveryCodes> {
  if (!(await secondFactorOf(person.personId)).isOn) throw wrongCode();
  const done = await withCode(person.personId, code, 'both', async (transaction) => {
    const recoveryCodes = await renewRecoveryCodes(person.personId, transaction);
    await record(person, 'renew-recovery-codes', 'made new recovery codes', transaction);
    return { recoveryCodes };
  });
  if (done === null) throw wrongCode();
  return done;
}

/** Turns it off; a password that is only long enough beside a code is changed first. */
export async function removeSecondFactor(
  person: KnownPerson,
  input: { password: string; code: string },
): Promise<void> {
  await demandPassword(person, input.password);
  if (!isLongAlone(input.password)) {
    const sentence = 'Your password is too short without a code: choose one of 15 characters first';
    throw new Conflict(sentence, 'password-short');
  }
  const done = await withCode(person.personId, input.code, 'both', async (transaction) => {
    await dropFactor(person.personId, transaction);
    await endSessions(person.personId, transaction, person.sessionId ?? null);
    await record(person, 'remove-second-factor', 'turned the second factor off', transaction);
    await tellOfChange(person.personId, 'second-factor-off', transaction);
    return true;
  });
  if (done === null) throw wrongCode();
}
