import { addFormulaGuard } from './formula-guard';

export type CsvCell = string | number | boolean | null;

export interface CsvColumn {
  name: string;
  values: readonly CsvCell[];
}

/** Free text: the one column whose cells may start like a spreadsheet formula. */
const freeText = 'notes';

/** The shortest decimal that reads back to the same bits, the sign of zero included. */
export function numberText(value: number): string {
  if (Number.isNaN(value)) return '';
  if (!Number.isFinite(value))
    throw new RangeError(`a number in a file must be finite, got ${value}`);
  return Object.is(value, -0) ? '-0' : String(value);
}

function cellText(value: CsvCell, isGuarded: boolean): string {
  if (value === null) return '';
  if (typeof value === 'number') return numberText(value);
  if (typeof value === 'boolean') return String(value);
  return isGuarded ? addFormulaGuard(value) : value;
}

function quoted(text: string): string {
  return /[",\r\n#]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/**
 * Writes columns as CSV: RFC 4180 with LF, one header line, no comments, missing cells empty.
 *
 * Cells that hold # are quoted, since a reader that takes # as a comment would cut the line there.
 * In a column named notes, text that a spreadsheet would run gets a leading '.
 *
 * @param options.guardsFormulas false for text that no spreadsheet opens
 * @throws RangeError for columns of unequal length and for infinite numbers
 * @example writeCsv([{ name: 'name', values: ['RB 1'] }, { name: 'age', values: [120] }]) // 'name,age\nRB 1,120\n'
 */
export function writeCsv(
  columns: readonly CsvColumn[],
  { guardsFormulas = true }: { guardsFormulas?: boolean } = {},
): string {
  const length = columns[0]?.values.length ?? 0;
  const uneven = columns.find(({ values }) => values.length !== length);
  if (uneven !== undefined) {
    throw new RangeError(
      `column ${uneven.name} must have ${length} values, got ${uneven.values.length}`,
    );
  }
  const isAlone = columns.length === 1;
  const lines = [columns.map(({ name }) => quoted(name)).join(',')];
  for (let row = 0; row < length; row += 1) {
    const cells = columns.map(({ name, values }) =>
      quoted(cellText(values[row], guardsFormulas && name === freeText)),
    );
    // A line with nothing on it would be skipped as empty.
    lines.push(isAlone && cells[0] === '' ? '""' : cells.join(','));
  }
  return `${lines.join('\n')}\n`;
}
