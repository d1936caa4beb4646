import { once } from 'node:events';
import type { Readable } from 'node:stream';
import { promisify } from 'node:util';
import { type Entry, fromBuffer, type Options, type ZipFile } from 'yauzl';

type OpenEntry = (entry: Entry, done: (error: Error | null, stream: Readable) => void) => void;

async function* entriesOf(zip: ZipFile): AsyncGenerator<Entry> {
  for (let read = 0; read < zip.entryCount; read++) {
    const entry = once(zip, 'entry') as Promise<[Entry]>;
    zip.readEntry();
    yield (await entry)[0];
  }
}

/** Every file of an archive, by its path, whatever its name. */
export async function unpackArchive(bytes: Buffer): Promise<Map<string, Buffer>> {
  const zip = await promisify<Buffer, Options, ZipFile>(fromBuffer)(bytes, { lazyEntries: true });
  const found = new Map<string, Buffer>();
  for await (const entry of entriesOf(zip)) {
    const parts: Buffer[] = [];
    const stream = await promisify(zip.openReadStream.bind(zip) as OpenEntry)(entry);
    for await (const part of stream) parts.push(part as Buffer);
    found.set(entry.fileName, Buffer.concat(parts));
  }
  return found;
}
