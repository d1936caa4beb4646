import { type FieldType, fieldBytes, readField } from './byte-reader';
import { dataOf, type Hdu, hduPlace, quoteForm, sidesOf, textOf } from './fits-hdu';
import { uploadLimits } from './limits';
import type { FaultReport } from './reports';
import type { RawCell, RawTable } from './table';

const types: Record<string, FieldType> = {
  L: 'boolean',
  B: 'uint8',
  I: 'int16',
  J: 'int32',
  K: 'int64',
  E: 'float32',
  D: 'float64',
};
const expectedForms = 'a FITS column format such as D, E, J, K, L or nA';

interface Field {
  name: string;
  unit: string | null;
  letter: string;
  repeat: number;
  offset: number;
  bytes: number;
  nullText: string | null;
  scale: number;
  zero: number;
}

function readFields(hdu: Hdu, view: DataView, rows: number, faults: FaultReport): Field[] | null {
  const { cards } = hdu;
  const count = Number(cards.get('TFIELDS') ?? 0);
  const forms = [...cards.keys()].filter((keyword) => /^TFORM\d+$/.test(keyword)).length;
  if (count !== forms) {
    faults.add({
      code: 'fits-header',
      ...hduPlace(hdu, 'TFIELDS'),
      found: `${count} fields and ${forms} TFORM cards`,
      expected: 'them to agree',
    });
    return null;
  }
  if (count > uploadLimits.tableColumns) {
    const found = `${count} columns`;
    faults.add({
      code: 'too-many',
      ...hduPlace(hdu),
      found,
      expected: `at most ${uploadLimits.tableColumns}`,
    });
    return null;
  }
  const fields: Field[] = [];
  let offset = 0;
  for (let i = 1; i <= count; i += 1) {
    const form = cards.get(`TFORM${i}`);
    const match = /^(\d*)([LXBIJKAEDCMPQ])(.*)$/.exec(String(form ?? '').trim());
    if (match === null) {
      const found = quoteForm(form);
      faults.add({
        code: 'fits-header',
        ...hduPlace(hdu, `TFORM${i}`),
        found,
        expected: expectedForms,
      });
      return null;
    }
    const letter = match[2];
    const repeat = match[1] === '' ? 1 : Number(match[1]);
    const bytes = widthOf(letter, repeat);
    const name = textOf(hdu, `TTYPE${i}`) ?? `column ${i}`;
    const field: Field = {
      name,
      unit: letter === 'A' ? null : textOf(hdu, `TUNIT${i}`),
      letter,
      repeat,
      offset,
      bytes,
      nullText: hdu.texts.get(`TNULL${i}`) ?? null,
      scale: Number(cards.get(`TSCAL${i}`) ?? 1),
      zero: Number(cards.get(`TZERO${i}`) ?? 0),
    };
    if ('PQCM'.includes(letter) && !refuseArrays(hdu, field, view, rows, faults)) return null;
    fields.push(field);
    offset += bytes;
  }
  const width = Number(cards.get('NAXIS1'));
  if (width !== offset) {
    faults.add({
      code: 'fits-header',
      ...hduPlace(hdu, 'NAXIS1'),
      found: `rows of ${width} bytes and columns of ${offset}`,
      expected: 'them to agree',
    });
    return null;
  }
  return fields;
}

function widthOf(letter: string, repeat: number): number {
  if (letter === 'X') return Math.ceil(repeat / 8);
  if (letter === 'A') return repeat;
  if (letter === 'P' || letter === 'C') return 8 * repeat;
  if (letter === 'Q' || letter === 'M') return 16 * repeat;
  return repeat * fieldBytes[types[letter]];
}

/** Arrays of changing length lie in a heap, which no column of ours needs; their pointers may lie. */
function refuseArrays(
  hdu: Hdu,
  field: Field,
  view: DataView,
  rows: number,
  faults: FaultReport,
): boolean {
  const width = Number(hdu.cards.get('NAXIS1'));
  const heap = view.byteLength - width * rows;
  const isPointer = field.letter === 'P' || field.letter === 'Q';
  for (let row = 0; isPointer && row < rows; row += 1) {
    const at = row * width + field.offset;
    if (at + field.bytes > view.byteLength) break;
    const start = field.letter === 'P' ? view.getUint32(at + 4) : Number(view.getBigUint64(at + 8));
    if (start <= heap) continue;
    faults.add({
      code: 'fits-heap',
      item: `HDU ${hdu.number}`,
      row: row + 1,
      column: field.name,
      message: `the array lies at byte ${start} of a heap of ${heap} bytes`,
    });
    return false;
  }
  faults.add({
    code: 'dtype-unsupported',
    ...hduPlace(hdu),
    column: field.name,
    found: isPointer ? 'arrays of changing length' : 'complex numbers',
    expected: 'one value a row',
  });
  return false;
}

/** Reads a binary table of a FITS file into a plain table. */
export function readFitsTable(
  bytes: Uint8Array,
  hdu: Hdu,
  maxRows: number,
  faults: FaultReport,
): RawTable | null {
  const sides = sidesOf(hdu, faults);
  const view = sides && dataOf(bytes, hdu, faults);
  if (!sides || !view) return null;
  const [width, rows] = sides;
  if (rows > maxRows) {
    faults.add({
      code: 'too-many',
      ...hduPlace(hdu),
      found: `${rows} rows`,
      expected: `at most ${maxRows} in one file`,
    });
    return null;
  }
  const fields = readFields(hdu, view, rows, faults);
  if (fields === null) return null;
  const place = { item: `HDU ${hdu.number}` };
  return {
    columns: fields.map((field) => ({
      heading: field.name,
      unit: field.unit,
      cells: Array.from({ length: rows }, (_, row) =>
        readCell(view, row * width + field.offset, field),
      ),
    })),
    rowCount: rows,
    headingPlace: place,
    rowPlace: (row) => ({ ...place, row: row + 1 }),
  };
}

function readCell(view: DataView, at: number, field: Field): RawCell {
  const { letter, repeat } = field;
  if (letter === 'A') {
    const part = new Uint8Array(view.buffer, view.byteOffset + at, repeat);
    return Buffer.from(part).toString('latin1').replace(/\0.*$/s, '').trimEnd();
  }
  if (letter === 'X' || repeat === 0) return null;
  if (repeat > 1) {
    const step = field.bytes / repeat;
    return Array.from({ length: repeat }, (_, i) => readOne(view, at + i * step, field)).join(' ');
  }
  return readOne(view, at, field);
}

function readOne(view: DataView, at: number, field: Field): RawCell {
  const value = readField(view, at, types[field.letter]);
  if (typeof value === 'boolean' || value === null) return value;
  if (typeof value === 'number' && Number.isNaN(value)) return null;
  const isWhole = 'BIJK'.includes(field.letter);
  if (isWhole && field.nullText !== null && String(value) === field.nullText) return null;
  if (field.scale === 1 && field.zero === 0) return value;
  return Number(value) * field.scale + field.zero;
}
