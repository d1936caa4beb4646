import { expect } from 'vitest';
import { withDatabase } from './database';
import { actorOf, createCollaborationWith } from './people';
import { buildStars, buildSurvey } from './sample';
import { jobOf } from './work';
import { until } from './worker';

interface StoredMap {
  digest: string;
  bytes: string;
}

/** Digest and bytes of every stored map, and a proof that each target has its own. */
export async function mapsOf(collaborationId: string): Promise<StoredMap[]> {
  const { query } = withDatabase();
  const maps = await query<StoredMap>(
    `select digest, encode(node_values, 'hex') as bytes from completeness_map
     where collaboration_id = $1 order by digest`,
    [collaborationId],
  );
  const [linked] = await query<{ targets: number; maps: number }>(
    `select count(*)::int as targets, count(distinct map_id)::int as maps from target
     where collaboration_id = $1 and map_state = 'ready'`,
    [collaborationId],
  );
  expect(linked).toEqual({ targets: maps.length, maps: maps.length });
  return maps;
}

/** A survey of stars whose curves have no maps yet, in a collaboration of its own. */
export async function newSurvey(stars: number) {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  const survey = await buildSurvey(collaboration.id);
  await buildStars(survey, stars);
  return { collaboration, survey, actor: await actorOf(people.owner, collaboration) };
}

/** Waits until the job is well under way, and says how far it has got. */
export async function underWay(jobId: string, atLeast: number): Promise<number> {
  let done = 0;
  await until('the job is under way', async () => {
    const job = await jobOf(jobId);
    done = job.doneCount;
    return job.status === 'running' && done >= atLeast;
  });
  return done;
}
