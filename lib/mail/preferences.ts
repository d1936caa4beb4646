import { QueryTypes, type Transaction } from 'sequelize';
import { idSchema } from '@/lib/schemas/common';
import { type MailPreference, mailPreferenceSchema } from '@/lib/schemas/mail';
import { database } from '@/models';
import { signatureOf } from './sealed';

/** Whether the person has not stopped this kind of mail. */
export async function isWanted(
  personId: string,
  preference: MailPreference,
  transaction?: Transaction,
): Promise<boolean> {
  const stopped = await database().query(
    'select 1 from mail_preference where person_id = $1 and kind = $2',
    { bind: [personId, preference], type: QueryTypes.SELECT, transaction },
  );
  return stopped.length === 0;
}

/** Kinds that the person has stopped. */
export async function stoppedKinds(personId: string): Promise<Set<string>> {
  const rows = await database().query<{ kind: string }>(
    'select kind from mail_preference where person_id = $1',
    { bind: [personId], type: QueryTypes.SELECT },
  );
  return new Set(rows.map(({ kind }) => kind));
}

/** @returns whether that changed anything */
export async function setWanted(
  personId: string,
  preference: MailPreference,
  wanted: boolean,
  transaction: Transaction,
): Promise<boolean> {
  const changed = await database().query(
    wanted
      ? 'delete from mail_preference where person_id = $1 and kind = $2 returning kind'
      : `insert into mail_preference (person_id, kind) select id, $2 from person where id = $1
         on conflict do nothing returning kind`,
    { bind: [personId, preference], type: QueryTypes.SELECT, transaction },
  );
  return changed.length > 0;
}

/** Text of a link that stops one kind of mail for one person, and does nothing else. */
export function stopToken(personId: string, preference: MailPreference): string {
  const claim = `${personId}.${preference}`;
  return `${claim}.${signatureOf(claim)}`;
}

/** @returns null for a text that this server did not write */
export function readStopToken(
  token: string,
): { personId: string; preference: MailPreference } | null {
  const [personId, kind, signature, ...rest] = token.split('.');
  const preference = mailPreferenceSchema.safeParse(kind);
  if (rest.length > 0 || !idSchema.safeParse(personId).success || !preference.success) return null;
  if (!isSame(signature ?? '', signatureOf(`${personId}.${preference.data}`))) return null;
  return { personId, preference: preference.data };
}

/** Takes as long for a first wrong letter as for a last one. */
function isSame(given: string, right: string): boolean {
  if (given.length !== right.length) return false;
  let difference = 0;
  for (let i = 0; i < right.length; i++) difference |= given.charCodeAt(i) ^ right.charCodeAt(i);
  return difference === 0;
}
