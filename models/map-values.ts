import { createHash } from 'node:crypto';
import { endianness } from 'node:os';
import { decodeMap, encodeMap } from '@/lib/sensitivity';

const isBigEndian = endianness() === 'BE';

/**
 * Numbers of a map as it lies in the table, little-endian; the bytes may begin at an odd address.
 *
 * @returns a copy, shape [mass, semiMajorAxis]
 */
export function asEncoded(bytes: Buffer): Uint16Array {
  const encoded = new Uint16Array(bytes.length / 2);
  const own = Buffer.from(encoded.buffer);
  own.set(bytes);
  if (isBigEndian) own.swap16();
  return encoded;
}

/** The bytes of numbers that nobody reads afterwards, little-endian; nothing is copied. */
export function ownBytes(encoded: Uint16Array): Buffer {
  const bytes = Buffer.from(encoded.buffer, encoded.byteOffset, encoded.byteLength);
  return isBigEndian ? bytes.swap16() : bytes;
}

interface PackedMap {
  nodeValues: Buffer;
  checksum: string;
}

/**
 * A map as it lies in the table: uint16 = round(65535 C), little-endian, row-major.
 *
 * @param completeness shape [mass, semiMajorAxis], row-major, 0 to 1, not modified
 */
export function packMap(completeness: Float64Array): PackedMap {
  return packEncoded(encodeMap(completeness));
}

/** @param encoded shape [mass, semiMajorAxis], round(65535 C), which nobody reads afterwards */
export function packEncoded(encoded: Uint16Array): PackedMap {
  const nodeValues = ownBytes(encoded);
  return { nodeValues, checksum: createHash('sha256').update(nodeValues).digest('hex') };
}

/** The inverse of packMap: values within 7.7e-6 of those that were packed. */
export function unpackMap(nodeValues: Buffer): Float64Array {
  return decodeMap(asEncoded(nodeValues));
}
