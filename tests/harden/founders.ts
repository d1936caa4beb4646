import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { endingOf, hashToken, makeToken } from '@/lib/access/tokens';
import type { Role } from '@/lib/schemas/common';
import { Api } from './api';
import type { Laboratory } from './row';

export const FOUNDED = 'harden';

/** Rows of one statement, on a connection of its own. */
export async function query<Row extends object>(
  databaseUrl: string,
  sql: string,
  values: unknown[] = [],
): Promise<Row[]> {
  const client = new Client({ connectionString: databaseUrl, application_name: 'harden' });
  await client.connect();
  try {
    return (await client.query<Row>(sql, values)).rows;
  } finally {
    await client.end();
  }
}

/** How many of these names no row of a table has. */
export async function countMissing(
  databaseUrl: string,
  { table, column, names }: { table: string; column: string; names: string[] },
): Promise<number> {
  const [{ missing }] = await query<{ missing: number }>(
    databaseUrl,
    `select count(*)::int as missing from unnest($1::text[]) as wanted(name)
      where not exists (select from ${table} t where t.${column} = wanted.name)`,
    [names],
  );
  return missing;
}

const MEMBER = `
  with someone as (
    insert into person (email, name, password_hash) values ($1, $2, 'no password') returning id),
  membership as (
    insert into member (collaboration_id, person_id, roles) select $3, id, $4 from someone)
  insert into access_token
    (collaboration_id, person_id, name, scopes, token_hash, ending, expires_at)
    select $3, id, 'harden', '{read,write,run}', $5, $6, now() + interval '1 day' from someone`;

/**
 * A collaboration in an empty laboratory, with one member of each role.
 *
 * @returns the product as each of them sees it
 */
export async function found<Key extends Role>(
  laboratory: Pick<Laboratory, 'address' | 'folder' | 'databaseUrl'>,
  roles: readonly Key[],
): Promise<{ collaborationId: string; as: Record<Key, Api> }> {
  const { databaseUrl } = laboratory;
  const [{ id: collaborationId }] = await query<{ id: string }>(
    databaseUrl,
    `insert into collaboration (slug, name) values ($1, 'Harden') returning id`,
    [FOUNDED],
  );
  const as = {} as Record<Key, Api>;
  for (const role of roles) as[role] = await join(laboratory, collaborationId, role);
  return { collaborationId, as };
}

/** One more member. @returns the product as that person sees it */
export async function join(
  laboratory: Pick<Laboratory, 'address' | 'folder' | 'databaseUrl'>,
  collaborationId: string,
  role: Role,
): Promise<Api> {
  const token = makeToken();
  const email = `${randomUUID()}@harden.example`;
  const values = [email, role, collaborationId, [role], hashToken(token), endingOf(token)];
  await query(laboratory.databaseUrl, MEMBER, values);
  return new Api(laboratory, token, FOUNDED);
}
