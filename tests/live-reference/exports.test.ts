import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { run } from '@/lib/local/process-run.mjs';
import { findExportReaders } from '@/lib/local/reference-programs.mjs';
import { runExports } from '@/lib/services/exports/registry';
import { writeExports } from './written-exports';

const folder = mkdtempSync(path.join(tmpdir(), 'rarebound-exports-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const { python } = await findExportReaders();

describe('files of a run', () => {
  it('are all written', async () => {
    const names = await writeExports(folder);
    expect(names).toHaveLength(runExports.length + 2);
  });

  // Without these the step says which are missing; a suite without tests would fail.
  if (python !== null) {
    it('are read by general-purpose clients, which agree on every cell', async () => {
      const script = path.join(import.meta.dirname, 'read_exports.py');
      const env = { ...process.env, PYTHONDONTWRITEBYTECODE: '1' };
      const { code, output } = await run(python, [script, folder], { env });
      expect(output).toContain('all agree');
      expect(code, output).toBe(0);
      // Five tables in each container that clients read as a table, and the arrays.
      const read = new Map(
        [...output.matchAll(/(\.\w+): (\d+)/g)].map(([, ending, count]) => [ending, Number(count)]),
      );
      for (const ending of ['.csv', '.ecsv', '.vot']) expect(read.get(ending), ending).toBe(6);
      expect(read.get('.fits')).toBe(8);
      for (const ending of ['.npz', '.h5']) expect(read.get(ending), ending).toBe(2);
    }, 180_000);
  }
});
