import { config } from '@/lib/config';
import { InputError } from '@/lib/errors';

/** What the query of a long list holds, whatever else it asks for. */
interface Page {
  limit: number;
  offset: number;
  cursor?: string;
}

const writeCursor = (offset: number) => Buffer.from(`after ${offset}`).toString('base64url');

function readCursor(cursor: string): number {
  const text = Buffer.from(cursor, 'base64url').toString('latin1');
  const offset = Number(/^after (\d{1,9})$/.exec(text)?.[1] ?? Number.NaN);
  if (Number.isFinite(offset)) return offset;
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

/** The query with its cursor turned into the offset that the services count from. */
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
  return { ...page, offset: readCursor(cursor) } as unknown as Q;
}

/**
 * The Link header (RFC 8288) that leads to the next page; null on the last one.
 *
 * @param list key of the rows in the answer
 */
export function nextLink(
  request: Request,
  query: unknown,
  answer: unknown,
  list: string,
): string | null {
  const { limit, offset } = query as Page;
  const { [list]: rows, total } = answer as Record<string, unknown>;
  const count = (rows as unknown[]).length;
  const isLast = typeof total === 'number' ? offset + count >= total : count < limit;
  if (isLast || count === 0) return null;
  const asked = new URL(request.url);
  const next = new URL(asked.pathname + asked.search, config().webAddress);
  next.searchParams.delete('offset');
  next.searchParams.set('cursor', writeCursor(offset + count));
  return `<${next.href}>; rel="next"`;
}
