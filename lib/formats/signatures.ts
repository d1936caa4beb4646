import type { Fault } from '@/lib/errors';

interface Signature {
  starts: string;
  content: string;
  /** A format of scientific data that another container will read. */
  isData?: boolean;
}

/** Formats known by their first bytes, as Latin-1 text. */
const signatures: Signature[] = [
  { starts: 'SIMPLE  =', content: 'a FITS file', isData: true },
  { starts: '\x93NUMPY', content: 'a NumPy array (.npy)', isData: true },
  { starts: '\x89HDF\r\n\x1a\n', content: 'an HDF5 file', isData: true },
  { starts: 'PK\x03\x04', content: 'a zip archive', isData: true },
  { starts: 'PK\x05\x06', content: 'an empty zip archive' },
  { starts: '\x1f\x8b', content: 'a gzip file', isData: true },
  { starts: '# %ECSV', content: 'an ECSV table', isData: true },
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
    if (/<VOTABLE/i.test(text)) return { starts: '', content: 'a VOTable', isData: true };
    if (/<html|<!doctype html/i.test(text)) return { starts: '', content: 'an HTML page' };
    return { starts: '', content: 'an XML document' };
  }
  if (/^[[{]/.test(text)) return { starts: '', content: 'JSON', isData: true };
  return null;
}

function recognise(bytes: Uint8Array): Signature | null {
  const head = latin1(bytes, 1024);
  const known = signatures.find(({ starts }) => head.startsWith(starts));
  if (known?.starts === 'PK\x03\x04' && head.includes('[Content_Types].xml')) {
    return { ...known, content: 'an Excel or other Office document', isData: false };
  }
  return known ?? fromMarkup(head);
}

/** The ending of a file name without its dot, lower case; '' where there is none. */
export function endingOf(fileName: string): string {
  return /\.([A-Za-z0-9]+)$/.exec(fileName)?.[1]?.toLowerCase() ?? '';
}

/**
 * Refuses what is not CSV text by its first bytes, since a name proves nothing.
 *
 * @returns the fault, or null where the bytes may be CSV text
 */
export function refuseOtherFormats(bytes: Uint8Array, fileName: string): Fault | null {
  const known = recognise(bytes);
  if (known === null) return null;
  const ending = endingOf(fileName);
  const name = ending === 'csv' || ending === 'tsv' ? `The name ends in .${ending} and the` : 'The';
  return known.isData
    ? {
        code: 'format-later',
        message: `${name} content is ${known.content}, which is not read yet; expected CSV text`,
        hint: 'Save the table as CSV with commas or tabs',
      }
    : {
        code: 'format-mismatch',
        message: `${name} content is ${known.content}; expected CSV text`,
      };
}

const endingsOfOtherFormats = new Set([
  'fits',
  'fit',
  'npy',
  'npz',
  'h5',
  'hdf5',
  'vot',
  'xml',
  'json',
  'ecsv',
  'zip',
  'gz',
  'xlsx',
]);

/** True where the name promises another format than the CSV text that was found. */
export function promisesOtherFormat(fileName: string): boolean {
  return endingsOfOtherFormats.has(endingOf(fileName));
}
