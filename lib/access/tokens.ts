import { createHash, randomInt } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import { database } from '@/models';
import type { KnownPerson, Scope } from './actor';

const ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz';
const PREFIX = 'rb_';
const RANDOM_LENGTH = 40;
const CHECKSUM_LENGTH = 6;
const SHAPE = /^rb_[0-9A-Za-z]{46}$/;

/** Six characters that catch a token which was cut or mistyped, before the database is asked. */
function checksumOf(random: string): string {
  let number = createHash('sha256').update(`${PREFIX}${random}`).digest().readUIntBE(0, 6);
  let text = '';
  for (let i = 0; i < CHECKSUM_LENGTH; i++) {
    text += ALPHABET[number % ALPHABET.length];
    number = Math.floor(number / ALPHABET.length);
  }
  return text;
}

/** A new token: 40 random characters hold 238 bits. */
export function makeToken(): string {
  let random = '';
  for (let i = 0; i < RANDOM_LENGTH; i++) random += ALPHABET[randomInt(ALPHABET.length)];
  return `${PREFIX}${random}${checksumOf(random)}`;
}

/** Whether the text has the form of a token and its checksum fits. */
export function isWellFormedToken(text: string): boolean {
  if (!SHAPE.test(text)) return false;
  const random = text.slice(PREFIX.length, PREFIX.length + RANDOM_LENGTH);
  return text.endsWith(checksumOf(random));
}

/** Only this is stored: 238 random bits need no slow hash. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

/** The last characters, by which a person tells tokens apart in a list. */
export function endingOf(token: string): string {
  return token.slice(-4);
}

interface TokenRow {
  id: string;
  collaborationId: string;
  personId: string;
  name: string;
  email: string;
  scopes: Scope[];
  isStale: boolean;
}

/** The person behind a token that is neither expired nor revoked, noting its use once a minute. */
export async function findPersonOfToken(token: string): Promise<KnownPerson | null> {
  if (!isWellFormedToken(token)) return null;
  const rows = await database().query<TokenRow>(
    `select t.id, t.collaboration_id as "collaborationId", t.scopes,
            p.id as "personId", p.name, p.email,
            coalesce(t.last_used_at < now() - interval '1 minute', true) as "isStale"
       from access_token t
       join person p on p.id = t.person_id
       join member m on m.person_id = t.person_id and m.collaboration_id = t.collaboration_id
        and m.suspended_at is null
      where t.token_hash = $1 and t.revoked_at is null and t.expires_at > now()
        and p.suspended_at is null`,
    { bind: [hashToken(token)], type: QueryTypes.SELECT },
  );
  const found = rows[0];
  if (!found) return null;
  if (found.isStale) {
    await database().query('update access_token set last_used_at = now() where id = $1', {
      bind: [found.id],
    });
  }
  return {
    personId: found.personId,
    personName: found.name,
    email: found.email,
    via: 'token',
    scopes: found.scopes,
    tokenId: found.id,
    tokenCollaborationId: found.collaborationId,
  };
}
