import { QueryTypes } from 'sequelize';
import { LabError } from '@/lib/errors';
import { database } from '@/models';
import {
  type ClaimedMessage,
  claimNext,
  giveUpStale,
  markFailed,
  markSent,
  markWithdrawn,
} from './claims';
import { isMailKind, mailKinds } from './kinds';
import { type Letter, writeLetter } from './letter';
import { isWanted, stopToken } from './preferences';
import { unseal } from './sealed';
import { isMailSetUp, type Message, messageIdOf, sendMail } from './transport';

const MOST_IN_A_ROUND = 50;

/** What became of one attempt, for the log: never an address. */
export interface Sending {
  id: string;
  kind: string;
  outcome: 'sent' | 'waiting' | 'failed' | 'withdrawn';
  fault?: string;
}

/** Whether the person is still there, and still a member of what the message tells of. */
async function isStillFor({ personId, collaborationId }: ClaimedMessage): Promise<boolean> {
  if (personId === null) return true;
  const rows = await database().query(
    `select 1 from person p where p.id = $1 and p.suspended_at is null and ($2::uuid is null
       or exists (select 1 from member m where m.person_id = p.id and m.collaboration_id = $2::uuid
         and m.suspended_at is null))`,
    { bind: [personId, collaborationId], type: QueryTypes.SELECT },
  );
  return rows.length > 0;
}

/** How to stop it, or that it cannot be stopped. */
function stopOf({ personId }: ClaimedMessage, kind: keyof typeof mailKinds) {
  const { preference } = mailKinds[kind];
  if (preference !== null && personId !== null) {
    return {
      words: 'Stop messages of this kind:',
      path: `/mail/stop/${stopToken(personId, preference)}`,
    };
  }
  if (kind === 'invitation') return { words: 'No other message follows this one.' };
  return { words: 'Messages about your account cannot be stopped.' };
}

/** @returns null when nobody wants the message any more */
async function compose(claimed: ClaimedMessage): Promise<Message | null> {
  const { kind, personId } = claimed;
  if (!isMailKind(kind)) throw new LabError('mail-kind', 500, `No words for mail of kind ${kind}`);
  const { preference, schema, compose: write } = mailKinds[kind];
  if (!(await isStillFor(claimed))) return null;
  if (preference !== null && personId !== null && !(await isWanted(personId, preference))) {
    return null;
  }
  const data = schema.parse(unseal(claimed.sealed));
  const letter = (write as (given: unknown) => Letter)(data);
  return {
    to: { name: claimed.toName, address: claimed.toAddress },
    messageId: messageIdOf(claimed.id),
    ...writeLetter(letter, stopOf(claimed, kind)),
  };
}

/** A mail server that answers 5xx to a message will not take it the next time either. */
function isFinal(error: unknown): boolean {
  if (!(error instanceof LabError)) return true;
  if (error.code !== 'mail') return true;
  const { responseCode } = (error.cause ?? {}) as { responseCode?: number };
  return responseCode !== undefined && responseCode >= 500;
}

async function sendOne(claimed: ClaimedMessage): Promise<Sending> {
  const { id, kind } = claimed;
  try {
    const message = await compose(claimed);
    if (message === null) {
      await markWithdrawn(claimed);
      return { id, kind, outcome: 'withdrawn' };
    }
    await sendMail(message);
  } catch (error) {
    const fault = error instanceof LabError ? error.message : 'The message could not be written';
    return { id, kind, outcome: await markFailed(claimed, fault, isFinal(error)), fault };
  }
  // A process that dies between these two lines sends it twice, under the same Message-ID.
  await markSent(claimed);
  return { id, kind, outcome: 'sent' };
}

/**
 * Sends what is due, one after the other. Several workers may do so at once: each message is
 * claimed by one of them.
 */
export async function sendDue(isStopped: () => boolean = () => false): Promise<Sending[]> {
  if (!isMailSetUp()) return [];
  await giveUpStale();
  const done: Sending[] = [];
  // Claimed one by one: none waits behind a slow server while its claim runs out.
  while (done.length < MOST_IN_A_ROUND && !isStopped()) {
    const claimed = await claimNext();
    if (!claimed) break;
    done.push(await sendOne(claimed));
  }
  return done;
}
