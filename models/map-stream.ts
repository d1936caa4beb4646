import { escapeLiteral } from 'pg';
import type { Transaction } from 'sequelize';
import { type CopiedField, copyRows } from './copy-rows';
import { asEncoded } from './map-values';

/** A stored map as it passes by. */
export interface PassingMap {
  id: string;
  digest: string;
  checksum: string;
  report: Record<string, unknown>;
  /** The same object for neighbours that share it; not to be modified. */
  massMjup: Float64Array;
  semiMajorAxisAu: Float64Array;
  /** Shape [mass, semiMajorAxis], round(65535 C); valid until the next map comes. */
  encoded: Uint16Array;
}

const bytesOf = (field: CopiedField): Buffer => {
  if (field === null) throw new TypeError('a column of a stored map is empty');
  return field;
};

const textOf = (field: CopiedField): string => bytesOf(field).toString('utf8');

function uuidOf(field: CopiedField): string {
  const hex = bytesOf(field).toString('hex');
  return [0, 8, 12, 16, 20].map((from, i, all) => hex.slice(from, all[i + 1] ?? 32)).join('-');
}

/** float8[] of one dimension: dimensions, flags, type, length, lower bound, then length and value of each. */
function axisOf(bytes: Buffer): Float64Array {
  const values = new Float64Array(bytes.readInt32BE(12));
  for (let i = 0; i < values.length; i++) values[i] = bytes.readDoubleBE(20 + 12 * i + 4);
  return values;
}

/** jsonb: one byte of version, then text. */
const jsonOf = (bytes: Buffer) => JSON.parse(bytes.toString('utf8', 1));

/** Parses a column only where its bytes differ from those of the row before. */
function asBefore<Value>(parse: (bytes: Buffer) => Value): (field: CopiedField) => Value {
  let before: { bytes: Buffer; value: Value } | null = null;
  return (field) => {
    const bytes = bytesOf(field);
    if (before === null || !bytes.equals(before.bytes)) {
      before = { bytes: Buffer.from(bytes), value: parse(bytes) };
    }
    return before.value;
  };
}

function statementFor(collaborationId: string, by: 'id' | 'digest', keys: readonly string[]) {
  const type = by === 'id' ? 'uuid' : 'text';
  const list = keys.map((key) => escapeLiteral(key)).join(',');
  return `select (wanted.place - 1)::int, m.id, m.digest, m.checksum, m.report, m.mass_mjup,
      m.semi_major_axis_au, m.node_values
    from unnest(array[${list}]::${type}[]) with ordinality as wanted(key, place)
    join completeness_map m on m.collaboration_id = ${escapeLiteral(collaborationId)}
      and m.${by} = wanted.key
    order by wanted.place`;
}

export interface MapKeys {
  by: 'id' | 'digest';
  keys: readonly string[];
  gaps?: 'refuse' | 'skip';
}

/**
 * Reads many stored maps, one for each key and in their order, holding one at a time.
 *
 * @param keys ids or digests; one that stands twice is read twice
 * @param gaps whether a key without a map is passed over or an error, the usual case
 * @param onMap called with each map and the place of its key
 * @throws MissingMap naming the first key that has no map
 */
export async function streamMaps(
  collaborationId: string,
  { by, keys, gaps = 'refuse' }: MapKeys,
  onMap: (map: PassingMap, place: number) => void,
  transaction?: Transaction,
): Promise<void> {
  if (keys.length === 0) return;
  const massOf = asBefore(axisOf);
  const semiMajorAxisOf = asBefore(axisOf);
  const reportOf = asBefore(jsonOf);
  let next = 0;
  const onRow = ([place, id, digest, checksum, report, mass, axis, values]: CopiedField[]) => {
    const at = bytesOf(place).readInt32BE(0);
    if (at !== next && gaps === 'refuse') throw new MissingMap(keys[next]);
    next = at + 1;
    const map: PassingMap = {
      id: uuidOf(id),
      digest: textOf(digest),
      checksum: textOf(checksum),
      report: reportOf(report),
      massMjup: massOf(mass),
      semiMajorAxisAu: semiMajorAxisOf(axis),
      encoded: asEncoded(bytesOf(values)),
    };
    onMap(map, at);
  };
  await copyRows(statementFor(collaborationId, by, keys), onRow, transaction);
  if (next < keys.length && gaps === 'refuse') throw new MissingMap(keys[next]);
}

/** A map that should be stored and is not. */
export class MissingMap extends Error {
  constructor(readonly key: string) {
    super(`the map ${key} is not stored`);
  }
}
