import { describe, expect, it } from 'vitest';
import { uploadKindSchema } from '@/lib/schemas/uploads';
import { exampleFile } from '@/lib/services/example-files';
import { recordsOf } from './read-text';

describe('exampleFile(kind)', () => {
  it.each(uploadKindSchema.options)('reads as %s without a fault', (kind) => {
    const { records } = recordsOf(kind, exampleFile(kind).text);
    expect(records.length).toBeGreaterThan(0);
  });

  it('names the same stars in every file', () => {
    for (const kind of ['contrast-curves', 'completeness-maps', 'companions'] as const) {
      const { records } = recordsOf(kind, exampleFile(kind).text);
      const names = records.map((record) => ('target' in record ? record.target : ''));
      expect(exampleFile('targets').text).toContain(names[0]);
    }
  });

  it('has no example of anything else', () => {
    expect(() => exampleFile('__proto__')).toThrow('example');
  });
});
