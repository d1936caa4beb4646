import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { database } from '@/models';

/** Frozen runs of the collaboration, the newest first: what a release may be made of. */
export async function listFrozenRuns(
  actor: Actor,
): Promise<{ id: string; name: string; analysisName: string; sentence: string }[]> {
  demand(actor, 'read');
  return database().query(
    `select r.id, 'A-' || a.number || ', run ' || r.number as name, a.name as "analysisName",
       r.result->'statement'->>'sentence' as sentence
     from frozen_run f join run r on r.id = f.run_id join analysis a on a.id = r.analysis_id
     where f.collaboration_id = $1 order by f.frozen_at desc limit 100`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT },
  );
}
