import { hold } from '@/lib/queue/attempt';
import type { MapGrid, StarInputs } from '@/lib/sensitivity';
import { CompletenessMapRow, inTransaction } from '@/models';
import type { MapRecipe } from '@/models/map-recipe';
import type { CompletedMap, CompleteMapsInput } from '../compute/complete-maps';
import { inLanes } from '../lanes';
import { ThreadFault } from '../pool';
import { type MapToStore, storeMaps } from './map-store';
import { combineRows, type Rule } from './run-maps';
import type { StudyWork } from './study-context';

/** A map that a study needs, computed from a star's inputs. */
export interface NewMap {
  digest: string;
  inputs: Record<string, unknown>;
  star: StarInputs;
  recipe: MapRecipe;
  grid: MapGrid;
}

/** A map that a study needs, put together from others. */
export interface NewCombination {
  digest: string;
  inputs: Record<string, unknown>;
  rule: Exclude<Rule, 'same-position'>;
  parts: string[];
}

/** Maps that could not be made, each with its sentence. */
export type MapFaults = Map<string, string>;

async function findMissing<Wanted extends { digest: string }>(
  collaborationId: string,
  wanted: Wanted[],
): Promise<Wanted[]> {
  const once = new Map(wanted.map((one) => [one.digest, one]));
  const stored = await CompletenessMapRow.findAll({
    attributes: ['digest'],
    where: { collaborationId, digest: [...once.keys()] },
  });
  for (const { digest } of stored) once.delete(digest);
  return [...once.values()];
}

async function storeOne({ work, collaborationId }: StudyWork, map: MapToStore): Promise<void> {
  await inTransaction(async (transaction) => {
    await hold(transaction, work.attempt);
    await storeMaps(collaborationId, [map], transaction);
  });
}

/**
 * Sees to it that every wanted map is stored. What is there is reused: the same question asked
 * again, or after a worker was killed, computes nothing twice.
 */
export async function ensureMaps(
  given: StudyWork,
  wanted: NewMap[],
  stage: string,
): Promise<MapFaults> {
  const { work, collaborationId } = given;
  const faults: MapFaults = new Map();
  const missing = await findMissing(collaborationId, wanted);
  const total = new Set(wanted.map(({ digest }) => digest)).size;
  let done = total - missing.length;
  await given.report(stage, done, total);
  await inLanes(missing, work.pool.threads + 1, async (map) => {
    const answer = await completeOne(given, map);
    if ('fault' in answer) faults.set(map.digest, `${map.star.name}: ${answer.fault}`);
    else await storeOne(given, { ...map.grid, ...answer, digest: map.digest, inputs: map.inputs });
    done++;
    await given.report(stage, done, total);
  });
  return faults;
}

async function completeOne({ work }: StudyWork, map: NewMap): Promise<CompletedMap> {
  const { star, grid, recipe } = map;
  const { cooling, settings } = recipe;
  try {
    const [answer] = await work.pool.run<CompleteMapsInput, CompletedMap[]>(
      'complete-maps',
      { stars: [star], cooling, grid, settings },
      { signal: work.signal },
    );
    return answer;
  } catch (error) {
    if (error instanceof ThreadFault) return { fault: error.message };
    throw error;
  }
}

/** Sees to it that every wanted combination of stored maps is stored. */
export async function ensureCombinations(
  given: StudyWork,
  wanted: NewCombination[],
): Promise<void> {
  const { collaborationId } = given;
  for (const { digest, inputs, rule, parts } of await findMissing(collaborationId, wanted)) {
    const rows = await CompletenessMapRow.findAll({
      where: { collaborationId, digest: parts },
      order: [['digest', 'ASC']],
    });
    await storeOne(given, { ...combineRows(rows, rule), digest, inputs });
  }
}
