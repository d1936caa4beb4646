import { describe, expect, it } from 'vitest';
import { InputError } from '@/lib/errors';
import { bundleLimits, citeAsBibtex, packFiles, unpackFiles } from '@/lib/formats/bundle';

const file = (name: string, text: string) => ({ name, bytes: Buffer.from(text) });

/** What the archive's names are changed to, letter by letter: no writer makes these. */
function renamed(archive: Buffer, from: string, to: string): Buffer {
  const text = archive.toString('latin1').replaceAll(from, to);
  return Buffer.from(text, 'latin1');
}

async function codeOf(archive: Buffer): Promise<string> {
  const fault = await unpackFiles(archive).catch((error: unknown) => error);
  if (!(fault instanceof InputError)) throw new Error(`expected a refusal, got ${String(fault)}`);
  return fault.code;
}

describe('a bundle', () => {
  it('comes back as it went in, and is the same bytes in any order', async () => {
    const files = [file('a/recipe.json', '{}'), file('README.txt', 'x'.repeat(5000))];
    const archive = await packFiles(files);
    expect(await packFiles([...files].reverse())).toEqual(archive);
    const read = await unpackFiles(archive);
    expect([...read.keys()]).toEqual(['README.txt', 'a/recipe.json']);
    expect(read.get('README.txt')?.toString()).toBe('x'.repeat(5000));
  });

  it('is refused where a path leads out of it or has another form', async () => {
    const archive = await packFiles([file('aa/x.json', '{}')]);
    expect(await codeOf(renamed(archive, 'aa/x.json', '../x.json'))).toBe('zip-path');
    expect(await codeOf(renamed(archive, 'aa/x.json', '/a/x.json'))).toBe('zip-path');
    expect(await codeOf(await packFiles([file('.hidden/x', '')]))).toBe('zip-path');
    expect(await codeOf(await packFiles([file('a/b/c/d/e', '')]))).toBe('zip-path');
  });

  it('is refused where a name stands twice, or a byte was changed', async () => {
    const two = await packFiles([file('aa.json', '{}'), file('ab.json', '[]')]);
    expect(await codeOf(renamed(two, 'ab.json', 'aa.json'))).toBe('entry-repeat');
    const stored = await packFiles([file('a.txt', 'the quick brown fox '.repeat(50))]);
    stored[45] ^= 0xff;
    expect(await codeOf(stored)).toBe('checksum');
    expect(await codeOf(two.subarray(0, two.length - 30))).toBe('truncated');
    expect(await codeOf(Buffer.from('no archive'))).toBe('truncated');
  });

  it('is refused beyond its limits, before anything is unpacked', async () => {
    const many = await packFiles([file('a.txt', '')]);
    // The count that the end record states: 10 bytes after its signature.
    many.writeUInt16LE(bundleLimits.entries + 1, many.indexOf('PK\x05\x06', 0, 'latin1') + 10);
    expect(await codeOf(many)).toBe('too-many');
    const archive = await packFiles([file('a.txt', 'x'.repeat(100))]);
    // The size that the central directory states: 24 bytes after its signature.
    const at = archive.indexOf('PK\x01\x02', 0, 'latin1') + 24;
    archive.writeUInt32LE(bundleLimits.unpackedBytes + 1, at);
    expect(await codeOf(archive)).toBe('too-large');
    archive.writeUInt32LE(10, at);
    expect(await codeOf(archive)).toBe('checksum');
  });
});

describe('a citation', () => {
  it('keeps signs of TeX from being read as commands', () => {
    const text = citeAsBibtex({
      key: 'rarebound-abc',
      title: 'Limits of 5 % & more_{a}',
      authors: [{ name: 'A. O’Brien', orcid: '0000-0002-1825-0097' }],
      year: 2026,
      version: 'release R-4',
      fingerprint: 'a'.repeat(64),
      address: 'https://lab.example/r/abc',
    });
    expect(text).toContain('title = {{Limits of 5 \\% \\& more\\_\\{a\\}}}');
    expect(text).toContain('note = {SHA-256 ');
    expect(text).toContain('https://orcid.org/0000-0002-1825-0097');
  });
});
