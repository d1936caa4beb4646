import {
  bytesPerValue,
  floatBytes,
  mapBytes,
  shapeOf,
  valueCount,
  type WrittenBytes,
  type WrittenMaps,
} from './written-maps';

/** NumPy's header (version 1.0): a whole number of 64 bytes. */
export function npyHeader(descr: string, shape: readonly number[]): Uint8Array {
  const sides = shape.length === 1 ? `${shape[0]},` : shape.join(', ');
  const text = `{'descr': '${descr}', 'fortran_order': False, 'shape': (${sides}), }`;
  const length = Math.ceil((10 + text.length + 1) / 64) * 64;
  const bytes = Buffer.alloc(length, ' ');
  bytes.write('\x93NUMPY\x01\x00', 'latin1');
  bytes.writeUInt16LE(length - 10, 8);
  bytes.write(text, 10, 'latin1');
  bytes.write('\n', length - 1, 'latin1');
  return bytes;
}

const descrOf = { float32: '<f4', float64: '<f8' } as const;

/** Doubles as an array of any shape. */
export function npyOfNumbers(values: ArrayLike<number>, shape: readonly number[]): Uint8Array {
  return Buffer.concat([npyHeader('<f8', shape), floatBytes(values, 'float64', true)]);
}

/** Texts as NumPy keeps them: four bytes a character, as many as the longest has. */
export function npyOfTexts(texts: readonly string[]): Uint8Array {
  const signs = texts.map((text) => Array.from(text, (sign) => sign.codePointAt(0) as number));
  const width = Math.max(1, ...signs.map((codes) => codes.length));
  const content = Buffer.alloc(4 * width * texts.length);
  signs.forEach((codes, i) => {
    codes.forEach((code, k) => {
      content.writeUInt32LE(code, 4 * (i * width + k));
    });
  });
  return Buffer.concat([npyHeader(`<U${width}`, [texts.length]), content]);
}

/** The maps alone; their axes belong to another file. */
export function npyOfMaps(maps: WrittenMaps): WrittenBytes {
  const header = npyHeader(descrOf[maps.format], shapeOf(maps));
  return {
    size: header.length + valueCount(maps) * bytesPerValue[maps.format],
    async *parts() {
      yield header;
      yield* mapBytes(maps, true);
    },
  };
}
