import { QueryTypes } from 'sequelize';
import type { Actor, KnownPerson } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { readStopToken, setWanted, stoppedKinds } from '@/lib/mail/preferences';
import { idSchema } from '@/lib/schemas/common';
import {
  type ChangeMailPreference,
  type FailedMessage,
  failedMessagesSchema,
  type MailPreference,
  type MailPreferences,
  mailPreferenceSchema,
  mailPreferencesSchema,
  type StoppedMail,
} from '@/lib/schemas/mail';
import { database, inTransaction } from '@/models';
import { type AuditActor, recordAudit } from './audit';

/** Which kinds of mail the person gets. */
export async function getMailPreferences(person: KnownPerson): Promise<MailPreferences> {
  const stopped = await stoppedKinds(person.personId);
  return mailPreferencesSchema.parse({
    preferences: mailPreferenceSchema.options.map((kind) => ({
      kind,
      isWanted: !stopped.has(kind),
    })),
  });
}

async function change(actor: AuditActor, kind: MailPreference, isWanted: boolean): Promise<void> {
  await inTransaction(async (transaction) => {
    if (!(await setWanted(actor.personId, kind, isWanted, transaction))) return;
    const item = { kind: 'person', id: actor.personId };
    const summary = `${isWanted ? 'wants' : 'stopped'} mail of kind "${kind}"`;
    const details = { before: !isWanted, after: isWanted };
    await recordAudit(actor, 'change-mail', item, summary, transaction, details);
  });
}

export async function changeMailPreference(
  person: KnownPerson,
  { kind, isWanted }: ChangeMailPreference,
): Promise<MailPreferences> {
  const { personId, via, address } = person;
  await change({ personId, via, address }, kind, isWanted);
  return getMailPreferences(person);
}

/** What a link at the foot of a message would stop; null for a link that this server did not write. */
export function readStopLink(token: string): StoppedMail | null {
  const claim = readStopToken(token);
  return claim && { kind: claim.preference };
}

/**
 * Stops one kind of mail for the person whom the link was sent to; nobody needs to sign in.
 *
 * @throws NotFound for a link that this server did not write
 */
export async function stopMail(token: string, address?: string): Promise<StoppedMail> {
  const claim = readStopToken(token);
  if (!claim) throw new NotFound('link to stop mail');
  await change({ personId: claim.personId, via: 'link', address }, claim.preference, false);
  return { kind: claim.preference };
}

/** Messages of the collaboration that were given up, the newest first. */
export async function listFailedMessages(actor: Actor): Promise<{ messages: FailedMessage[] }> {
  demand(actor, 'read-audit');
  const rows = await database().query<Record<string, unknown>>(
    `select id, kind, coalesce(nullif(to_name, ''), to_address) as to, coalesce(fault, '') as fault,
       attempts, to_char(created_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "createdAt",
       to_char(ended_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "endedAt"
     from outbox_message where collaboration_id = $1 and state = 'failed'
     order by ended_at desc limit 100`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT },
  );
  return failedMessagesSchema.parse({ messages: rows });
}

/** Tries a message again that was given up, from the first attempt on. */
export async function retryMessage(actor: Actor, id: string): Promise<void> {
  demand(actor, 'read-audit');
  if (!idSchema.safeParse(id).success) throw new NotFound('message');
  await inTransaction(async (transaction) => {
    const again = await database().query(
      `update outbox_message set state = 'waiting', attempts = 0, due_at = now(), fault = null,
         ended_at = null, useless_after = greatest(useless_after, now() + interval '1 day')
       where id = $1 and collaboration_id = $2 and state = 'failed' and kind <> 'notes' returning id`,
      { bind: [id, actor.collaborationId], type: QueryTypes.SELECT, transaction },
    );
    if (again.length === 0) throw new NotFound('message that was given up');
    const item = { kind: 'message', id };
    await recordAudit(actor, 'retry-mail', item, 'sends a message again', transaction);
  });
}
