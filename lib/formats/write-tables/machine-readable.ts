import { asciiProse, asciiText } from './ascii';
import {
  plainCell,
  rowCount,
  unitIn,
  type WrittenCell,
  type WrittenColumn,
  type WrittenTable,
} from './written-table';

const WIDTH = 80;

interface Layout {
  column: WrittenColumn;
  cells: string[];
  width: number;
  format: string;
  isMissing: boolean;
}

const decimalsOf = (text: string) => (text.split('.')[1] ?? '').length;

/** Numbers of one column, all with a power of ten or none, each in its shortest exact form. */
function numbersOf(values: readonly WrittenCell[]): { cells: string[]; format: string } {
  const numbers = values.map(plainCell) as (number | null)[];
  const hasPowers = numbers.some((value) => value !== null && String(value).includes('e'));
  const cells = numbers.map((value) => {
    if (value === null) return '';
    if (!Number.isFinite(value)) {
      throw new RangeError(`a number in a file must be finite, got ${value}`);
    }
    const sign = Object.is(value, -0) ? '-' : '';
    return (
      sign + (hasPowers ? value.toExponential().toUpperCase().replace('+', '') : String(value))
    );
  });
  const width = Math.max(1, ...cells.map((cell) => cell.length));
  const decimals = Math.max(0, ...cells.map((cell) => decimalsOf(cell.split('E')[0])));
  return { cells, format: `${hasPowers ? 'E' : 'F'}${width}.${decimals}` };
}

function layOut(column: WrittenColumn): Layout {
  const { type, values } = column;
  const isMissing = values.some((value) => plainCell(value) === null);
  if (type === 'number') {
    const { cells, format } = numbersOf(values);
    const width = Math.max(1, ...cells.map((cell) => cell.length));
    return { column, cells: cells.map((cell) => cell.padStart(width)), width, format, isMissing };
  }
  const texts = values.map((value) => {
    const plain = plainCell(value);
    if (plain === null) return '';
    return typeof plain === 'boolean' ? (plain ? 'True' : 'False') : asciiText(String(plain));
  });
  const width = Math.max(1, ...texts.map((text) => text.length));
  const isInteger = type === 'integer';
  return {
    column,
    cells: texts.map((text) => (isInteger ? text.padStart(width) : text.padEnd(width))),
    width,
    format: `${isInteger ? 'I' : 'A'}${width}`,
    isMissing,
  };
}

/** One line a column: bytes, format, unit, label, explanation. */
function describeColumns(layouts: readonly Layout[]): string[] {
  let start = 1;
  const rows = layouts.map(({ column, width, format, isMissing }) => {
    const bytes = `${String(start).padStart(5)}-${String(start + width - 1).padStart(5)}`;
    start += width + 1;
    const unit = unitIn(column, 'machineReadableTable') ?? '---';
    const explanation = `${isMissing ? '? ' : ''}${asciiProse(column.description)}`;
    return { bytes, format, unit, label: column.name, explanation };
  });
  const widest = (key: 'format' | 'unit' | 'label', head: string) =>
    Math.max(head.length, ...rows.map((row) => row[key].length));
  const [format, unit, label] = [
    widest('format', 'Format'),
    widest('unit', 'Units'),
    widest('label', 'Label'),
  ];
  const line = (cells: string[]) =>
    [cells[0].padStart(11), cells[1].padEnd(format), cells[2].padEnd(unit), cells[3].padEnd(label)]
      .concat(cells[4])
      .join(' ')
      .trimEnd();
  return [
    line(['Bytes', 'Format', 'Units', 'Label', 'Explanations']),
    '-'.repeat(WIDTH),
    ...rows.map((row) => line([row.bytes, row.format, row.unit, row.label, row.explanation])),
  ];
}

/**
 * A machine-readable table of the AAS journals: ASCII, its bytes described, blank where a cell is
 * missing. Numbers are not rounded.
 *
 * @param authors as the journal prints them; empty where there are none yet
 * @see https://journals.aas.org/mrt-standards/
 */
export function writeMachineReadableTable(table: WrittenTable, authors = ''): string {
  const length = rowCount(table);
  const layouts = table.columns.map(layOut);
  const rule = '-'.repeat(WIDTH);
  return [
    `Title: ${asciiProse(table.title)}`,
    `Authors: ${asciiProse(authors)}`.trimEnd(),
    `Table: ${asciiProse(table.title)}`,
    '='.repeat(WIDTH),
    `Byte-by-byte Description of file: ${asciiText(table.name)}.txt`,
    rule,
    ...describeColumns(layouts),
    rule,
    ...table.provenance.map(
      ([name, text], i) => `Note (${i + 1}): ${asciiProse(`${name}: ${text}`)}`,
    ),
    rule,
    // Lines keep their trailing blanks: some readers ask for the full width.
    ...Array.from({ length }, (_, row) => layouts.map(({ cells }) => cells[row]).join(' ')),
    '',
  ].join('\n');
}
