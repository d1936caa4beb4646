import { describe, expect, it } from 'vitest';
import { uploadKindSchema } from '@/lib/schemas/uploads';
import { exampleFile } from '@/lib/services/example-files';
import { recordsOf } from './read-text';

describe('exampleFile(kind)', () => {
  it.each(uploadKindSchema.options)('reads as %s without a fault', (kind) => {
    const { records } = recordsOf(kind, exampleFile(kind).text);
    expect(records.length).toBeGreaterThan(0);
  });

  it('names the same stars in every file, so that they fit each other', () => {
    const names = (kind: string) =>
      exampleFile(kind)
        .text.trim()
        .split('\n')
        .slice(1)
        .map((line) => line.split(',')[0]);
    const known = names('targets');
    expect(known).toHaveLength(3);
    for (const kind of ['contrast-curves', 'completeness-maps', 'companions']) {
      expect(names(kind).filter((name) => !known.includes(name))).toEqual([]);
    }
  });

  it('has no example of anything else', () => {
    expect(() => exampleFile('__proto__')).toThrow('example');
  });
});
