import { randomInt } from 'node:crypto';
import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import { select } from '@/lib/queue/statement';
import type { CreateRelease, ReleaseView, updateReleaseSchema } from '@/lib/schemas/releases';
import { FrozenRunRow, inTransaction, ReleaseRow, ReleaseRunRow } from '@/models';
import { recordAudit } from '../audit';
import { findRelease, getRelease } from './describe';
import { askForSignatures } from './mails';

const LETTERS = '0123456789abcdefghjkmnpqrstvwxyz';
const CODE_LENGTH = 10;

/** Fifty random bits: nobody meets another release by mistyping an address. */
function makeCode(): string {
  let code = '';
  for (let i = 0; i < CODE_LENGTH; i++) code += LETTERS[randomInt(LETTERS.length)];
  return code;
}

async function setRuns(
  actor: Actor,
  releaseId: string,
  runIds: string[],
  transaction: Transaction,
): Promise<void> {
  const { collaborationId } = actor;
  if (new Set(runIds).size < runIds.length) {
    throw new InputError({
      code: 'repeated',
      column: 'runIds',
      found: 'a run twice',
      expected: 'each run once',
    });
  }
  const frozen = await FrozenRunRow.findAll({
    attributes: ['runId'],
    where: { collaborationId, runId: runIds },
    transaction,
  });
  if (frozen.length < runIds.length) throw new NotFound('frozen run');
  await ReleaseRunRow.destroy({ where: { releaseId }, transaction });
  await ReleaseRunRow.bulkCreate(
    runIds.map((runId, position) => ({ releaseId, collaborationId, runId, position })),
    { transaction },
  );
}

async function checkReplaced(
  actor: Actor,
  replacesId: string | null | undefined,
  transaction: Transaction,
): Promise<void> {
  if (!replacesId) return;
  const { collaborationId } = actor;
  const found = await ReleaseRow.findOne({
    where: { id: replacesId, collaborationId },
    transaction,
  });
  if (!found) throw new NotFound('release to replace');
  if (!found.publishedAt) {
    throw new Conflict(`R-${found.number} is not published: there is nothing to replace`);
  }
}

/** A draft of a release of frozen runs. */
export async function createRelease(actor: Actor, input: CreateRelease): Promise<ReleaseView> {
  demand(actor, 'freeze-run');
  const { collaborationId } = actor;
  const { runIds, ...fields } = input;
  const id = await inTransaction(async (transaction) => {
    await select(
      'select id from collaboration where id = $1 for update',
      [collaborationId],
      transaction,
    );
    await checkReplaced(actor, fields.replacesId, transaction);
    const last = await ReleaseRow.max<number, ReleaseRow>('number', {
      where: { collaborationId },
      transaction,
    });
    const number = (last ?? 0) + 1;
    const row = await ReleaseRow.create(
      { ...fields, collaborationId, number, code: makeCode(), createdBy: actor.personId },
      { transaction },
    );
    await setRuns(actor, row.id, runIds, transaction);
    const item = { kind: 'release', id: row.id };
    await recordAudit(actor, 'save-release', item, `began the release R-${number}`, transaction);
    await askForSignatures(actor, row, transaction);
    return row.id;
  });
  return getRelease(actor, id);
}

/** Locks a release that is still a draft. @throws Conflict once it is public or being checked */
export async function lockDraft(row: ReleaseRow, transaction: Transaction): Promise<void> {
  await row.reload({ transaction, lock: transaction.LOCK.UPDATE });
  const name = `R-${row.number}`;
  if (row.withdrawnAt) throw new Conflict(`${name} was withdrawn; it does not change`);
  if (row.publishedAt) {
    throw new Conflict(`${name} is published and does not change; make one that replaces it`);
  }
}

/** What was signed holds for what was read: a change asks for both signatures again. */
const UNSIGNED = {
  signedOffBy: null,
  signedOffByName: null,
  signedOffAt: null,
  agreedBy: null,
  agreedByName: null,
  agreedAt: null,
  jobId: null,
  verification: null,
};

export async function updateRelease(
  actor: Actor,
  key: string,
  input: z.output<typeof updateReleaseSchema>,
): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'freeze-run');
  const { runIds, ...fields } = input;
  await inTransaction(async (transaction) => {
    await lockDraft(row, transaction);
    await checkReplaced(actor, fields.replacesId, transaction);
    await row.update({ ...fields, ...UNSIGNED }, { transaction });
    if (runIds) await setRuns(actor, row.id, runIds, transaction);
    const item = { kind: 'release', id: row.id };
    await recordAudit(actor, 'save-release', item, `changed R-${row.number}`, transaction);
  });
  return getRelease(actor, row.id);
}

/** Deletes a draft; what was public once keeps its page. */
export async function removeRelease(actor: Actor, key: string): Promise<void> {
  const row = await findRelease(actor, key);
  demand(actor, 'freeze-run');
  await inTransaction(async (transaction) => {
    await lockDraft(row, transaction);
    await row.destroy({ transaction });
    const item = { kind: 'release', id: row.id };
    await recordAudit(actor, 'save-release', item, `deleted R-${row.number}`, transaction);
  });
}
