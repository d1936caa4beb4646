import { gunzipSync } from 'node:zlib';
import { parseCsv } from './csv';
import { parseEcsv } from './ecsv';
import { type Hdu, hduPlace, readHdus } from './fits-hdu';
import { findMapImage, readFitsMaps } from './fits-map';
import { readFitsTable } from './fits-table';
import { parseHdf5 } from './hdf5';
import { cubeOfJson } from './json-map';
import { tableOfJson } from './json-table';
import { isArray, isObject, type JsonValue, memberOf, parseJsonText } from './json-text';
import type { Container, ReadContext } from './kinds';
import { uploadLimits } from './limits';
import { cubeOfArrays } from './map-arrays';
import type { MapCube } from './map-cube';
import { parseNpy } from './npy';
import { parseAxisText } from './npy-axes';
import { parseNpz } from './npz';
import type { FaultReport, NoteReport } from './reports';
import { endingOf, promisedContainer, recogniseContent } from './signatures';
import type { RawTable } from './table';
import { refuseBrokenUtf8 } from './utf8';
import { parseVotable } from './votable';

/** A container opened: rows for the reader of a kind, or maps as arrays. */
export type Opened = { container: Container; part?: string } & (
  | { table: RawTable }
  | { cube: MapCube }
);

export interface OpenOptions {
  context: ReadContext;
  maxRows: number;
  /** What one row is, for "at least one …". */
  what: string;
  isKnownHeading(heading: string): boolean;
  faults: FaultReport;
  notes: NoteReport;
  /** Told as soon as it is known: the unpacked bytes of a text file, from which faults are quoted. */
  onText?(bytes: Uint8Array): void;
}

const names: Record<Container, string> = {
  csv: 'CSV text',
  ecsv: 'an ECSV table',
  votable: 'a VOTable',
  fits: 'a FITS file',
  npy: 'a NumPy array (.npy)',
  npz: 'a zip archive',
  hdf5: 'an HDF5 file',
  json: 'JSON',
};

/** The container, told by the first bytes; the fault goes to `faults`. */
function identify(bytes: Uint8Array, options: OpenOptions): Container | null {
  const { context, faults, notes, what } = options;
  const isOnlyMark = bytes.length === 3 && bytes[0] === 0xef && bytes[1] === 0xbb;
  if (bytes.length === 0 || isOnlyMark) {
    const message = `the file is empty; expected a header line and at least one ${what}`;
    faults.add({ code: 'empty-file', message });
    return null;
  }
  const known = recogniseContent(bytes);
  const promised = promisedContainer(context.fileName);
  const ending = endingOf(context.fileName);
  if (known !== null && (known.container === null || known.container === 'gzip')) {
    const expected = names[promised ?? 'csv'];
    const page = known.content === 'an HTML page';
    const name = promised === 'csv' ? `The name ends in .${ending} and the` : 'The';
    faults.add({
      code: 'format-mismatch',
      ...(page && { line: 1 }),
      message: `${name} content is ${known.content}; expected ${expected}`,
      ...(page && { hint: 'Was a sign-in page saved in its place?' }),
    });
    return null;
  }
  const container = (known?.container ?? 'csv') as Container;
  // Bytes that are no text and promise an array are judged as one: their first bytes are wrong.
  if (known === null && promised === 'npy' && bytes.subarray(0, 1024).includes(0)) return 'npy';
  if (promised !== null && promised !== container) {
    const message = `The name ends in .${ending} and the content is ${names[container]}; it is read as that`;
    notes.warn('name-mismatch', message);
  }
  return container;
}

const isText = (container: Container) => ['csv', 'ecsv', 'votable', 'json'].includes(container);

/** No deflated byte becomes more than so many. */
const mostDeflated = 1032;

const tooLarge = { code: 'ERR_BUFFER_TOO_LARGE' };

/** Undoes gzip, whatever is inside, within the limit of an upload: more could not be read anyway. */
export function gunzip(bytes: Uint8Array, faults: FaultReport): Uint8Array | null {
  if (bytes[0] !== 0x1f || bytes[1] !== 0x8b) return bytes;
  const most = uploadLimits.uploadBytes;
  try {
    // The last four bytes state the length; one that so few bytes cannot hold is a cut file's noise.
    const end = new DataView(bytes.buffer, bytes.byteOffset + Math.max(0, bytes.length - 4));
    const stated = bytes.length > 18 ? end.getUint32(0, true) : 0;
    if (stated > most && stated < mostDeflated * bytes.length) throw tooLarge;
    return new Uint8Array(gunzipSync(bytes, { maxOutputLength: most }));
  } catch (error) {
    const isLarge = error === tooLarge || (error as { code?: string }).code === tooLarge.code;
    const words = `${most / 2 ** 20} MiB`;
    faults.add(
      isLarge
        ? { code: 'too-large', message: `unpacks to more than ${words}; expected at most ${words}` }
        : { code: 'truncated', message: 'the gzip file is cut short or damaged' },
    );
    return null;
  }
}

/** Opens what can be read in one go; archives and HDF5 come with `openContainer`. */
function openPlain(bytes: Uint8Array, container: Container, options: OpenOptions): Opened | null {
  const { maxRows, faults, notes } = options;
  if (isText(container)) {
    const broken = refuseBrokenUtf8(bytes);
    if (broken !== null) {
      faults.add(broken);
      return null;
    }
    options.onText?.(bytes);
  }
  switch (container) {
    case 'csv':
      return asTable(container, parseCsv(bytes, maxRows, faults, notes));
    case 'ecsv':
      return asTable(container, parseEcsv(bytes, maxRows, faults, notes));
    case 'votable':
      return asTable(container, parseVotable(bytes, maxRows, faults, notes));
    case 'fits':
      return openFits(bytes, options);
    case 'npy':
      return asCube(container, openNpy(bytes, options));
    case 'json':
      return openJson(bytes, options);
    default:
      return null;
  }
}

const asTable = (container: Container, table: RawTable | null): Opened | null =>
  table && { container, table };
const asCube = (container: Container, cube: MapCube | null): Opened | null =>
  cube && { container, cube };

function openFits(bytes: Uint8Array, options: OpenOptions): Opened | null {
  const { context, maxRows, faults, notes } = options;
  const hdus = readHdus(bytes, faults);
  if (hdus === null) return null;
  const tables = hdus.filter(({ kind }) => kind === 'table');
  if (context.kind === 'completeness-maps') {
    const isLongTable = tables.length === 1 && !hdus.some(({ kind }) => kind === 'image');
    if (!isLongTable) {
      const image = findMapImage(hdus, faults);
      const maps = image && readFitsMaps(bytes, hdus, image, faults);
      return image && inPart(image, asCube('fits', maps));
    }
  }
  const table = pickTable(tables, faults);
  if (table === null) return null;
  if (hdus.length > 2) {
    notes.inform('hdu-chosen', `Read from HDU ${table.number}`, hduPlace(table));
  }
  return inPart(table, asTable('fits', readFitsTable(bytes, table, maxRows, faults)));
}

const inPart = ({ number, name }: Hdu, opened: Opened | null): Opened | null =>
  opened && { ...opened, part: `HDU ${number} ${name ?? ''}`.trim() };

function pickTable(tables: Hdu[], faults: FaultReport): Hdu | null {
  if (tables.length === 1) return tables[0];
  if (tables.length === 0) {
    faults.add({ code: 'no-table', found: 'no binary table', expected: 'one' });
    return null;
  }
  const names = tables.slice(0, 10).map(({ number, name }) => `HDU ${number} ${name}`.trim());
  const message = `found ${tables.length} tables (${names.join(', ')}); expected a file with one`;
  faults.add({ code: 'choose-table', message });
  return null;
}

function openNpy(bytes: Uint8Array, { context, faults }: OpenOptions): MapCube | null {
  const array = parseNpy(bytes, 'numbers', faults);
  if (array === null) return null;
  const dimensions = array.shape.length;
  if (dimensions !== 2 && dimensions !== 3) {
    const found = `${dimensions} dimension${dimensions === 1 ? '' : 's'}`;
    const expected = '2, or 3 for a cube of targets';
    faults.add({ code: 'map-shape', item: 'header', found, expected });
    return null;
  }
  const { mass, semiMajorAxis } = context.axes ?? {};
  if (!mass || !semiMajorAxis) {
    const message =
      'a .npy file holds no axes; give mass and semi_major_axis with it, for example mass=geomspace(1,20,8)';
    faults.add({ code: 'axis-missing', message });
    return null;
  }
  const masses = parseAxisText(mass, 'mass', faults);
  const axes = parseAxisText(semiMajorAxis, 'semi_major_axis', faults);
  if (masses === null || axes === null) return null;
  const axis = (values: number[]) => ({
    shape: [values.length],
    numbers: Float64Array.from(values),
    texts: null,
    unit: null,
  });
  const arrays = { completeness: array, mass: axis(masses), semiMajorAxis: axis(axes) };
  const placeOf = (name: string) => (name === 'completeness' ? {} : { item: name });
  return cubeOfArrays({ ...arrays, target: null, placeOf }, faults);
}

/** Names of a list of columns: a table without a row has headings too. */
function headingsOf(columns: JsonValue | undefined): string[] {
  if (!isArray(columns)) return [];
  return columns.items.flatMap((column) => {
    const name = isObject(column) ? memberOf(column, 'name') : undefined;
    return typeof name === 'string' ? [name] : [];
  });
}

function openJson(bytes: Uint8Array, options: OpenOptions): Opened | null {
  const { context, faults } = options;
  const parsed = parseJsonText(bytes, faults);
  if (parsed === null) return null;
  if (context.kind === 'completeness-maps' && isObject(parsed.value)) {
    return asCube('json', cubeOfJson(parsed.value, faults));
  }
  // Our own tables come as an object: what they rest on, their columns, and the rows.
  const rows = isObject(parsed.value) ? memberOf(parsed.value, 'rows') : undefined;
  if (!isObject(parsed.value) || rows === undefined) {
    return asTable('json', tableOfJson(parsed.value, options));
  }
  const headings = headingsOf(memberOf(parsed.value, 'columns'));
  return asTable('json', tableOfJson(rows, { ...options, headings }));
}

/** Opens a container that needs no waiting: everything but archives and HDF5. */
export function openText(bytes: Uint8Array, options: OpenOptions): Opened | null {
  const plain = gunzip(bytes, options.faults);
  const container = plain && identify(plain, options);
  if (!plain || !container) return null;
  if (container === 'npz' || container === 'hdf5') {
    throw new Error(`${names[container]} is opened by readUploadedFile`);
  }
  return openPlain(plain, container, options);
}

/** Opens any container by its first bytes; nothing outside the bytes is read. */
export async function openContainer(
  bytes: Uint8Array,
  options: OpenOptions,
): Promise<Opened | null> {
  const plain = gunzip(bytes, options.faults);
  const container = plain && identify(plain, options);
  if (!plain || !container) return null;
  if (container !== 'npz' && container !== 'hdf5') return openPlain(plain, container, options);
  if (options.context.kind !== 'completeness-maps') {
    const found = `${names[container]}, which holds maps`;
    options.faults.add({ code: 'kind-mismatch', found, expected: 'a table' });
    return null;
  }
  const parse = container === 'npz' ? parseNpz : parseHdf5;
  return asCube(container, await parse(plain, options.faults));
}
