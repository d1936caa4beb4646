import type { Transaction } from 'sequelize';
import { select } from '@/lib/queue/statement';

const PART_BYTES = 1 << 20;

export interface ArchivedFile {
  path: string;
  parts(): AsyncGenerator<Buffer>;
}

/** A name that no system reads as a way out of its folder. */
const safeName = (name: string) => {
  const plain = [...name].map((c) => (c < ' ' || c === '/' || c === '\\' ? '_' : c)).join('');
  return /^\.+$/.test(plain) || plain === '' ? 'file' : plain;
};

async function* piecesOf(
  statement: string,
  bind: unknown[],
  byteLength: number,
  transaction: Transaction,
): AsyncGenerator<Buffer> {
  for (let at = 0; at < byteLength; at += PART_BYTES) {
    const values = [...bind, at + 1, PART_BYTES];
    const [row] = await select<{ part: Buffer }>(statement, values, transaction);
    yield row.part;
  }
}

/** Uploads as they came, files of releases, and the inputs of frozen runs. */
export async function archivedFiles(
  collaborationId: string,
  transaction: Transaction,
): Promise<ArchivedFile[]> {
  const uploads = await select<{ id: string; name: string }>(
    'select id, file_name as name from upload where collaboration_id = $1 order by created_at, id',
    [collaborationId],
    transaction,
  );
  const released = await select<{ id: string; number: number; name: string; bytes: number }>(
    `select f.release_id as id, r.number, f.name, f.byte_length as bytes
     from release_file f join release r on r.id = f.release_id
     where f.collaboration_id = $1 order by r.number, f.position`,
    [collaborationId],
    transaction,
  );
  const frozen = await select<{ id: string; bytes: number }>(
    `select id, length(snapshot) as bytes from frozen_run where collaboration_id = $1 order by id`,
    [collaborationId],
    transaction,
  );
  return [
    ...uploads.map(({ id, name }) => ({
      path: `uploads/${id}/${safeName(name)}`,
      parts: () => uploadParts(id, transaction),
    })),
    ...released.map(({ id, number, name, bytes }) => ({
      path: `releases/R-${number}/${safeName(name)}`,
      parts: () =>
        piecesOf(
          `select substring(bytes from $3::int for $4::int) as part from release_file
           where release_id = $1 and name = $2`,
          [id, name],
          bytes,
          transaction,
        ),
    })),
    ...frozen.map(({ id, bytes }) => ({
      path: `frozen-runs/${id}.zip`,
      parts: () =>
        piecesOf(
          'select substring(snapshot from $2::int for $3::int) as part from frozen_run where id = $1',
          [id],
          bytes,
          transaction,
        ),
    })),
  ];
}

async function* uploadParts(id: string, transaction: Transaction): AsyncGenerator<Buffer> {
  for (let number = 0; ; number++) {
    const [row] = await select<{ bytes: Buffer }>(
      'select bytes from upload_part where upload_id = $1 and part_number = $2',
      [id, number],
      transaction,
    );
    if (!row) return;
    yield row.bytes;
  }
}
