import { ZipFile } from 'yazl';

export interface BundleFile {
  /** Path inside the archive, with forward slashes. */
  name: string;
  mediaType: string;
  description: string;
  bytes: Uint8Array;
}

/** The first moment that a ZIP archive can state; it holds local fields, hence a local date. */
const FIXED_TIME = new Date(1980, 0, 1);
const MODE = 0o100644;

const byName = (a: { name: string }, b: { name: string }) =>
  a.name < b.name ? -1 : a.name > b.name ? 1 : 0;

export const sortFiles = <File extends { name: string }>(files: readonly File[]): File[] =>
  [...files].sort(byName);

/** A ZIP archive that is the same bytes whenever it is made of the same files. */
export async function packFiles(
  files: readonly Pick<BundleFile, 'name' | 'bytes'>[],
): Promise<Buffer> {
  const zip = new ZipFile();
  for (const { name, bytes } of sortFiles(files)) {
    zip.addBuffer(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength), name, {
      mtime: FIXED_TIME,
      mode: MODE,
      forceDosTimestamp: true,
    });
  }
  zip.end();
  const parts: Buffer[] = [];
  for await (const part of zip.outputStream) parts.push(part as Buffer);
  return Buffer.concat(parts);
}
