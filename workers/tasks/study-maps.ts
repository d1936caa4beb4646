import { hold } from '@/lib/queue/attempt';
import type { MapGrid, StarInputs } from '@/lib/sensitivity';
import { CompletenessMapRow, inTransaction } from '@/models';
import type { MapRecipe } from '@/models/map-recipe';
import { inLanes } from '../lanes';
import { completeStars } from './complete-stars';
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

async function store({ work, collaborationId }: StudyWork, maps: MapToStore[]): Promise<void> {
  await inTransaction(async (transaction) => {
    await hold(transaction, work.attempt);
    await storeMaps(collaborationId, maps, transaction);
  });
}

/** Few enough that progress is seen and a stop is quick, enough that storing does not rule the time. */
const STARS_PER_TASK = 12;

/** Maps that are made alike, so many at a time. */
function batchesOf(maps: NewMap[]): NewMap[][] {
  const alike: NewMap[][] = [];
  for (const map of maps) {
    const isAlike = ([{ recipe, grid }]: NewMap[]) =>
      recipe.cooling === map.recipe.cooling &&
      recipe.settings === map.recipe.settings &&
      grid === map.grid;
    const others = alike.find(isAlike);
    if (others) others.push(map);
    else alike.push([map]);
  }
  return alike.flatMap((all) =>
    Array.from({ length: Math.ceil(all.length / STARS_PER_TASK) }, (_, i) =>
      all.slice(i * STARS_PER_TASK, (i + 1) * STARS_PER_TASK),
    ),
  );
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
  await inLanes(batchesOf(missing), work.pool.threads + 1, async (batch) => {
    const [{ recipe, grid }] = batch;
    const stars = batch.map(({ star }) => star);
    const answers = await completeStars(work, recipe, grid, stars);
    const made = batch.flatMap(({ digest, inputs, star }, i) => {
      const answer = answers[i];
      if (!('fault' in answer)) return [{ ...grid, ...answer, digest, inputs }];
      faults.set(digest, `${star.name}: ${answer.fault}`);
      return [];
    });
    await store(given, made);
    done += batch.length;
    await given.report(stage, done, total);
  });
  return faults;
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
    await store(given, [{ ...combineRows(rows, rule), digest, inputs }]);
  }
}
