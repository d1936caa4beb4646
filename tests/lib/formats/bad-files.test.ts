import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import {
  type KnownMap,
  placeOf,
  type ReadContext,
  type ReadResult,
  readUploadedFile,
  type UploadKind,
} from '@/lib/formats';

import { withUnknownFilter } from './unknown-filter';
import { gzippedZeros, zipOf } from './zip-of';

const folder = path.resolve(import.meta.dirname, '../../fixtures/bad');

interface Row {
  id: string;
  case: string;
  kind: UploadKind;
  format: string;
  file: string;
  expect: 'accept' | 'warn' | 'reject';
  code: string;
  where: string;
}

const rows: Row[] = parse(readFileSync(path.join(folder, 'index.csv')), { columns: true });

/** The rows that say how to make their file instead of naming one. */
const made: Record<string, () => string | Uint8Array | Promise<Uint8Array>> = {
  '063': () => `${Array.from({ length: 2000 }, (_, i) => `c${i}`).join(',')}\n`,
  '064': () =>
    `name,distance,age\n${Array.from({ length: 100_001 }, (_, i) => `RB ${i},20,100\n`).join('')}`,
  '154': withUnknownFilter,
  '142': () => zipOf([{ name: 'completeness.npy', unpackedBytes: 3 * 2 ** 30 }]),
  '144': () => gzippedZeros(3 * 2 ** 30),
  '143': () =>
    zipOf(Array.from({ length: 20_000 }, (_, i) => ({ name: `${i}.npy`, unpackedBytes: 0 }))),
};

const mapOfStar: KnownMap = {
  massMjup: [1, 5, 20],
  semiMajorAxisAu: [5, 50, 300],
  completeness: [0, 0.1, 0.2, 0.3, 0.6, 0.7, 0.5, 0.9, 0.95],
};
const survey = { targetNames: [{ name: 'RB 0001', otherNames: [] }] };

/** What the survey must know for a row's answer to be the one in the list. */
const contexts: Record<string, Partial<ReadContext>> = {
  '155': { defaultTarget: 'RB 0001' },
  '156': { defaultTarget: 'RB 0001' },
  '157': { defaultTarget: 'RB 0001' },
  '158': { defaultTarget: 'RB 0001' },
  '171': { bands: ['J', 'H', 'K'] },
  '172': survey,
  '180': { maps: new Map([['RB 0001', mapOfStar]]) },
  '181': { maps: new Map([['RB 0001', mapOfStar]]) },
};

const nameOf = (row: Row) => row.file || (row.case.includes('.') ? row.case : `${row.case}.csv`);

async function readRow(row: Row): Promise<ReadResult> {
  const bytes =
    row.file === '' ? Buffer.from(await made[row.id]()) : readFileSync(path.join(folder, row.file));
  const fileName = nameOf(row);
  const kind = row.kind;
  const star = kind === 'completeness-maps' && row.format !== 'csv' ? 'RB 0001' : undefined;
  const context = { fileName, kind, ...(star && { defaultTarget: star }), ...contexts[row.id] };
  return readUploadedFile(new Uint8Array(bytes), context);
}

/** Reads under the kind that it holds; what its kind must be told is a test of its own. */
const tableAsMap = rows.filter(({ id }) => id === '119');
const titled = (answer: Row['expect']) =>
  rows
    .filter((row) => row.expect === answer && !tableAsMap.includes(row))
    .map((row) => [`${row.id} ${row.case}`, row] as const);

describe('the list of odd and bad files', { timeout: 60_000 }, () => {
  it('names a file that exists, or one that is made here, in every row', () => {
    for (const row of rows) {
      const isThere = row.file === '' ? row.id in made : existsSync(path.join(folder, row.file));
      expect([row.id, isThere]).toEqual([row.id, true]);
    }
    const listed = new Set(rows.map((row) => row.file));
    const unlisted = readdirSync(folder).filter(
      (name) => name !== 'index.csv' && !listed.has(name),
    );
    expect(unlisted).toEqual([]);
  });

  it.each(titled('reject'))('%s is refused with its code at its place', async (_, row) => {
    const result = await readRow(row);
    if (result.ok) throw new Error('the file was accepted');
    const [first] = result.faults;
    expect({ code: first.code, where: placeOf(first) }).toEqual({
      code: row.code,
      where: row.where,
    });
    expect(new Set(result.faults.map((fault) => fault.code))).toEqual(new Set([row.code]));
    expect(result.faultCount).toBeGreaterThan(0);
    expect(result.faults[0].file).toBe(nameOf(row));
  });

  it.each(titled('warn'))('%s is read with a warning at its place', async (_, row) => {
    const result = await readRow(row);
    expect(result.ok ? [] : result.faults).toEqual([]);
    const warnings = result.notes.filter((note) => note.level === 'warning');
    expect(warnings.map((note) => ({ code: note.code, where: placeOf(note) }))).toEqual([
      { code: row.code, where: row.where },
    ]);
  });

  it.each(titled('accept'))('%s is read without a warning', async (_, row) => {
    const result = await readRow(row);
    expect(result.ok ? [] : result.faults).toEqual([]);
    // A missing distance is named with its consequence; the word for it is no fault.
    const warnings = result.notes.filter(({ level }) => level === 'warning');
    expect(warnings.filter(({ code }) => row.id !== '076' || code !== 'value-missing')).toEqual([]);
    if (row.where !== 'file') expect(result.notes.map(placeOf)).toContain(row.where);
  });

  it('suggests the kind of a table that was chosen as maps', async () => {
    const [row] = tableAsMap;
    const result = await readRow({ ...row, kind: 'completeness-maps' });
    expect(result.ok).toBe(false);
    const suggestions = result.notes.filter(({ code }) => code === row.code);
    expect(suggestions.map(placeOf)).toEqual([row.where]);
  });

  it.each([
    ['x.npz', () => zipOf([{ name: 'completeness.npy', unpackedBytes: 3 * 2 ** 30 }])],
    ['x.csv.gz', () => gzippedZeros(3 * 2 ** 30)],
  ])('stops the bomb %s early and small', { timeout: 20_000 }, async (fileName, make) => {
    const bytes = make();
    const before = process.memoryUsage().rss;
    const result = await readUploadedFile(bytes, { fileName, kind: 'completeness-maps' });
    expect(result.ok ? null : result.faults[0].code).toBe('too-large');
    expect(process.memoryUsage().rss - before).toBeLessThan(200 * 2 ** 20);
  });
});
