/** Bytes of a file whose length is known before the first of them is made. */
export interface WrittenBytes {
  size: number;
  /** Makes them anew at each call, a part at a time. */
  parts(): AsyncIterable<Uint8Array>;
}

export type FloatFormat = 'float32' | 'float64';

/** Maps on one grid, read one after the other so that thousands never lie in memory together. */
export interface WrittenMaps {
  /** One line for people. */
  title: string;
  /** Shape [mass] [Mjup], increasing. */
  massMjup: readonly number[];
  /** Shape [semiMajorAxis] [AU], increasing. */
  semiMajorAxisAu: readonly number[];
  /** Whose maps, in order; null for one map that belongs to no single star. */
  targets: readonly string[] | null;
  /** One map alone is [mass, semiMajorAxis], without the axis of targets. */
  isCube: boolean;
  format: FloatFormat;
  provenance: readonly (readonly [name: string, text: string])[];
  /** Each map in the order of `targets`: [mass, semiMajorAxis], row-major, 0 to 1. */
  maps(): AsyncIterable<ArrayLike<number>>;
}

export const bytesPerValue = { float32: 4, float64: 8 } as const;

/** Sides of the array, the slowest first. */
export function shapeOf({ massMjup, semiMajorAxisAu, targets, isCube }: WrittenMaps): number[] {
  const sides = [massMjup.length, semiMajorAxisAu.length];
  return isCube ? [targets?.length ?? 1, ...sides] : sides;
}

export const valueCount = (maps: WrittenMaps) =>
  shapeOf(maps).reduce((product, side) => product * side, 1);

/** Numbers as bytes in one order. */
export function floatBytes(
  values: ArrayLike<number>,
  format: FloatFormat,
  isLittle: boolean,
): Uint8Array {
  const width = bytesPerValue[format];
  const bytes = new Uint8Array(values.length * width);
  const view = new DataView(bytes.buffer);
  for (let i = 0; i < values.length; i += 1) {
    if (format === 'float32') view.setFloat32(i * width, values[i], isLittle);
    else view.setFloat64(i * width, values[i], isLittle);
  }
  return bytes;
}

/** The maps' bytes one after the other. @throws RangeError where a map has another size */
export async function* mapBytes(maps: WrittenMaps, isLittle: boolean): AsyncGenerator<Uint8Array> {
  const size = maps.massMjup.length * maps.semiMajorAxisAu.length;
  for await (const values of maps.maps()) {
    if (values.length !== size) {
      throw new RangeError(`a map must have ${size} values, got ${values.length}`);
    }
    yield floatBytes(values, maps.format, isLittle);
  }
}

/** The whole of a file, where it is known to be small. */
export async function collectBytes({ size, parts }: WrittenBytes): Promise<Uint8Array> {
  const whole = new Uint8Array(size);
  let at = 0;
  for await (const part of parts()) {
    whole.set(part, at);
    at += part.length;
  }
  if (at !== size) throw new RangeError(`a file of ${size} bytes was promised, ${at} were made`);
  return whole;
}

export const bytesOf = (content: Uint8Array): WrittenBytes => ({
  size: content.length,
  async *parts() {
    yield content;
  },
});
