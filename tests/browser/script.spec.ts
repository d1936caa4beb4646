import { execFile } from 'node:child_process';
import path from 'node:path';
import { promisify } from 'node:util';
import { expect, test } from '@playwright/test';
import { parse } from 'csv-parse/sync';
import { projectFile } from './demonstration';

/** The script of README.md: the whole job by the API alone, with what Debian's Python brings. */
test('a script goes from files to an upper limit by the API alone', async ({ baseURL }) => {
  const token = path.join(process.env.RAREBOUND_DATA_DIR ?? '', 'demo-token');
  const script = projectFile('public/samples/first_limit.py');
  const words = [script, baseURL ?? '', 'breakwater', token];
  const { stdout } = await promisify(execFile)('/usr/bin/python3', words, { timeout: 150_000 });
  expect(stdout).toMatch(/^12 targets: 12 (new|of known stars)$/m);
  const [, shown] = stdout.match(/^<(\d+) planets of 2–30\sMJ .* per 100 stars \(95\s%\)$/m) ?? [];
  const table = stdout.slice(stdout.indexOf('\nanalysis,') + 1);
  const rows: Record<string, string>[] = parse(table, { columns: true });
  const limit = rows.find(
    ({ quantity, interval, credible_level: level }) =>
      quantity === 'companions_per_star' && interval === 'upper_limit' && level === '0.95',
  );
  const at = (column: string) => Number(limit?.[column]);
  expect(at('n_targets')).toBe(12);
  expect(at('upper')).toBeGreaterThan(0);
  expect(Number(shown)).toBe(Number((100 * at('upper')).toPrecision(2)));
});

test('a script whose file is refused ends with the place of the fault', async ({ baseURL }) => {
  const token = path.join(process.env.RAREBOUND_DATA_DIR ?? '', 'demo-token');
  const script = projectFile('public/samples/first_limit.py');
  const words = [script, baseURL ?? '', 'breakwater', token, projectFile('tests/browser/bad-set')];
  const run = promisify(execFile)('/usr/bin/python3', words, { timeout: 60_000 });
  await expect(run).rejects.toMatchObject({
    code: 1,
    stderr: expect.stringMatching(/^422: .*\n.*line 3.*: found .*; expected /s),
  });
});
