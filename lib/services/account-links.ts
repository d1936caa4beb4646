import { setTimeout as pause } from 'node:timers/promises';
import { dropLinks, findLink, makeLink, takeLink } from '@/lib/access/account-links';
import { attemptKey, countAttempt, forgetAttempts } from '@/lib/access/attempts';
import { checkPassword, hashPassword } from '@/lib/access/passwords';
import { secondFactorOf } from '@/lib/access/second-factor';
import { endSessions } from '@/lib/access/sessions';
import { LabError } from '@/lib/errors';
import { queueMessage, withdrawMessages } from '@/lib/mail/outbox';
import { isMailSetUp } from '@/lib/mail/transport';
import type { AskLink, LinkPurpose, ResetPassword } from '@/lib/schemas/account-access';
import { database, inTransaction, PersonRow } from '@/models';
import { tellOfChange } from './account-notice';
import { recordAudit } from './audit';

/** Longer than the work takes: the time of the answer does not tell which accounts exist. */
const ANSWER_AFTER_MS = 200;

const pathOf: Record<LinkPurpose, (code: string) => string> = {
  'password-reset': (code) => `/reset/${code}`,
  'sign-in': (code) => `/sign-in/link/${code}`,
};

/** One sentence for a link that was used, has expired, was replaced or never was. */
export const linkIsOver = () =>
  new LabError(
    'link-over',
    422,
    'This link was used, has expired or was replaced by a newer one: ask for another.',
  );

async function sendLink(email: string, purpose: LinkPurpose): Promise<void> {
  database();
  const person = await PersonRow.findOne({ where: { email, suspendedAt: null } });
  if (!person) return;
  await inTransaction(async (transaction) => {
    const { code, expiresAt } = await makeLink(person.id, purpose, transaction);
    const about = `${purpose}:${person.id}`;
    await withdrawMessages(transaction, about);
    await queueMessage(
      transaction,
      purpose === 'sign-in' ? 'sign-in-link' : 'password-reset',
      { personId: person.id },
      { path: pathOf[purpose](code), expiresAt },
      { about, uselessAfter: expiresAt },
    );
  });
}

/**
 * Sends a link to an account, if there is one with this address; the answer is the same if not.
 *
 * @throws TooMany after 3 links for one address in 15 minutes, whether it has an account or not
 */
export async function askLink(input: AskLink, address: string): Promise<void> {
  if (!isMailSetUp()) {
    throw new LabError('mail', 503, 'No mail server is set up, so no link can be sent');
  }
  const tooMany = 'Too many links were asked for.';
  await countAttempt('link-address', address, tooMany);
  await countAttempt('link-account', `${input.purpose}:${attemptKey(input.email)}`, tooMany);
  await Promise.all([sendLink(input.email, input.purpose), pause(ANSWER_AFTER_MS)]);
}

/** The address of the account that the link opens, while it works; looking uses nothing up. */
export async function readLink(code: string, purpose: LinkPurpose): Promise<string | null> {
  return (await findLink(code, purpose))?.email ?? null;
}

/**
 * A new password by the link of a message. Every session of the person ends and every other link;
 * a refused password leaves the link as it was.
 *
 * @throws LabError for a link that does not work, InputError for a password against the rules
 */
export async function resetPassword(input: ResetPassword, address: string): Promise<void> {
  const email = await inTransaction(async (transaction) => {
    const person = await takeLink(input.code, 'password-reset', transaction);
    if (!person) throw linkIsOver();
    const { isOn } = await secondFactorOf(person.id, transaction);
    checkPassword(input.password, person, isOn);
    const passwordHash = await hashPassword(input.password);
    await PersonRow.update({ passwordHash }, { where: { id: person.id }, transaction });
    await endSessions(person.id, transaction);
    await dropLinks(person.id, transaction);
    const actor = { personId: person.id, via: 'link', address } as const;
    const item = { kind: 'person', id: person.id };
    const summary = 'set a new password by a link';
    await recordAudit(actor, 'reset-password', item, summary, transaction);
    await tellOfChange(person.id, 'password', transaction);
    return person.email;
  });
  const account = attemptKey(email);
  await forgetAttempts('sign-in-account', account);
  await forgetAttempts('sign-in-account-address', `${account}:${address}`);
}
