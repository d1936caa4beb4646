import type { Container } from './kinds';

interface Signature {
  starts: string;
  content: string;
  container?: Container | 'gzip';
}

/** Formats known by their first bytes, as Latin-1 text. */
const signatures: Signature[] = [
  { starts: 'SIMPLE  =', content: 'a FITS file', container: 'fits' },
  { starts: '\x93NUMPY', content: 'a NumPy array (.npy)', container: 'npy' },
  { starts: '\x89HDF\r\n\x1a\n', content: 'an HDF5 file', container: 'hdf5' },
  { starts: 'PK\x03\x04', content: 'a zip archive', container: 'npz' },
  { starts: 'PK\x05\x06', content: 'an empty zip archive' },
  { starts: '\x1f\x8b', content: 'a gzip file', container: 'gzip' },
  { starts: '# %ECSV', content: 'an ECSV table', container: 'ecsv' },
  { starts: '\x89PNG\r\n\x1a\n', content: 'a PNG image' },
  { starts: '\xff\xd8\xff', content: 'a JPEG image' },
  { starts: 'GIF8', content: 'a GIF image' },
  { starts: '%PDF-', content: 'a PDF document' },
  { starts: '\xd0\xcf\x11\xe0', content: 'an old Office document' },
  { starts: 'BZh', content: 'a bzip2 file' },
  { starts: '\xfd7zXZ\x00', content: 'an xz file' },
  { starts: '7z\xbc\xaf\x27\x1c', content: 'a 7-zip archive' },
  { starts: 'SQLite format 3\x00', content: 'an SQLite database' },
];

function latin1(bytes: Uint8Array, end: number): string {
  return String.fromCharCode(...bytes.subarray(0, end));
}

function fromMarkup(head: string): Signature | null {
  const text = head.replace(/^\xef\xbb\xbf/, '').trimStart();
  if (/^(<\?xml|<!--|<!doctype|<[a-z])/i.test(text)) {
    if (/<VOTABLE/i.test(text)) return { starts: '', content: 'a VOTable', container: 'votable' };
    if (/<html|<!doctype html/i.test(text)) return { starts: '', content: 'an HTML page' };
    return { starts: '', content: 'an XML document', container: 'votable' };
  }
  if (/^[[{]/.test(text)) return { starts: '', content: 'JSON', container: 'json' };
  return null;
}

/** What the first bytes say; null where they may be CSV text. */
export function recogniseContent(
  bytes: Uint8Array,
): { content: string; container: Container | 'gzip' | null } | null {
  const head = latin1(bytes, 1024);
  let known = signatures.find(({ starts }) => head.startsWith(starts)) ?? fromMarkup(head);
  if (known?.container === 'npz' && head.includes('[Content_Types].xml')) {
    known = { starts: '', content: 'an Excel or other Office document' };
  }
  return known ? { content: known.content, container: known.container ?? null } : null;
}

/** The ending of a file name without its dot, lower case; '' where there is none. */
export function endingOf(fileName: string): string {
  return /\.([A-Za-z0-9]+)$/.exec(fileName)?.[1]?.toLowerCase() ?? '';
}

const containersOfEndings: Record<string, Container> = {
  csv: 'csv',
  tsv: 'csv',
  ecsv: 'ecsv',
  fits: 'fits',
  fit: 'fits',
  npy: 'npy',
  npz: 'npz',
  zip: 'npz',
  h5: 'hdf5',
  hdf5: 'hdf5',
  vot: 'votable',
  xml: 'votable',
  json: 'json',
};

/** The container that a name promises; null where it promises none of ours. */
export function promisedContainer(fileName: string): Container | null {
  return containersOfEndings[endingOf(fileName.replace(/\.gz$/i, ''))] ?? null;
}
