/** Little-endian bytes of an HDF5 structure, put together field by field. */
export class Fields {
  private parts: Uint8Array[] = [];

  bytes(...values: number[]): this {
    this.parts.push(Uint8Array.from(values));
    return this;
  }

  uint16(value: number): this {
    return this.bytes(value & 0xff, value >> 8);
  }

  uint32(value: number): this {
    const part = new Uint8Array(4);
    new DataView(part.buffer).setUint32(0, value, true);
    this.parts.push(part);
    return this;
  }

  /** A length or an address; null for "not defined". */
  uint64(value: number | null): this {
    const part = new Uint8Array(8);
    new DataView(part.buffer).setBigUint64(
      0,
      value === null ? 2n ** 64n - 1n : BigInt(value),
      true,
    );
    this.parts.push(part);
    return this;
  }

  raw(part: Uint8Array): this {
    this.parts.push(part);
    return this;
  }

  text(text: string): this {
    return this.raw(new TextEncoder().encode(text));
  }

  build(): Uint8Array {
    return Buffer.concat(this.parts);
  }
}

const rotate = (x: number, k: number) => (x << k) | (x >>> (32 - k));

/** Jenkins' lookup3 over bytes, which HDF5 calls its metadata checksum. */
export function lookup3(bytes: Uint8Array): number {
  const start = (0xdeadbeef + bytes.length) | 0;
  let [a, b, c] = [start, start, start];
  const word = (at: number) => {
    let value = 0;
    for (let i = 3; i >= 0; i -= 1) value = (value << 8) | (bytes[at + i] ?? 0);
    return value;
  };
  let at = 0;
  for (; bytes.length - at > 12; at += 12) {
    a = (a + word(at)) | 0;
    b = (b + word(at + 4)) | 0;
    c = (c + word(at + 8)) | 0;
    a = ((a - c) | 0) ^ rotate(c, 4);
    c = (c + b) | 0;
    b = ((b - a) | 0) ^ rotate(a, 6);
    a = (a + c) | 0;
    c = ((c - b) | 0) ^ rotate(b, 8);
    b = (b + a) | 0;
    a = ((a - c) | 0) ^ rotate(c, 16);
    c = (c + b) | 0;
    b = ((b - a) | 0) ^ rotate(a, 19);
    a = (a + c) | 0;
    c = ((c - b) | 0) ^ rotate(b, 4);
    b = (b + a) | 0;
  }
  if (at === bytes.length) return c >>> 0;
  a = (a + word(at)) | 0;
  b = (b + word(at + 4)) | 0;
  c = (c + word(at + 8)) | 0;
  c = ((c ^ b) - rotate(b, 14)) | 0;
  a = ((a ^ c) - rotate(c, 11)) | 0;
  b = ((b ^ a) - rotate(a, 25)) | 0;
  c = ((c ^ b) - rotate(b, 16)) | 0;
  a = ((a ^ c) - rotate(c, 4)) | 0;
  b = ((b ^ a) - rotate(a, 14)) | 0;
  c = ((c ^ b) - rotate(b, 24)) | 0;
  return c >>> 0;
}

export type Hdf5Type = 'float32' | 'float64' | { textBytes: number };

/** Datatype message: IEEE little-endian, or UTF-8 of a fixed length padded with zeros. */
export function datatypeMessage(type: Hdf5Type): Uint8Array {
  if (typeof type === 'object') {
    return new Fields().bytes(0x13, 0x11, 0, 0).uint32(type.textBytes).build();
  }
  const isDouble = type === 'float64';
  const bits = isDouble ? 64 : 32;
  const mantissa = isDouble ? 52 : 23;
  return new Fields()
    .bytes(0x11, 0x20, bits - 1, 0)
    .uint32(bits / 8)
    .uint16(0)
    .uint16(bits)
    .bytes(mantissa, bits - 1 - mantissa, 0, mantissa)
    .uint32(isDouble ? 1023 : 127)
    .build();
}

/** Dataspace message; no sides for a single value. */
export function dataspaceMessage(shape: readonly number[]): Uint8Array {
  const fields = new Fields().bytes(2, shape.length, 0, shape.length === 0 ? 0 : 1);
  for (const side of shape) fields.uint64(side);
  return fields.build();
}

/** Attribute message that holds one text. */
export function textAttribute(name: string, text: string): Uint8Array {
  const content = new TextEncoder().encode(text === '' ? ' ' : text);
  const type = datatypeMessage({ textBytes: content.length });
  const space = dataspaceMessage([]);
  const title = new TextEncoder().encode(`${name}\0`);
  return new Fields()
    .bytes(3, 0)
    .uint16(title.length)
    .uint16(type.length)
    .uint16(space.length)
    .bytes(1)
    .raw(title)
    .raw(type)
    .raw(space)
    .raw(content)
    .build();
}

/** Object header, version 2: messages by their type, then the checksum. */
export function objectHeader(
  messages: readonly (readonly [type: number, content: Uint8Array])[],
): Uint8Array {
  const body = new Fields();
  for (const [type, content] of messages) {
    body.bytes(type).uint16(content.length).bytes(0).raw(content);
  }
  const content = body.build();
  const header = new Fields().text('OHDR').bytes(2, 2).uint32(content.length).raw(content).build();
  return new Fields().raw(header).uint32(lookup3(header)).build();
}
