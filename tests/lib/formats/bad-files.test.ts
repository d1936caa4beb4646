import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import {
  type KnownMap,
  placeOf,
  type ReadContext,
  type ReadResult,
  readUpload,
  type UploadKind,
} from '@/lib/formats';

const folder = path.resolve(import.meta.dirname, '../../fixtures/bad');

interface Row {
  id: string;
  case: string;
  kind: UploadKind;
  file: string;
  expect: 'accept' | 'warn' | 'reject';
  code: string;
  where: string;
}

const rows: Row[] = parse(readFileSync(path.join(folder, 'index.csv')), { columns: true });

/** The rows that say how to make their file instead of naming one. */
const made: Record<string, () => string> = {
  '063': () => `${Array.from({ length: 2000 }, (_, i) => `c${i}`).join(',')}\n`,
  '064': () =>
    `name,distance,age\n${Array.from({ length: 100_001 }, (_, i) => `RB ${i},20,100\n`).join('')}`,
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

function readRow(row: Row): ReadResult {
  const bytes =
    row.file === '' ? Buffer.from(made[row.id]()) : readFileSync(path.join(folder, row.file));
  const fileName = row.file || `${row.case}.csv`;
  return readUpload(new Uint8Array(bytes), { fileName, kind: row.kind, ...contexts[row.id] });
}

const titled = (answer: Row['expect']) =>
  rows.filter((row) => row.expect === answer).map((row) => [`${row.id} ${row.case}`, row] as const);

describe('the list of odd and bad CSV files', { timeout: 60_000 }, () => {
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

  it.each(titled('reject'))('%s is refused with its code at its place', (_, row) => {
    const result = readRow(row);
    if (result.ok) throw new Error('the file was accepted');
    const [first] = result.faults;
    expect({ code: first.code, where: placeOf(first) }).toEqual({
      code: row.code,
      where: row.where,
    });
    expect(new Set(result.faults.map((fault) => fault.code))).toEqual(new Set([row.code]));
    expect(result.faultCount).toBeGreaterThan(0);
    expect(result.faults[0].file).toBe(row.file || `${row.case}.csv`);
  });

  it.each(titled('warn'))('%s is read with a warning at its place', (_, row) => {
    const result = readRow(row);
    expect(result.ok ? [] : result.faults).toEqual([]);
    const warnings = result.notes.filter((note) => note.level === 'warning');
    expect(warnings.map((note) => ({ code: note.code, where: placeOf(note) }))).toEqual([
      { code: row.code, where: row.where },
    ]);
  });

  it.each(titled('accept'))('%s is read without a warning', (_, row) => {
    const result = readRow(row);
    expect(result.ok ? [] : result.faults).toEqual([]);
    expect(result.notes.filter((note) => note.level === 'warning')).toEqual([]);
    if (row.where !== 'file') expect(result.notes.map(placeOf)).toContain(row.where);
  });
});
