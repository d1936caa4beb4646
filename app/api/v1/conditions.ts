import type { Actor } from '@/lib/access/actor';
import { InputError, LabError } from '@/lib/errors';
import { answerOnce, fingerprintOf, readIdempotencyKey } from '@/lib/services/idempotency';
import { etagOf, namesTag, WrittenJson } from './answer';

/**
 * Refuses a write whose If-Match names another state than the one that reading would answer now.
 *
 * @throws LabError, 412; also where an address carries no tag, since then none can match
 */
export async function requireUnchanged(
  request: Request,
  current: (() => Promise<unknown>) | undefined,
): Promise<void> {
  const held = request.headers.get('if-match');
  if (held === null || request.method === 'GET' || request.method === 'HEAD') return;
  if (current && namesTag(held, etagOf(JSON.stringify(await current())))) return;
  throw new LabError(
    'changed-meanwhile',
    412,
    current
      ? 'It has changed since it was read: read it again, then decide'
      : 'This address carries no ETag: leave If-Match out',
  );
}

/** Where an answer cannot be kept, a key must not be taken as if it were. */
export function refuseKey(request: Request): void {
  if (request.method !== 'POST' || !request.headers.has('idempotency-key')) return;
  throw new InputError(
    {
      code: 'idempotency-key-refused',
      item: 'Idempotency-Key',
      message: 'Answers are not kept here: send the request without this header',
    },
    { status: 400 },
  );
}

/** The work, or the answer that it had when the same key came before. */
export async function answerKept(
  request: Request,
  { actor, body }: { actor: Actor; body: unknown },
  status: number,
  work: () => Promise<unknown>,
): Promise<unknown> {
  const key = request.method === 'POST' ? readIdempotencyKey(request.headers) : null;
  if (key === null) return work();
  const answer = await answerOnce(actor, key, fingerprintOf(request, body), async () => {
    const result = await work();
    if (result instanceof Response) throw new Error('an answer that is kept must be JSON');
    if (result === undefined) return { status: 204, json: null };
    return { status, json: JSON.stringify(result) };
  });
  const told: Record<string, string> = answer.isReplayed ? { 'Idempotency-Replayed': 'true' } : {};
  return new WrittenJson(answer.json, answer.status, told);
}
