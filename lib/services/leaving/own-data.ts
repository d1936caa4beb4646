import { QueryTypes } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { database, inTransaction } from '@/models';
import { recordAudit } from '../audit';

/**
 * What is stored about a person, by the name under which they read it. Hashes, and what is sealed,
 * are about nobody and stay out.
 */
const questions: Record<string, string> = {
  memberships: `select c.name as collaboration, c.slug, m.roles, m.created_at as since
    from member m join collaboration c on c.id = m.collaboration_id
    where m.person_id = $1 order by m.created_at`,
  notes: `select c.name as collaboration, n.id, to_jsonb(n) - array['collaboration_id'] as note
    from note n join collaboration c on c.id = n.collaboration_id
    where n.created_by = $1 order by n.created_at`,
  log: `select c.name as collaboration, a.created_at as at, a.action, a.item_kind as "itemKind",
      a.item_id as "itemId", a.summary, a.address, a.details
    from audit_entry a left join collaboration c on c.id = a.collaboration_id
    where a.person_id = $1 order by a.created_at, a.id`,
  tokens: `select c.name as collaboration, t.name, t.scopes, t.created_at as "createdAt",
      t.expires_at as "expiresAt", t.last_used_at as "lastUsedAt", t.revoked_at as "revokedAt"
    from access_token t join collaboration c on c.id = t.collaboration_id
    where t.person_id = $1 order by t.created_at`,
  sessions: `select id, user_agent as "userAgent", created_at as "createdAt",
      last_seen_at as "lastSeenAt", expires_at as "expiresAt"
    from session where person_id = $1 order by created_at`,
  mail: `select kind, to_address as "to", state, created_at as "createdAt", ended_at as "endedAt"
    from outbox_message where person_id = $1 order by created_at`,
  mailStopped: `select kind, stopped_at as "stoppedAt" from mail_preference where person_id = $1
    order by kind`,
  invitations: `select c.name as collaboration, i.roles, i.created_at as "createdAt",
      i.expires_at as "expiresAt", i.accepted_at as "acceptedAt"
    from invitation i join collaboration c on c.id = i.collaboration_id
      join person p on p.email = i.email where p.id = $1 order by i.created_at`,
};

/** Everything that is stored about the person who asks, as one document. */
export async function collectOwnData(person: KnownPerson): Promise<Record<string, unknown>> {
  return inTransaction(async (transaction) => {
    const ask = (sql: string) =>
      database().query<Record<string, unknown>>(sql, {
        bind: [person.personId],
        type: QueryTypes.SELECT,
        transaction,
      });
    const [profile] = await ask(
      `select id, name, email, orcid, created_at as "createdAt" from person where id = $1`,
    );
    const data: Record<string, unknown> = { at: new Date().toISOString(), profile };
    for (const [name, sql] of Object.entries(questions)) data[name] = await ask(sql);
    const item = { kind: 'person', id: person.personId };
    await recordAudit(person, 'export', item, 'fetched their own data', transaction);
    return data;
  });
}
