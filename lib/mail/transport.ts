import { createTransport } from 'nodemailer';
import { config } from '@/lib/config';
import { LabError } from '@/lib/errors';

export interface Address {
  name: string;
  address: string;
}

export interface Message {
  to: Address;
  subject: string;
  text: string;
  html?: string;
  /** The same at every attempt, so that a message which arrives twice is known as one. */
  messageId?: string;
}

/** What would let a name or an address break out of its header, or reach a second mailbox. */
const isUnsafe = (text: string) => /[\p{Cc}"<>\u2028\u2029]/u.test(text);

/** @throws LabError for an address that is not one plain mailbox */
function checkAddress({ address }: Address): void {
  const parts = address.normalize('NFKC').split('@');
  if (isUnsafe(address) || /[\s,;]/.test(address) || parts.length !== 2 || parts.includes('')) {
    throw new LabError('mail-address', 422, 'email: expected one address without quotes or breaks');
  }
}

const oneLine = (text: string) => text.replace(/[\p{Cc}\u2028\u2029]+/gu, ' ').trim();
const plainName = (text: string) => oneLine(text).replace(/["<>]/g, '');

/** Of a message of the outbox. */
export const messageIdOf = (id: string) => `<${id}@${new URL(config().webAddress).hostname}>`;

export const isMailSetUp = () => config().mailUrl !== undefined;

/**
 * Sends one message to one person.
 *
 * @throws LabError 503 when no mail server is set up, or it does not take the message
 */
export async function sendMail(message: Message): Promise<void> {
  const { mailUrl, mailFrom } = config();
  if (mailUrl === undefined) {
    throw new LabError('mail', 503, 'No mail server is set up, so no message was sent');
  }
  checkAddress(message.to);
  const transport = createTransport(mailUrl, {
    from: { name: 'Rarebound', address: mailFrom },
    disableFileAccess: true,
    disableUrlAccess: true,
    // Together shorter than the claim on a message lasts.
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 30_000,
    headers: { 'Auto-Submitted': 'auto-generated' },
  });
  try {
    await transport.sendMail({
      to: { name: plainName(message.to.name), address: message.to.address },
      subject: oneLine(message.subject),
      text: message.text,
      html: message.html,
      messageId: message.messageId ?? messageIdOf(crypto.randomUUID()),
    });
  } catch (reason) {
    const error = new LabError('mail', 503, 'The mail server did not take the message');
    error.cause = reason;
    throw error;
  } finally {
    transport.close();
  }
}
