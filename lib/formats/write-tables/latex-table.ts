import { formatSignificant } from '@/lib/quantities/display';
import { type LatexCell, type LatexStyle, latexMeasurement, writeLatexTable } from '../latex';
import { plainCell, rowCount, unitIn, type WrittenTable } from './written-table';

interface LatexChoice {
  /** Columns of a paper's table, in order; those that the table does not have are left out. */
  columns: readonly string[];
  /** Heads that are not the column's name with spaces. */
  headings?: Readonly<Record<string, string>>;
  label: string;
}

/** Digits of a number that has no error beside it. */
const LONE_DIGITS = 4;

const asNumber = (cell: unknown): number | null => (typeof cell === 'number' ? cell : null);

function numberCell(value: number, plus: number | null, minus: number | null): LatexCell {
  if (plus !== null && minus !== null && plus > 0 && minus > 0) {
    return latexMeasurement(value, plus, minus);
  }
  if (Number.isInteger(value) && Math.abs(value) < 1e6) return value;
  return Number(formatSignificant(value, LONE_DIGITS).replace('−', '-'));
}

/**
 * A table for a paper: the chosen columns, errors beside their values with two figures of the
 * smaller one, other numbers to four digits, which a note says.
 */
export function writeLatex(table: WrittenTable, choice: LatexChoice, style: LatexStyle): string {
  const columnOf = new Map(table.columns.map((column) => [column.name, column]));
  const chosen = choice.columns.flatMap((name) => columnOf.get(name) ?? []);
  const errorOf = (name: string, row: number, side: 'lower' | 'upper') => {
    const both = asNumber(plainCell(columnOf.get(`${name}_error`)?.values[row]));
    return both ?? asNumber(plainCell(columnOf.get(`${name}_error_${side}`)?.values[row]));
  };
  const rows = Array.from({ length: rowCount(table) }, (_, row) =>
    chosen.map(({ name, values, type }): LatexCell => {
      const cell = plainCell(values[row]);
      if (typeof cell === 'boolean') return cell ? 'yes' : 'no';
      if (typeof cell !== 'number') return cell;
      if (type === 'integer') return cell;
      return numberCell(cell, errorOf(name, row, 'upper'), errorOf(name, row, 'lower'));
    }),
  );
  return writeLatexTable(
    {
      caption: table.title,
      label: choice.label,
      columns: chosen.map((column) => ({
        heading: choice.headings?.[column.name] ?? headingOf(column.name),
        ...(unitIn(column, 'ecsv') !== null && { unit: unitIn(column, 'ecsv') as string }),
        align: column.type === 'number' || column.type === 'integer' ? 'r' : 'l',
      })),
      rows,
      notes: [
        ...table.provenance.filter(isForPaper).map(([name, text]) => noteOf(name, text)),
        'Digits follow the smaller error with two figures of it; numbers without an error are rounded to four digits.',
      ],
    },
    style,
  );
}

/** Fingerprints of what went in, and the seed, are in the other files: a note is read by people. */
const isForPaper = ([name]: readonly [string, string]) =>
  name !== 'seed' && (name === 'result_digest' || !name.endsWith('_digest'));

/** A condition names itself. */
const noteOf = (name: string, text: string) =>
  name.startsWith('condition_') ? `${text}.` : `${headingOf(name)}: ${text}.`;

function headingOf(name: string): string {
  const words = name.replaceAll('_', ' ');
  return words[0].toUpperCase() + words.slice(1);
}
