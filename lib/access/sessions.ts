import { decode } from 'next-auth/jwt';
import { QueryTypes, type Transaction } from 'sequelize';
import { config } from '@/lib/config';
import { idSchema } from '@/lib/schemas/common';
import { database } from '@/models';
import { EVERY_SCOPE, type KnownPerson } from './actor';

export const SESSION_IDLE_DAYS = 7;
export const SESSION_LONGEST_DAYS = 30;

const isSecure = () => config().webAddress.startsWith('https://');

/** The session cookie's name: the prefix ties it to this host and to https. */
export function sessionCookieName(): string {
  return `${isSecure() ? '__Host-' : ''}rarebound.session`;
}

/** What the cookie carries: whose it is and which row it stands on. */
export interface SessionClaims {
  sub: string;
  sid: string;
}

/** @returns null for a cookie that is missing, damaged, expired or signed with another secret */
export async function readSessionCookie(value: string | undefined): Promise<SessionClaims | null> {
  if (!value) return null;
  try {
    const claims = await decode({ token: value, secret: config().authSecret });
    const sid = idSchema.safeParse(claims?.sid);
    if (!claims?.sub || !sid.success) return null;
    return { sub: claims.sub, sid: sid.data };
  } catch {
    return null;
  }
}

interface SessionPerson {
  id: string;
  name: string;
  email: string;
  isStale: boolean;
}

/** The person of a session that still stands, and a note that they were here (once a minute). */
export async function findPersonOfSession(claims: SessionClaims): Promise<KnownPerson | null> {
  const rows = await database().query<SessionPerson>(
    `select p.id, p.name, p.email, s.last_seen_at < now() - interval '1 minute' as "isStale"
       from session s join person p on p.id = s.person_id
      where s.id = $1 and p.id::text = $2 and p.suspended_at is null
        and s.expires_at > now() and s.last_seen_at > now() - make_interval(days => $3)`,
    { bind: [claims.sid, claims.sub, SESSION_IDLE_DAYS], type: QueryTypes.SELECT },
  );
  const person = rows[0];
  if (!person) return null;
  if (person.isStale) {
    await database().query('update session set last_seen_at = now() where id = $1', {
      bind: [claims.sid],
    });
  }
  return {
    personId: person.id,
    personName: person.name,
    email: person.email,
    via: 'session',
    scopes: [...EVERY_SCOPE],
    sessionId: claims.sid,
  };
}

/** Begins a session with an id of its own; the oldest ended ones of the person are swept away. */
export async function beginSession(
  personId: string,
  userAgent: string | null,
  transaction: Transaction,
): Promise<string> {
  await database().query(
    `delete from session where person_id = $1
       and (expires_at <= now() or last_seen_at <= now() - make_interval(days => $2))`,
    { bind: [personId, SESSION_IDLE_DAYS], transaction },
  );
  const rows = await database().query<{ id: string }>(
    `insert into session (person_id, user_agent, expires_at)
     values ($1, $2, now() + make_interval(days => $3)) returning id`,
    {
      bind: [personId, userAgent?.slice(0, 300) ?? null, SESSION_LONGEST_DAYS],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return rows[0].id;
}

/** Ends every session of a person, except the one that asks. */
export async function endSessions(
  personId: string,
  transaction: Transaction,
  exceptId: string | null = null,
): Promise<void> {
  await database().query(
    'delete from session where person_id = $1 and ($2::uuid is null or id <> $2::uuid)',
    { bind: [personId, exceptId], transaction },
  );
}
