import { QueryTypes } from 'sequelize';
import { database } from '@/models';

/** A message that was tried this often is given up. */
export const MAX_ATTEMPTS = 10;
/** How long one attempt may take; then another worker takes the message up. */
const CLAIM_S = 120;
const FIRST_PAUSE_S = 30;
const LONGEST_PAUSE_S = 3600;

/** Seconds until the next attempt: each pause is twice the one before, up to an hour. */
export function pauseAfter(attempts: number): number {
  return Math.min(FIRST_PAUSE_S * 2 ** (attempts - 1), LONGEST_PAUSE_S);
}

/** A message that this worker holds; its token is the fence that marking it passes. */
export interface ClaimedMessage {
  id: string;
  token: string;
  attempts: number;
  kind: string;
  collaborationId: string | null;
  personId: string | null;
  toAddress: string;
  toName: string;
  sealed: Buffer;
}

const run = <Row extends object>(sql: string, bind: unknown[]) =>
  database().query<Row>(sql, { bind, type: QueryTypes.SELECT });

const END = `claim_token = null, claimed_until = null, ended_at = now()`;

/** Gives up what was tried too often without an end, or has become of no use. */
export async function giveUpStale(): Promise<string[]> {
  const rows = await run<{ id: string }>(
    `update outbox_message set state = 'failed', ${END},
       fault = case when useless_after < now() then 'It could not be sent in time'
         else 'Sending it stopped each time before its end' end
     where id in (select id from outbox_message
       where (state = 'waiting' and useless_after < now())
          or (state = 'sending' and claimed_until < clock_timestamp()
              and (attempts >= $1 or useless_after < now()))
       for update skip locked)
     returning id`,
    [MAX_ATTEMPTS],
  );
  return rows.map(({ id }) => id);
}

/** Takes the message that is due longest; one whose attempt ended without a word is due again. */
export async function claimNext(): Promise<ClaimedMessage | null> {
  const [claimed] = await run<ClaimedMessage>(
    `update outbox_message set state = 'sending', attempts = attempts + 1,
       claim_token = gen_random_uuid(), claimed_until = clock_timestamp() + make_interval(secs => $1)
     where id in (select id from outbox_message
       where (state = 'waiting' and due_at <= clock_timestamp())
          or (state = 'sending' and claimed_until < clock_timestamp() and attempts < $2)
       order by due_at limit 1 for update skip locked)
     returning id, claim_token as token, attempts, kind, collaboration_id as "collaborationId",
       person_id as "personId", to_address as "toAddress", to_name as "toName", sealed`,
    [CLAIM_S, MAX_ATTEMPTS],
  );
  return claimed ?? null;
}

/** Notes that the message has gone; its contents go as well. */
export async function markSent({ id, token }: ClaimedMessage): Promise<void> {
  await run(
    `update outbox_message set state = 'sent', sealed = null, fault = null, ${END}
     where id = $1 and claim_token = $2 returning id`,
    [id, token],
  );
}

/** Notes that nobody wants the message any more. */
export async function markWithdrawn({ id, token }: ClaimedMessage): Promise<void> {
  await run(
    `update outbox_message set state = 'withdrawn', sealed = null, ${END}
     where id = $1 and claim_token = $2 returning id`,
    [id, token],
  );
}

/**
 * Notes that an attempt failed: the message waits longer each time, or is given up.
 *
 * @param isFinal the server will never take this message
 */
export async function markFailed(
  { id, token, attempts }: ClaimedMessage,
  fault: string,
  isFinal: boolean,
): Promise<'waiting' | 'failed'> {
  const state = isFinal || attempts >= MAX_ATTEMPTS ? 'failed' : 'waiting';
  await run(
    `update outbox_message set state = $3, fault = $4, claim_token = null, claimed_until = null,
       due_at = now() + make_interval(secs => $5), ended_at = case when $3 = 'failed' then now() end
     where id = $1 and claim_token = $2 returning id`,
    [id, token, state, fault, pauseAfter(attempts)],
  );
  return state;
}
