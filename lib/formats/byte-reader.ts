/** Fixed-width binary fields of tables, by the letter that VOTable and FITS share where they do. */
export type FieldType = 'boolean' | 'uint8' | 'int16' | 'int32' | 'int64' | 'float32' | 'float64';

export const fieldBytes: Record<FieldType, number> = {
  boolean: 1,
  uint8: 1,
  int16: 2,
  int32: 4,
  int64: 8,
  float32: 4,
  float64: 8,
};

/** Reads one big-endian value; 64-bit integers stay exact as bigint, booleans are T, F or null. */
export function readField(
  view: DataView,
  at: number,
  type: FieldType,
): number | bigint | boolean | null {
  switch (type) {
    case 'boolean':
      return readBoolean(view.getUint8(at));
    case 'uint8':
      return view.getUint8(at);
    case 'int16':
      return view.getInt16(at);
    case 'int32':
      return view.getInt32(at);
    case 'int64':
      return view.getBigInt64(at);
    case 'float32':
      return view.getFloat32(at);
    case 'float64':
      return view.getFloat64(at);
  }
}

function readBoolean(byte: number): boolean | null {
  const letter = String.fromCharCode(byte);
  if (/[Tt1]/.test(letter)) return true;
  if (/[Ff0]/.test(letter)) return false;
  return null;
}
