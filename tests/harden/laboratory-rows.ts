import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { hashPassword } from '@/lib/access/passwords';
import { hashToken, makeToken } from '@/lib/access/tokens';
import type { RunningProduct } from './row';

/** The database of the product, past everything that the product does. */
export async function withRows<Answer>(
  { databaseUrl }: RunningProduct,
  work: (query: <Row>(sql: string, values?: unknown[]) => Promise<Row[]>) => Promise<Answer>,
): Promise<Answer> {
  const client = new Client({ connectionString: databaseUrl, application_name: 'harden' });
  await client.connect();
  try {
    return await work(async (sql, values) => (await client.query(sql, values)).rows as never);
  } finally {
    await client.end();
  }
}

export interface Newcomer {
  personId: string;
  email: string;
  token: string;
}

/** A further member of a collaboration with a token that may do everything, and a password if given. */
export async function addMember(
  product: RunningProduct,
  slug: string,
  roles: string[],
  password?: string,
): Promise<Newcomer> {
  const token = makeToken();
  const email = `${randomUUID()}@harden.example`;
  const hash = password === undefined ? 'none' : await hashPassword(password);
  const [{ id: personId }] = await withRows(product, (query) =>
    query<{ id: string }>(
      `with made as (
         insert into person (email, name, password_hash) values ($5, 'Newcomer', $6) returning id),
       home as (select id from collaboration where slug = $1),
       joined as (
         insert into member (collaboration_id, person_id, roles)
         select home.id, made.id, $2 from home, made returning person_id),
       given as (
         insert into access_token
           (collaboration_id, person_id, name, scopes, token_hash, ending, expires_at)
         select home.id, made.id, 'hardening', '{read,write,run}', $3, $4, now() + interval '1 day'
           from home, made returning id)
       select person_id as id from joined, given`,
      [slug, roles, hashToken(token), token.slice(-4), email, hash],
    ),
  );
  return { personId, email, token };
}
