import { Readable } from 'node:stream';
import { ZipFile } from 'yazl';
import { npyOfMaps, npyOfNumbers, npyOfTexts } from './npy';
import { bytesOf, type WrittenBytes, type WrittenMaps } from './written-maps';

/** The earliest time that an archive can state: the same content gives the same bytes. */
const NO_TIME = new Date(1980, 0, 1);

interface Entry {
  name: string;
  content: WrittenBytes;
}

function zipOf(entries: readonly Entry[]): ZipFile {
  const zip = new ZipFile();
  for (const { name, content } of entries) {
    zip.addReadStreamLazy(
      name,
      { compress: false, size: content.size, mtime: NO_TIME, forceDosTimestamp: true, mode: 0o644 },
      (take) => take(null, Readable.from(content.parts())),
    );
  }
  zip.end();
  return zip;
}

/** Bytes that an archive keeps beside the content of a stored entry, and at its end. */
const entryHeaders = 30 + 16 + 46;
const directoryEnd = 22;
/** More would need the archive's larger form, which has other headers. */
const MOST_BYTES = 2 ** 32 - 1;

/**
 * NumPy's archive (`np.load`): completeness, mass, semi_major_axis and, of stars, target; and
 * `provenance`, one text a line. Entries are stored, so that they can be made as they are sent.
 *
 * @throws RangeError beyond 4 GiB
 */
export function npzOfMaps(maps: WrittenMaps): WrittenBytes {
  const { massMjup, semiMajorAxisAu, targets, provenance } = maps;
  const entries: Entry[] = [
    { name: 'completeness.npy', content: npyOfMaps(maps) },
    { name: 'mass.npy', content: bytesOf(npyOfNumbers(massMjup, [massMjup.length])) },
    {
      name: 'semi_major_axis.npy',
      content: bytesOf(npyOfNumbers(semiMajorAxisAu, [semiMajorAxisAu.length])),
    },
    ...(targets === null ? [] : [{ name: 'target.npy', content: bytesOf(npyOfTexts(targets)) }]),
    {
      name: 'provenance.npy',
      content: bytesOf(npyOfTexts(provenance.map(([name, text]) => `${name}: ${text}`))),
    },
  ];
  const size = entries.reduce(
    (sum, { name, content }) => sum + entryHeaders + 2 * name.length + content.size,
    directoryEnd,
  );
  if (size > MOST_BYTES) {
    throw new RangeError(`an archive must have at most ${MOST_BYTES} bytes, got ${size}`);
  }
  return {
    size,
    async *parts() {
      for await (const part of zipOf(entries).outputStream) yield Buffer.from(part);
    },
  };
}
