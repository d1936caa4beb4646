import type { Transaction } from 'sequelize';
import { select } from '@/lib/queue/statement';

/** What is no content of the collaboration: letters on their way, and the archives themselves. */
const LEFT_OUT = /^(outbox_message|idempotency.*|collaboration_export.*|departure)$/;
/** Hashes of tokens and codes, sealed letters, fences: of no use to a reader, of some to a thief. */
const SECRET = /^sealed|(^|_)(hash|secret|token|password)$/;
/** Bytes that lie in the archive as files. */
const AS_FILES = new Set(['release_file.bytes', 'frozen_run.snapshot', 'upload_part.bytes']);
const ROWS_AT_ONCE = 200;
/** Of rows with bytes: a map has up to half a megabyte. */
const HEAVY_ROWS_AT_ONCE = 10;

export interface ArchivedTable {
  name: string;
  /** As they stand in the file. */
  columns: string[];
  bytesColumns: string[];
}

interface Column {
  table: string;
  column: string;
  type: string;
}

/**
 * Every table whose rows name their collaboration, as the database has them now: a table of a later
 * migration is in the archive by being there.
 */
export async function archivedTables(transaction: Transaction): Promise<ArchivedTable[]> {
  const rows = await select<Column>(
    `select c.table_name as table, c.column_name as column, c.data_type as type
     from information_schema.columns c
       join information_schema.tables t using (table_schema, table_name)
     where c.table_schema = 'public' and t.table_type = 'BASE TABLE'
       and (c.table_name = 'collaboration' or exists (
         select 1 from information_schema.columns o where o.table_schema = 'public'
           and o.table_name = c.table_name and o.column_name = 'collaboration_id'))
     order by c.table_name, c.ordinal_position`,
    [],
    transaction,
  );
  const tables = new Map<string, ArchivedTable>();
  for (const { table, column, type } of rows) {
    if (LEFT_OUT.test(table) || SECRET.test(column) || AS_FILES.has(`${table}.${column}`)) continue;
    const known = tables.get(table) ?? { name: table, columns: [], bytesColumns: [] };
    known.columns.push(column);
    if (type === 'bytea') known.bytesColumns.push(column);
    tables.set(table, known);
  }
  return [...tables.values()];
}

const quote = (name: string) => `"${name.replaceAll('"', '""')}"`;

/** Names come from the catalogue; the id is one of ours, checked by its type. */
function statementOf(table: ArchivedTable): string {
  const columns = table.columns.map((name) =>
    table.bytesColumns.includes(name)
      ? `translate(encode(${quote(name)}, 'base64'), E'\\n', '') as ${quote(name)}`
      : quote(name),
  );
  const key = table.name === 'collaboration' ? 'id' : 'collaboration_id';
  const also = table.name === 'share' ? ' or receiver_id = $1' : '';
  return `select row_to_json(t)::text as line from (
    select ${columns.join(', ')} from ${quote(table.name)} where ${key} = $1${also}) t`;
}

/** The rows of a table, each one line of JSON, a few at a time. */
export async function* linesOf(
  table: ArchivedTable,
  collaborationId: string,
  transaction: Transaction,
): AsyncGenerator<string[]> {
  const cursor = quote(`archive ${table.name}`);
  const count = table.bytesColumns.length > 0 ? HEAVY_ROWS_AT_ONCE : ROWS_AT_ONCE;
  const statement = `declare ${cursor} no scroll cursor for ${statementOf(table)}`;
  await select(statement, [collaborationId], transaction);
  for (;;) {
    const rows = await select<{ line: string }>(`fetch ${count} from ${cursor}`, [], transaction);
    if (rows.length === 0) break;
    yield rows.map(({ line }) => `${line}\n`);
  }
  await select(`close ${cursor}`, [], transaction);
}
