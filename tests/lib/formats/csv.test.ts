import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeCsv } from '@/lib/formats';
import { parseCsv } from '@/lib/formats/csv';
import { FaultReport, NoteReport, placeOf } from '@/lib/formats/reports';
import { bytesOf, faultsOf, recordsOf } from './read-text';

function parseText(text: string) {
  const faults = new FaultReport();
  const notes = new NoteReport();
  const table = parseCsv(bytesOf(text), 1000, faults, notes);
  if (table === null) throw new Error(JSON.stringify(faults.list('')));
  return table;
}

const linesOf = (text: string) =>
  recordsOf('targets', text).records.map((record) => [record.name, record.line]);

describe('parseCsv(bytes)', { timeout: 60_000 }, () => {
  it.each([
    ['LF', '\n'],
    ['CRLF', '\r\n'],
    ['CR', '\r'],
  ])('counts physical lines after cells with line breaks, with %s', (_, end) => {
    const lines = [
      'name,distance,age,notes',
      `A,1,2,"one${end}two${end}${end}four"`,
      '',
      'B,1,2,x',
      'C,1,2,',
    ];
    expect(linesOf(lines.join(end))).toEqual([
      ['A', 2],
      ['B', 7],
      ['C', 8],
    ]);
  });

  it('keeps the line breaks of a quoted cell as they are', () => {
    const { records } = recordsOf(
      'targets',
      'name,distance,age,notes\nA,1,2,"one\r\ntwo\rthree ""x"""\n',
    );
    expect(records[0].notes).toBe('one\r\ntwo\rthree "x"');
  });

  it('skips a byte order mark, empty lines and comments before the headings only', () => {
    const text = '\uFEFF# made by hand\n\n# second\nname,distance,age\n#7,1,2\n';
    const { records, notes } = recordsOf('targets', text);
    expect(records.map((record) => [record.name, record.line])).toEqual([['#7', 5]]);
    expect(notes.map((note) => note.code)).toEqual(
      expect.arrayContaining(['mark-skipped', 'comment-skipped']),
    );
  });

  it('reads tabs, and commas within tab-separated cells', () => {
    const { records } = recordsOf('targets', 'name\tdistance\tage\tnotes\nA\t1\t2\tone, two\n');
    expect([records[0].distancePc, records[0].notes]).toEqual([1, 'one, two']);
  });

  it('names the line on which an open quotation mark stands', () => {
    const text = 'name,distance,age,notes\nA,1,2,"one\ntwo"\nB,1,2,"never\nclosed\nC,1,2,x\n';
    expect(faultsOf('targets', text)).toEqual(['quote-open at line 4']);
  });

  it('refuses a quotation mark inside a cell', () => {
    expect(faultsOf('targets', 'name,distance\nA,1\nB 5",2\n')).toEqual([
      'quote-misplaced at line 3',
    ]);
    expect(faultsOf('targets', 'name,distance\nA,1\n"B" x,2\n')).toEqual([
      'quote-misplaced at line 3',
    ]);
  });

  it('goes on after a row of the wrong length and reports what else is wrong', () => {
    const text = 'name,distance,age\nA,1\nB,x,2\nC,1,2,3\n';
    expect(faultsOf('targets', text)).toEqual([
      'row-length at line 2',
      'row-length at line 4',
      'not-a-number at line 3, column "distance"',
    ]);
  });

  it('lists five faults of one code and counts the rest', () => {
    const rows = Array.from({ length: 9 }, (_, i) => `A${i},x,2`).join('\n');
    const faults = faultsOf('targets', `name,distance,age\n${rows}\n`);
    expect(faults).toHaveLength(6);
    expect(faults[5]).toBe('not-a-number at file');
  });

  it('does not take a missing row for a hole in a map', () => {
    const text =
      'target,mass,semi_major_axis,completeness\nA,1,5,0.1\nA,1,10,0.1\nA,5,5\nA,5,10,0.1\n';
    expect(faultsOf('completeness-maps', text)).toEqual(['row-length at line 4']);
  });

  it('reads back every text that writeCsv wrote', () => {
    const cell = fc.string({
      unit: fc.constantFrom('a', 'é', ',', '"', '\n', '\r', '#', ' ', ';', '\t'),
    });
    const table = fc
      .tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 5 }))
      .chain(([width, height]) =>
        fc.array(fc.array(cell, { minLength: height, maxLength: height }), {
          minLength: width,
          maxLength: width,
        }),
      );
    fc.assert(
      fc.property(table, (columns) => {
        const named = columns.map((values, i) => ({ name: `c${i}`, values }));
        const read = parseText(writeCsv(named));
        expect(read.columns.map((column) => column.cells)).toEqual(columns);
      }),
      { numRuns: 300 },
    );
  });

  it('places a row by its line', () => {
    expect(placeOf(parseText('a,b\n1,2\n\n3,4\n').rowPlace(1))).toBe('line 4');
  });
});
