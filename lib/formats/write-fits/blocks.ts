import { asciiProse, asciiText } from '../write-tables/ascii';

export const FITS_BLOCK = 2880;
const CARD = 80;
/** Most characters of a text in one card. */
const TEXT_MAX = 68;

/** One line of a header: a value, or a sentence under COMMENT. */
export type Card =
  | { keyword: string; value: string | number | boolean | bigint; comment?: string }
  | { comment: string };

function valueText(value: string | number | boolean | bigint): string {
  if (typeof value === 'string') {
    const text = asciiText(value).slice(0, TEXT_MAX).replaceAll("'", "''");
    return `'${text.padEnd(8)}'`.slice(0, CARD - 10).padEnd(20);
  }
  if (typeof value === 'boolean') return (value ? 'T' : 'F').padStart(20);
  const text = String(value).toUpperCase();
  return text.padStart(20);
}

/** Sentences as lines of 70, broken at spaces where there are some. */
function wrapped(text: string, width = CARD - 10): string[] {
  const lines: string[] = [];
  let rest = asciiProse(text).trim();
  while (rest.length > width) {
    const space = rest.lastIndexOf(' ', width);
    const end = space > 0 ? space : width;
    lines.push(rest.slice(0, end));
    rest = rest.slice(end).trimStart();
  }
  return [...lines, rest];
}

function cardLines(card: Card): string[] {
  if (!('keyword' in card)) {
    return wrapped(card.comment).map((line) => `COMMENT   ${line}`.padEnd(CARD));
  }
  const { keyword, value, comment } = card;
  const start = `${keyword.padEnd(8)}= ${valueText(value)}`;
  return [
    (comment === undefined ? start : `${start} / ${asciiProse(comment)}`)
      .padEnd(CARD)
      .slice(0, CARD),
  ];
}

function headerBytes(cards: readonly Card[]): Buffer {
  const lines = [...cards.flatMap(cardLines), 'END'.padEnd(CARD)];
  const text = lines.join('');
  return Buffer.from(text.padEnd(Math.ceil(text.length / FITS_BLOCK) * FITS_BLOCK), 'latin1');
}

const WORD = 2 ** 32;

/** Sum of 32-bit words in ones' complement: what DATASUM and CHECKSUM rest on. */
export class FitsSum {
  private sum = 0;
  private left: number[] = [];

  /** Bytes that follow those added before. */
  add(bytes: Uint8Array): this {
    let at = 0;
    while (this.left.length > 0 && at < bytes.length) {
      this.left.push(bytes[at++]);
      if (this.left.length === 4) {
        const [a, b, c, d] = this.left;
        this.take(a * 2 ** 24 + b * 2 ** 16 + c * 2 ** 8 + d);
        this.left = [];
      }
    }
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    for (; at + 4 <= bytes.length; at += 4) this.take(view.getUint32(at));
    while (at < bytes.length) this.left.push(bytes[at++]);
    return this;
  }

  private take(word: number): void {
    this.sum += word;
    if (this.sum >= WORD) this.sum -= WORD - 1;
  }

  /** The sum, with zeros up to the next word. */
  get value(): number {
    if (this.left.length === 0) return this.sum;
    const padded = [0, 1, 2, 3].map((i) => this.left[i] ?? 0);
    const word = padded.reduce((total, byte) => total * 256 + byte, 0);
    const sum = this.sum + word;
    return sum >= WORD ? sum - (WORD - 1) : sum;
  }
}

const isPunctuation = (code: number) =>
  (code >= 0x3a && code <= 0x40) || (code >= 0x5b && code <= 0x60);

/** A sum's complement as 16 letters and digits (FITS standard 4.0, appendix J). */
export function encodeChecksum(sum: number): string {
  const complement = WORD - 1 - sum;
  const text = new Array<number>(16);
  for (let i = 0; i < 4; i += 1) {
    const byte = Math.floor(complement / 2 ** (24 - 8 * i)) % 256;
    const codes = new Array<number>(4).fill(Math.floor(byte / 4) + 0x30);
    codes[0] += byte % 4;
    while (codes.some(isPunctuation)) {
      for (const j of [0, 2]) {
        if (!isPunctuation(codes[j]) && !isPunctuation(codes[j + 1])) continue;
        codes[j] += 1;
        codes[j + 1] -= 1;
      }
    }
    for (let j = 0; j < 4; j += 1) text[4 * j + i] = codes[j];
  }
  return String.fromCharCode(...text.map((_, i) => text[(i + 15) % 16]));
}

/** Zeros (or spaces) that fill the last block after so many bytes. */
export const fitsPadding = (size: number) =>
  Buffer.alloc((FITS_BLOCK - (size % FITS_BLOCK)) % FITS_BLOCK);

/** A header with the sums of itself and of its data. */
export function headerWithSums(cards: readonly Card[], dataSum: number): Buffer {
  const withSum = (checksum: string) =>
    headerBytes([
      ...cards,
      { keyword: 'CHECKSUM', value: checksum, comment: 'HDU checksum' },
      { keyword: 'DATASUM', value: String(dataSum), comment: 'data unit checksum' },
    ]);
  const sum = new FitsSum().add(withSum('0'.repeat(16))).value + dataSum;
  return withSum(encodeChecksum(sum >= WORD ? sum - (WORD - 1) : sum));
}

/** The first unit of every file: no data, what the file says of itself. */
export function primaryUnit(comments: readonly string[]): Buffer {
  const cards: Card[] = [
    { keyword: 'SIMPLE', value: true, comment: 'FITS 4.0' },
    { keyword: 'BITPIX', value: 8 },
    { keyword: 'NAXIS', value: 0 },
    { keyword: 'EXTEND', value: true },
    ...comments.map((comment) => ({ comment })),
  ];
  return headerWithSums(cards, 0);
}
