import type { Dataset, ExternalLink, File as Hdf5File } from 'h5wasm';
import { uploadLimits } from './limits';
import { cubeOfArrays } from './map-arrays';
import type { MapCube } from './map-cube';
import type { NpyArray } from './npy';
import { type FaultReport, quoteFound } from './reports';

const wanted = ['completeness', 'mass', 'semi_major_axis', 'target'] as const;
/** The library comes late and by itself, so its classes are handed on. */
interface Classes {
  Dataset: typeof Dataset;
  ExternalLink: typeof ExternalLink;
}
type Name = (typeof wanted)[number];
const knownFilters = [1, 2, 3, 32000];

/** HDF5's own words for an end of file that lies beyond the bytes. */
const cutShort = /truncated|eof|end of file|stored_eof/i;

/**
 * Reads maps from an HDF5 file with the datasets completeness, mass, semi_major_axis[, target] at
 * its top level. The library works on memory only: no link, no external storage, no virtual source
 * is followed.
 */
export async function parseHdf5(bytes: Uint8Array, faults: FaultReport): Promise<MapCube | null> {
  const h5wasm = await import('h5wasm');
  const library = await h5wasm.ready;
  library.activate_throwing_error_handler();
  const { FS } = library;
  const path = '/upload.h5';
  FS.writeFile(path, bytes);
  let file: Hdf5File | null = null;
  try {
    file = new h5wasm.File(path, 'r');
    if (file.file_id < 0n) throw new Error('not opened');
    return readFile(file, h5wasm, faults);
  } catch (error) {
    if (faults.count > 0) return null;
    const said = error instanceof Error ? error.message : String(error);
    faults.add(
      cutShort.test(said)
        ? { code: 'truncated', message: 'the file says it is longer than it is' }
        : { code: 'hdf5-invalid', message: 'the HDF5 superblock cannot be read' },
    );
    return null;
  } finally {
    try {
      file?.close();
    } catch {
      // A file that never opened has nothing to close.
    }
    FS.unlink(path);
  }
}

function readFile(file: Hdf5File, classes: Classes, faults: FaultReport): MapCube | null {
  const names = file.keys();
  if (names.length > uploadLimits.hdf5Objects) {
    const found = `${names.length} objects`;
    faults.add({ code: 'too-many', found, expected: `at most ${uploadLimits.hdf5Objects}` });
    return null;
  }
  const arrays = new Map<Name, NpyArray & { unit: string | null }>();
  for (const name of wanted) {
    if (!names.includes(name)) continue;
    const array = readDataset(file, name, classes, faults);
    if (array === null) return null;
    arrays.set(name, array);
  }
  const completeness = arrays.get('completeness');
  if (completeness === undefined) {
    faults.add({
      code: 'array-missing',
      item: '/',
      found: 'no dataset "completeness"',
      expected: 'one at the top level',
    });
    return null;
  }
  return cubeOfArrays(
    {
      completeness,
      mass: arrays.get('mass') ?? null,
      semiMajorAxis: arrays.get('semi_major_axis') ?? null,
      target: arrays.get('target') ?? null,
      placeOf: (name) => ({ item: `/${name}` }),
    },
    faults,
  );
}

function readDataset(
  file: Hdf5File,
  name: Name,
  classes: Classes,
  faults: FaultReport,
): (NpyArray & { unit: string | null }) | null {
  const item = `/${name}`;
  const refuse = (code: string, found: string, expected: string) => {
    faults.add({ code, item, found, expected });
    return null;
  };
  const entity = file.get(name);
  if (entity instanceof classes.ExternalLink) {
    return refuse('external-refused', 'a link to another file', 'the data inside this one');
  }
  if (!(entity instanceof classes.Dataset)) {
    return refuse('array-missing', `no dataset "${name}"`, 'one at the top level');
  }
  const dataset = entity;
  const { metadata } = dataset;
  if (metadata.virtual_sources && metadata.virtual_sources.length > 0) {
    const source = quoteFound(metadata.virtual_sources[0].file_name);
    return refuse(
      'external-refused',
      `a virtual dataset over ${source}`,
      'the data inside this file',
    );
  }
  const odd = dataset.filters.find(({ id }) => !knownFilters.includes(id));
  if (odd) {
    const expected = 'none, gzip, shuffle, fletcher32 or lzf';
    return refuse('hdf5-filter', `the filter ${odd.id}`, expected);
  }
  if (metadata.total_size * metadata.size > uploadLimits.unpackedBytes) {
    return refuse('too-large', `${metadata.total_size} values`, 'at most 2 GiB unpacked');
  }
  const isText = metadata.type === 3 || metadata.type === 9;
  if (isText !== (name === 'target')) {
    return refuse(
      'dtype-unsupported',
      isText ? 'text' : 'no text',
      name === 'target' ? 'text' : 'numbers',
    );
  }
  const value = dataset.value;
  const shape = metadata.shape ?? [];
  const unit = dataset.attrs.unit?.value;
  const common = { shape, unit: typeof unit === 'string' ? unit : null };
  if (isText) {
    const texts = Array.isArray(value) ? value.map(String) : [String(value)];
    return { ...common, numbers: null, texts };
  }
  if (!ArrayBuffer.isView(value) || value instanceof DataView) {
    return refuse('dtype-unsupported', 'a type that is not read', 'numbers');
  }
  const numbers = Float64Array.from(value as ArrayLike<number | bigint>, Number);
  return { ...common, numbers, texts: null };
}
