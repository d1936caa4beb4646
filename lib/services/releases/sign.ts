import { type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { AccessError, Conflict, NotFound } from '@/lib/errors';
import { enqueueVerification } from '@/lib/queue/enqueue';
import type { ReleaseView } from '@/lib/schemas/releases';
import { inTransaction, JobRow, ReleaseFileRow, ReleaseRow, ReleaseRunRow } from '@/models';
import { sha256Hex } from '@/models/digest';
import { recordAudit } from '../audit';
import { addressOfRelease } from './address';
import { bundledRun } from './bundled-runs';
import { describeReleases, findRelease, getRelease, OWN_FREEZE, stateOfRelease } from './describe';
import { lockDraft } from './draft';
import { makeReleaseFiles, type ReleaseToWrite } from './files';
import { tellMembers, tellOfSignature } from './mails';

/** Once both have signed, everything is run again from its inputs before anybody may publish it. */
async function checkOnceSigned(
  actor: Actor,
  row: ReleaseRow,
  transaction: Transaction,
): Promise<void> {
  if (!row.signedOffAt || !row.agreedAt || row.jobId) return;
  const jobId = await enqueueVerification(transaction, {
    collaborationId: actor.collaborationId,
    requestedBy: actor.personId,
  });
  await row.update({ jobId, verification: null }, { transaction });
}

const itemOf = (row: ReleaseRow) => ({ kind: 'release', id: row.id });

/** A statistician stands for the statistics of the release. */
export async function signOffRelease(actor: Actor, key: string): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'sign-off-release');
  await inTransaction(async (transaction) => {
    await lockDraft(row, transaction);
    if (row.signedOffAt) throw new Conflict(`${row.signedOffByName} has signed it off already`);
    const { personId: signedOffBy, personName: signedOffByName } = actor;
    await row.update({ signedOffBy, signedOffByName, signedOffAt: new Date() }, { transaction });
    await recordAudit(
      actor,
      'sign-off-release',
      itemOf(row),
      `signed R-${row.number} off`,
      transaction,
    );
    await tellOfSignature(actor, row, transaction);
    await checkOnceSigned(actor, row, transaction);
  });
  return getRelease(actor, row.id);
}

/**
 * An author or an owner agrees to the release.
 *
 * @throws AccessError for who froze one of its runs, where two people are needed
 */
export async function agreeToRelease(actor: Actor, key: string): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'agree-release');
  const [view] = await describeReleases(actor, [row]);
  if (view.can.whyNotAgree === OWN_FREEZE) throw new AccessError(`${OWN_FREEZE}.`);
  await inTransaction(async (transaction) => {
    await lockDraft(row, transaction);
    if (row.agreedAt) throw new Conflict(`${row.agreedByName} has agreed to it already`);
    const { personId: agreedBy, personName: agreedByName } = actor;
    await row.update({ agreedBy, agreedByName, agreedAt: new Date() }, { transaction });
    await recordAudit(
      actor,
      'agree-release',
      itemOf(row),
      `agreed to R-${row.number}`,
      transaction,
    );
    await tellOfSignature(actor, row, transaction);
    await checkOnceSigned(actor, row, transaction);
  });
  return getRelease(actor, row.id);
}

/** Runs it again after a check that failed or found a difference. */
export async function checkReleaseAgain(actor: Actor, key: string): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'agree-release');
  await inTransaction(async (transaction) => {
    await lockDraft(row, transaction);
    const job = row.jobId ? await JobRow.findByPk(row.jobId, { transaction }) : null;
    const state = stateOfRelease(row, job ?? undefined);
    if (state !== 'failed' && state !== 'mismatch') {
      throw new Conflict('Only a check that failed or found a difference is done again');
    }
    await row.update({ jobId: null, verification: null }, { transaction });
    const summary = `had R-${row.number} run again from its inputs`;
    await recordAudit(actor, 'agree-release', itemOf(row), summary, transaction);
    await checkOnceSigned(actor, row, transaction);
  });
  return getRelease(actor, row.id);
}

/**
 * Makes the release public: its files are made and kept, and nothing of it changes from then on.
 *
 * @throws Conflict before both have signed, while the check runs, and after one that differs
 */
export async function publishRelease(actor: Actor, key: string): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'agree-release');
  const publishedAt = new Date();
  const [view] = await describeReleases(actor, [row]);
  refuseUnready(view);
  const links = await ReleaseRunRow.findAll({
    where: { releaseId: row.id },
    order: [['position', 'ASC']],
  });
  const address = addressOfRelease(row.code);
  const facts = {
    title: row.title,
    version: row.number,
    licence: row.licence,
    address,
    year: publishedAt.getUTCFullYear(),
    authors: row.authors,
  };
  const runs: ReleaseToWrite['runs'] = [];
  for (const { runId } of links) runs.push(await bundledRun(actor, runId, facts));
  const { title, authors, abstract, number } = row;
  const { key: name, licence } = view;
  const toWrite = {
    key: name,
    number,
    title,
    authors,
    abstract,
    licence,
    address,
    publishedAt,
    runs,
  };
  const files = await makeReleaseFiles(toWrite);
  const store = inTransaction(async (transaction) => {
    const before = row.signedOffAt?.getTime();
    await lockDraft(row, transaction);
    if (row.signedOffAt?.getTime() !== before || !row.verification?.isSame) {
      throw new Conflict('The release has changed meanwhile; look at it again');
    }
    const { collaborationId } = actor;
    await ReleaseFileRow.bulkCreate(
      files.map((file, position) => ({
        ...file,
        releaseId: row.id,
        collaborationId,
        position,
        byteLength: file.bytes.length,
        sha256: sha256Hex(file.bytes),
      })),
      { transaction },
    );
    const { personId: publishedBy, personName: publishedByName } = actor;
    await row.update({ publishedBy, publishedByName, publishedAt }, { transaction });
    await recordAudit(actor, 'publish-release', itemOf(row), `published R-${number}`, transaction);
    await tellMembers(actor, row, 'release-published', transaction);
  });
  await store.catch((error: unknown) => {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Conflict(`Another release has replaced ${view.replaces?.key} meanwhile`);
  });
  return getRelease(actor, row.id);
}

function refuseUnready({ state, key, signedOff, agreed }: ReleaseView): void {
  if (state === 'checked') return;
  if (state === 'published' || state === 'withdrawn') {
    throw new Conflict(`${key} is published already`);
  }
  if (state === 'mismatch') {
    throw new Conflict(
      `${key} gave other numbers when it was run again from its inputs; it cannot be published`,
    );
  }
  if (state === 'checking') throw new Conflict(`${key} is being run again from its inputs; wait`);
  if (state === 'failed') throw new Conflict(`The check of ${key} failed; start it again`);
  const missing = [
    ...(signedOff ? [] : ['a statistician’s sign-off']),
    ...(agreed ? [] : ['the agreement of an author or an owner']),
  ];
  throw new Conflict(`${key} needs ${missing.join(' and ')} before it is published`);
}

/** Takes a release back: its page stays, with the reason in place of the numbers. */
export async function withdrawRelease(
  actor: Actor,
  key: string,
  { reason }: { reason: string },
): Promise<ReleaseView> {
  const row = await findRelease(actor, key);
  demand(actor, 'withdraw-release');
  await inTransaction(async (transaction) => {
    await row.reload({ transaction, lock: transaction.LOCK.UPDATE });
    if (!row.publishedAt) throw new Conflict('Only a published release is withdrawn');
    if (row.withdrawnAt) throw new Conflict('It was withdrawn already');
    const fields = { withdrawnAt: new Date(), withdrawnReason: reason };
    await row.update({ ...fields, withdrawnByName: actor.personName }, { transaction });
    const summary = `withdrew R-${row.number}`;
    await recordAudit(actor, 'withdraw-release', itemOf(row), summary, transaction, { reason });
    await tellMembers(actor, row, 'release-withdrawn', transaction);
  });
  return getRelease(actor, row.id);
}

/** A file of a published release, with its bytes. @throws NotFound after it was withdrawn */
export async function readReleaseFile(code: string, name: string) {
  const row = await ReleaseRow.findOne({ where: { code } });
  const file =
    row?.publishedAt && !row.withdrawnAt
      ? await ReleaseFileRow.findOne({ where: { releaseId: row.id, name } })
      : null;
  if (!file) throw new NotFound('file of a release');
  return file;
}
