import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { readUpload } from '@/lib/formats';
import { recordsOf } from './read-text';

function codeOf(content: string | Uint8Array, fileName = 'file.csv') {
  const bytes =
    typeof content === 'string' ? new Uint8Array(Buffer.from(content, 'latin1')) : content;
  const result = readUpload(bytes, { fileName, kind: 'targets' });
  if (result.ok) throw new Error('the bytes were accepted');
  const [{ code, message }] = result.faults;
  return { code, message };
}

describe('readUpload(other formats)', () => {
  it.each([
    ['FITS', `SIMPLE  =                    T${' '.repeat(50)}`],
    ['NumPy', '\x93NUMPY\x01\x00'],
    ['HDF5', '\x89HDF\r\n\x1a\n'],
    ['zip', 'PK\x03\x04\x14\x00'],
    ['gzip', new Uint8Array(gzipSync('name\nA\n'))],
    ['ECSV', '# %ECSV 1.0\n# ---\nname\nA\n'],
    ['VOTable', '<?xml version="1.0"?>\n<VOTABLE version="1.3"></VOTABLE>'],
    ['JSON', '[{"name": "A"}]'],
    ['JSON', '{"name": "A"}'],
  ])('says that %s is not read yet', (name, content) => {
    const { code, message } = codeOf(content);
    expect(code).toBe('format-later');
    expect(message).toContain(name);
    expect(message).toContain('not read yet; expected CSV text');
  });

  it.each([
    ['an HTML page', '<!DOCTYPE html>\n<html><body>Sign in</body></html>'],
    ['a PDF document', '%PDF-1.7\n'],
    ['a PNG image', '\x89PNG\r\n\x1a\n'],
    ['an Excel', `PK\x03\x04${'\x00'.repeat(26)}[Content_Types].xml`],
  ])('says that the content is %s', (name, content) => {
    const { message } = codeOf(content);
    expect(message).toContain(`The name ends in .csv and the content is ${name}`);
  });

  it('names the byte where Latin-1 text stops being UTF-8', () => {
    const result = readUpload(new Uint8Array(Buffer.from('name,notes\nA,caf\xe9\n', 'latin1')), {
      fileName: 'file.csv',
      kind: 'targets',
    });
    expect(result.ok ? null : result.faults[0]).toMatchObject({
      code: 'not-utf8',
      item: 'byte 17',
    });
  });

  it.each([
    ['an overlong form', [0xc0, 0xaf], 12],
    ['a surrogate', [0xed, 0xa0, 0x80], 12],
    ['a cut sequence', [0xe2, 0x82], 12],
    ['a code point too large', [0xf4, 0x90, 0x80, 0x80], 12],
  ])('refuses %s', (_, broken, at) => {
    const bytes = new Uint8Array([...Buffer.from('name,notes\n'), ...broken]);
    const result = readUpload(bytes, { fileName: 'file.csv', kind: 'targets' });
    expect(result.ok ? null : result.faults[0].item).toBe(`byte ${at}`);
  });

  it('reads CSV text under the name of another format, and says so', () => {
    const { notes } = recordsOf('targets', 'name,distance,age\nA,1,2\n', {
      fileName: 'table.fits',
    });
    expect(notes.map((note) => note.code)).toContain('name-mismatch');
  });
});
