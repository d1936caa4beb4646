import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { crc32, gzipSync } from 'node:zlib';
import { parse } from 'csv-parse/sync';
import type { KnownMap, ReadContext, UploadKind } from '@/lib/formats';
import { FaultReport } from '@/lib/formats/reports';
import { unzip } from '@/lib/formats/zip';

export interface SampleFile {
  bytes: Uint8Array;
  /** What stands inside an envelope; the bytes themselves where there is none. */
  inner: Uint8Array;
  context: ReadContext;
  /** The other entries of an archive, which stay as they are. */
  others?: { name: string; bytes: Uint8Array }[];
  entryName?: string;
}

export interface FormatFiles {
  name: string;
  /** The samples, as other programs write them. */
  good: SampleFile[];
  /** The odd and broken ones. */
  bad: SampleFile[];
  /** Puts changed contents back into an envelope with the right checksum, so that they are read. */
  wrap?: (inner: Uint8Array, file: SampleFile) => Uint8Array;
}

const map: KnownMap = {
  massMjup: [1, 5, 20],
  semiMajorAxisAu: [5, 50, 300],
  completeness: [0, 0.1, 0.2, 0.3, 0.6, 0.7, 0.5, 0.9, 0.95],
};

const kindsByName: [RegExp, UploadKind][] = [
  [/^targets/, 'targets'],
  [/^contrast/, 'contrast-curves'],
  [/^companions/, 'companions'],
  [/^cooling/, 'cooling-tables'],
  [/^map/, 'completeness-maps'],
];

const formatsByEnding: Record<string, string> = {
  csv: 'csv',
  ecsv: 'ecsv',
  vot: 'votable',
  fits: 'fits',
  npy: 'npy',
  npz: 'npz',
  h5: 'hdf5',
  json: 'json',
};

function contextOf(kind: UploadKind, fileName: string): ReadContext {
  const isMap = kind === 'completeness-maps';
  return {
    fileName,
    kind,
    ...(isMap && { defaultTarget: 'RB 0001' }),
    ...(fileName.endsWith('.npy') && {
      axes: axesOf(fileName),
    }),
    ...(kind === 'companions' && { maps: new Map([['RB 0001', map]]) }),
  };
}

/** The sides of the maps that stand alone in the samples; those of the bad ones are 8 × 10. */
function axesOf(fileName: string): ReadContext['axes'] {
  const isSample = fileName.startsWith('map-');
  const [masses, axes] = isSample ? [40, 50] : [8, 10];
  return { mass: `geomspace(1,80,${masses})`, semiMajorAxis: `geomspace(1,1000,${axes})` };
}

/** Kinds of the bad files, as their list states them. */
function badKinds(folder: string): Map<string, UploadKind> {
  const rows: { file: string; kind: UploadKind }[] = parse(
    readFileSync(path.join(folder, 'index.csv')),
    { columns: true },
  );
  return new Map(rows.map(({ file, kind }) => [file, kind]));
}

function kindOf(name: string, bad: Map<string, UploadKind>): UploadKind | null {
  const kind = bad.get(name) ?? kindsByName.find(([pattern]) => pattern.test(name))?.[1];
  return kind ?? null;
}

/** A zip archive of stored entries, with the checksums of what it holds. */
export function storedZip(entries: { name: string; bytes: Uint8Array }[]): Uint8Array {
  const parts: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const { name, bytes } of entries) {
    const head = Buffer.alloc(26);
    head.writeUInt16LE(20, 0);
    head.writeUInt32LE(crc32(bytes), 10);
    head.writeUInt32LE(bytes.length, 14);
    head.writeUInt32LE(bytes.length, 18);
    head.writeUInt16LE(Buffer.byteLength(name), 22);
    const record = Buffer.alloc(42);
    record.writeUInt16LE(20, 0);
    head.copy(record, 2);
    record.writeUInt32LE(offset, 38);
    parts.push(Buffer.from('PK\x03\x04', 'latin1'), head, Buffer.from(name), Buffer.from(bytes));
    directory.push(Buffer.from('PK\x01\x02', 'latin1'), record, Buffer.from(name));
    offset += 30 + Buffer.byteLength(name) + bytes.length;
  }
  const records = Buffer.concat(directory);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(entries.length, 4);
  end.writeUInt16LE(entries.length, 6);
  end.writeUInt32LE(records.length, 8);
  end.writeUInt32LE(offset, 12);
  parts.push(records, Buffer.from('PK\x05\x06', 'latin1'), end);
  return new Uint8Array(Buffer.concat(parts));
}

/** One sample for each entry of an archive, which is the part that is changed. */
async function openArchive(file: SampleFile): Promise<SampleFile[]> {
  const unpacked = await unzip(file.bytes, () => true, new FaultReport());
  if (unpacked === null || unpacked.size === 0) return [file];
  const entries = [...unpacked].map(([name, bytes]) => ({ name, bytes }));
  return entries.map(({ name, bytes }) => ({
    ...file,
    inner: bytes,
    entryName: name,
    others: entries.filter((other) => other.name !== name),
  }));
}

/** The samples and bad files of the tests, by the format that their names promise. */
export async function loadFormats(fixtures: string): Promise<FormatFiles[]> {
  const formats = new Map<string, FormatFiles>();
  for (const part of ['samples', 'bad']) {
    const folder = path.join(fixtures, part);
    const isBad = part === 'bad';
    const kinds = isBad ? badKinds(folder) : new Map<string, UploadKind>();
    for (const fileName of readdirSync(folder).sort()) {
      const name = formatsByEnding[path.extname(fileName).slice(1)];
      const kind = kindOf(fileName, kinds);
      if (name === undefined || kind === null || fileName === 'index.csv') continue;
      const bytes = new Uint8Array(readFileSync(path.join(folder, fileName)));
      if (bytes.length === 0) continue;
      const file = { bytes, inner: bytes, context: contextOf(kind, fileName) };
      const format = formats.get(name) ?? { name, good: [], bad: [] };
      format[isBad ? 'bad' : 'good'].push(...(name === 'npz' ? await openArchive(file) : [file]));
      formats.set(name, format);
    }
  }
  const archives = formats.get('npz');
  if (archives) {
    archives.wrap = (inner, { entryName, others }) =>
      storedZip([{ name: entryName ?? 'x.npy', bytes: inner }, ...(others ?? [])]);
  }
  return [...formats.values(), gzipped([...formats.values()])];
}

/** Text files as they are often sent: damaged in their envelope, and inside one that is whole. */
function gzipped(formats: FormatFiles[]): FormatFiles {
  const good = formats
    .filter(({ name }) => ['csv', 'ecsv', 'votable', 'json', 'fits'].includes(name))
    .flatMap((format) => format.good.slice(0, 4))
    .map(({ bytes, context }) => ({
      bytes: new Uint8Array(gzipSync(bytes)),
      inner: bytes,
      context: { ...context, fileName: `${context.fileName}.gz` },
    }));
  return { name: 'gzip', good, bad: [], wrap: (inner) => new Uint8Array(gzipSync(inner)) };
}
