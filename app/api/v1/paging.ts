import { config } from '@/lib/config';
import { InputError } from '@/lib/errors';

/** What the query of a long list holds, whatever else it asks for. */
interface Page {
  limit: number;
  offset: number;
  cursor?: string;
}

const writeCursor = (place: string) => Buffer.from(place).toString('base64url');

/** A cursor stands behind a row; where the order itself moves, behind a number of rows. */
function readCursor(cursor: string): { after: string } | { offset: number } {
  const text = Buffer.from(cursor, 'base64url').toString('latin1');
  const [, offset, after] = /^after (?:(\d{1,9})|row ([\w-]{1,40}))$/.exec(text) ?? [];
  if (after !== undefined) return { after };
  if (offset !== undefined) return { offset: Number(offset) };
  throw new InputError(
    {
      code: 'format-mismatch',
      item: 'query "cursor"',
      found: `"${cursor.slice(0, 40)}"`,
      expected: 'the cursor of a Link header',
    },
    { status: 400 },
  );
}

/** The query with its cursor turned into the row or the offset that the services go on from. */
export function fromCursor<Q>(query: Q): Q {
  const { cursor, ...page } = query as Q & Page;
  if (cursor === undefined) return query;
  if (page.offset > 0) {
    throw new InputError(
      {
        code: 'both-given',
        item: 'query "cursor", query "offset"',
        found: 'both',
        expected: 'one of them',
      },
      { status: 400 },
    );
  }
  return { ...page, ...readCursor(cursor) } as unknown as Q;
}

/**
 * The Link header (RFC 8288) that leads to the next page; null on the last one.
 *
 * @param list key of the rows in the answer
 * @param order whether rows keep their place among each other, so that a row can be gone on from
 */
export function nextLink(
  request: Request,
  query: unknown,
  answer: unknown,
  list: string,
  order: 'kept' | 'moving',
): string | null {
  const { limit, offset, after } = query as Page & { after?: string };
  const { [list]: rows, total } = answer as Record<string, unknown>;
  const count = (rows as unknown[]).length;
  const isCounted = typeof total === 'number' && after === undefined;
  const isLast = isCounted ? offset + count >= total : count < limit;
  if (isLast || count === 0) return null;
  const { id } = (rows as { id?: string }[])[count - 1];
  if (order === 'kept' && id === undefined) throw new Error(`rows of ${list} have no id`);
  const asked = new URL(request.url);
  const next = new URL(asked.pathname + asked.search, config().webAddress);
  next.searchParams.delete('offset');
  next.searchParams.set(
    'cursor',
    writeCursor(order === 'kept' ? `after row ${id}` : `after ${offset + count}`),
  );
  return `<${next.href}>; rel="next"`;
}
