import type { Transaction } from 'sequelize';
import { select } from '@/lib/queue/statement';
import type { ShareScope } from '@/lib/schemas/sharing';
import { digestOf } from '@/models/digest';
import type { SharedMap } from './content';

/**
 * A map shared without its inputs is known by its values alone: the digest of the owner is made
 * from ages and curves, which anybody could check guesses against.
 */
export const copiedDigest = (map: SharedMap, scope: ShareScope): string =>
  scope === 'whole' ? map.digest : digestOf({ kind: 'shared', checksum: map.checksum });

const WHOLE = `m.origin, m.inputs - 'uploadId', m.report`;

/** Which masses lie beyond the cooling relation's validity is part of what a limit has to state. */
const MAPS_ALONE = `'uploaded', '{"kind": "shared"}'::jsonb, case when m.report ? 'flaggedMassNodes'
  then jsonb_build_object('flaggedMassNodes', m.report->'flaggedMassNodes') else '{}'::jsonb end`;

/** Copies stored bytes from one collaboration to another inside the database. */
export async function copyMaps(
  from: string,
  to: string,
  maps: SharedMap[],
  scope: ShareScope,
  transaction: Transaction,
): Promise<void> {
  await select(
    `insert into completeness_map (collaboration_id, digest, engine_version, mass_mjup,
       semi_major_axis_au, scale, node_values, checksum, origin, inputs, report)
     select $2, wanted.digest, m.engine_version, m.mass_mjup, m.semi_major_axis_au, m.scale,
       m.node_values, m.checksum, ${scope === 'whole' ? WHOLE : MAPS_ALONE}
     from unnest($3::uuid[], $4::text[]) as wanted(id, digest)
     join completeness_map m on m.id = wanted.id and m.collaboration_id = $1
     on conflict (collaboration_id, digest) do nothing returning id`,
    [from, to, maps.map(({ id }) => id), maps.map((map) => copiedDigest(map, scope))],
    transaction,
  );
}
