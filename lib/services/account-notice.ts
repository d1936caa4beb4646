import type { Transaction } from 'sequelize';
import type { MailData } from '@/lib/mail/kinds';
import { queueMessage } from '@/lib/mail/outbox';

/** Tells a person that a way into their account was changed, so that nobody does it unseen. */
export async function tellOfChange(
  personId: string,
  what: MailData<'account-changed'>['what'],
  transaction: Transaction,
): Promise<void> {
  await queueMessage(transaction, 'account-changed', { personId }, { what, at: new Date() });
}
