import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { endingOf, hashToken, makeToken } from '@/lib/access/tokens';
import { AccessError, NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import { newTokenSchema, type TokenView, tokenSchema } from '@/lib/schemas/people';
import { AccessTokenRow, database, inTransaction } from '@/models';
import { recordAudit } from './audit';

function toView(row: AccessTokenRow): TokenView {
  return tokenSchema.parse({
    id: row.id,
    name: row.name,
    scopes: row.scopes,
    ending: row.ending,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
    revokedAt: row.revokedAt?.toISOString() ?? null,
  });
}

/** The actor's own tokens in this collaboration, newest first. */
export async function listTokens(actor: Actor): Promise<{ tokens: TokenView[] }> {
  demand(actor, 'create-token');
  database();
  const rows = await AccessTokenRow.findAll({
    where: { collaborationId: actor.collaborationId, personId: actor.personId },
    order: [['createdAt', 'DESC']],
    limit: 500,
  });
  return { tokens: rows.map(toView) };
}

export interface NewToken {
  name: string;
  scopes: ('read' | 'write' | 'run')[];
  days: number;
}

/** A new token, whose text is in this answer and nowhere else. */
export async function createToken(
  actor: Actor,
  input: NewToken,
): Promise<TokenView & { token: string }> {
  demand(actor, 'create-token');
  if (actor.via === 'token') {
    throw new AccessError('A token cannot make tokens: sign in with your password.');
  }
  const token = makeToken();
  return inTransaction(async (transaction) => {
    const row = await AccessTokenRow.create(
      {
        collaborationId: actor.collaborationId,
        personId: actor.personId,
        name: input.name,
        scopes: [...new Set(input.scopes)],
        tokenHash: hashToken(token),
        ending: endingOf(token),
        expiresAt: new Date(Date.now() + input.days * 86_400_000),
      },
      { transaction },
    );
    await row.reload({ transaction });
    const item = { kind: 'token', id: row.id };
    const details = { scopes: row.scopes, days: input.days };
    await recordAudit(actor, 'create-token', item, 'made an access token', transaction, details);
    return newTokenSchema.parse({ ...toView(row), token });
  });
}

/** Ends one of the actor's own tokens at once. */
export async function revokeToken(actor: Actor, id: string): Promise<void> {
  if (!idSchema.safeParse(id).success) throw new NotFound('token');
  await inTransaction(async (transaction) => {
    const ended = await database().query(
      `update access_token set revoked_at = coalesce(revoked_at, now())
        where id = $1 and collaboration_id = $2 and person_id = $3 returning id`,
      {
        bind: [id, actor.collaborationId, actor.personId],
        type: QueryTypes.SELECT,
        transaction,
      },
    );
    if (ended.length === 0) throw new NotFound('token');
    const item = { kind: 'token', id };
    await recordAudit(actor, 'revoke-token', item, 'revoked an access token', transaction);
  });
}
