import { uploadLimits } from './limits';
import { type FaultReport, quoteFound } from './reports';
import type { Place } from './table';

const block = 2880;
const card = 80;

/** One header and data unit of a FITS file. */
export interface Hdu {
  /** From 1. */
  number: number;
  cards: Map<string, string | number | boolean>;
  /** The texts of integers, which numbers would round. */
  texts: Map<string, string>;
  name: string;
  kind: 'image' | 'table' | 'other';
  dataStart: number;
  dataBytes: number;
}

export const hduPlace = ({ number }: Hdu, keyword?: string): Place => ({
  item: keyword ? `HDU ${number}, ${keyword}` : `HDU ${number}`,
});

/** Header keywords with their values; comments and continuations are no use to us. */
function readCards(
  bytes: Uint8Array,
  start: number,
  number: number,
  faults: FaultReport,
): (Pick<Hdu, 'cards' | 'texts'> & { end: number }) | null {
  const cards: Hdu['cards'] = new Map();
  const texts = new Map<string, string>();
  for (let i = 0; i < uploadLimits.fitsCardsPerHdu; i += 1) {
    const at = start + i * card;
    if (at + card > bytes.length) {
      const message = `the header of HDU ${number} has no END: the file is cut short`;
      faults.add({ code: 'truncated', message });
      return null;
    }
    const text = Buffer.from(bytes.subarray(at, at + card)).toString('latin1');
    const keyword = text.slice(0, 8).trimEnd();
    if (keyword === 'END') {
      const end = start + Math.ceil(((i + 1) * card) / block) * block;
      return { cards, texts, end };
    }
    if (text.slice(8, 10) !== '= ') continue;
    const value = readValue(text.slice(10));
    if (value === null) continue;
    cards.set(keyword, value.value);
    texts.set(keyword, value.text);
  }
  const most = uploadLimits.fitsCardsPerHdu;
  faults.add({
    code: 'too-many',
    item: `HDU ${number}`,
    found: `more than ${most} cards`,
    expected: `at most ${most}`,
  });
  return null;
}

function readValue(field: string): { value: string | number | boolean; text: string } | null {
  const quoted = /^\s*'((?:[^']|'')*)'/.exec(field);
  if (quoted) {
    const text = quoted[1].replace(/''/g, "'").trimEnd();
    return { value: text, text };
  }
  const text = field.split('/')[0].trim();
  if (text === 'T' || text === 'F') return { value: text === 'T', text };
  const value = Number(text.replace(/[dD]/, 'E'));
  return text === '' || Number.isNaN(value) ? null : { value, text };
}

const bitpixes = [8, 16, 32, 64, -32, -64];

/** Sides of the data array, the fastest first; the fault goes to `faults`. */
export function sidesOf(hdu: Pick<Hdu, 'cards' | 'number'>, faults: FaultReport): number[] | null {
  const refuse = (keyword: string, found: unknown, expected: string) => {
    const item = `HDU ${hdu.number}, ${keyword}`;
    faults.add({ code: 'fits-header', item, found: String(found ?? 'nothing'), expected });
    return null;
  };
  const bitpix = hdu.cards.get('BITPIX');
  if (!bitpixes.includes(bitpix as number)) {
    return refuse('BITPIX', bitpix, '8, 16, 32, 64, -32 or -64');
  }
  const naxis = hdu.cards.get('NAXIS');
  if (typeof naxis !== 'number' || !Number.isInteger(naxis) || naxis < 0 || naxis > 999) {
    return refuse('NAXIS', naxis, '0 to 999');
  }
  const sides: number[] = [];
  for (let i = 1; i <= naxis; i += 1) {
    const side = hdu.cards.get(`NAXIS${i}`);
    if (typeof side !== 'number' || !Number.isInteger(side) || side < 0) {
      return refuse(`NAXIS${i}`, side, '0 or more');
    }
    sides.push(side);
  }
  return sides;
}

function kindOf(cards: Hdu['cards'], sides: number[]): Hdu['kind'] {
  const extension = cards.get('XTENSION');
  if (extension === 'BINTABLE') return 'table';
  if (extension === undefined || extension === 'IMAGE') return sides.length > 0 ? 'image' : 'other';
  return 'other';
}

/** Walks the header and data units of a FITS file; null where it cannot be followed. */
export function readHdus(bytes: Uint8Array, faults: FaultReport): Hdu[] | null {
  const hdus: Hdu[] = [];
  let at = 0;
  while (at < bytes.length && bytes.length - at >= card) {
    const number = hdus.length + 1;
    // Some writers pad the end of a file beyond its last block.
    if (number > 1 && bytes.subarray(at, at + 8).every((byte) => byte === 0 || byte === 32)) break;
    if (number > uploadLimits.fitsHdus) {
      const expected = `at most ${uploadLimits.fitsHdus}`;
      faults.add({ code: 'too-many', found: `more than ${uploadLimits.fitsHdus} HDUs`, expected });
      return null;
    }
    const header = readCards(bytes, at, number, faults);
    if (header === null) return null;
    const sides = sidesOf({ ...header, number }, faults);
    if (sides === null) return null;
    const { cards } = header;
    const width = Math.abs(cards.get('BITPIX') as number) / 8;
    const elements = sides.length === 0 ? 0 : sides.reduce((product, side) => product * side, 1);
    const groups = Number(cards.get('GCOUNT') ?? 1);
    const dataBytes = width * groups * (elements + Number(cards.get('PCOUNT') ?? 0));
    const name = String(cards.get('EXTNAME') ?? '')
      .trim()
      .toUpperCase();
    const kind = kindOf(cards, sides);
    if (cards.get('ZIMAGE') === true) {
      faults.add({
        code: 'container-unsupported',
        item: `HDU ${number}`,
        found: 'a tile-compressed image (.fz)',
        expected: 'the image as such',
      });
      return null;
    }
    hdus.push({ number, ...header, name, kind, dataStart: header.end, dataBytes });
    at = header.end + Math.ceil(dataBytes / block) * block;
  }
  return hdus;
}

/** The bytes of a unit's data; null, with the fault, where the file ends before they do. */
export function dataOf(bytes: Uint8Array, hdu: Hdu, faults: FaultReport): DataView | null {
  const there = Math.max(0, bytes.length - hdu.dataStart);
  if (hdu.dataBytes > there) {
    const message = `the header of HDU ${hdu.number} promises ${hdu.dataBytes} bytes of data; found ${there}`;
    faults.add({ code: 'truncated', message });
    return null;
  }
  return new DataView(bytes.buffer, bytes.byteOffset + hdu.dataStart, hdu.dataBytes);
}

/** A keyword's text, or null. */
export function textOf({ cards }: Hdu, keyword: string): string | null {
  const value = cards.get(keyword);
  return typeof value === 'string' && value.trim() !== '' ? value.trim() : null;
}

export const quoteForm = (value: unknown) => quoteFound(String(value ?? ''));
