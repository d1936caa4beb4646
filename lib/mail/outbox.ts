import { QueryTypes, type Transaction } from 'sequelize';
import { database, OutgoingMessageRow } from '@/models';
import { type MailData, type MailKindName, mailKinds } from './kinds';
import { isWanted } from './preferences';
import { seal, unseal } from './sealed';

/** Notes on one person's things are gathered this long. */
const DIGEST_MINUTES = 60;
/** News older than this is none. */
const KEPT_DAYS = 3;

/** A person with an account, or an address that has none yet. */
export type Recipient = { personId: string } | { email: string; name?: string };

export interface QueueOptions {
  /** Whose business it is; none for a message about an account. */
  collaborationId?: string | null;
  /** What it tells of, such as "invitation:…": `withdrawMessages` takes it back by this. */
  about?: string;
  /** After this moment the message would be of no use: it is given up. */
  uselessAfter?: Date;
}

async function addressOf(
  to: Recipient,
  transaction: Transaction,
): Promise<{ personId: string | null; address: string; name: string } | null> {
  if ('email' in to) return { personId: null, address: to.email, name: to.name ?? '' };
  const [person] = await database().query<{ email: string; name: string }>(
    'select email, name from person where id = $1 and suspended_at is null',
    { bind: [to.personId], type: QueryTypes.SELECT, transaction },
  );
  return person ? { personId: to.personId, address: person.email, name: person.name } : null;
}

/**
 * Stores a message in the caller's transaction; a worker sends it afterwards.
 *
 * @param to a person, who gets nothing of a kind that they have stopped, or an address
 * @returns the message's id, or null where the person wants no such mail or is not there
 */
export async function queueMessage<Kind extends MailKindName>(
  transaction: Transaction,
  kind: Kind,
  to: Recipient,
  data: MailData<Kind>,
  options: QueueOptions = {},
): Promise<string | null> {
  const { schema, preference } = mailKinds[kind];
  const checked = schema.parse(data);
  const found = await addressOf(to, transaction);
  if (!found) return null;
  if (preference !== null && found.personId !== null) {
    if (!(await isWanted(found.personId, preference, transaction))) return null;
  }
  if (kind === 'notes') {
    return addToDigest(found, checked as MailData<'notes'>, options, transaction);
  }
  const row = await OutgoingMessageRow.create(
    { ...rowOf(kind, found, options), sealed: seal(checked) },
    { transaction },
  );
  return row.id;
}

function rowOf(
  kind: MailKindName,
  found: { personId: string | null; address: string; name: string },
  options: QueueOptions,
) {
  return {
    kind,
    personId: found.personId,
    collaborationId: options.collaborationId ?? null,
    toAddress: found.address,
    toName: found.name,
    about: options.about ?? '',
    uselessAfter: options.uselessAfter ?? new Date(Date.now() + KEPT_DAYS * 86_400_000),
  };
}

/** Adds to the digest that waits for the person in this collaboration, or begins one. */
async function addToDigest(
  found: { personId: string | null; address: string; name: string },
  data: MailData<'notes'>,
  options: QueueOptions,
  transaction: Transaction,
): Promise<string> {
  for (;;) {
    const row = rowOf('notes', found, options);
    const [begun] = await database().query<{ id: string }>(
      `insert into outbox_message (collaboration_id, person_id, kind, to_address, to_name, about,
         sealed, useless_after, due_at)
       values ($1, $2, 'notes', $3, $4, $5, $6, $7, now() + make_interval(mins => $8))
       on conflict (collaboration_id, person_id)
         where kind = 'notes' and state = 'waiting' and attempts = 0 do nothing returning id`,
      {
        bind: [
          row.collaborationId,
          row.personId,
          row.toAddress,
          row.toName,
          row.about,
          seal(data),
          row.uselessAfter,
          DIGEST_MINUTES,
        ],
        type: QueryTypes.SELECT,
        transaction,
      },
    );
    if (begun) return begun.id;
    const waiting = await OutgoingMessageRow.findOne({
      where: {
        collaborationId: row.collaborationId,
        personId: row.personId,
        kind: 'notes',
        state: 'waiting',
        attempts: 0,
      },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    // Taken by a worker between the two statements: the next digest begins.
    if (!waiting?.sealed) continue;
    const before = mailKinds.notes.schema.parse(unseal(waiting.sealed));
    const sealed = seal({ ...data, notes: [...before.notes, ...data.notes] });
    await waiting.update({ sealed }, { transaction });
    return waiting.id;
  }
}

/** Takes back what has not gone yet: its cause is gone. */
export async function withdrawMessages(transaction: Transaction, about: string): Promise<void> {
  await OutgoingMessageRow.update(
    { state: 'withdrawn', sealed: null, endedAt: new Date() },
    { where: { about, state: ['waiting', 'failed'] }, transaction },
  );
}
