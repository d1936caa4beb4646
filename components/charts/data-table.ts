import { writeCsv } from '@/lib/formats/write-csv';

/** Numbers behind a drawing as a file holds them: unrounded, unit in the name of the column. */
export interface DataTable {
  /** A word for the file's name: "posterior". */
  name: string;
  columns: string[];
  rows: (number | string | boolean | null)[][];
}

/** One file a table, since a CSV file holds one header; what is no number stays empty. */
export function dataCsv({ columns, rows }: DataTable): string {
  return writeCsv(
    columns.map((name, column) => ({
      name,
      values: rows.map((row) => {
        const cell = row[column];
        return typeof cell === 'number' && !Number.isFinite(cell) ? null : cell;
      }),
    })),
  );
}

/** Columns of equal length as a table. */
export function tableOfColumns(
  name: string,
  columns: Record<string, ArrayLike<number> | readonly (string | null)[]>,
): DataTable {
  const names = Object.keys(columns);
  const length = names.length === 0 ? 0 : columns[names[0]].length;
  return {
    name,
    columns: names,
    rows: Array.from({ length }, (_, row) => names.map((column) => columns[column][row])),
  };
}

/** Values over two axes as rows, the second axis fastest. */
export function tableOfField(
  name: string,
  [outerName, outer]: [string, ArrayLike<number>],
  [innerName, inner]: [string, ArrayLike<number>],
  [valueName, values]: [string, ArrayLike<number>],
): DataTable {
  return {
    name,
    columns: [outerName, innerName, valueName],
    rows: Array.from({ length: values.length }, (_, at) => [
      outer[Math.floor(at / inner.length)],
      inner[at % inner.length],
      values[at],
    ]),
  };
}
