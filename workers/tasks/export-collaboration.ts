import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';
import { Transaction } from 'sequelize';
import { ZipFile } from 'yazl';
import { NotFound } from '@/lib/errors';
import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { select } from '@/lib/queue/statement';
import { CollaborationExportRow, database, inTransaction } from '@/models';
import { archivedFiles } from '../leaving/archive-files';
import { type ArchivedTable, archivedTables, linesOf } from '../leaving/archive-tables';
import { describeArchive } from '../leaving/archive-words';
import type { Work } from '../perform';

const PART_BYTES = 1 << 20;
/** How long owners may fetch it. */
const KEPT_DAYS = 7;
const MODE = 0o100600;

const streamOf = (parts: AsyncGenerator<Buffer | string>) =>
  Readable.from(parts, { objectMode: false });

/** Lines of a table; how many there were stands in the contents afterwards. */
async function* counted(
  table: ArchivedTable,
  collaborationId: string,
  transaction: Transaction,
  rows: Record<string, number>,
): AsyncGenerator<string> {
  rows[table.name] = 0;
  for await (const lines of linesOf(table, collaborationId, transaction)) {
    rows[table.name] += lines.length;
    yield lines.join('');
  }
}

async function* peopleLines(
  collaborationId: string,
  transaction: Transaction,
): AsyncGenerator<string> {
  const people = await select<{ id: string; name: string }>(
    `select p.id, p.name from person p where p.id in (
       select person_id from member where collaboration_id = $1
       union select person_id from audit_entry where collaboration_id = $1)
     order by p.name, p.id`,
    [collaborationId],
    transaction,
  );
  for (const person of people) yield `${JSON.stringify(person)}\n`;
}

/** The archive as a stream; entries are read from the database when their turn comes. */
async function pack(work: Work, transaction: Transaction): Promise<NodeJS.ReadableStream> {
  const { attempt } = work;
  const { collaborationId } = attempt;
  const [facts] = await select<{ name: string; slug: string; schemaVersion: string }>(
    `select name, slug, (select max(name) from "SequelizeMeta") as "schemaVersion"
     from collaboration where id = $1`,
    [collaborationId],
    transaction,
  );
  const at = new Date();
  const tables = await archivedTables(transaction);
  const files = await archivedFiles(collaborationId, transaction);
  const rows: Record<string, number> = {};
  const zip = new ZipFile();
  // A fault while an entry is read ends the archive; nobody else listens to it.
  zip.on('error', (error: Error) => (zip.outputStream as Readable).destroy(error));
  const options = { mtime: at, mode: MODE };
  const words = describeArchive({ ...facts, at: at.toISOString() }, tables);
  zip.addBuffer(Buffer.from(words), 'README.txt', options);
  zip.addReadStream(streamOf(peopleLines(collaborationId, transaction)), 'people.jsonl', options);
  for (const table of tables) {
    const lines = streamOf(counted(table, collaborationId, transaction, rows));
    zip.addReadStream(lines, `tables/${table.name}.jsonl`, options);
  }
  for (const { path, parts } of files) zip.addReadStream(streamOf(parts()), path, options);
  async function* contents(): AsyncGenerator<string> {
    const described = tables.map(({ name, columns }) => ({ name, columns, rows: rows[name] }));
    const { name, slug, schemaVersion } = facts;
    const paths = files.map(({ path }) => path);
    const all = {
      collaboration: { name, slug },
      at,
      schemaVersion,
      tables: described,
      files: paths,
    };
    yield `${JSON.stringify(all, null, 1)}\n`;
  }
  zip.addReadStream(streamOf(contents()), 'contents.json', options);
  zip.end();
  return zip.outputStream;
}

/** Cuts a stream into parts of one size. */
async function* inParts(stream: NodeJS.ReadableStream): AsyncGenerator<Buffer> {
  let waiting: Buffer[] = [];
  let length = 0;
  for await (const chunk of stream) {
    waiting.push(chunk as Buffer);
    length += (chunk as Buffer).length;
    while (length >= PART_BYTES) {
      const all = Buffer.concat(waiting);
      yield all.subarray(0, PART_BYTES);
      waiting = [all.subarray(PART_BYTES)];
      length -= PART_BYTES;
    }
  }
  if (length > 0) yield Buffer.concat(waiting);
}

async function keepPart(work: Work, row: CollaborationExportRow, number: number, bytes: Buffer) {
  await inTransaction(async (transaction) => {
    await hold(transaction, work.attempt);
    await select(
      `insert into collaboration_export_part (export_id, collaboration_id, part_number, bytes)
       values ($1, $2, $3, $4) returning part_number`,
      [row.id, row.collaborationId, number, bytes],
      transaction,
    );
  });
}

/** The whole collaboration as one archive, as it stands at one moment; begun anew after a crash. */
export async function performExportCollaboration(work: Work): Promise<void> {
  const { attempt, signal } = work;
  const { collaborationId, jobId } = attempt;
  const row = await CollaborationExportRow.findOne({ where: { jobId, collaborationId } });
  if (!row) throw new NotFound('export for this job');
  await reportProgress(attempt, 'pack', 0, 1);
  await inTransaction(async (transaction) => {
    await hold(transaction, attempt);
    const statement = 'delete from collaboration_export_part where export_id = $1 returning 1';
    await select(statement, [row.id], transaction);
  });
  const hash = createHash('sha256');
  let byteLength = 0;
  let parts = 0;
  const { REPEATABLE_READ: isolationLevel } = Transaction.ISOLATION_LEVELS;
  await database().transaction({ isolationLevel }, async (reading) => {
    for await (const part of inParts(await pack(work, reading))) {
      signal.throwIfAborted();
      hash.update(part);
      byteLength += part.length;
      await keepPart(work, row, parts++, part);
    }
  });
  await inTransaction(async (transaction) => {
    await hold(transaction, attempt);
    const finishedAt = new Date();
    const expiresAt = new Date(finishedAt.getTime() + KEPT_DAYS * 86_400_000);
    const sha256 = hash.digest('hex');
    await row.update({ finishedAt, expiresAt, byteLength, sha256 }, { transaction });
    await reportProgress(attempt, 'pack', 1, 1, transaction);
    await complete(transaction, attempt);
  });
}
