import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { database } from '@/models';
import { GROUND, type Ground, JOIN_GROUND, restsOn } from './rests-on';

interface FrozenRun {
  id: string;
  name: string;
  analysisName: string;
  sentence: string;
}

/** Frozen runs of the collaboration, the newest first: what a release may be made of. */
export async function listFrozenRuns(
  actor: Actor,
): Promise<(FrozenRun & ReturnType<typeof restsOn>)[]> {
  demand(actor, 'read');
  const rows = await database().query<FrozenRun & Ground>(
    `select r.id, 'A-' || a.number || ', run ' || r.number as name, a.name as "analysisName",
       x.statement->>'sentence' as sentence, ${GROUND}
     from frozen_run f join run r on r.id = f.run_id join analysis a on a.id = r.analysis_id
       ${JOIN_GROUND}
     where f.collaboration_id = $1 order by f.frozen_at desc limit 100`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT },
  );
  return rows.map(({ id, name, analysisName, sentence, ...ground }) => ({
    id,
    name,
    analysisName,
    sentence,
    ...restsOn(ground),
  }));
}
