import { createHash } from 'node:crypto';
import { decodeMap, encodeMap } from '@/lib/sensitivity';

/**
 * A map as it lies in the table: uint16 = round(65535 C), little-endian, row-major.
 *
 * @param completeness shape [mass, semiMajorAxis], row-major, 0 to 1, not modified
 */
export function packMap(completeness: Float64Array): { nodeValues: Buffer; checksum: string } {
  const encoded = encodeMap(completeness);
  const nodeValues = Buffer.alloc(encoded.length * 2);
  for (let i = 0; i < encoded.length; i++) nodeValues.writeUInt16LE(encoded[i], i * 2);
  return { nodeValues, checksum: createHash('sha256').update(nodeValues).digest('hex') };
}

/** The inverse of packMap: values within 7.7e-6 of those that were packed. */
export function unpackMap(nodeValues: Buffer): Float64Array {
  const encoded = new Uint16Array(nodeValues.length / 2);
  for (let i = 0; i < encoded.length; i++) encoded[i] = nodeValues.readUInt16LE(i * 2);
  return decodeMap(encoded);
}
