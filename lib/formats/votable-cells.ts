import { type FieldType, fieldBytes, readField } from './byte-reader';
import { type FaultReport, quoteFound } from './reports';
import type { RawCell } from './table';

/** One FIELD: its datatype decides how a cell is read. */
export interface VotableField {
  name: string;
  unit: string | null;
  datatype: string;
  /** Fixed length, Infinity for "*", null for a single value. */
  length: number | null;
  nullText: string | null;
}

const numericTypes: Record<string, FieldType> = {
  boolean: 'boolean',
  unsignedByte: 'uint8',
  short: 'int16',
  int: 'int32',
  long: 'int64',
  float: 'float32',
  double: 'float64',
};
export const VOTABLE_DATATYPES =
  'boolean, unsignedByte, short, int, long, char, unicodeChar, float or double';

const isText = (datatype: string) => datatype === 'char' || datatype === 'unicodeChar';
export const isKnownDatatype = (datatype: string) => datatype in numericTypes || isText(datatype);

export function fieldOf(attributes: Record<string, string>, position: number): VotableField {
  const { arraysize, unit, datatype = '' } = attributes;
  const length =
    arraysize === undefined || arraysize === '1'
      ? null
      : arraysize.endsWith('*')
        ? Number.POSITIVE_INFINITY
        : Number(arraysize);
  return {
    name: attributes.name ?? attributes.ID ?? `column ${position}`,
    unit: unit && !isText(datatype) ? unit : null,
    datatype,
    length,
    nullText: null,
  };
}

/** A cell of TABLEDATA: text stays text, so that identifiers keep every digit. */
export function readTextCell(text: string, field: VotableField): RawCell {
  const trimmed = text.trim();
  if (isText(field.datatype)) return text;
  if (trimmed === '' || trimmed === field.nullText || /^nan$/i.test(trimmed)) return null;
  if (field.datatype === 'boolean') {
    if (trimmed === '?') return null;
    return /^(t|true|1)$/i.test(trimmed) ? true : /^(f|false|0)$/i.test(trimmed) ? false : text;
  }
  return text;
}

interface Rows {
  /** BINARY2: each row begins with one bit a field that says that it is missing. */
  hasNullFlags: boolean;
  maxRows: number;
  line: number;
  faults: FaultReport;
}

/** Rows of a base64 stream; null where they cannot be read. */
export function readBinaryRows(
  base64: string,
  fields: VotableField[],
  { hasNullFlags, maxRows, line, faults }: Rows,
): RawCell[][] | null {
  const compact = base64.replace(/\s+/g, '');
  const odd = /[^A-Za-z0-9+/=]/.exec(compact);
  if (odd) {
    faults.add({ code: 'base64-invalid', line, found: `${quoteFound(odd[0])} in base64 data` });
    return null;
  }
  const bytes = Buffer.from(compact, 'base64');
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const flagBytes = hasNullFlags ? Math.ceil(fields.length / 8) : 0;
  const rows: RawCell[][] = [];
  let at = 0;
  try {
    while (at < bytes.length) {
      if (rows.length === maxRows) {
        faults.add({
          code: 'too-many',
          found: `more than ${maxRows} rows`,
          expected: `at most ${maxRows} in one file`,
        });
        return null;
      }
      const flags = bytes.subarray(at, at + flagBytes);
      at += flagBytes;
      const cells: RawCell[] = [];
      fields.forEach((field, i) => {
        const [cell, next] = readCell(view, at, field);
        at = next;
        const isMissing = flagBytes > 0 && (flags[i >> 3] & (0x80 >> (i & 7))) !== 0;
        cells.push(isMissing ? null : cell);
      });
      rows.push(cells);
    }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    faults.add({
      code: 'truncated',
      line,
      row: rows.length + 1,
      message: `the data end inside row ${rows.length + 1}`,
    });
    return null;
  }
  return rows;
}

/** One value and the place after it; arrays of numbers are no cells of ours and read as text. */
function readCell(view: DataView, start: number, field: VotableField): [RawCell, number] {
  let at = start;
  let count = field.length ?? 1;
  if (count === Number.POSITIVE_INFINITY) {
    count = view.getUint32(at);
    at += 4;
  }
  if (field.datatype === 'char' || field.datatype === 'unicodeChar') {
    const width = field.datatype === 'char' ? 1 : 2;
    const end = at + count * width;
    if (end > view.byteLength) throw new RangeError('beyond the data');
    return [readText(view, at, count, width), end];
  }
  const type = numericTypes[field.datatype];
  const values: RawCell[] = [];
  for (let i = 0; i < count; i += 1) {
    values.push(readField(view, at, type));
    at += fieldBytes[type];
  }
  const [value] = values;
  if (values.length !== 1) return [values.join(' '), at];
  if (typeof value === 'number' && Number.isNaN(value)) return [null, at];
  if (field.nullText !== null && String(value) === field.nullText) return [null, at];
  return [value, at];
}

function readText(view: DataView, at: number, count: number, width: 1 | 2): string {
  const bytes = new Uint8Array(view.buffer, view.byteOffset + at, count * width);
  if (width === 1) return new TextDecoder('utf-8').decode(bytes).replace(/\0.*$/s, '');
  const units = Array.from({ length: count }, (_, i) => view.getUint16(at + 2 * i));
  return String.fromCharCode(...units).replace(/\0.*$/s, '');
}
