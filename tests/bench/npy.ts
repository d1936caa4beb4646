import { closeSync, openSync, writeSync } from 'node:fs';

const MAGIC = Buffer.from([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0]);
/** The header ends at a multiple of so many bytes, so that the values may be mapped into memory. */
const ALIGNMENT = 64;

/** Header of a NumPy file of little-endian 32-bit floats in C order, format version 1.0. */
export function npyHeader(shape: readonly number[]): Buffer {
  const words = `{'descr': '<f4', 'fortran_order': False, 'shape': (${shape.join(', ')},), }`;
  const length = MAGIC.length + 2 + words.length + 1;
  const padded = `${words.padEnd(words.length + ((ALIGNMENT - (length % ALIGNMENT)) % ALIGNMENT))}\n`;
  const size = Buffer.alloc(2);
  size.writeUInt16LE(padded.length);
  return Buffer.concat([MAGIC, size, Buffer.from(padded, 'latin1')]);
}

/** Writes parts of one array one after the other, so that they need not be in memory together. */
export function writeNpy(
  file: string,
  shape: readonly number[],
  parts: Iterable<Float64Array>,
): void {
  const expected = shape.reduce((a, b) => a * b, 1);
  const descriptor = openSync(file, 'w');
  let written = 0;
  try {
    writeSync(descriptor, npyHeader(shape));
    for (const part of parts) {
      // In the machine's own order, which is the file's on every one that Node.js runs on but one.
      writeSync(descriptor, new Uint8Array(Float32Array.from(part).buffer));
      written += part.length;
    }
  } finally {
    closeSync(descriptor);
  }
  if (written !== expected)
    throw new RangeError(`${written} values do not fill ${shape.join(' × ')}`);
}

/** Values of a file that this program or NumPy wrote as little-endian 32-bit floats in C order. */
export function readNpy(bytes: Buffer): { shape: number[]; values: Float32Array } {
  if (!bytes.subarray(0, 6).equals(MAGIC.subarray(0, 6))) throw new TypeError('not a NumPy file');
  const start = 10 + bytes.readUInt16LE(8);
  const words = bytes.toString('latin1', 10, start);
  const shape = /'shape': \(([\d, ]+)\)/.exec(words)?.[1];
  if (!shape || !words.includes("'<f4'") || !words.includes("'fortran_order': False")) {
    throw new TypeError(`expected 32-bit floats in C order, got ${words.trim()}`);
  }
  const values = new Float32Array((bytes.length - start) / 4);
  for (let i = 0; i < values.length; i++) values[i] = bytes.readFloatLE(start + 4 * i);
  return {
    shape: shape
      .split(',')
      .filter((n) => n.trim())
      .map(Number),
    values,
  };
}
