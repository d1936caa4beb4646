import { createHash, randomInt } from 'node:crypto';
import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '@/models';
import { sealFor, unsealFor } from './sealed';
import { newKey, stepOfCode } from './totp';

const PURPOSE = 'second factor';
const CODE_COUNT = 10;
const CODE_LENGTH = 16;
/** Without the letters and digits that look like others. */
const ALPHABET = 'abcdefghjkmnpqrstuvwxyz23456789';

/** Small and capital letters, blanks and hyphens do not matter. */
const plain = (code: string) => code.toLowerCase().replace(/[\s-]+/g, '');
/** Only this is stored: a code holds 79 random bits, which need no slow hash. */
const hashCode = (code: string) => createHash('sha256').update(plain(code)).digest('hex');

function newRecoveryCode(): string {
  const signs = Array.from({ length: CODE_LENGTH }, () => ALPHABET[randomInt(ALPHABET.length)]);
  return signs.join('').replace(/(.{4})(?=.)/g, '$1-');
}

interface StoredFactor {
  sealedKey: Buffer;
  isOn: boolean;
  codesLeft: number;
}

async function readFactor(
  personId: string,
  transaction?: Transaction,
): Promise<StoredFactor | undefined> {
  const [row] = await database().query<StoredFactor>(
    `select sealed_key as "sealedKey", confirmed_at is not null as "isOn",
            (select count(*)::int from recovery_code c where c.person_id = f.person_id) as "codesLeft"
       from second_factor f where person_id = $1`,
    { bind: [personId], type: QueryTypes.SELECT, transaction },
  );
  return row;
}

/** Whether the person signs in with a code, and how many recovery codes are left. */
export async function secondFactorOf(
  personId: string,
  transaction?: Transaction,
): Promise<{ isOn: boolean; codesLeft: number }> {
  const factor = await readFactor(personId, transaction);
  return factor?.isOn ? { isOn: true, codesLeft: factor.codesLeft } : { isOn: false, codesLeft: 0 };
}

/** A new key that asks for nothing until a code of it is typed; null where one is on already. */
export async function beginFactor(
  personId: string,
  transaction: Transaction,
): Promise<string | null> {
  const key = newKey();
  const stored = await database().query(
    `insert into second_factor (person_id, sealed_key) values ($1, $2)
     on conflict (person_id) do update set sealed_key = $2, last_step = null
       where second_factor.confirmed_at is null returning person_id`,
    { bind: [personId, sealFor(PURPOSE, key)], type: QueryTypes.SELECT, transaction },
  );
  return stored.length === 0 ? null : key;
}

/** Uses a code of the authenticator up: neither it nor an earlier one is taken again. */
export async function takeTimeCode(
  personId: string,
  code: string,
  transaction: Transaction,
): Promise<boolean> {
  const factor = await readFactor(personId, transaction);
  const step = factor ? stepOfCode(String(unsealFor(PURPOSE, factor.sealedKey)), code) : null;
  if (step === null) return false;
  const used = await database().query(
    `update second_factor set last_step = $2, confirmed_at = coalesce(confirmed_at, now())
      where person_id = $1 and (last_step is null or last_step < $2) returning person_id`,
    { bind: [personId, step], type: QueryTypes.SELECT, transaction },
  );
  return used.length > 0;
}

/** Uses a recovery code up. */
export async function takeRecoveryCode(
  personId: string,
  code: string,
  transaction: Transaction,
): Promise<boolean> {
  const used = await database().query(
    'delete from recovery_code where person_id = $1 and code_hash = $2 returning person_id',
    { bind: [personId, hashCode(code)], type: QueryTypes.SELECT, transaction },
  );
  return used.length > 0;
}

/** New recovery codes in place of all earlier ones; they are shown once. */
export async function renewRecoveryCodes(
  personId: string,
  transaction: Transaction,
): Promise<string[]> {
  const codes = Array.from({ length: CODE_COUNT }, newRecoveryCode);
  await database().query('delete from recovery_code where person_id = $1', {
    bind: [personId],
    transaction,
  });
  await database().query(
    'insert into recovery_code (person_id, code_hash) select $1, unnest($2::text[])',
    { bind: [personId, codes.map(hashCode)], transaction },
  );
  return codes;
}

/** The person signs in without a code from now on. */
export async function dropFactor(personId: string, transaction: Transaction): Promise<void> {
  await database().query('delete from second_factor where person_id = $1', {
    bind: [personId],
    transaction,
  });
}
