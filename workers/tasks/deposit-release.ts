import { Readable } from 'node:stream';
import type { Transaction } from 'sequelize';
import { config } from '@/lib/config';
import { Conflict, NotFound } from '@/lib/errors';
import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { select } from '@/lib/queue/statement';
import { type Licence, licences } from '@/lib/schemas/releases';
import { AuditEntryRow, DepositRow, inTransaction, ReleaseRow } from '@/models';
import type { Work } from '../perform';
import type {
  DepositMetadata,
  FileToDeposit,
  RemoteDeposit,
  Repository,
} from '../repository/contract';
import type { ExchangeOptions } from '../repository/exchange';
import { openRepository } from '../repository/plain-api';

const PART_BYTES = 1 << 20;

/** Bytes of a stored file, a part at a time. */
async function* partsOf(releaseId: string, name: string, byteLength: number) {
  for (let at = 0; at < byteLength; at += PART_BYTES) {
    const [row] = await select<{ part: Buffer }>(
      `select substring(bytes from $3::int for $4::int) as part from release_file
       where release_id = $1 and name = $2`,
      [releaseId, name, at + 1, PART_BYTES],
    );
    if (!row) throw new NotFound('file of the release');
    yield row.part;
  }
}

async function filesOf(releaseId: string): Promise<FileToDeposit[]> {
  const rows = await select<Omit<FileToDeposit, 'open'>>(
    `select name, media_type as "mediaType", byte_length as "byteLength", sha256
     from release_file where release_id = $1 order by position`,
    [releaseId],
  );
  return rows.map((row) => ({
    ...row,
    open: () => Readable.from(partsOf(releaseId, row.name, row.byteLength), { objectMode: false }),
  }));
}

async function metadataOf(release: ReleaseRow): Promise<DepositMetadata> {
  const { origin } = new URL(config().webAddress);
  const { publishedAt, title, abstract, authors, number, licence, code } = release;
  if (!publishedAt) throw new Conflict('Only a published release is deposited');
  const [before] = await select<{ doi: string | null; code: string }>(
    `select d.doi, r.code from release r
       left join deposit d on d.release_id = r.id and d.published_at is not null
     where r.id = $1::uuid`,
    [release.replacesId],
  );
  return {
    identifier: `${origin}/r/${code}`,
    title,
    description: abstract || title,
    creators: authors,
    publicationDate: publishedAt.toISOString().slice(0, 10),
    version: `R-${number}`,
    licence: licences[licence as Licence],
    ...(before && { replaces: before.doi ?? `${origin}/r/${before.code}` }),
  };
}

/** Where a draft stands, kept before the next step is taken. */
function keep(
  { attempt }: Work,
  row: DepositRow,
  change: Partial<Pick<DepositRow, 'remoteId' | 'doi' | 'uploaded' | 'address' | 'publishedAt'>>,
  also?: (transaction: Transaction) => Promise<void>,
): Promise<void> {
  return inTransaction(async (transaction) => {
    await hold(transaction, attempt);
    await row.update(change, { transaction });
    await also?.(transaction);
  });
}

/** Files that the repository does not hold whole. */
const missingAt = ({ files: there }: RemoteDeposit, files: readonly FileToDeposit[]) =>
  files.filter(
    ({ name, sha256 }) => !there.some((file) => file.name === name && file.sha256 === sha256),
  );

async function upload(
  work: Work,
  repository: Repository,
  row: DepositRow,
  remote: RemoteDeposit,
  files: readonly FileToDeposit[],
): Promise<void> {
  const missing = missingAt(remote, files);
  const arrived = files.filter((file) => !missing.includes(file)).map(({ name }) => name);
  for (const file of missing) {
    work.signal.throwIfAborted();
    await reportProgress(work.attempt, 'upload', arrived.length, files.length);
    await repository.uploadFile(remote.id, file);
    arrived.push(file.name);
    await keep(work, row, { uploaded: [...arrived] });
  }
  await reportProgress(work.attempt, 'upload', files.length, files.length);
}

async function ended(work: Work, release: ReleaseRow, row: DepositRow, transaction: Transaction) {
  const { askedBy, collaborationId, doi } = row;
  if (askedBy !== null) {
    await AuditEntryRow.create(
      {
        collaborationId,
        personId: askedBy,
        action: 'deposit-release',
        itemKind: 'release',
        itemId: release.id,
        summary: `deposited R-${release.number} as ${doi}`,
        details: { via: 'worker', doi },
      },
      { transaction },
    );
  }
  await complete(transaction, work.attempt);
}

/**
 * Sends a release to the open repository: draft, DOI, files, publication. Each step looks first
 * whether it was taken, here or there, so that a second attempt begins where the first one ended.
 *
 * @param options of the exchange, for tests
 */
export async function performDepositRelease(
  work: Work,
  options: Pick<ExchangeOptions, 'wait'> = {},
): Promise<void> {
  const { attempt, signal } = work;
  const { collaborationId, jobId } = attempt;
  const { repository: place } = config();
  if (!place) throw new Conflict('No open repository is set up on this server');
  const row = await DepositRow.findOne({ where: { jobId, collaborationId } });
  if (!row) throw new NotFound('deposit for this job');
  const release = await ReleaseRow.findByPk(row.releaseId, { rejectOnEmpty: true });
  if (release.withdrawnAt) throw new Conflict('The release was withdrawn: it is not deposited');
  const repository = openRepository({ ...place, ...options, signal });
  const files = await filesOf(release.id);

  await reportProgress(attempt, 'draft', 0, 1);
  const known = row.remoteId ? await repository.find(row.remoteId) : null;
  const draft = known ?? (await repository.createDraft(await metadataOf(release)));
  // Another draft than the one that was begun has another identifier, and none of its files.
  if (!known) await keep(work, row, { remoteId: draft.id, doi: draft.doi, uploaded: [] });
  if (!row.doi) {
    await reportProgress(attempt, 'doi', 0, 1);
    await keep(work, row, { doi: draft.doi ?? (await repository.reserveDoi(draft.id)) });
  }
  if (draft.state === 'draft') await upload(work, repository, row, draft, files);
  await reportProgress(attempt, 'publish', 0, 1);
  const published = draft.state === 'draft' ? await repository.publish(draft.id) : draft;
  const absent = missingAt(published, files);
  if (absent.length > 0) {
    throw new Conflict(
      `The repository published the release without ${absent[0].name}. Whoever runs this server has to look at deposit ${published.id} there`,
    );
  }
  const { doi, address } = published;
  const change = { publishedAt: new Date(), address, ...(doi !== null && { doi }) };
  await keep(work, row, change, (transaction) => ended(work, release, row, transaction));
}
