import { asciiText } from '../write-tables/ascii';
import {
  areWholeNumbers,
  MISSING_INTEGER,
  plainCell,
  rowCount,
  unitIn,
  type WrittenCell,
  type WrittenColumn,
  type WrittenTable,
} from '../write-tables/written-table';
import { type Card, FitsSum, fitsPadding, headerWithSums, primaryUnit } from './blocks';

interface Field {
  column: WrittenColumn;
  form: string;
  width: number;
  isWhole: boolean;
  write(view: DataView, at: number, cell: WrittenCell): void;
}

const writeDouble = (view: DataView, at: number, cell: WrittenCell) => {
  const value = cell === null ? Number.NaN : Number(cell);
  if (Math.abs(value) === Number.POSITIVE_INFINITY) {
    throw new RangeError(`a number in a file must be finite, got ${value}`);
  }
  view.setFloat64(at, value);
};
const writeLong = (view: DataView, at: number, cell: WrittenCell) =>
  view.setBigInt64(at, BigInt(cell === null ? MISSING_INTEGER : String(cell)));
const writeLogical = (view: DataView, at: number, cell: WrittenCell) =>
  view.setUint8(at, (cell ? 'T' : 'F').charCodeAt(0));

/** A logical column has no mark for "missing" that clients agree on, so that one with gaps is text. */
function fieldOf(column: WrittenColumn): Field {
  const { type, values } = column;
  if (type === 'number') return { column, form: 'D', width: 8, isWhole: false, write: writeDouble };
  if (type === 'integer' || (type === 'identifier' && areWholeNumbers(values))) {
    return { column, form: 'K', width: 8, isWhole: true, write: writeLong };
  }
  if (type === 'boolean' && values.every((value) => value !== null)) {
    return { column, form: 'L', width: 1, isWhole: false, write: writeLogical };
  }
  const textOf = (cell: WrittenCell) => {
    if (cell === null) return '';
    return typeof cell === 'boolean' ? (cell ? 'True' : 'False') : asciiText(String(cell));
  };
  const width = Math.max(1, ...values.map((value) => textOf(plainCell(value)).length));
  return {
    column,
    form: `${width}A`,
    width,
    isWhole: false,
    write: (view, at, cell) => {
      Buffer.from(view.buffer, view.byteOffset + at, width)
        .fill(32)
        .write(textOf(cell), 'latin1');
    },
  };
}

/** One binary table as an extension, ready to follow another unit. */
export function tableUnit(
  name: string,
  columns: readonly WrittenColumn[],
  comments: readonly string[] = [],
): Buffer {
  const length = rowCount({ columns });
  const fields = columns.map(fieldOf);
  const width = fields.reduce((sum, field) => sum + field.width, 0);
  const data = Buffer.alloc(length * width);
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength);
  let offset = 0;
  for (const field of fields) {
    for (let row = 0; row < length; row += 1) {
      field.write(view, row * width + offset, plainCell(field.column.values[row]));
    }
    offset += field.width;
  }
  const cards: Card[] = [
    { keyword: 'XTENSION', value: 'BINTABLE', comment: 'binary table' },
    { keyword: 'BITPIX', value: 8 },
    { keyword: 'NAXIS', value: 2 },
    { keyword: 'NAXIS1', value: width, comment: 'bytes of a row' },
    { keyword: 'NAXIS2', value: length, comment: 'rows' },
    { keyword: 'PCOUNT', value: 0 },
    { keyword: 'GCOUNT', value: 1 },
    { keyword: 'TFIELDS', value: fields.length },
    { keyword: 'EXTNAME', value: name },
    ...fields.flatMap(fieldCards),
    ...comments.map((comment) => ({ comment })),
  ];
  const sum = new FitsSum().add(data).value;
  return Buffer.concat([headerWithSums(cards, sum), data, fitsPadding(data.length)]);
}

function fieldCards({ column, form, isWhole }: Field, i: number): Card[] {
  const unit = form.endsWith('A') ? null : unitIn(column, 'fits');
  const number = i + 1;
  return [
    { keyword: `TTYPE${number}`, value: column.name },
    { keyword: `TFORM${number}`, value: form },
    ...(unit === null ? [] : [{ keyword: `TUNIT${number}`, value: unit }]),
    ...(isWhole ? [{ keyword: `TNULL${number}`, value: BigInt(MISSING_INTEGER) }] : []),
    ...(column.ucd === undefined ? [] : [{ keyword: `TUCD${number}`, value: column.ucd }]),
  ];
}

/**
 * A table as FITS: an empty first unit with where it comes from, then one binary table, each unit
 * with its checksums. Texts are ASCII; a mass of Jupiter is no unit of FITS and stated as text.
 */
export function writeFitsTable(table: WrittenTable): Buffer {
  const hasJupiter = table.columns.some((column) => unitIn(column, 'fits') === 'Mjup');
  const comments = [
    ...table.columns.map(({ name, description }) => `${name}: ${description}`),
    ...(hasJupiter ? ['Mjup is the mass of Jupiter, GM = 1.2668653e17 m3 s-2 (IAU 2015 B3).'] : []),
  ];
  return Buffer.concat([
    primaryUnit([table.title, ...table.provenance.map(([name, text]) => `${name}: ${text}`)]),
    tableUnit(table.name.toUpperCase(), table.columns, comments),
  ]);
}
