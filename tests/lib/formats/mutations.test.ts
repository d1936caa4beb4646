import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { readUploadedFile } from '@/lib/formats';
import { readMutations } from '@/tests/harden/mutation-run';
import { loadFormats } from '@/tests/harden/sample-files';

/** `npm run harden` reads two thousand of each on the product's threads. */
const MUTATIONS = 60;
const LONGEST_MS = 5000;

const formats = await loadFormats(path.resolve(import.meta.dirname, '../../fixtures'));

describe('damaged files', () => {
  it.each(formats.map((format) => [format.name, format] as const))(
    '%s: each gets an answer, and no value outside its domain is read',
    async (_, format) => {
      const tally = await readMutations(format, MUTATIONS, LONGEST_MS, readUploadedFile);
      expect(tally.findings).toEqual([]);
      expect(tally.accepted + tally.refused).toBe(MUTATIONS);
      expect(tally.refused).toBeGreaterThan(MUTATIONS / 10);
    },
  );
});
