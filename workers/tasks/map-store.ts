import type { Transaction } from 'sequelize';
import { select } from '@/lib/queue/statement';
import { type CoolingReport, ENGINE_VERSION, type MapGrid } from '@/lib/sensitivity';
import { CompletenessMapRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { packEncoded } from '@/models/map-values';

export interface MapToStore extends MapGrid {
  digest: string;
  /** Shape [mass, semiMajorAxis], as encodeMap returns it; nobody reads it afterwards. */
  encoded: Uint16Array;
  inputs: Record<string, unknown>;
  report: CoolingReport | Record<string, unknown>;
}

/** What the row of a computed map holds. */
export function rowOfMap(
  collaborationId: string,
  { digest, encoded, inputs, report, ...grid }: MapToStore,
) {
  return {
    collaborationId,
    digest,
    origin: 'computed' as const,
    engineVersion: ENGINE_VERSION,
    massMjup: [...grid.massMjup],
    semiMajorAxisAu: [...grid.semiMajorAxisAu],
    ...packEncoded(encoded),
    // Typed arrays as lists: JSON would write them as objects.
    inputs: JSON.parse(canonicalJson(inputs)),
    report: JSON.parse(canonicalJson(report)),
  };
}

/** Stores maps that are not there yet; one that another attempt stored first is left as it is. */
export async function storeMaps(
  collaborationId: string,
  maps: MapToStore[],
  transaction: Transaction,
): Promise<void> {
  if (maps.length === 0) return;
  const rows = maps.map((map) => rowOfMap(collaborationId, map));
  await CompletenessMapRow.bulkCreate(rows, { ignoreDuplicates: true, transaction });
}

/** Gives targets the stored maps of their digests. */
export async function linkMaps(
  collaborationId: string,
  links: { targetId: string; digest: string }[],
  transaction: Transaction,
): Promise<void> {
  if (links.length === 0) return;
  await select(
    `update target t set map_id = m.id, map_state = 'ready', map_fault = null
     from unnest($2::uuid[], $3::text[]) as wanted(target_id, digest)
     join completeness_map m on m.collaboration_id = $1 and m.digest = wanted.digest
     where t.id = wanted.target_id and t.collaboration_id = $1 returning t.id`,
    [collaborationId, links.map((link) => link.targetId), links.map((link) => link.digest)],
    transaction,
  );
}

/** Targets that wait for a map lose the one that no longer fits their curves. */
export async function markWaiting(targetIds: string[], transaction: Transaction): Promise<void> {
  await select(
    `update target set map_state = 'waiting', map_id = null, map_fault = null
     where id = any($1) and map_state <> 'waiting' returning id`,
    [targetIds],
    transaction,
  );
}

/** Targets whose map cannot be made, each with its sentence. */
export async function markFailed(
  faults: { targetId: string; fault: string }[],
  transaction: Transaction,
): Promise<void> {
  if (faults.length === 0) return;
  await select(
    `update target t set map_state = 'failed', map_id = null, map_fault = found.fault
     from unnest($1::uuid[], $2::text[]) as found(target_id, fault)
     where t.id = found.target_id and (t.map_state, t.map_fault) is distinct from ('failed', found.fault)
     returning t.id`,
    [faults.map(({ targetId }) => targetId), faults.map(({ fault }) => fault)],
    transaction,
  );
}
