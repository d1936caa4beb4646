import { UNIT_KINDS, type UnitKind, type WrittenUnit } from '@/lib/quantities/unit-table';

export type WrittenCell = string | number | boolean | null;

/**
 * How a column's cells are kept: an identifier is a number of up to 19 digits, which stays text here
 * and becomes a 64-bit integer where a container has one.
 */
export type WrittenType = 'text' | 'number' | 'integer' | 'identifier' | 'boolean';

/** What a column means, told once for every container. */
export interface ColumnDefinition {
  name: string;
  type: WrittenType;
  description: string;
  /** What it measures; its unit in each container follows. */
  measures?: UnitKind | 'Julian year';
  /** Unified content descriptor of the IVOA. */
  ucd?: string;
}

export interface WrittenColumn extends ColumnDefinition {
  values: readonly WrittenCell[];
}

/** A table with all that its files say beside the numbers. */
export interface WrittenTable {
  /** One word, such as `limits`: the stem of the file's name. */
  name: string;
  /** One line for people. */
  title: string;
  columns: readonly WrittenColumn[];
  /** Where it comes from and what it rests on, in order; plain text. */
  provenance: readonly (readonly [name: string, text: string])[];
}

const inYears: WrittenUnit = {
  ecsv: 'yr',
  votable: 'yr',
  machineReadableTable: 'yr',
  fits: 'yr',
  hdf5: 'yr',
};

/** The unit of a column as a container spells it, or null where it has none. */
export function unitIn(column: ColumnDefinition, container: keyof WrittenUnit): string | null {
  const { measures } = column;
  if (measures === undefined) return null;
  const written: WrittenUnit = measures === 'Julian year' ? inYears : UNIT_KINDS[measures].written;
  return written[container];
}

/** How many rows a table has. @throws RangeError for columns of unequal length */
export function rowCount({ columns }: Pick<WrittenTable, 'columns'>): number {
  const length = columns[0]?.values.length ?? 0;
  const uneven = columns.find(({ values }) => values.length !== length);
  if (uneven !== undefined) {
    throw new RangeError(
      `column ${uneven.name} must have ${length} values, got ${uneven.values.length}`,
    );
  }
  return length;
}

/** A cell with one word for "missing": NaN and empty text are null too. */
export function plainCell(cell: WrittenCell | undefined): WrittenCell {
  if (cell === undefined || cell === '') return null;
  return typeof cell === 'number' && Number.isNaN(cell) ? null : cell;
}

/** Integers that 64 bits hold, this one kept for "missing". */
export const MISSING_INTEGER = '-9223372036854775808';

/** Whether every identifier of a column reads back alike from a 64-bit integer. */
export function areWholeNumbers(values: readonly WrittenCell[]): boolean {
  return values.every((value) => {
    if (value === null || value === '') return true;
    const text = String(value);
    return /^(0|[1-9]\d{0,18})$/.test(text) && BigInt(text) < 2n ** 63n;
  });
}

/**
 * Rows as a table: the columns of a list of definitions, in its order.
 *
 * @param rows one object a row, keyed by column name; what is absent is missing
 * @param dropEmpty leaves out columns that no row fills, apart from the names given here
 */
export function tableOfRows(
  head: Omit<WrittenTable, 'columns'>,
  definitions: readonly ColumnDefinition[],
  rows: readonly Readonly<Record<string, WrittenCell | undefined>>[],
  { dropEmpty }: { dropEmpty?: readonly string[] } = {},
): WrittenTable {
  const columns = definitions
    .map((definition) => ({
      ...definition,
      values: rows.map((row) => plainCell(row[definition.name])),
    }))
    .filter(
      ({ name, values }) =>
        dropEmpty === undefined ||
        dropEmpty.includes(name) ||
        values.some((value) => value !== null),
    );
  return { ...head, columns };
}
