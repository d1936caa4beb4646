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
  it('reads what a gzip file holds', () => {
    const bytes = new Uint8Array(gzipSync('name,distance,age\nA,1,2\n'));
    const result = readUpload(bytes, { fileName: 'table.csv.gz', kind: 'targets' });
    expect(result).toMatchObject({ ok: true, container: 'csv', records: [{ name: 'A' }] });
  });

  it('says that a gzip file is cut short', () => {
    const bytes = gzipSync('name,distance,age\nA,1,2\n');
    expect(codeOf(new Uint8Array(bytes.subarray(0, 20)), 'table.csv.gz').code).toBe('truncated');
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
