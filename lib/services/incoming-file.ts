import { createHash, randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { open, rm } from 'node:fs/promises';
import path from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { escapeLiteral } from 'pg';
import type { Transaction } from 'sequelize';
import { InputError, LabError } from '@/lib/errors';
import { uploadLimits } from '@/lib/formats';
import { database } from '@/models';
import { copyRows } from '@/models/copy-rows';
import { noRoomFor, sweptFolder } from './disk';

/** Parts of this size keep memory flat, however large the file is. */
const PART_BYTES = 1 << 20;

/** No upload is written to or read for so long: the server that received this one was killed. */
const ABANDONED_MS = 60 * 60_000;

export interface IncomingFile {
  path: string;
  byteLength: number;
  sha256: string;
  discard(): Promise<void>;
}

/** The SHA-256 that the sender states, in hex: `Repr-Digest: sha-256=:<base64>:` (RFC 9530). */
export function statedDigest(headers: Headers): string | null {
  const field = headers.get('repr-digest');
  if (field === null) return null;
  const found = /(?:^|,)\s*sha-256=:([A-Za-z0-9+/=]+):/.exec(field);
  if (!found) {
    throw new InputError(
      {
        code: 'checksum',
        item: 'header "Repr-Digest"',
        found: 'no sha-256',
        expected: 'sha-256=:<base64>:',
      },
      { status: 400 },
    );
  }
  return Buffer.from(found[1], 'base64').toString('hex');
}

/**
 * Streams a request's body to a file of the data folder while hashing it.
 *
 * @throws InputError `truncated` when fewer or more bytes came than Content-Length says,
 *   `checksum` when the stated SHA-256 differs, `too-large` (413) beyond the limit. The file is
 *   gone by then.
 */
export async function receiveFile(request: Request): Promise<IncomingFile> {
  const stated = statedDigest(request.headers);
  const statedLength = request.headers.get('content-length');
  const folder = await sweptFolder('incoming', ABANDONED_MS);
  const filePath = path.join(folder, randomUUID());
  const discard = () => rm(filePath, { force: true });
  const hash = createHash('sha256');
  let byteLength = 0;
  try {
    if (Number(statedLength) > uploadLimits.uploadBytes) throw tooLarge(Number(statedLength));
    const body = request.body ?? new ReadableStream({ start: (stream) => stream.close() });
    await pipeline(
      Readable.fromWeb(body as never),
      async function* measure(source: AsyncIterable<Uint8Array>) {
        for await (const chunk of source) {
          byteLength += chunk.length;
          if (byteLength > uploadLimits.uploadBytes) throw tooLarge(byteLength);
          hash.update(chunk);
          yield chunk;
        }
      },
      createWriteStream(filePath, { mode: 0o600 }),
    );
    if (statedLength !== null && Number(statedLength) !== byteLength) {
      throw new InputError(
        {
          code: 'truncated',
          item: 'body',
          found: `${byteLength} bytes`,
          expected: `${statedLength} bytes, as Content-Length says`,
        },
        { status: 400 },
      );
    }
    const sha256 = hash.digest('hex');
    if (stated !== null && stated !== sha256) {
      throw digestFault(sha256, stated);
    }
    return { path: filePath, byteLength, sha256, discard };
  } catch (error) {
    await discard();
    if (error instanceof LabError) throw error;
    const noRoom = noRoomFor(error);
    if (noRoom !== null) throw noRoom;
    throw new InputError(
      {
        code: 'truncated',
        item: 'body',
        found: `${byteLength} bytes and then the end of the connection`,
        expected: statedLength ? `${statedLength} bytes` : 'the whole file',
      },
      { status: 400 },
    );
  }
}

export const digestFault = (sha256: string, stated: string) =>
  new InputError({
    code: 'checksum',
    item: 'header "Repr-Digest"',
    found: `the SHA-256 ${sha256}`,
    expected: stated,
    hint: 'Nothing is stored; send the file again',
  });

export function tooLarge(bytes: number): InputError {
  return new InputError(
    {
      code: 'too-large',
      item: 'file',
      found: `${bytes} bytes`,
      expected: `at most ${uploadLimits.uploadBytes} bytes`,
    },
    { status: 413 },
  );
}

/** Copies a received file into the database, part by part. */
export async function storeParts(
  uploadId: string,
  file: IncomingFile,
  transaction: Transaction,
): Promise<void> {
  const handle = await open(file.path);
  try {
    const part = Buffer.alloc(PART_BYTES);
    for (let number = 0; ; number++) {
      const { bytesRead } = await handle.read(part, 0, PART_BYTES, number * PART_BYTES);
      if (bytesRead === 0 && number > 0) return;
      await database().query(
        'insert into upload_part (upload_id, part_number, bytes) values ($1, $2, $3)',
        { bind: [uploadId, number, Buffer.from(part.subarray(0, bytesRead))], transaction },
      );
      if (bytesRead < PART_BYTES) return;
    }
  } finally {
    await handle.close();
  }
}

/** The original bytes of an upload, in a buffer that is theirs alone. */
export async function loadParts({
  id,
  byteLength,
}: {
  id: string;
  byteLength: number | string;
}): Promise<Buffer<ArrayBuffer>> {
  const bytes = Buffer.from(new ArrayBuffer(Number(byteLength)));
  let at = 0;
  const query = `select bytes from upload_part where upload_id = ${escapeLiteral(id)} order by part_number`;
  await copyRows(query, ([part]) => {
    if (part) at += part.copy(bytes, at);
  });
  if (at !== bytes.length) throw new Error(`upload ${id} has ${at} of its ${bytes.length} bytes`);
  return bytes;
}
