import { createHash, randomBytes } from 'node:crypto';
import { QueryTypes, type Transaction } from 'sequelize';
import type { LinkPurpose } from '@/lib/schemas/account-access';
import { database } from '@/models';

const CODE_BYTES = 32;
const CODE_SHAPE = /^[A-Za-z0-9_-]{43}$/;

/** How long each link opens something. */
export const LINK_MINUTES: Record<LinkPurpose, number> = { 'password-reset': 30, 'sign-in': 15 };

/** Only this is stored: 256 random bits need no slow hash. */
const hashCode = (code: string) => createHash('sha256').update(code).digest('hex');

export interface LinkPerson {
  id: string;
  name: string;
  email: string;
}

/** A new link of the person; an earlier one for the same purpose stops working. */
export async function makeLink(
  personId: string,
  purpose: LinkPurpose,
  transaction: Transaction,
): Promise<{ code: string; expiresAt: Date }> {
  const code = randomBytes(CODE_BYTES).toString('base64url');
  await database().query('delete from account_link where person_id = $1 and purpose = $2', {
    bind: [personId, purpose],
    transaction,
  });
  const [row] = await database().query<{ expiresAt: Date }>(
    `insert into account_link (person_id, purpose, code_hash, expires_at)
     values ($1, $2, $3, now() + make_interval(mins => $4)) returning expires_at as "expiresAt"`,
    {
      bind: [personId, purpose, hashCode(code), LINK_MINUTES[purpose]],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return { code, expiresAt: row.expiresAt };
}

const OPEN = `l.code_hash = $1 and l.purpose = $2 and l.expires_at > now()
  and p.id = l.person_id and p.suspended_at is null`;

/** Whose link it is, while it works; nothing is used up. */
export async function findLink(code: string, purpose: LinkPurpose): Promise<LinkPerson | null> {
  if (!CODE_SHAPE.test(code)) return null;
  const [row] = await database().query<LinkPerson>(
    `select p.id, p.name, p.email from account_link l, person p where ${OPEN}`,
    { bind: [hashCode(code), purpose], type: QueryTypes.SELECT },
  );
  return row ?? null;
}

/** Uses the link up: of two requests at the same moment one gets the person, the other null. */
export async function takeLink(
  code: string,
  purpose: LinkPurpose,
  transaction: Transaction,
): Promise<LinkPerson | null> {
  if (!CODE_SHAPE.test(code)) return null;
  const [row] = await database().query<LinkPerson>(
    `delete from account_link l using person p where ${OPEN} returning p.id, p.name, p.email`,
    { bind: [hashCode(code), purpose], type: QueryTypes.SELECT, transaction },
  );
  return row ?? null;
}

/** Every link of the person stops working. */
export async function dropLinks(personId: string, transaction: Transaction): Promise<void> {
  await database().query('delete from account_link where person_id = $1', {
    bind: [personId],
    transaction,
  });
}
