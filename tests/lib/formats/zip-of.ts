import { deflateRawSync } from 'node:zlib';

/** Deflated zeros, as long as asked for: whole blocks repeat, so that gigabytes cost kilobytes. */
function deflatedZeros(length: number): Buffer {
  if (length === 0) return Buffer.from([3, 0]);
  const chunk = 2 ** 20;
  // A flushed block ends on a byte and does not end the stream, so it may be repeated.
  const block = deflateRawSync(Buffer.alloc(chunk), { finishFlush: 2 });
  const whole = Math.floor(length / chunk);
  return Buffer.concat([...new Array<Buffer>(whole).fill(block), Buffer.from([3, 0])]);
}

/** A zip archive of entries that unpack to zeros, with the sizes that it really has. */
export function zipOf(entries: { name: string; unpackedBytes: number }[]): Uint8Array {
  const locals: Buffer[] = [];
  const central: Buffer[] = [];
  let offset = 0;
  for (const { name, unpackedBytes } of entries) {
    const content = deflatedZeros(unpackedBytes);
    const head = Buffer.alloc(26);
    head.writeUInt16LE(20, 0);
    head.writeUInt16LE(8, 4);
    head.writeUInt32LE(content.length, 14);
    head.writeUInt32LE(unpackedBytes, 18);
    head.writeUInt16LE(name.length, 22);
    locals.push(Buffer.from('PK\x03\x04', 'latin1'), head, Buffer.from(name), content);
    const record = Buffer.alloc(42);
    record.writeUInt16LE(20, 0);
    head.copy(record, 2);
    record.writeUInt32LE(offset, 38);
    central.push(Buffer.from('PK\x01\x02', 'latin1'), record, Buffer.from(name));
    offset += 4 + head.length + name.length + content.length;
  }
  const directory = Buffer.concat(central);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(entries.length, 4);
  end.writeUInt16LE(entries.length, 6);
  end.writeUInt32LE(directory.length, 8);
  end.writeUInt32LE(offset, 12);
  return new Uint8Array(
    Buffer.concat([...locals, directory, Buffer.from('PK\x05\x06', 'latin1'), end]),
  );
}

/** A gzip file of zeros, which states the length that it has; its checksum is reached by nobody. */
export function gzippedZeros(unpackedBytes: number): Uint8Array {
  const head = Buffer.from([0x1f, 0x8b, 8, 0, 0, 0, 0, 0, 0, 255]);
  const end = Buffer.alloc(8);
  end.writeUInt32LE(unpackedBytes % 2 ** 32, 4);
  return new Uint8Array(Buffer.concat([head, deflatedZeros(unpackedBytes), end]));
}
