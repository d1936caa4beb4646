import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { Conflict, InputError, LabError } from '@/lib/errors';
import { database } from '@/models';
import { sha256Hex } from '@/models/digest';

const KEPT_HOURS = 24;
/** No request takes longer: one without an answer after this was cut off in the middle. */
const LONGEST_REQUEST_MS = 5 * 60_000;
const KEY = /^[\x21-\x7e]{1,200}$/;

/** An answer as it went out; `json` is null where there was no content. */
export interface KeptAnswer {
  status: number;
  json: string | null;
}

/**
 * The key that a request carries.
 *
 * @throws InputError, 400, for one of another form
 */
export function readIdempotencyKey(headers: Headers): string | null {
  const key = headers.get('idempotency-key');
  if (key === null || KEY.test(key)) return key;
  throw new InputError(
    {
      code: 'format-mismatch',
      item: 'Idempotency-Key',
      found: `${key.length} characters`,
      expected: '1 to 200 printable ASCII characters without spaces',
    },
    { status: 400 },
  );
}

/** What makes two requests the same: where to, and with what. */
export const fingerprintOf = (request: Request, body: unknown): string => {
  const { pathname, search } = new URL(request.url);
  return sha256Hex(JSON.stringify([request.method, pathname, search, body ?? null]));
};

interface Kept {
  fingerprint: string;
  status: number | null;
  answer: string | null;
  createdAt: Date;
}

async function findKept(bind: string[]): Promise<Kept | undefined> {
  const [row] = await database().query<Kept>(
    `select fingerprint, status, answer, created_at as "createdAt" from idempotency_key
      where collaboration_id = $1 and person_id = $2 and key = $3`,
    { bind, type: QueryTypes.SELECT },
  );
  return row;
}

/** The place of a key is taken once, however many ask at the same time; null for all others. */
async function takePlace(bind: string[], fingerprint: string): Promise<string | null> {
  const options = { type: QueryTypes.SELECT } as const;
  await database().query(
    `delete from idempotency_key where created_at < now() - interval '${KEPT_HOURS} hours'`,
    { type: QueryTypes.DELETE },
  );
  const [row] = await database().query<{ id: string }>(
    `insert into idempotency_key (collaboration_id, person_id, key, fingerprint)
     values ($1, $2, $3, $4) on conflict do nothing returning id`,
    { ...options, bind: [...bind, fingerprint] },
  );
  return row?.id ?? null;
}

function replay(row: Kept, fingerprint: string): KeptAnswer {
  if (row.fingerprint !== fingerprint) {
    throw new LabError(
      'idempotency-key-reused',
      422,
      'This Idempotency-Key came with another request before: give each write a key of its own',
    );
  }
  if (row.status !== null) return { status: row.status, json: row.answer };
  if (Date.now() - row.createdAt.getTime() < LONGEST_REQUEST_MS) {
    throw new Conflict(
      'The first request with this Idempotency-Key is still being answered',
      'idempotency-key-busy',
    );
  }
  throw new Conflict(
    'The first request with this Idempotency-Key was cut off: look whether it took effect, then send it with a new key',
    'idempotency-key-lost',
  );
}

/**
 * Does the work once for each key of a person in a collaboration; who asks again within a day gets
 * the first answer. Work that throws has stored nothing, so its key is free again.
 *
 * @returns the answer, and whether it is the one of an earlier request
 * @throws Conflict while the first request is under way, or when it was cut off
 * @throws LabError, 422, when the key came with another request before
 */
export async function answerOnce(
  actor: Actor,
  key: string,
  fingerprint: string,
  work: () => Promise<KeptAnswer>,
): Promise<KeptAnswer & { isReplayed: boolean }> {
  const bind = [actor.collaborationId, actor.personId, key];
  const id = await takePlace(bind, fingerprint);
  if (id === null) {
    const kept = await findKept(bind);
    if (kept) return { ...replay(kept, fingerprint), isReplayed: true };
    throw new Conflict(
      'The first request with this Idempotency-Key was refused just now: ask again',
      'idempotency-key-busy',
    );
  }
  let answer: KeptAnswer;
  try {
    answer = await work();
  } catch (error) {
    await database().query('delete from idempotency_key where id = $1', { bind: [id] });
    throw error;
  }
  await database().query('update idempotency_key set status = $2, answer = $3 where id = $1', {
    bind: [id, answer.status, answer.json],
  });
  return { ...answer, isReplayed: false };
}
