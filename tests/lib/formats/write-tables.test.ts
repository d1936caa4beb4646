import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bandDefinitions,
  bandsOfTargets,
  type CompanionRecord,
  companionDefinitions,
  companionRow,
  foldName,
  readUploadedFile,
  type TargetRecord,
  tableOfRows,
  targetDefinitions,
  targetEndDefinitions,
  targetRow,
  type WrittenTable,
  type WrittenTarget,
  writeCsvTable,
  writeEcsvTable,
  writeFitsTable,
  writeJsonTable,
  writeMachineReadableTable,
  writeVotable,
} from '@/lib/formats';
import { ABSENT_TARGET } from '../../support/written-target';

const encoder = new TextEncoder();
const writers = {
  csv: (table: WrittenTable) => encoder.encode(writeCsvTable(table)),
  ecsv: (table: WrittenTable) => encoder.encode(writeEcsvTable(table)),
  vot: (table: WrittenTable) => encoder.encode(writeVotable(table)),
  json: (table: WrittenTable) => encoder.encode(writeJsonTable(table)),
  fits: writeFitsTable,
} as const;

const orNull = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null });
const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const positive = fc.double({ min: Number.MIN_VALUE, max: Number.MAX_VALUE, noNaN: true });
const notNegative = fc.double({ min: 0, max: Number.MAX_VALUE, noNaN: true });

const clean = (text: string) =>
  text
    .replace(/[\p{C}\p{Zl}\p{Zp}]/gu, '')
    .replace(/^[=+\-@\s']+/, '')
    .trim();
/** FITS holds ASCII alone; every other container any letter. */
const words = (isAscii: boolean) =>
  fc
    .string({ unit: isAscii ? 'grapheme-ascii' : 'grapheme', minLength: 1, maxLength: 20 })
    .map(clean)
    .filter((text) => text !== '');

const target = (isAscii: boolean): fc.Arbitrary<WrittenTarget> =>
  fc
    .record({
      name: words(isAscii),
      gaiaDr3Id: orNull(fc.bigInt({ min: 0n, max: 2n ** 63n - 1n }).map(String)),
      pmRaMasYr: orNull(finite),
      pmDecMasYr: orNull(finite),
      hostMassMsun: orNull(positive),
      hostMassErrorMsun: orNull(notNegative),
      spectralType: orNull(words(isAscii)),
      debrisDisk: orNull(fc.boolean()),
      magnitudes: fc.dictionary(
        fc.constantFrom('J', 'K', 'Ks'),
        fc.record({ valueMag: finite, errorMag: orNull(notNegative) }),
        { noNullPrototype: true },
      ),
      notes: orNull(words(isAscii)),
    })
    .map((part) => ({ ...ABSENT_TARGET, ...part }));

function distinct(targets: readonly WrittenTarget[]): WrittenTarget[] {
  const seen = new Set<string>();
  return targets.filter(({ name, gaiaDr3Id }) => {
    const keys = [`n ${foldName(name)}`, ...(gaiaDr3Id === null ? [] : [`g ${gaiaDr3Id}`])];
    if (foldName(name) === '' || keys.some((key) => seen.has(key))) return false;
    for (const key of keys) seen.add(key);
    return true;
  });
}

const head = (name: string) => ({
  name,
  title: 'A table – of “things”',
  provenance: [
    ['run', 'A-3, run 18'],
    ['condition_1', 'Prior: <5 % & "more": #1\\'],
  ] as const,
});

const tableOfTargets = (targets: readonly WrittenTarget[]) =>
  tableOfRows(
    head('targets'),
    [
      ...targetDefinitions,
      ...bandsOfTargets(targets).flatMap(bandDefinitions),
      ...targetEndDefinitions,
    ],
    targets.map(targetRow),
    { dropEmpty: ['name'] },
  );

async function readBack(kind: 'targets' | 'companions', ending: string, bytes: Uint8Array) {
  const read = await readUploadedFile(bytes, { fileName: `${kind}.${ending}`, kind });
  if (!read.ok) throw new Error(`${ending}: ${JSON.stringify(read.faults)}`);
  return read.records;
}

const withoutLines = <R extends { line: number }>(records: R[]) =>
  records.map(({ line: _, ...rest }) => rest);

describe('tables', () => {
  it.each(Object.keys(writers) as (keyof typeof writers)[])(
    'of targets read back from %s to the last bit, 1 to 500 rows',
    async (ending) => {
      const some = fc.array(target(ending === 'fits'), { minLength: 1, maxLength: 12 });
      await fc.assert(
        fc.asyncProperty(some, async (drawn) => {
          const targets = distinct(drawn);
          fc.pre(targets.length > 0);
          const bytes = writers[ending](tableOfTargets(targets));
          const records = (await readBack('targets', ending, bytes)) as TargetRecord[];
          expect(withoutLines(records)).toEqual(targets);
        }),
        { numRuns: 25 },
      );
      const many = fc.sample(target(ending === 'fits'), { numRuns: 500, seed: 7 });
      const targets = distinct(many).map((one, i) => ({ ...one, name: `${i} ${one.name}`.trim() }));
      const records = await readBack('targets', ending, writers[ending](tableOfTargets(targets)));
      expect(withoutLines(records as TargetRecord[])).toEqual(targets);
    },
  );

  it.each(Object.keys(writers) as (keyof typeof writers)[])(
    'of companions read back from %s, also without a row',
    async (ending) => {
      const companion = {
        target: 'RB 1',
        companion: 'b',
        status: 'candidate',
        massMjup: 1 / 3,
        massErrorLowerMjup: 0.1,
        massErrorUpperMjup: 1e-300,
        semiMajorAxisAu: 40,
        semiMajorAxisErrorLowerAu: 2,
        semiMajorAxisErrorUpperAu: 2,
        projectedSeparationAu: null,
        separationArcsec: 0.25,
        separationErrorArcsec: 0,
        positionAngleDeg: -12.5,
        positionAngleErrorDeg: null,
        contrastMag: 9.1,
        contrastErrorMag: null,
        band: 'K',
        epoch: '2014-05-01',
        eccentricity: null,
        commonProperMotion: 'untested',
        probability: 0.5,
        reference: '2014A&A...1..1X',
      } as const;
      for (const companions of [[companion], []]) {
        const rows = companions.map(companionRow);
        const table = tableOfRows(head('companions'), companionDefinitions, rows, {
          dropEmpty: ['target', 'companion', 'status'],
        });
        const records = await readBack('companions', ending, writers[ending](table));
        expect(withoutLines(records as CompanionRecord[])).toEqual(companions);
      }
    },
  );

  it('keep what a spreadsheet would run as text, in CSV alone', async () => {
    const notes = ['=1+2', "'=1", '-x', 'plain'];
    const targets = notes.map((note, i) => ({ ...ABSENT_TARGET, name: `S ${i}`, notes: note }));
    const table = tableOfTargets(targets);
    expect(writeCsvTable(table)).toContain("'=1+2");
    expect(writeEcsvTable(table)).toContain('S 0,=1+2');
    for (const ending of ['csv', 'ecsv', 'vot', 'json'] as const) {
      const records = (await readBack('targets', ending, writers[ending](table))) as TargetRecord[];
      expect(
        records.map((record) => record.notes),
        ending,
      ).toEqual(notes);
    }
  });

  it('refuse infinite numbers everywhere', () => {
    const table = tableOfTargets([{ ...ABSENT_TARGET, name: 'S', pmRaMasYr: Infinity }]);
    for (const write of [...Object.values(writers), writeMachineReadableTable]) {
      expect(() => write(table)).toThrow(RangeError);
    }
  });

  it('describe every byte in a machine-readable table', () => {
    const targets = [
      { ...ABSENT_TARGET, name: 'Lafrenière 3', pmRaMasYr: 0.1, distancePc: 1e-9 },
      { ...ABSENT_TARGET, name: 'B', pmRaMasYr: null, distancePc: 12.5 },
    ];
    const lines = writeMachineReadableTable(tableOfTargets(targets)).trimEnd().split('\n');
    const described = lines.flatMap((line) => {
      const match = /^ *(\d+)- *(\d+) (\S+) +(\S+) +(\S+) +(\? )?/.exec(line);
      return match
        ? [{ start: Number(match[1]), end: Number(match[2]), name: match[5], gap: match[6] }]
        : [];
    });
    const cell = (row: string, name: string) => {
      const column = described.find((one) => one.name === name);
      return column && row.slice(column.start - 1, column.end).trim();
    };
    const rows = lines.slice(-2);
    expect(rows.map((row) => cell(row, 'name'))).toEqual(['Lafreniere 3', 'B']);
    expect(rows.map((row) => cell(row, 'pmra'))).toEqual(['0.1', '']);
    expect(rows.map((row) => Number(cell(row, 'distance')))).toEqual([1e-9, 12.5]);
    expect(described.find(({ name }) => name === 'pmra')?.gap).toBe('? ');
    expect(lines.every((line) => /^[\x20-\x7e]*$/.test(line))).toBe(true);
  });
});
