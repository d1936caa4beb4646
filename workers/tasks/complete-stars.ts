import type { MapGrid, StarInputs } from '@/lib/sensitivity';
import type { MapRecipe } from '@/models/map-recipe';
import type { CompletedMap, CompleteMapsInput } from '../compute/complete-maps';
import type { Work } from '../perform';
import { ThreadFault } from '../pool';

/**
 * The maps of stars that are made alike, in one thread: one answer a star, in order. One star that
 * brings the thread down does not take the others along.
 */
export async function completeStars(
  work: Work,
  { cooling, settings }: Pick<MapRecipe, 'cooling' | 'settings'>,
  grid: MapGrid,
  stars: StarInputs[],
): Promise<CompletedMap[]> {
  const run = (some: StarInputs[]) =>
    work.pool.run<CompleteMapsInput, CompletedMap[]>(
      'complete-maps',
      { stars: some, cooling, grid, settings },
      { signal: work.signal },
    );
  try {
    return await run(stars);
  } catch (error) {
    if (!(error instanceof ThreadFault)) throw error;
    if (stars.length === 1) return [{ fault: error.message }];
  }
  const answers: CompletedMap[] = [];
  for (const star of stars) {
    answers.push(...(await completeStars(work, { cooling, settings }, grid, [star])));
  }
  return answers;
}
