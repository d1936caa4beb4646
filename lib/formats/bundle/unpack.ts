import { crc32 } from 'node:zlib';
import { type Entry, fromBuffer, type ZipFile } from 'yauzl';
import { type Fault, InputError } from '@/lib/errors';
import { quoteFound } from '../reports';

/** What a bundle may hold at most: the inputs of some thousand stars, several runs of them. */
export const bundleLimits = {
  bytes: 256 * 2 ** 20,
  entries: 1000,
  unpackedBytes: 2 ** 30,
  nameCharacters: 200,
} as const;

const NAME = /^[A-Za-z0-9][A-Za-z0-9._ -]*(?:\/[A-Za-z0-9][A-Za-z0-9._ -]*){0,3}$/;

function refuse(fault: Fault): never {
  throw new InputError(fault);
}

const truncated = () =>
  refuse({ code: 'truncated', message: 'the archive is cut short, damaged, or not a zip file' });

const open = (bytes: Buffer) =>
  new Promise<ZipFile>((resolve, reject) => {
    fromBuffer(bytes, { lazyEntries: true, strictFileNames: true }, (error, zip) =>
      error ? reject(error) : resolve(zip),
    );
  });

const nextEntry = (zip: ZipFile) =>
  new Promise<Entry | null>((resolve, reject) => {
    const settle = (done: () => void) => {
      zip.removeAllListeners();
      done();
    };
    zip.on('entry', (entry: Entry) => settle(() => resolve(entry)));
    zip.on('end', () => settle(() => resolve(null)));
    zip.on('error', (error: Error) => settle(() => reject(error)));
    zip.readEntry();
  });

function inflate(zip: ZipFile, entry: Entry, budget: number): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    zip.openReadStream(entry, (error, stream) => {
      if (error) return reject(error);
      const parts: Buffer[] = [];
      let size = 0;
      stream.on('data', (part: Buffer) => {
        size += part.length;
        if (size > budget) stream.destroy(new Error('more than it says'));
        else parts.push(part);
      });
      stream.on('end', () => resolve(Buffer.concat(parts)));
      stream.on('error', reject);
    });
  });
}

function checkEntry(entry: Entry, known: ReadonlySet<string>, budget: number): void {
  const { fileName: name } = entry;
  const item = `entry ${quoteFound(name)}`;
  if (!NAME.test(name) || name.length > bundleLimits.nameCharacters) {
    refuse({
      code: 'zip-path',
      item,
      found: 'a path of another form',
      expected: 'letters, digits and . _ - in at most four levels, none of them ".."',
    });
  }
  if (known.has(name)) refuse({ code: 'entry-repeat', item, message: 'the name appears twice' });
  if ((entry.generalPurposeBitFlag & 1) !== 0) {
    refuse({
      code: 'zip-encrypted',
      item,
      found: 'an encrypted entry',
      expected: 'an open archive',
    });
  }
  if (entry.uncompressedSize > budget) {
    refuse({
      code: 'too-large',
      item,
      message: 'the archive unpacks to more than 1 GiB; expected at most 1 GiB',
    });
  }
}

/**
 * Unpacks a bundle, counting bytes while they come; nothing outside the archive is touched.
 *
 * @returns path → bytes
 * @throws InputError for an archive that is damaged, too large, or holds paths of another form
 */
export async function unpackFiles(bytes: Uint8Array): Promise<Map<string, Buffer>> {
  if (bytes.byteLength > bundleLimits.bytes) {
    refuse({ code: 'too-large', message: 'the archive has more than 256 MiB; expected fewer' });
  }
  const zip = await open(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength)).catch(
    truncated,
  );
  if (zip.entryCount > bundleLimits.entries) {
    refuse({
      code: 'too-many',
      found: `${zip.entryCount} entries`,
      expected: `at most ${bundleLimits.entries}`,
    });
  }
  const files = new Map<string, Buffer>();
  let budget: number = bundleLimits.unpackedBytes;
  try {
    for (;;) {
      const entry = await nextEntry(zip).catch((error: Error) =>
        /path|characters/i.test(error.message)
          ? refuse({
              code: 'zip-path',
              item: `entry ${files.size + 1}`,
              found: 'a path that leads out of the archive',
              expected: 'names below it',
            })
          : truncated(),
      );
      if (entry === null) return files;
      if (entry.fileName.endsWith('/')) continue;
      checkEntry(entry, new Set(files.keys()), budget);
      const content = await inflate(zip, entry, Math.min(budget, entry.uncompressedSize)).catch(
        () => null,
      );
      if (content === null || crc32(content) !== entry.crc32) {
        refuse({
          code: 'checksum',
          item: `entry ${quoteFound(entry.fileName)}`,
          message: 'the checksum does not match: the archive is damaged',
        });
      }
      budget -= content.length;
      files.set(entry.fileName, content);
    }
  } finally {
    zip.close();
  }
}
