import { CsvError, parse } from 'csv-parse/sync';
import type { Fault } from '@/lib/errors';
import type { OffendingRows } from './kinds';
import type { RawTable } from './table';

const rowsAtMost = 1000;
const charactersAtMost = 1 << 20;

const keyOf = ({ line, row, item }: Pick<Fault, 'line' | 'row' | 'item'>) =>
  line !== undefined ? `line ${line}` : row !== undefined ? `${item ?? ''} row ${row}` : null;

/**
 * The rows that faults name, with their cells as the file has them, one entry a fault. Null where
 * no fault names a row.
 *
 * @param textsOf texts of lines that are no row of the table, such as one of another length
 */
export function offendingRows(
  table: RawTable,
  faults: readonly Fault[],
  textsOf: (lines: ReadonlySet<number>) => ReadonlyMap<number, string>,
): OffendingRows | null {
  const wanted = new Set(faults.flatMap((fault) => keyOf(fault) ?? []));
  const headingKey = keyOf(table.headingPlace);
  const rowOf = new Map<string, number>();
  for (let row = 0; row < table.rowCount; row += 1) {
    const key = keyOf(table.rowPlace(row));
    if (key !== null && wanted.has(key)) rowOf.set(key, row);
  }
  const isRow = (fault: Fault) => rowOf.has(keyOf(fault) ?? '');
  const texts = textsOf(
    new Set(faults.flatMap((fault) => (isRow(fault) ? [] : (fault.line ?? [])))),
  );
  const width = table.columns.length;
  const rows: OffendingRows['rows'] = [];
  let characters = 0;
  let count = 0;
  for (const fault of faults) {
    const key = keyOf(fault);
    if (key === null || key === headingKey) continue;
    const row = rowOf.get(key);
    const line = row === undefined ? texts.get(fault.line ?? 0) : undefined;
    if (row === undefined && line === undefined) continue;
    count += 1;
    const cells =
      row === undefined
        ? fitCells(splitLine(line ?? ''), width)
        : table.columns.map((column) => String(column.cells[row] ?? ''));
    characters += cells.reduce((sum, cell) => sum + cell.length, 0);
    if (rows.length === rowsAtMost || characters > charactersAtMost) continue;
    rows.push({
      place: key.trim(),
      cells,
      column: fault.column ?? null,
      code: fault.code,
      found: fault.found ?? fault.message ?? '',
      expected: fault.expected ?? '',
    });
  }
  if (count === 0) return null;
  return { headings: table.columns.map(({ heading }) => heading), rows, count };
}

/** A row of another length whose cells hold line breaks stays one text. */
function splitLine(line: string): string[] {
  const delimiter = line.includes('\t') && !line.includes(',') ? '\t' : ',';
  const options = { delimiter, relax_quotes: true, relax_column_count: true };
  try {
    const [cells] = parse(line, options) as string[][];
    return cells ?? [];
  } catch (error) {
    if (error instanceof CsvError) return [line];
    throw error;
  }
}

/** A row of another length: what is missing stays empty, what is over stands in the last cell. */
function fitCells(cells: string[], width: number): string[] {
  if (cells.length <= width) return [...cells, ...Array<string>(width - cells.length).fill('')];
  return [...cells.slice(0, width - 1), cells.slice(width - 1).join(',')];
}
