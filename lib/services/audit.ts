import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { type AuditPage, type AuditQuery, auditPageSchema } from '@/lib/schemas/audit';
import { AuditEntryRow, database, inTransaction } from '@/models';

/** Whom an entry is about: a member within a collaboration, or a person outside of any. */
export type AuditActor = Pick<Actor, 'personId' | 'via'> &
  Partial<Pick<Actor, 'collaborationId' | 'sessionId' | 'tokenId'>>;

export interface AuditItem {
  kind: string;
  id: string;
}

/**
 * Adds one entry to the log, in the transaction of what it tells of: both are stored, or neither.
 *
 * @param summary completes "R. Castellan …", such as "invited a student"; no secret, no address of mail
 */
export async function recordAudit(
  actor: AuditActor,
  action: string,
  item: AuditItem,
  summary: string,
  transaction: Transaction,
  details: Record<string, unknown> = {},
): Promise<void> {
  await AuditEntryRow.create(
    {
      collaborationId: actor.collaborationId ?? null,
      personId: actor.personId,
      action,
      itemKind: item.kind,
      itemId: item.id,
      summary,
      details: {
        ...details,
        via: actor.via,
        ...(actor.tokenId === undefined ? {} : { tokenId: actor.tokenId }),
      },
    },
    { transaction },
  );
}

/** Entries of the collaboration, newest first. */
export async function listAudit(actor: Actor, query: AuditQuery): Promise<AuditPage> {
  demand(actor, 'read-audit');
  return inTransaction(async (transaction) => {
    const conditions = `a.collaboration_id = $1
      and ($2::text is null or a.action = $2) and ($3::text is null or a.item_id = $3)`;
    const bind = [actor.collaborationId, query.action ?? null, query.item ?? null];
    const entries = await database().query<Record<string, unknown>>(
      `select a.id::text as id, a.created_at as at, coalesce(p.name, 'somebody who left') as who,
              a.action, a.item_kind as "itemKind", a.item_id as "itemId", a.summary, a.details
         from audit_entry a left join person p on p.id = a.person_id
        where ${conditions} order by a.created_at desc, a.id desc limit $4 offset $5`,
      { bind: [...bind, query.limit, query.offset], type: QueryTypes.SELECT, transaction },
    );
    const counted = await database().query<{ total: number }>(
      `select count(*)::int as total from audit_entry a where ${conditions}`,
      { bind, type: QueryTypes.SELECT, transaction },
    );
    return auditPageSchema.parse({
      entries: entries.map((entry) => ({ ...entry, at: (entry.at as Date).toISOString() })),
      total: counted[0].total,
    });
  });
}
