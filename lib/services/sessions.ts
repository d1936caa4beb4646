import { QueryTypes } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { endSessions, SESSION_IDLE_DAYS } from '@/lib/access/sessions';
import { NotFound } from '@/lib/errors';
import { type SessionView, sessionSchema } from '@/lib/schemas/account';
import { idSchema } from '@/lib/schemas/common';
import { database, inTransaction } from '@/models';
import { recordAudit } from './audit';

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
