import { type FaultReport, quoteFound } from './reports';
import type { Place } from './table';

/** A NumPy array in C order. */
export interface NpyArray {
  shape: number[];
  /** Numbers, or texts of a text array. */
  numbers: Float64Array | null;
  texts: string[] | null;
}

const numbersExpected = 'f4, f8, or integers with a scale';
const header =
  /^\{\s*(?:'(?:descr|fortran_order|shape)'\s*:\s*(?:'[^'\\]*'|True|False|\([\d,\sL]*\))\s*,?\s*){3}\}\s*$/;

interface Header {
  descr: string;
  isFortran: boolean;
  shape: number[];
}

/** The header by its small grammar: it is matched, never run. */
function parseHeader(text: string, place: Place, faults: FaultReport): Header | null {
  const descr = /'descr'\s*:\s*'([^'\\]*)'/.exec(text)?.[1];
  const order = /'fortran_order'\s*:\s*(True|False)/.exec(text)?.[1];
  const shape = /'shape'\s*:\s*\(([\d,\sL]*)\)/.exec(text)?.[1];
  if (header.test(text) && descr !== undefined && order && shape !== undefined) {
    const sides = shape
      .split(',')
      .flatMap((side) => (/\d/.test(side) ? [Number.parseInt(side, 10)] : []));
    return { descr, isFortran: order === 'True', shape: sides };
  }
  const written = /'shape'\s*:\s*(.+?)\s*,?\s*\}/.exec(text)?.[1] ?? text.trim();
  const isStructured = /'descr'\s*:\s*\[/.test(text);
  faults.add(
    isStructured
      ? {
          ...place,
          code: 'dtype-unsupported',
          found: 'rows of several fields',
          expected: numbersExpected,
        }
      : {
          ...place,
          code: 'npy-header',
          found: quoteFound(written),
          expected: 'a shape such as (8, 10)',
          hint: 'Headers are read, never run',
        },
  );
  return null;
}

type Getter = (view: DataView, at: number, little: boolean) => number;
const getters: Record<string, [bytes: number, get: Getter]> = {
  f4: [4, (view, at, little) => view.getFloat32(at, little)],
  f8: [8, (view, at, little) => view.getFloat64(at, little)],
  i1: [1, (view, at) => view.getInt8(at)],
  i2: [2, (view, at, little) => view.getInt16(at, little)],
  i4: [4, (view, at, little) => view.getInt32(at, little)],
  i8: [8, (view, at, little) => Number(view.getBigInt64(at, little))],
  u1: [1, (view, at) => view.getUint8(at)],
  u2: [2, (view, at, little) => view.getUint16(at, little)],
  u4: [4, (view, at, little) => view.getUint32(at, little)],
  u8: [8, (view, at, little) => Number(view.getBigUint64(at, little))],
  b1: [1, (view, at) => view.getUint8(at)],
};

const namesOfTypes: Record<string, string> = { c: 'complex numbers', U: 'text', S: 'text' };

/**
 * Reads a NumPy array (.npy, versions 1 to 3) of numbers or fixed-width text, C or Fortran order.
 *
 * @param wanted what the caller can use; the other is refused by name
 */
export function parseNpy(
  bytes: Uint8Array,
  wanted: 'numbers' | 'texts',
  faults: FaultReport,
  place: Place = {},
): NpyArray | null {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const magic = Buffer.from(bytes.subarray(0, 6)).toString('latin1');
  if (magic !== '\x93NUMPY') {
    const found = quoteFound(magic.replace(/^\x93/, ''));
    const where = place.item ? place : { item: 'byte 1' };
    faults.add({ ...where, code: 'format-mismatch', found, expected: '\\x93NUMPY' });
    return null;
  }
  const where = place.item ? place : { item: 'header' };
  const isLong = bytes[6] > 1;
  const start = isLong ? 12 : 10;
  const length =
    bytes.length < start ? -1 : isLong ? view.getUint32(8, true) : view.getUint16(8, true);
  if (length < 0 || start + length > bytes.length) {
    faults.add({ ...place, code: 'truncated', message: 'the file ends inside its header' });
    return null;
  }
  const text = new TextDecoder(bytes[6] > 2 ? 'utf-8' : 'latin1').decode(
    bytes.subarray(start, start + length),
  );
  const isObject = /'descr'\s*:\s*'[|<>=]?O/.test(text) || /'\|?O\d?'/.test(text);
  if (isObject) {
    faults.add({
      ...where,
      code: 'npy-pickle',
      found: 'Python objects (pickle), which are never opened',
      expected: 'numbers',
    });
    return null;
  }
  const parsed = parseHeader(text, where, faults);
  if (parsed === null) return null;
  const kind = parsed.descr.replace(/^[<>|=]/, '');
  const texts = /^([US])(\d+)$/.exec(kind);
  const isFitting = wanted === 'texts' ? texts !== null : kind in getters;
  if (!isFitting) {
    const found = namesOfTypes[kind[0]] ?? 'numbers';
    faults.add({
      ...where,
      code: 'dtype-unsupported',
      found: `${found} (${kind})`,
      expected: wanted === 'texts' ? 'text' : kind[0] === 'c' ? numbersExpected : 'numbers',
    });
    return null;
  }
  const size = texts ? Number(texts[2]) * (texts[1] === 'U' ? 4 : 1) : getters[kind][0];
  const count = parsed.shape.reduce((product, side) => product * side, 1);
  const there = bytes.length - start - length;
  if (count * size > there) {
    // A wrong shape is a matter of the header; a file cut short is a matter of the file.
    const isShape = count * size > 2 * there;
    faults.add({
      ...(isShape || place.item ? where : {}),
      code: 'truncated',
      message: `the header promises ${count * size} bytes of data; found ${there}`,
    });
    return null;
  }
  const data = new DataView(bytes.buffer, bytes.byteOffset + start + length, count * size);
  const isLittle = !parsed.descr.startsWith('>');
  const { shape } = parsed;
  if (texts) {
    return { shape, numbers: null, texts: readTexts(data, count, size, texts[1], isLittle) };
  }
  const get = getters[kind][1];
  const raw = Float64Array.from({ length: count }, (_, i) => get(data, i * size, isLittle));
  return { shape, numbers: parsed.isFortran ? toRowMajor(raw, shape) : raw, texts: null };
}

function readTexts(
  data: DataView,
  count: number,
  size: number,
  letter: string,
  isLittle: boolean,
): string[] {
  return Array.from({ length: count }, (_, i) => {
    if (letter === 'S') {
      const part = new Uint8Array(data.buffer, data.byteOffset + i * size, size);
      return new TextDecoder('utf-8').decode(part).replace(/\0+$/, '');
    }
    let text = '';
    for (let at = i * size; at < (i + 1) * size; at += 4) {
      const code = data.getUint32(at, isLittle);
      if (code > 0x10ffff) return '\ufffd';
      text += code === 0 ? '\0' : String.fromCodePoint(code);
    }
    return text.replace(/\0+$/, '');
  });
}

/** Fortran order runs down the first axis fastest. */
function toRowMajor(raw: Float64Array, shape: number[]): Float64Array {
  const ordered = new Float64Array(raw.length);
  const index = new Array<number>(shape.length).fill(0);
  for (let to = 0; to < raw.length; to += 1) {
    let from = 0;
    for (let axis = shape.length - 1; axis >= 0; axis -= 1) from = from * shape[axis] + index[axis];
    ordered[to] = raw[from];
    for (let axis = shape.length - 1; axis >= 0; axis -= 1) {
      index[axis] += 1;
      if (index[axis] < shape[axis]) break;
      index[axis] = 0;
    }
  }
  return ordered;
}
