import { execFile } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { countRanks } from '@/lib/local/test-counts.mjs';

const run = promisify(execFile);
const root = process.cwd();

/** A small house in which each file breaks one rule, and one file breaks none. */
const house: Record<string, string> = {
  'lib/errors.ts': 'export class InputError extends Error {}',
  'lib/numerics/vendor.ts': "import { mean } from 'd3';\nexport const average = mean;",
  'lib/numerics/axis.ts':
    "import { InputError } from '@/lib/errors';\nexport const e = InputError;",
  'lib/quantities/upward.ts':
    "import type { average } from '@/lib/numerics/vendor';\nexport type A = typeof average;",
  'lib/numerics/platform.ts':
    "import { readFileSync } from 'node:fs';\nexport const r = readFileSync;",
  'lib/inference/package.ts': "import { z } from 'zod';\nexport const shape = z;",
  'lib/population/one.ts': "import { two } from './two';\nexport const one = () => two;",
  'lib/population/two.ts': "import { one } from './one';\nexport const two = () => one;",
  'lib/schemas/sideways.ts':
    "import { table } from '@/lib/formats/table';\nexport const s = table;",
  'lib/formats/table.ts': 'export const table = 1;',
  'lib/services/surveys.ts': "import { main } from '@/workers/main';\nexport const m = main;",
  'workers/main.ts': 'export const main = 1;',
  'models/index.ts': 'export const database = 1;',
  'components/surveys/list.tsx': "import { database } from '@/models';\nexport const d = database;",
  'app/page.tsx':
    "import { database } from '@/models';\nexport default function Page() { return database; }",
  'lib/queue/nowhere.ts': "import { gone } from './gone';\nexport const g = gone;",
  'lib/local/start.mjs': "import zod from 'zod';\nexport default zod;",
};

let folder = '';
let notes: string[] = [];

beforeAll(async () => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'ranks-'));
  for (const [file, text] of Object.entries(house)) {
    mkdirSync(path.join(folder, path.dirname(file)), { recursive: true });
    writeFileSync(path.join(folder, file), `${text}\n`);
  }
  for (const file of ['.dependency-cruiser.cjs', 'tsconfig.json', 'package.json']) {
    cpSync(path.join(root, file), path.join(folder, file));
  }
  symlinkSync(path.join(root, 'node_modules'), path.join(folder, 'node_modules'));
  const program = path.join(root, 'node_modules/.bin/depcruise');
  const rooms = ['app', 'components', 'lib', 'models', 'workers'];
  const { stdout } = await run(program, [...rooms, '--output-type', 'json'], { cwd: folder }).catch(
    (error: { stdout: string }) => error,
  );
  notes = countRanks(JSON.parse(stdout)).notes;
}, 30_000);

afterAll(() => rmSync(folder, { recursive: true }));

/** Which rules a file of the house breaks. */
const rulesOf = (file: string) =>
  notes.filter((note) => note.includes(` ${file} imports`)).map((note) => note.split(':')[0]);

describe('the ranks of the rooms', () => {
  it.each([
    ['lib/quantities/upward.ts', 'rank-of-quantities'],
    ['lib/schemas/sideways.ts', 'rank-of-schemas'],
    ['lib/services/surveys.ts', 'rank-of-services'],
    ['lib/numerics/platform.ts', 'pure-rooms-import-no-platform'],
    ['lib/inference/package.ts', 'pure-rooms-import-no-package'],
    ['lib/population/one.ts', 'no-circles'],
    ['components/surveys/list.tsx', 'components-stay-in-the-browser'],
    ['app/page.tsx', 'pages-reach-rows-through-services'],
    ['lib/queue/nowhere.ts', 'every-import-is-found'],
    ['lib/local/start.mjs', 'launcher-before-install'],
  ])('%s is reported by %s', (file, rule) => {
    expect(rulesOf(file)).toContain(rule);
  });

  it('leave alone what imports from below, and the one door to the packages', () => {
    expect(rulesOf('lib/numerics/axis.ts')).toEqual([]);
    expect(rulesOf('lib/numerics/vendor.ts')).toEqual([]);
  });
});
