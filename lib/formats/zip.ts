import { crc32 } from 'node:zlib';
import { type Entry, fromBuffer, type ZipFile } from 'yauzl';
import { uploadLimits } from './limits';
import { type FaultReport, quoteFound } from './reports';

/** Ends the reading from within; what is wrong has been reported. */
class StopReading extends Error {}

const open = (bytes: Buffer) =>
  new Promise<ZipFile>((resolve, reject) => {
    fromBuffer(bytes, { lazyEntries: true, strictFileNames: true }, (error, zip) =>
      error ? reject(error) : resolve(zip),
    );
  });

function inflate(zip: ZipFile, entry: Entry, budget: number): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    zip.openReadStream(entry, (error, stream) => {
      if (error) return reject(error);
      const parts: Buffer[] = [];
      let size = 0;
      stream.on('data', (part: Buffer) => {
        size += part.length;
        if (size > budget) {
          stream.destroy(new StopReading());
          return;
        }
        parts.push(part);
      });
      stream.on('end', () => resolve(Buffer.concat(parts)));
      stream.on('error', reject);
    });
  });
}

/**
 * Unpacks those entries of a zip archive that are wanted, counting bytes while they come.
 *
 * @returns name → bytes, or null where the archive is refused
 */
export async function unzip(
  bytes: Uint8Array,
  isWanted: (name: string) => boolean,
  faults: FaultReport,
): Promise<Map<string, Uint8Array> | null> {
  let zip: ZipFile;
  try {
    zip = await open(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength));
  } catch {
    const message = 'the archive has no end record: it is cut short or not a zip file';
    faults.add({ code: 'truncated', message });
    return null;
  }
  if (zip.entryCount > uploadLimits.archiveEntries) {
    const found = `${zip.entryCount} entries`;
    faults.add({ code: 'too-many', found, expected: `at most ${uploadLimits.archiveEntries}` });
    return null;
  }
  const unpacked = new Map<string, Uint8Array>();
  let budget: number = uploadLimits.unpackedBytes;
  let count = 0;
  return new Promise((resolve) => {
    const refuse = (fault: Parameters<FaultReport['add']>[0]) => {
      faults.add(fault);
      zip.close();
      resolve(null);
    };
    zip.on('entry', (entry: Entry) => {
      count += 1;
      const name = entry.fileName;
      const fault = findEntryFault(entry, count, budget);
      if (fault !== null) return refuse(fault);
      if (!isWanted(name)) return zip.readEntry();
      inflate(zip, entry, Math.min(budget, entry.uncompressedSize)).then(
        (content) => {
          const item = `entry ${quoteFound(name)}`;
          if (crc32(content) !== entry.crc32) {
            const message = 'the checksum does not match: the archive is damaged';
            return refuse({ code: 'checksum', item, message });
          }
          if (unpacked.has(name)) {
            return refuse({ code: 'entry-repeat', item, message: 'the name appears twice' });
          }
          budget -= content.length;
          unpacked.set(name, content);
          zip.readEntry();
        },
        () => {
          const message = 'the checksum does not match: the archive is damaged';
          refuse({ code: 'checksum', item: `entry ${quoteFound(name)}`, message });
        },
      );
    });
    zip.on('end', () => resolve(unpacked));
    zip.on('error', (error: Error) => {
      const encrypted = findEncrypted(bytes, count);
      if (encrypted !== null) return refuse(encryptedFault(encrypted));
      const path = /(?:invalid|absolute) (?:relative )?path: (.*)/i.exec(error.message)?.[1];
      if (path === undefined && /invalid characters/i.test(error.message) === false) {
        // Whatever else the library says, in words of its own, is about these bytes.
        return refuse({ code: 'truncated', message: 'the archive is cut short or damaged' });
      }
      refuse({
        code: 'zip-path',
        item: `entry ${count + 1}`,
        found: `the path ${quoteFound(path ?? 'with a backslash')}`,
        expected: 'names without folders',
      });
    });
    zip.readEntry();
  });
}

function findEntryFault(entry: Entry, count: number, budget: number) {
  const name = entry.fileName;
  if (name.includes('/')) {
    return {
      code: 'zip-path',
      item: `entry ${count}`,
      found: `the path ${quoteFound(name)}`,
      expected: 'names without folders',
    };
  }
  if ((entry.generalPurposeBitFlag & 1) !== 0) {
    return encryptedFault(name);
  }
  if (entry.uncompressedSize > budget) {
    return {
      code: 'too-large',
      item: `entry ${count}`,
      message: 'unpacks to more than 2 GiB; expected at most 2 GiB',
    };
  }
  return null;
}

function encryptedFault(name: string) {
  return {
    code: 'zip-encrypted',
    item: `entry ${quoteFound(name)}`,
    found: 'an encrypted entry',
    expected: 'an open archive',
  };
}

/**
 * Name of an entry of the central directory that is encrypted, or null. The library refuses some of
 * them for their sizes before it shows their flags.
 */
function findEncrypted(bytes: Uint8Array, number: number): string | null {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let at = -1;
  for (let i = 0; i <= number; i += 1) {
    at = buffer.indexOf('PK\x01\x02', at + 1, 'latin1');
    if (at < 0 || at + 46 > buffer.length) return null;
  }
  if ((buffer.readUInt16LE(at + 8) & 1) === 0) return null;
  return buffer.toString('utf8', at + 46, at + 46 + buffer.readUInt16LE(at + 28));
}
