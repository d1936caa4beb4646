import { CsvError, parse } from 'csv-parse/sync';
import type { Fault } from '@/lib/errors';
import {
  type CsvLayout,
  countLineEnds,
  findLayout,
  hasMixedLineEnds,
  isLineEnd,
} from './csv-layout';
import { splitHeading } from './headings';
import { uploadLimits } from './limits';
import type { FaultReport, NoteReport } from './reports';
import type { RawColumn, RawTable } from './table';

/** Distinct texts that a column keeps one copy of: repeated names and grid values cost nothing. */
const sharedTextsPerColumn = 8192;
const recordCharacters = uploadLimits.tableColumns * uploadLimits.cellCharacters;

/** Ends the parse from within; what is wrong has been reported. */
class StopReading extends Error {}

class CsvCollector {
  readonly columns: RawColumn[] = [];
  readonly lines: number[] = [];
  private readonly shared: Map<string, string>[] = [];
  private end: number;
  private line: number;
  headingLine: number;

  constructor(
    private readonly bytes: Uint8Array,
    layout: Pick<CsvLayout, 'start' | 'line'>,
    private readonly maxRows: number,
    private readonly faults: FaultReport,
  ) {
    this.end = layout.start;
    this.line = layout.line;
    this.headingLine = layout.line;
  }

  /** `recordEnd` is the byte after the record; lines are counted from the bytes themselves. */
  take(cells: string[], recordEnd: number): void {
    let start = this.end;
    while (isLineEnd(this.bytes[start])) start += 1;
    const line = this.line + countLineEnds(this.bytes, this.end, start);
    this.line = line + countLineEnds(this.bytes, start, recordEnd);
    this.end = recordEnd;
    if (this.columns.length === 0) this.takeHeadings(cells, line);
    else this.takeRow(cells, line);
  }

  private takeHeadings(cells: string[], line: number): void {
    this.headingLine = line;
    if (cells.every((cell) => cell.trim() === '')) {
      this.stop({
        code: 'header-missing',
        line,
        found: 'no column names',
        expected: 'a header line such as "name,ra,dec"',
      });
    }
    if (cells.length > uploadLimits.tableColumns) {
      this.stop({
        code: 'too-many',
        line,
        found: `${cells.length} columns`,
        expected: `at most ${uploadLimits.tableColumns}`,
      });
    }
    for (const heading of cells) {
      this.columns.push({ heading, unit: null, cells: [] });
      this.shared.push(new Map());
    }
  }

  private takeRow(cells: string[], line: number): void {
    if (cells.length === 1 && this.columns.length > 1 && cells[0].trim() === '') return;
    if (this.lines.length === this.maxRows) {
      this.stop({
        code: 'too-many',
        line,
        found: `more than ${this.maxRows} rows`,
        expected: `at most ${this.maxRows} in one file`,
      });
    }
    if (cells.length !== this.columns.length) {
      this.faults.add({
        code: 'row-length',
        line,
        found: cells.length === 1 ? '1 cell' : `${cells.length} cells`,
        expected: `${this.columns.length}, as in the header`,
      });
      return;
    }
    this.lines.push(line);
    for (let index = 0; index < cells.length; index += 1) this.takeCell(cells[index], index, line);
  }

  private takeCell(cell: string, index: number, line: number): void {
    const column = this.columns[index];
    if (cell.length > uploadLimits.cellCharacters) {
      this.faults.add({
        code: 'too-long',
        line,
        column: splitHeading(column.heading).name,
        found: `${cell.length} characters`,
        expected: `at most ${uploadLimits.cellCharacters}`,
      });
    }
    const shared = this.shared[index];
    const known = shared.get(cell);
    if (known === undefined && shared.size < sharedTextsPerColumn) shared.set(cell, cell);
    column.cells.push(known ?? cell);
  }

  /** The line of a byte at or after the end of the last whole record. */
  lineOf(at: number): number {
    return this.line + countLineEnds(this.bytes, this.end, at);
  }

  private stop(fault: Fault): never {
    this.faults.add(fault);
    throw new StopReading();
  }
}

function grammarFault(
  error: CsvError,
  bytes: Uint8Array,
  start: number,
  lineOf: (at: number) => number,
): Fault {
  const lastSeparator = start + Number(error.bytes ?? 0);
  const opened = bytes.indexOf(34, lastSeparator);
  const line = lineOf(opened < 0 ? lastSeparator : opened);
  switch (error.code as string) {
    case 'CSV_QUOTE_NOT_CLOSED':
      return {
        code: 'quote-open',
        line,
        message: `a quotation mark opened on line ${line} is never closed`,
      };
    case 'CSV_MAX_RECORD_SIZE':
      return {
        code: 'too-long',
        line,
        found: `a row of more than ${recordCharacters} characters`,
        expected: `at most ${uploadLimits.cellCharacters} in a cell`,
        hint: 'Is a quotation mark left open?',
      };
    default:
      return {
        code: 'quote-misplaced',
        line,
        message:
          'a quotation mark stands inside a cell; expected it around the whole cell, and doubled inside',
      };
  }
}

/**
 * Reads CSV text (RFC 4180, comma or tab, any line ends) into a plain table of texts.
 *
 * The bytes must be UTF-8. Faults go to `faults`; the table is null where no row can be trusted.
 * Lines are physical lines, also after cells that hold line breaks.
 */
export function parseCsv(
  bytes: Uint8Array,
  maxRows: number,
  faults: FaultReport,
  notes: NoteReport,
): RawTable | null {
  const layout = findLayout(bytes);
  if ('fault' in layout) {
    faults.add(layout.fault);
    return null;
  }
  describeLayout(bytes, layout, notes);
  const table = readDelimited(bytes, layout, maxRows, faults);
  return table && Object.assign(table, { hasFormulaGuards: true });
}

/** Reads rows of delimited cells below a heading line whose place and separator are known. */
export function readDelimited(
  bytes: Uint8Array,
  layout: Omit<CsvLayout, 'delimiter'> & { delimiter: CsvLayout['delimiter'] | ' ' },
  maxRows: number,
  faults: FaultReport,
): RawTable | null {
  const collector = new CsvCollector(bytes, layout, maxRows, faults);
  const body = bytes.subarray(layout.start);
  try {
    parse(Buffer.from(body.buffer, body.byteOffset, body.byteLength), {
      delimiter: layout.delimiter,
      record_delimiter: ['\r\n', '\n', '\r'],
      relax_column_count: true,
      skip_empty_lines: true,
      max_record_size: recordCharacters,
      on_record: (cells: string[], { bytes: read }) => {
        collector.take(cells, layout.start + read);
        return null;
      },
    });
  } catch (error) {
    if (error instanceof CsvError) {
      faults.add(grammarFault(error, bytes, layout.start, (at) => collector.lineOf(at)));
    } else if (!(error instanceof StopReading)) throw error;
    return null;
  }
  if (collector.columns.length === 0) {
    faults.add({
      code: 'header-missing',
      line: 1,
      found: 'no column names',
      expected: 'a header line',
    });
    return null;
  }
  const lines = Int32Array.from(collector.lines);
  return {
    columns: collector.columns,
    rowCount: lines.length,
    headingPlace: { line: collector.headingLine },
    rowPlace: (row) => ({ line: lines[row] }),
  };
}

function describeLayout(bytes: Uint8Array, layout: CsvLayout, notes: NoteReport): void {
  if (layout.hasMark) notes.inform('mark-skipped', 'A UTF-8 byte order mark is skipped');
  if (layout.commentLines > 0) {
    notes.inform('comment-skipped', `${layout.commentLines} lines starting with # are skipped`);
  }
  if (hasMixedLineEnds(bytes)) {
    notes.inform('line-ends-mixed', 'The file mixes line ends (LF, CRLF, CR); each is read as one');
  }
}
