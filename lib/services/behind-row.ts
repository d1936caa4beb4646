import { literal, QueryTypes } from 'sequelize';
import { InputError } from '@/lib/errors';
import { database } from '@/models';

/** What the end of the page before leaves to go on from. */
export interface PageAsked {
  limit: number;
  offset: number;
  /** Id of the last row of the page before, where a cursor was given: the list goes on behind it. */
  after?: string;
}

const gone = () =>
  new InputError(
    {
      code: 'cursor-gone',
      item: 'query "cursor"',
      message:
        'The row that this cursor stands at is not in the list any more: read it from the start',
    },
    { status: 400 },
  );

interface Order {
  table: string;
  /** What the list is ordered by, of the row under that name; ends with its id. */
  keys: (row: string) => string[];
  direction: 'up' | 'down';
}

/**
 * The condition that a row stands behind another one, whatever was added before that since.
 *
 * @param name under which the statement knows the rows of the table
 * @throws InputError, 400, for a row that is gone or of another collaboration
 */
export async function behindRow(
  { table, keys, direction }: Order,
  { name, collaborationId, after }: { name: string; collaborationId: string; after: string },
) {
  const found = await database().query(
    `select 1 from ${table} where id::text = $1 and collaboration_id = $2`,
    { bind: [after, collaborationId], type: QueryTypes.SELECT },
  );
  if (found.length === 0) throw gone();
  const sign = direction === 'up' ? '>' : '<';
  return literal(
    `(${keys(name)}) ${sign} (select ${keys('before')} from ${table} before
       where before.id::text = ${database().escape(after)})`,
  );
}

/** A page of a list that is ordered in memory. @throws InputError, as `behindRow` does */
export function pageOf<T>(
  rows: readonly T[],
  { limit, offset, after }: PageAsked,
  idOf: (row: T) => string,
): T[] {
  if (after === undefined) return rows.slice(offset, offset + limit);
  const at = rows.findIndex((row) => idOf(row) === after);
  if (at < 0) throw gone();
  return rows.slice(at + 1, at + 1 + limit);
}
