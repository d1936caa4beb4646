import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { addFormulaGuard, writeCsv } from '@/lib/formats';
import {
  type AuditEntryView,
  type AuditExportQuery,
  type AuditPage,
  type AuditQuery,
  auditEntrySchema,
} from '@/lib/schemas/audit';
import { AuditEntryRow, database, inTransaction } from '@/models';
import { behindRow, type PageAsked } from './behind-row';
import { nameItems } from './item-names';
import { together } from './together';

/** Whom an entry is about: a member within a collaboration, or a person outside of any. */
export type AuditActor = {
  personId: string;
  /** `link`: whoever opened a link in a message that was sent to the person. */
  via: Actor['via'] | 'link';
} & Partial<Pick<Actor, 'collaborationId' | 'sessionId' | 'tokenId' | 'address'>>;

export interface AuditItem {
  kind: string;
  id: string;
}

/**
 * Adds one entry to the log, in the transaction of what it tells of: both are stored, or neither.
 *
 * @param summary completes "R. Castellan …", such as "invited a student"; no secret, no address of mail
 * @param details holds `before` and `after` where a value changed
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
      address: actor.address ?? null,
      details: {
        ...details,
        via: actor.via,
        ...(actor.tokenId === undefined ? {} : { tokenId: actor.tokenId }),
      },
    },
    { transaction },
  );
}

type Filters = Pick<AuditQuery, 'action' | 'item' | 'person' | 'from' | 'to'>;

const CONDITIONS = `a.collaboration_id = $1
  and ($2::text is null or a.action = $2) and ($3::text is null or a.item_id = $3)
  and ($4::uuid is null or a.person_id = $4::uuid)
  and ($5::timestamptz is null or a.created_at >= $5::timestamptz)
  and ($6::timestamptz is null or a.created_at < $6::timestamptz)`;

const bindOf = (actor: Actor, { action, item, person, from, to }: Filters) => [
  actor.collaborationId,
  action ?? null,
  item ?? null,
  person ?? null,
  from ?? null,
  to ?? null,
];

const NEWEST = {
  table: 'audit_entry',
  keys: (row: string) => [`${row}.created_at`, `${row}.id`],
  direction: 'down',
} as const;

async function readEntries(
  actor: Actor,
  filters: Filters,
  { limit, offset, after }: Omit<PageAsked, 'limit'> & { limit: number | null },
  transaction?: Transaction,
): Promise<AuditEntryView[]> {
  const { collaborationId } = actor;
  const behind =
    after === undefined ? null : await behindRow(NEWEST, { name: 'a', collaborationId, after });
  const rows = await database().query<Omit<AuditEntryView, 'at'> & { at: Date }>(
    `select a.id::text as id, a.created_at as at,
            coalesce(p.name, 'somebody who left') as who,
            a.person_id as "personId", a.action, a.item_kind as "itemKind", a.item_id as "itemId",
            a.summary, a.address, a.details
       from audit_entry a left join person p on p.id = a.person_id
      where ${CONDITIONS} ${behind ? `and ${behind.val}` : ''} order by a.created_at desc, a.id desc limit $7 offset $8`,
    {
      bind: [...bindOf(actor, filters), limit, offset],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  const names = await nameItems(
    actor.collaborationId,
    rows.map(({ itemKind: kind, itemId: id }) => ({ kind, id })),
  );
  return rows.map((row) => {
    const name = names.get(`${row.itemKind}:${row.itemId}`);
    return auditEntrySchema.parse({
      ...row,
      at: row.at.toISOString(),
      item: name?.label ?? null,
      path: name?.path ?? null,
    });
  });
}

type AuditAsked = AuditQuery & Pick<PageAsked, 'after'>;

/** Entries of the collaboration, newest first. */
export async function listAudit(actor: Actor, query: AuditAsked): Promise<AuditPage> {
  demand(actor, 'read-audit');
  const key = `audit ${actor.collaborationId} ${JSON.stringify(query)}`;
  return together(key, () => readPage(actor, query));
}

/** The same for everybody who may read it. */
async function readPage(actor: Actor, query: AuditAsked): Promise<AuditPage> {
  const [counted] = await database().query<{ total: number }>(
    `select count(*)::int as total from audit_entry a where ${CONDITIONS}`,
    { bind: bindOf(actor, query), type: QueryTypes.SELECT },
  );
  return {
    entries: await readEntries(actor, query, query),
    total: counted.total,
  };
}

/** What the filters of the log offer: actions that occur in it, and who acted. */
export async function auditChoices(
  actor: Actor,
): Promise<{ actions: string[]; people: { id: string; name: string }[] }> {
  demand(actor, 'read-audit');
  const bind = [actor.collaborationId];
  const [actions, people] = await Promise.all([
    database().query<{ action: string }>(
      'select distinct action from audit_entry where collaboration_id = $1 order by action',
      { bind, type: QueryTypes.SELECT },
    ),
    database().query<{ id: string; name: string }>(
      `select p.id, p.name from person p where p.id in (
         select person_id from audit_entry where collaboration_id = $1) order by p.name`,
      { bind, type: QueryTypes.SELECT },
    ),
  ]);
  return { actions: actions.map(({ action }) => action), people };
}

/** A value of any shape as one cell. */
const cellOf = (value: unknown): string => {
  if (value === undefined || value === null) return '';
  return addFormulaGuard(typeof value === 'string' ? value : JSON.stringify(value));
};

function writeEntriesCsv(entries: readonly AuditEntryView[]): string {
  const column = (name: string, read: (entry: AuditEntryView) => unknown) => ({
    name,
    values: entries.map((entry) => cellOf(read(entry))),
  });
  return writeCsv([
    column('at', ({ at }) => at),
    column('who', ({ who }) => who),
    column('action', ({ action }) => action),
    column('summary', ({ summary }) => summary),
    column('item_kind', ({ itemKind }) => itemKind),
    column('item_id', ({ itemId }) => itemId),
    column('item', ({ item }) => item),
    column('before', ({ details }) => details.before),
    column('after', ({ details }) => details.after),
    column('address', ({ address }) => address),
    column('via', ({ details }) => details.via),
  ]);
}

/** All entries that the filters leave, as a file; that it was taken is an entry of its own. */
export async function exportAudit(
  actor: Actor,
  { format, ...filters }: AuditExportQuery,
): Promise<{ fileName: string; contentType: string; text: string }> {
  demand(actor, 'read-audit');
  return inTransaction(async (transaction) => {
    const entries = await readEntries(actor, filters, { limit: null, offset: 0 }, transaction);
    const item = { kind: 'collaboration', id: actor.collaborationId };
    const summary = `exported ${entries.length} entries of the log`;
    await recordAudit(actor, 'export', item, summary, transaction, { format, ...filters });
    const fileName = `${actor.collaboration}-log.${format}`;
    if (format === 'csv') {
      return { fileName, contentType: 'text/csv; charset=utf-8', text: writeEntriesCsv(entries) };
    }
    const text = `${JSON.stringify({ collaboration: actor.collaboration, entries }, null, 1)}\n`;
    return { fileName, contentType: 'application/json; charset=utf-8', text };
  });
}
