import { UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { config } from '@/lib/config';
import { Conflict } from '@/lib/errors';
import { retry } from '@/lib/queue/cancel';
import { enqueueDeposit } from '@/lib/queue/enqueue';
import type { DepositView } from '@/lib/schemas/deposits';
import { DepositRow, inTransaction, JobRow, type ReleaseRow } from '@/models';
import { recordAudit } from '../audit';
import { findRelease } from '../releases/describe';

/** Reserved for trials: identifiers that begin with it are never resolved. */
const PRACTICE = '10.5072/';
const isPracticeDoi = (doi: string) => doi.startsWith(PRACTICE);

const NO_REPOSITORY = 'No open repository is set up on this server';

function stateOf(row: DepositRow | null, job: JobRow | null): DepositView['state'] {
  if (!row) return 'none';
  if (row.publishedAt) return 'published';
  if (job?.status === 'waiting' || job?.status === 'running') return job.status;
  return 'failed';
}

/** Why nobody may send it now, whatever their role; null where nothing is in the way. */
function obstacle(release: ReleaseRow, state: DepositView['state']): string | null {
  if (!release.publishedAt) return 'Only a published release is deposited';
  if (release.withdrawnAt) return 'The release was withdrawn: it is not deposited';
  if (state === 'published') return 'It is in the repository already';
  if (state === 'waiting' || state === 'running') return 'It is on its way already';
  return config().repository ? null : NO_REPOSITORY;
}

async function viewOf(actor: Actor, release: ReleaseRow): Promise<DepositView> {
  const row = await DepositRow.findOne({ where: { releaseId: release.id } });
  const job = row && (await JobRow.findByPk(row.jobId));
  const state = stateOf(row, job);
  const inTheWay = obstacle(release, state);
  const isAllowed = may(actor, 'deposit-release');
  const place = config().repository;
  return {
    state,
    repository: place && new URL(place.url).host,
    doi: row?.doi ?? null,
    address: row?.address ?? null,
    isPractice: row?.doi ? isPracticeDoi(row.doi) : false,
    askedBy: row?.askedByName ?? null,
    askedAt: row?.createdAt.toISOString() ?? null,
    publishedAt: row?.publishedAt?.toISOString() ?? null,
    stage: job?.stage ?? '',
    done: job?.doneCount ?? 0,
    total: job?.totalCount ?? 0,
    fault:
      state === 'failed' ? (job?.fault ?? 'It was stopped before it was published there') : null,
    canAsk: isAllowed && inTheWay === null,
    whyNot: isAllowed ? inTheWay : 'An author or an owner can send it',
  };
}

/** The copy of a release in an open repository, as far as it has got. */
export async function getDeposit(actor: Actor, key: string): Promise<DepositView> {
  return viewOf(actor, await findRelease(actor, key));
}

/**
 * Sends a published release to the open repository, or goes on where an attempt has failed.
 *
 * @throws Conflict before it is published, after it was withdrawn, and while it is on its way
 */
export async function askForDeposit(actor: Actor, key: string): Promise<DepositView> {
  const release = await findRelease(actor, key);
  demand(actor, 'deposit-release');
  const { collaborationId, personId: askedBy, personName: askedByName } = actor;
  const ask = inTransaction(async (transaction) => {
    await release.reload({ transaction, lock: transaction.LOCK.UPDATE });
    const row = await DepositRow.findOne({ where: { releaseId: release.id }, transaction });
    const job = row && (await JobRow.findByPk(row.jobId, { transaction }));
    const inTheWay = obstacle(release, stateOf(row, job));
    if (inTheWay !== null) throw new Conflict(inTheWay);
    if (job) await retry(transaction, job);
    else {
      const jobId = await enqueueDeposit(transaction, { collaborationId, requestedBy: askedBy });
      await DepositRow.create(
        { collaborationId, releaseId: release.id, jobId, askedBy, askedByName },
        { transaction },
      );
    }
    const summary = `sent R-${release.number} to the open repository`;
    const item = { kind: 'release', id: release.id };
    await recordAudit(actor, 'deposit-release', item, summary, transaction);
  });
  await ask.catch((error: unknown) => {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Conflict('It is on its way already');
  });
  return viewOf(actor, release);
}

/** What a public page says of the copy of its release; null where there is none. */
export async function findDeposit(
  releaseId: string,
): Promise<{ doi: string; address: string | null; isPractice: boolean } | null> {
  const row = await DepositRow.findOne({ where: { releaseId } });
  if (!row?.publishedAt || !row.doi) return null;
  return { doi: row.doi, address: row.address, isPractice: isPracticeDoi(row.doi) };
}
